import { percentText, quantityText, timeText } from '../draw/quantityText.ts';
import type { RankedDesign } from '../run/ranking.ts';
import type { Miss } from '../score/aim.ts';
import { worstOf } from '../score/scores.ts';
import type { Task } from '../score/task.ts';

/** One limit of a brief and how a design misses it: `target.time allows 1 ms, it takes 3.2 ms (3.2 times as much)`. */
export function missText({ limit, factor }: Miss, { scores, shop }: RankedDesign, task: Task): string {
  const { target, detector } = task;
  const times = `${Number(factor.toPrecision(4))} times`;
  switch (limit) {
    case 'target.correction': {
      // Three digits would make a correction just beyond 1 % look like one that keeps it.
      const worst = `${Number((100 * worstOf(scores)).toPrecision(4))} %`;
      return `target.correction allows ${percentText(target.correction)}, its worst is ${worst} (${times})`;
    }
    case 'target.lobe':
      return `target.lobe allows ${percentText(target.lobe)}, it has ${percentText(scores.lobe.ratio)} (${times})`;
    case 'target.time':
      return `target.time allows ${timeText(target.timeS)}, it takes ${timeText(scores.snr.time_s)} (${times})`;
    case 'detector.radius': {
      const [least, most] = detector.radiusM.map((radius) => quantityText(radius, 'm'));
      return `detector.radius allows ${least} to ${most}, its own is ${quantityText(scores.radius_m, 'm')}`;
    }
    case 'shop':
      return `the shop cannot cut it: ${shop.notes[0] ?? 'it breaks the rules'}`;
    default:
      return `${limit} is missed by ${times}`;
  }
}
