import { inputError } from '../base/errors.ts';

/**
 * Amplitudes of any particle that scatters alike at all azimuths, from another computation: Bohren & Huffman's S1 and S2 for
 * exp(−iωt). (Amplitudes for exp(+iωt) are the complex conjugates; nothing in a table tells them apart.)
 */
export interface AmplitudeTable {
  /** Radians, from 0, strictly ascending. */
  angles: Float64Array;
  /** S1re, S1im, S2re, S2im of each angle. */
  values: Float64Array;
  /** Largest distance of a row from what its neighbours say, over |S(0)|: see `samplingMisfit`. */
  misfit: number;
}

/** Rows that a value is interpolated from. */
const POINTS = 6;
/** Fewest rows for which `samplingMisfit` has its points. */
export const LEAST_ROWS = POINTS + 2;

/** Of the extinction that the user states. */
const EXTINCTION_TOLERANCE = 0.01;

/**
 * S1re, S1im, S2re, S2im at an angle, by the polynomial through the six rows around it (at the table's end, the last six).
 *
 * Amplitudes are even in the angle (a scattered field is smooth on the axis), so that the rows mirrored at 0 serve as well.
 * Error about 0.005 h⁶ S⁽⁶⁾ for rows h apart, four times that in the last interval.
 *
 * @param angle radians, 0 to the table's last
 */
export function interpolateAmplitudes(table: AmplitudeTable, angle: number, out: Float64Array): void {
  const first = rowBefore(table.angles, angle) - (POINTS / 2 - 1);
  lagrange(table, angle, window(first, POINTS, table.angles.length), out);
}

/** Where a table is worst to interpolate in, and by how much. */
export interface Misfit {
  /** Row, counted from 0. */
  row: number;
  /** Larger of the distances of S1 and S2 from what the rows around it say, over |S(0)|. */
  share: number;
}

/**
 * How far the worst row is from what its six neighbours say: about ten times the error of `interpolateAmplitudes`, as the gap is
 * twice as wide. Sees steps that are too coarse, single wrong numbers and rounding; not a ripple with the very period of the rows.
 * The last row is not tried.
 */
export function samplingMisfit(table: AmplitudeTable): Misfit {
  const { angles, values } = table;
  const size = Math.hypot(values[0], values[1]);
  const out = new Float64Array(4);
  const worst: Misfit = { row: 0, share: 0 };
  for (let row = 0; row < angles.length - 1; row++) {
    const rows = window(row - POINTS / 2, POINTS + 1, angles.length).filter((other) => other !== row);
    lagrange(table, angles[row], rows, out);
    const s1 = Math.hypot(out[0] - values[4 * row], out[1] - values[4 * row + 1]);
    const s2 = Math.hypot(out[2] - values[4 * row + 2], out[3] - values[4 * row + 3]);
    const share = Math.max(s1, s2) / size;
    if (share > worst.share) Object.assign(worst, { row, share });
  }
  return worst;
}

/** Extinction cross-section 4π Re S(0)/k², m² (the optical theorem, Bohren & Huffman 1983, section 4.4). */
export function tableExtinction(table: AmplitudeTable, wavenumber: number): number {
  return (4 * Math.PI * tableForward(table)[0]) / (wavenumber * wavenumber);
}

/**
 * Holds a table against the extinction that its computation gave: amplitudes of another normalisation, wavelength or medium
 * fail here.
 *
 * @param wavenumber in the medium, 1/m
 * @param extinctionM2 m², as stated
 * @param file the table's name, for messages
 * @throws RimwrightError `input` where they differ by more than 1 %
 */
export function checkExtinction(
  table: AmplitudeTable,
  wavenumber: number,
  extinctionM2: number,
  file: string,
): void {
  const ours = tableExtinction(table, wavenumber);
  if (Math.abs(ours / extinctionM2 - 1) <= EXTINCTION_TOLERANCE) return;
  const found = `amplitudes whose 4π Re S(0)/k² is ${ours.toPrecision(4)} m²`;
  const expected =
    `the stated extinction of ${extinctionM2.toPrecision(4)} m² within 1 %: ` +
    `S1 and S2 as in Bohren & Huffman, of the same wavelength and medium`;
  throw inputError([{ file, found, expected }]);
}

/** S(0), the mean of S1(0) and S2(0). */
export function tableForward({ values }: AmplitudeTable): [number, number] {
  return [(values[0] + values[2]) / 2, (values[1] + values[3]) / 2];
}

/** `count` rows from `first` on, fewer than none being mirrored ones, moved back where the table ends. */
function window(first: number, count: number, rows: number): number[] {
  const start = Math.min(first, rows - count);
  return Array.from({ length: count }, (_, i) => start + i);
}

/** The last row at or before the angle. */
function rowBefore(angles: Float64Array, angle: number): number {
  let low = 0;
  let high = angles.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (angles[middle] <= angle) low = middle;
    else high = middle;
  }
  return low;
}

/** Lagrange's polynomial through the given rows; row −i is row i at minus its angle. */
function lagrange(
  { angles, values }: AmplitudeTable,
  angle: number,
  rows: number[],
  out: Float64Array,
): void {
  const nodes = rows.map((row) => Math.sign(row) * angles[Math.abs(row)]);
  out.fill(0);
  for (let i = 0; i < rows.length; i++) {
    let weight = 1;
    for (let j = 0; j < rows.length; j++) {
      if (j !== i) weight *= (angle - nodes[j]) / (nodes[i] - nodes[j]);
    }
    const at = 4 * Math.abs(rows[i]);
    for (let j = 0; j < 4; j++) out[j] += weight * values[at + j];
  }
}
