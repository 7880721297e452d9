import { csvText } from './csvText.ts';
import type { Response } from './response.ts';

/** A response as CSV, one row a diameter. */
export function responseCsv({ points }: Response): string {
  const header = [
    'diameter_um',
    'extinction_um2',
    'reading_um2',
    'calibrated_um2',
    'correction_least',
    'correction_most',
    'holds',
  ];
  const inUnits = (value: number, perUnit: number) => Number((value * perUnit).toPrecision(10));
  const rows = points.map(({ diameter_m, extinction_m2, reading_m2, calibrated_m2, correction, holds }) => [
    inUnits(diameter_m, 1e6),
    ...[extinction_m2, reading_m2, calibrated_m2].map((area) => inUnits(area, 1e12)),
    inUnits(correction.least, 1),
    inUnits(correction.most, 1),
    holds,
  ]);
  return csvText([header, ...rows]);
}
