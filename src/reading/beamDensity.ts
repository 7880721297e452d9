import { waveIrradiance } from './beamPath.ts';
import type { BeamTable } from './beamTable.ts';
import { meanTerms } from './beamTable.ts';

/**
 * Adds to `out` the flux density that a beam table was made of, and its two derivatives: what `beamReading` integrates.
 *
 * With a piece V of degree n in ρ beside its s, g = V(s) h(ρ), the density is div(gρ) = ((n + 2) V + 2s V′) h. As in
 * `tableDensity` it is good to about 1e-5 of its size, and its slope to 1e-3.
 *
 * @param weight of what is added
 * @param x, y where, from the beam's axis, metres
 * @param px, py place of the particle, metres
 */
export function addBeamDensity(
  table: BeamTable,
  weight: number,
  [x, y]: readonly [number, number],
  [px, py]: readonly [number, number],
  out: Float64Array,
): void {
  const { pieces, cells, cellsPerM2, axis, terms, curved, perUnit, shadow } = table;
  const p2 = px * px + py * py;
  if (p2 > table.farthestM ** 2) return;
  const dx = x - shadow * px;
  const dy = y - shadow * py;
  const s = dx * dx + dy * dy;
  const cell = Math.min(Math.floor(s * cellsPerM2), cells - 1);
  const t = s * cellsPerM2 - cell;
  const nu = perUnit * (dx * px + dy * py);
  const [factorRe, factorIm] = table.crossedFactor(p2);
  const [cos2, sin2] = axis ?? [0, 0];
  const turnX = dx * cos2 + dy * sin2;
  const turnY = dx * sin2 - dy * cos2;
  const [formX, formY] = [px * cos2 + py * sin2, px * sin2 - py * cos2];
  const plain: Shape = { degree: 0, value: 1, slopeX: 0, slopeY: 0 };
  const form: Shape = { degree: 1, value: dx * formX + dy * formY, slopeX: formX, slopeY: formY };
  const turn: Shape = { degree: 2, value: dx * turnX + dy * turnY, slopeX: 2 * turnX, slopeY: 2 * turnY };
  const formP = px * formX + py * formY;

  /** The piece at an address, times ν^order and a shape. */
  function add(at: number, factor: number, order: number, { degree, value, slopeX, slopeY }: Shape): void {
    const [a, b, c, d] = pieces.subarray(at, at + 4);
    const piece = a + t * (b + t * (c + t * d));
    const first = (b + t * (2 * c + 3 * t * d)) * cellsPerM2;
    const second = (2 * c + 6 * t * d) * cellsPerM2 * cellsPerM2;
    const all = order + degree;
    const even = factor * weight * ((all + 2) * piece + 2 * s * first);
    const slope = factor * weight * 2 * ((all + 4) * first + 2 * s * second);
    const power = nu ** order;
    const along = order === 0 ? 0 : even * order * nu ** (order - 1) * perUnit * value;
    out[0] += even * power * value;
    out[1] += slope * dx * power * value + along * px + even * power * slopeX;
    out[2] += slope * dy * power * value + along * py + even * power * slopeY;
  }

  const pairs = (from: number, factor: number, shape: Shape) => {
    for (let n = 0; n < terms; n++) {
      add(from + 8 * n, factor * factorRe, n, shape);
      add(from + 8 * n + 4, -factor * factorIm, n, shape);
    }
  };
  const isTurned = curved && axis !== null;
  const meanNumbers = 8 * meanTerms({ terms, curved, polarised: axis !== null });
  const scatteredNumbers = isTurned ? 28 : 16;
  const stride = meanNumbers + scatteredNumbers + (axis === null ? 0 : 8 * terms + 4);
  const at = cell * stride;
  pairs(at, 1, plain);
  if (curved) pairs(at + 8 * terms, perUnit * p2, plain);
  const irradiance = waveIrradiance(table.path, p2);
  const scattered = at + meanNumbers;
  for (let n = 0; n < 3; n++) add(scattered + 4 * n, irradiance, n, plain);
  add(scattered + 12, irradiance * p2, 0, plain);
  if (isTurned) {
    pairs(at + 16 * terms, perUnit, form);
    pairs(at + 24 * terms, perUnit * formP, plain);
    add(scattered + 16, irradiance, 0, form);
    add(scattered + 20, irradiance, 1, form);
    add(scattered + 24, irradiance * formP, 0, plain);
  }
  if (axis === null) return;
  pairs(scattered + scatteredNumbers, 1, turn);
  add(at + stride - 4, irradiance, 0, turn);
}

/** What a piece is multiplied with: a polynomial in ρ, its degree and its derivatives. */
interface Shape {
  degree: number;
  value: number;
  slopeX: number;
  slopeY: number;
}
