import { particleIrradiance, waveIrradiance } from './beamPath.ts';
import { seriesTerms } from './beamSeries.ts';
import type { BeamTable } from './beamTable.ts';
import { meanTerms } from './beamTable.ts';
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
  const { pieces, cells, cellsPerM2, axis, perUnit, shadow, terms, curved } = table;
  const p2 = px * px + py * py;
  if (p2 > table.farthestM ** 2) return 0;
  const power = 8 * (Math.min(terms, seriesTerms(table.bound, Math.sqrt(p2))) - 1);
  const isTurned = curved && axis !== null;
  const scatteredAt = 8 * meanTerms({ terms, curved, polarised: axis !== null });
  const twofoldAt = scatteredAt + (isTurned ? 28 : 16);
  const stride = axis === null ? twofoldAt : twofoldAt + 8 * terms + 4;
  const cx = axisX + shadow * px;
  const cy = axisY + shadow * py;
  const ux = perUnit * px;
  const uy = perUnit * py;
  const u2 = perUnit * p2;
  const [cos2, sin2] = axis ?? [0, 0];
  // The forms (ρ, p) and (p, p) of cos 2φ
  const formX = px * cos2 + py * sin2;
  const formY = px * sin2 - py * cos2;
  const formP = px * formX + py * formY;
  const crossed: [number, number] = [0, 0];
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
    crossed[0] = 0;
    crossed[1] = 0;
    addSeries(pieces, at, power, t, nu, 1, crossed);
    if (curved) addSeries(pieces, at + 8 * terms, power, t, nu, u2, crossed);
    const q = at + scatteredAt;
    let scattered =
      cubic(pieces, q, t) +
      nu * (cubic(pieces, q + 4, t) + nu * cubic(pieces, q + 8, t)) +
      p2 * cubic(pieces, q + 12, t);
    if (isTurned) {
      const form = x * formX + y * formY;
      addSeries(pieces, at + 16 * terms, power, t, nu, perUnit * form, crossed);
      addSeries(pieces, at + 24 * terms, power, t, nu, perUnit * formP, crossed);
      scattered += form * (cubic(pieces, q + 16, t) + nu * cubic(pieces, q + 20, t));
      scattered += formP * cubic(pieces, q + 24, t);
    }
    if (axis !== null) {
      // ρ² cos 2(φ − φ₀) in Cartesian coordinates
      const turn = (x * x - y * y) * cos2 + 2 * x * y * sin2;
      addSeries(pieces, at + twofoldAt, power, t, nu, turn, crossed);
      scattered += turn * cubic(pieces, at + stride - 4, t);
    }
    const area = x * nodes[i + 3] - y * nodes[i + 2];
    sumRe += crossed[0] * area;
    sumIm += crossed[1] * area;
    sumScattered += scattered * area;
  }
  const [factorRe, factorIm] = table.crossedFactor(p2);
  return factorRe * sumRe - factorIm * sumIm + waveIrradiance(table.path, p2) * sumScattered;
}

/** Adds a series in ν, times a factor; `power` is 8 times its last order. */
function addSeries(
  pieces: Float64Array,
  from: number,
  power: number,
  t: number,
  nu: number,
  factor: number,
  out: [number, number],
): void {
  let re = 0;
  let im = 0;
  for (let c = from + power; c >= from; c -= 8) {
    re = re * nu + cubic(pieces, c, t);
    im = im * nu + cubic(pieces, c + 4, t);
  }
  out[0] += factor * re;
  out[1] += factor * im;
}

function cubic(pieces: Float64Array, at: number, t: number): number {
  return pieces[at] + t * (pieces[at + 1] + t * (pieces[at + 2] + t * pieces[at + 3]));
}

/** Irradiance at the particle over that on the beam's axis at its z, as a mean over its random motion. */
export function localIrradiance(table: BeamTable, px: number, py: number): number {
  return particleIrradiance(table.path, px * px + py * py);
}
