import type { Cell } from './csvText.ts';
import { csvText } from './csvText.ts';
import type { RankedDesign } from './ranking.ts';

const COLUMNS: readonly [title: string, cell: (design: RankedDesign) => Cell][] = [
  ['id', ({ id }) => id],
  ['family', ({ family }) => family],
  ['rank', ({ rank }) => rank],
  ['meets_target', ({ meetsTarget }) => meetsTarget],
  ['distance_m', ({ distanceM }) => distanceM],
  ['radius_m', ({ scores }) => scores.radius_m],
  ['area_m2', ({ scores }) => scores.area_m2],
  ['gain', ({ scores }) => scores.gain],
  ['correction_worst', ({ scores }) => scores.correction.worst],
  ['correction_certified', ({ scores }) => scores.correction.certified ?? ''],
  ['correction_rms', ({ scores }) => scores.correction.rms],
  // Empty where the brief has no distribution of sizes.
  ['correction_population', ({ scores }) => scores.correction.population ?? ''],
  // Where the certified worst was found.
  ['certified_diameter_m', ({ scores }) => scores.correction.certifiedAt?.diameter_m ?? ''],
  ['certified_wavelength_m', ({ scores }) => scores.correction.certifiedAt?.wavelength_m ?? ''],
  ['certified_depth_m', ({ scores }) => scores.correction.certifiedAt?.depth_m ?? ''],
  ['certified_x_m', ({ scores }) => scores.correction.certifiedAt?.position_m[0] ?? ''],
  ['certified_y_m', ({ scores }) => scores.correction.certifiedAt?.position_m[1] ?? ''],
  ['lobe_ratio', ({ scores }) => scores.lobe.ratio],
  ['snr_required', ({ scores }) => scores.snr.required],
  ['time_s', ({ scores }) => scores.snr.time_s],
  ['area_over_floor', ({ scores }) => scores.areaOverFloor],
  // Empty where nothing is proven of it.
  ['least_area_over_floor', ({ scores }) => scores.leastAreaOverFloor ?? ''],
  ['shop_fits', ({ shop }) => shop.fits],
  ['shop_notes', ({ shop }) => shop.notes.join('; ')],
];

/** The designs as CSV, one row a design. */
export function frontCsv(designs: readonly RankedDesign[]): string {
  const header = COLUMNS.map(([title]) => title);
  return csvText([header, ...designs.map((design) => COLUMNS.map(([, cell]) => cell(design)))]);
}
