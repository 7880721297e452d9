import { inputError, RimwrightError } from '../base/errors.ts';
import { chebyshevFit, chebyshevFour } from '../numeric/chebyshev.ts';
import type { AmplitudeTable } from './amplitudeTable.ts';
import { interpolateAmplitudes, tableExtinction, tableForward } from './amplitudeTable.ts';
import type { SphereAmplitudes } from './sphereAmplitudes.ts';

/** Of |S(0)|: no table is worth a finer series. */
const FINEST = 1e-10;
/** What is lost by interpolating is about this part of the misfit, and so may the series lose. */
const SHARE_OF_MISFIT = 0.1;
const MOST_TERMS = 8192;
const DEGREES = 180 / Math.PI;

/**
 * The table as the rest of the program knows amplitudes: a Chebyshev series in cosθ over a forward cone, with as many terms as
 * bring it back to the rows, and to what is interpolated half-way between them, within a tenth of the table's misfit. Of
 * rounded numbers, the misfit is their rounding: there the series stops earlier, within the misfit.
 *
 * A table says nothing of size and index: `index` is NaN, and `sizeParameter` that of the opaque disc of the same |S(0)|,
 * x = √(2|S(0)|).
 *
 * @param wavenumber in the medium, 1/m, for which the table was computed
 * @param halfAngle of the cone, radians, above 0 and below π/2
 * @param file the table's name, for messages
 * @throws RimwrightError `input` where the table does not reach the half-angle, `machine` where 8192 terms do not suffice
 */
export function tableAmplitudes(
  table: AmplitudeTable,
  wavenumber: number,
  halfAngle: number,
  file?: string,
): SphereAmplitudes {
  const short = shortReach(table, halfAngle);
  if (short !== null) throw inputError([{ ...(file !== undefined && { file }), ...short }]);
  const cosLimit = Math.cos(halfAngle);
  const { series, terms } = fitSeries(table, halfAngle, cosLimit);
  const forward = tableForward(table);
  return {
    wavenumber,
    sizeParameter: Math.sqrt(2 * Math.hypot(...forward)),
    index: [Number.NaN, Number.NaN],
    forward,
    extinctionM2: tableExtinction(table, wavenumber),
    cosLimit,
    series,
    terms,
  };
}

/** What is wrong with a table that ends before the half-angle of a cone, radians; null where it does not. */
export function shortReach(
  { angles }: AmplitudeTable,
  halfAngle: number,
): { found: string; expected: string } | null {
  const last = angles[angles.length - 1];
  // An angle that went through a change of units misses the end by a rounding error.
  if (halfAngle <= last * (1 + 1e-12)) return null;
  const found = `amplitudes up to ${Number((last * DEGREES).toPrecision(6))} deg`;
  const reach = Number((halfAngle * DEGREES).toPrecision(6));
  return { found, expected: `amplitudes up to ${reach} deg, where detectors may reach` };
}

interface Series {
  series: Float64Array;
  terms: number;
  /** Largest distance from the table. */
  miss: number;
}

/** Doubles the number of terms until the series is as good as the table, or until more of them only follow its rounding. */
function fitSeries(table: AmplitudeTable, halfAngle: number, cosLimit: number): Series {
  const size = Math.hypot(...tableForward(table));
  const wanted = size * Math.max(FINEST, SHARE_OF_MISFIT * table.misfit);
  const rounding = size * Math.max(FINEST, table.misfit);
  const last = table.angles[table.angles.length - 1];
  const sample = (cosTheta: number, out: Float64Array) =>
    interpolateAmplitudes(table, Math.min(last, Math.acos(Math.min(1, cosTheta))), out);
  let before: Series | undefined;
  for (let count = 8; count <= MOST_TERMS; count *= 2) {
    const full = chebyshevFit(sample, 4, cosLimit, 1, count);
    const terms = termsWithin(full, count, wanted / 10);
    const series = full.slice(0, terms * 4);
    const miss = largestMiss(table, series, terms, halfAngle, cosLimit);
    if (miss <= wanted) return { series, terms, miss };
    if (before !== undefined && before.miss <= rounding && miss > before.miss / 2) return before;
    before = { series, terms, miss };
  }
  throw new RimwrightError('machine', `the amplitudes of a table did not settle in ${MOST_TERMS} terms`);
}

/** Number of terms after which all further ones add up to less than `allowed`. */
function termsWithin(series: Float64Array, count: number, allowed: number): number {
  let terms = count;
  let dropped = 0;
  while (terms > 1) {
    const term = series.subarray((terms - 1) * 4, terms * 4);
    dropped += Math.max(...term.map(Math.abs));
    if (dropped > allowed) break;
    terms--;
  }
  return terms;
}

/** Largest distance of the series from the rows of the cone and from what is interpolated half-way between them. */
function largestMiss(
  table: AmplitudeTable,
  series: Float64Array,
  terms: number,
  halfAngle: number,
  cosLimit: number,
): number {
  const { angles } = table;
  const middle = (1 + cosLimit) / 2;
  const given = new Float64Array(4);
  const fitted = new Float64Array(4);
  let largest = 0;
  for (let half = 0; half < 2 * angles.length - 1; half++) {
    const row = half >> 1;
    const angle = half % 2 === 0 ? angles[row] : (angles[row] + angles[row + 1]) / 2;
    if (angle > halfAngle) break;
    interpolateAmplitudes(table, angle, given);
    chebyshevFour(series, terms, (Math.cos(angle) - middle) / (1 - middle), fitted);
    for (let j = 0; j < 4; j++) largest = Math.max(largest, Math.abs(given[j] - fitted[j]));
  }
  return largest;
}
