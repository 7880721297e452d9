import { waveIrradiance } from './beamPath.ts';
import type { BeamTable } from './beamTable.ts';

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
  const turn = (dx * dx - dy * dy) * cos2 + 2 * dx * dy * sin2;
  const [turnX, turnY] = [2 * (dx * cos2 + dy * sin2), 2 * (dx * sin2 - dy * cos2)];

  /** The piece at an address, times ν^order and, where `twofold` is 2, times ρ² cos 2φ. */
  function add(at: number, factor: number, order: number, twofold: 0 | 2): void {
    const [a, b, c, d] = pieces.subarray(at, at + 4);
    const value = a + t * (b + t * (c + t * d));
    const first = (b + t * (2 * c + 3 * t * d)) * cellsPerM2;
    const second = (2 * c + 6 * t * d) * cellsPerM2 * cellsPerM2;
    const degree = order + twofold;
    const even = factor * weight * ((degree + 2) * value + 2 * s * first);
    const slope = factor * weight * 2 * ((degree + 4) * first + 2 * s * second);
    const power = nu ** order;
    const shape = twofold === 0 ? 1 : turn;
    const along = order === 0 ? 0 : even * order * nu ** (order - 1) * perUnit * shape;
    out[0] += even * power * shape;
    out[1] += slope * dx * power * shape + along * px + (twofold === 0 ? 0 : even * power * turnX);
    out[2] += slope * dy * power * shape + along * py + (twofold === 0 ? 0 : even * power * turnY);
  }

  const pairs = (from: number, factor: number, twofold: 0 | 2) => {
    for (let n = 0; n < terms; n++) {
      add(from + 8 * n, factor * factorRe, n, twofold);
      add(from + 8 * n + 4, -factor * factorIm, n, twofold);
    }
  };
  const meanNumbers = 8 * terms * (curved ? 2 : 1);
  const stride = meanNumbers + 16 + (axis === null ? 0 : 8 * terms + 4);
  const at = cell * stride;
  pairs(at, 1, 0);
  if (curved) pairs(at + 8 * terms, perUnit * p2, 0);
  const irradiance = waveIrradiance(table.path, p2);
  const scattered = at + meanNumbers;
  for (let n = 0; n < 3; n++) add(scattered + 4 * n, irradiance, n, 0);
  add(scattered + 12, irradiance * p2, 0, 0);
  if (axis === null) return;
  pairs(scattered + 16, 1, 2);
  add(at + stride - 4, irradiance, 0, 2);
}
