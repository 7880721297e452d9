import { particleIrradiance, waveIrradiance } from './beamPath.ts';
import { seriesTerms } from './beamSeries.ts';
import type { BeamTable } from './beamTable.ts';
import type { BoundaryNodes } from './boundaryReading.ts';

/**
 * The reading of an outline in a focused beam, m²: power through it without the particle minus with it, over the irradiance on the
 * beam's axis at the particle's z. Over `localIrradiance` of the place it is comparable with the extinction.
 *
 * Holds for rings of any shape, holes (opposite sense of rotation), several pieces and a particle outside.
 * A node beyond the table's reach gives NaN.
 *
 * @param px, py place of the particle, metres, within the table's offset of the axis
 * @param axisX, axisY where the beam's axis meets the plane that the nodes are in, metres
 */
export function beamReading(
  table: BeamTable,
  nodes: BoundaryNodes,
  px: number,
  py: number,
  axisX = 0,
  axisY = 0,
): number {
  const { pieces, cells, cellsPerM2, axis, perUnit, shadow } = table;
  const p2 = px * px + py * py;
  if (p2 > table.farthestM ** 2) return 0;
  const power = 8 * (Math.min(table.terms, seriesTerms(table.bound, Math.sqrt(p2))) - 1);
  const curvedAt = table.curved ? 8 * table.terms : 0;
  const scatteredAt = 8 * table.terms + curvedAt;
  const twofoldAt = scatteredAt + 16;
  const stride = axis === null ? twofoldAt : twofoldAt + 8 * table.terms + 4;
  const cx = axisX + shadow * px;
  const cy = axisY + shadow * py;
  const ux = perUnit * px;
  const uy = perUnit * py;
  const u2 = perUnit * p2;
  let sumRe = 0;
  let sumIm = 0;
  let sumScattered = 0;
  for (let i = 0; i < nodes.length; i += 4) {
    const x = nodes[i] - cx;
    const y = nodes[i + 1] - cy;
    const position = (x * x + y * y) * cellsPerM2;
    // Past the last cell there is no number, so the sum becomes NaN.
    const cell = position < cells ? position | 0 : cells;
    const t = position - cell;
    const at = cell * stride;
    const nu = x * ux + y * uy;
    let re = 0;
    let im = 0;
    for (let c = at + power; c >= at; c -= 8) {
      re = re * nu + cubic(pieces, c, t);
      im = im * nu + cubic(pieces, c + 4, t);
    }
    if (curvedAt > 0) {
      const from = at + curvedAt;
      let bentRe = 0;
      let bentIm = 0;
      for (let c = from + power; c >= from; c -= 8) {
        bentRe = bentRe * nu + cubic(pieces, c, t);
        bentIm = bentIm * nu + cubic(pieces, c + 4, t);
      }
      re += u2 * bentRe;
      im += u2 * bentIm;
    }
    const q = at + scatteredAt;
    let scattered =
      cubic(pieces, q, t) +
      nu * (cubic(pieces, q + 4, t) + nu * cubic(pieces, q + 8, t)) +
      p2 * cubic(pieces, q + 12, t);
    if (axis !== null) {
      // ρ² cos 2(φ − φ₀) in Cartesian coordinates
      const turn = (x * x - y * y) * axis[0] + 2 * x * y * axis[1];
      const from = at + twofoldAt;
      let twofoldRe = 0;
      let twofoldIm = 0;
      for (let c = from + power; c >= from; c -= 8) {
        twofoldRe = twofoldRe * nu + cubic(pieces, c, t);
        twofoldIm = twofoldIm * nu + cubic(pieces, c + 4, t);
      }
      re += turn * twofoldRe;
      im += turn * twofoldIm;
      scattered += turn * cubic(pieces, at + stride - 4, t);
    }
    const area = x * nodes[i + 3] - y * nodes[i + 2];
    sumRe += re * area;
    sumIm += im * area;
    sumScattered += scattered * area;
  }
  const [factorRe, factorIm] = table.crossedFactor(p2);
  return factorRe * sumRe - factorIm * sumIm + waveIrradiance(table.path, p2) * sumScattered;
}

function cubic(pieces: Float64Array, at: number, t: number): number {
  return pieces[at] + t * (pieces[at + 1] + t * (pieces[at + 2] + t * pieces[at + 3]));
}

/** Irradiance at the particle over that on the beam's axis at its z, as a mean over its random motion. */
export function localIrradiance(table: BeamTable, px: number, py: number): number {
  return particleIrradiance(table.path, px * px + py * py);
}
