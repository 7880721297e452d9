import { areaText, countText, percentText, timeText } from '../draw/quantityText.ts';
import type { RankedDesign } from '../run/ranking.ts';
import { missesOf } from '../run/ranking.ts';
import { worstOf } from '../score/scores.ts';
import type { Task } from '../score/task.ts';
import { shortCount } from './designColumns.ts';
import { missText } from './missText.ts';

/** A design's scores as one paragraph, and what of the target it misses. */
export function scoreText(design: RankedDesign, task: Task): string {
  const { gain, correction, lobe, snr, area_m2, areaOverFloor, leastAreaOverFloor } = design.scores;
  const worst = worstOf(design.scores);
  const { asDrawn } = design;
  const scores = [
    `worst correction ${percentText(worst)}`,
    ...(asDrawn === undefined ? [] : [`as cut (as drawn ${percentText(asDrawn.worst)})`]),
    // The same three digits twice would tell nothing.
    ...(percentText(worst) === percentText(correction.worst)
      ? []
      : [`of the samples alone ${percentText(correction.worst)}`]),
    `rms ${percentText(correction.rms)}`,
    ...(correction.population === undefined
      ? []
      : [`mean over the sizes ${percentText(correction.population)}`]),
    `gain ${Number(gain.toPrecision(5))}`,
    `lobe ratio ${countText(lobe.ratio)}`,
    `SNR ${shortCount(snr.required)}`,
    `time ${timeText(snr.time_s)}`,
    `area ${areaText(area_m2)}`,
    `${countText(areaOverFloor)} times the floor`,
    ...(leastAreaOverFloor === undefined
      ? []
      : [`${(areaOverFloor / leastAreaOverFloor).toFixed(3)} times the least that any mask needs`]),
  ];
  const misses = missesOf(design, task).map((miss) => missText(miss, design, task));
  const target = misses.length === 0 ? 'The target is met.' : `The target is not met: ${misses.join('; ')}.`;
  return `Over all particles, wavelengths and places: ${scores.join(', ')}. ${target}`;
}
