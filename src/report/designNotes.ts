import { elementArea } from '../draw/elementMeasure.ts';
import { elementPlaceText } from '../draw/elementText.ts';
import { percentText, timeText } from '../draw/quantityText.ts';
import { worstOf } from '../score/scores.ts';
import type { ReportDesign } from './reportInput.ts';

/** Common practice for the lobe ratio, with no source: design, section 4. */
const LOBE_PRACTICE = 0.1;

/** What a reader should know of a design before building it, in whole sentences. */
export function designNotes(design: ReportDesign, targetCorrection: number): string[] {
  const { gain, lobe, area_m2, areaOverFloor, snr } = design.scores;
  const notes: string[] = [];
  if (!design.meetsTarget) notes.push('Does not meet the target of this brief.');
  const worst = worstOf(design.scores);
  if (worst > targetCorrection) {
    notes.push(
      `The worst correction, ${percentText(worst)}, is above the target of ${percentText(targetCorrection)}.`,
    );
  }
  if (Math.abs(gain - 1) > 1e-6) {
    notes.push(
      `Divide readings by the gain, ${gain.toPrecision(5)}: corrections are what is left after that. Measure the gain with particles of known extinction.`,
    );
  }
  const weighted = design.elements.some(({ weight }) => weight !== 1);
  if (weighted)
    notes.push('Each element is read on its own; the reading is the sum of weight times element reading.');
  for (const [e, element] of design.elements.entries()) {
    const place = elementPlaceText(element);
    if (place.length > 0) notes.push(`Element ${e + 1}: ${place.join(', ')}.`);
  }
  if (design.elements.some(({ weight }) => weight < 0)) {
    notes.push(
      'With a weight below 0 the floor and the bounds over all masks do not hold: area over gain may be less.',
    );
  }
  if (weighted && Math.abs(weightedArea(design)) < 1e-3 * area_m2) {
    notes.push('The weighted areas cancel, and with them the intensity noise of the light.');
  }
  if (lobe.ratio > LOBE_PRACTICE) {
    notes.push(
      `The detector takes in ${percentText(lobe.ratio)} of the angle of the first dark ring of diffraction; common practice keeps to ${percentText(LOBE_PRACTICE)}.`,
    );
  }
  if (areaOverFloor < 1) {
    notes.push('Area over gain lies below the floor of a fixed particle: the target leaves that much room.');
  }
  if (snr.time_s !== null && Number.isFinite(snr.time_s)) {
    notes.push(
      `One measurement is two readings, with and without the particle: ${timeText(snr.time_s)} together.`,
    );
  }
  return notes;
}

function weightedArea({ elements }: ReportDesign): number {
  return elements.reduce((sum, one) => sum + one.weight * (one.share ?? 1) * elementArea(one), 0);
}
