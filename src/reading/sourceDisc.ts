import type { CumulativeFlux } from './cumulativeFlux.ts';

/**
 * The flux density of a particle whose place is spread evenly over a disc, which is how a source with an angular size is seen.
 *
 * A plane wave tilted by the small angle a meets the detector plane with the phase k(r − x sin a − z cos a) between it and the
 * scattered wave. To second order in angles that is k|ρ − z a|²/(2z): the particle reads as if it were shifted by z tan a. What
 * is left out is, for light at the angle θ from the axis, a phase of η(θa + a²/2) and parts θa of the flux.
 * A disc of directions makes a disc of places, of radius z tan a. For a constant amplitude the crossed flux at ρ fades
 * as 2J₁(u)/u, u = 2κρ z a, which is the theorem of van Cittert and Zernike (Born & Wolf, Principles of Optics, section 10.4.2).
 *
 * The mean of w over a disc around ρ is the reading of that disc over its area, ∮ G dφ / (πD²), with the evenly spaced
 * rule around the disc: for the smooth periodic integrand it converges faster than any power.
 *
 * @param table of the particle at one place, out to D beyond the farthest sample
 * @param discM D, radius of the disc of places, metres, above 0
 * @param kappa κ = k/(2z) of the shortest wavelength, 1/m²
 * @param stepM2 samples are wanted at s = ρ² = 0, step, 2·step …
 * @returns mean and factor of cos 2φ
 */
export function discMeans(
  table: CumulativeFlux,
  discM: number,
  kappa: number,
  stepM2: number,
  count: number,
): { mean: Float64Array; twofold: Float64Array } {
  const mean = new Float64Array(count);
  const twofold = new Float64Array(count);
  const { cellsPerM2, cells } = table;
  const middles = new Map<number, Float64Array>();
  for (let i = 0; i < count; i++) {
    const rho = Math.sqrt(i * stepM2);
    const half = halfNodes(2 * kappa * rho * discM, kappa * discM * discM);
    let cosines = middles.get(half);
    if (!cosines) {
      cosines = Float64Array.from({ length: half }, (_, n) => Math.cos((Math.PI * (n + 0.5)) / half));
      middles.set(half, cosines);
    }
    let [even, odd] = [0, 0];
    for (let n = 0; n < half; n++) {
      const cos = cosines[n];
      const x = rho + discM * cos;
      const s = rho * rho + discM * (2 * rho * cos + discM);
      // x dy − y dx over dt
      const turn = discM * (discM + rho * cos);
      const position = Math.max(0, s * cellsPerM2);
      const cell = position < cells ? position | 0 : cells;
      const t = position - cell;
      even += cubic(table.mean, cell, t) * turn;
      // ρ² cos 2φ = 2x² − s
      if (table.twofold !== null) odd += cubic(table.twofold, cell, t) * (2 * x * x - s) * turn;
    }
    // The lower half mirrors the upper one: 2π/(2 half) a node, twice, over πD².
    const perArea = 2 / (half * discM * discM);
    mean[i] = even * perArea;
    twofold[i] = odd * perArea;
  }
  return { mean, twofold };
}

/** Nodes on half of the disc's rim: e^{iu cos t} of 2n nodes errs as J of order 2n, which is nothing beyond u. In steps, to share cosines. */
function halfNodes(swing: number, fresnel: number): number {
  const needed = 0.5 * (swing + 6 * Math.cbrt(swing) + 12) + Math.min(4, fresnel);
  return 4 * Math.ceil(needed / 4);
}

function cubic(pieces: Float64Array, cell: number, t: number): number {
  const c = cell << 2;
  return pieces[c] + t * (pieces[c + 1] + t * (pieces[c + 2] + t * pieces[c + 3]));
}
