import { gaussHermite } from '../numeric/gaussHermite.ts';

/** Diameters that stand for a distribution of sizes. */
export interface SizeClass {
  /** Metres. */
  diameterM: number;
  /** Share of the particles, by number; they add up to 1. */
  share: number;
}

/**
 * A log-normal distribution by number as the Gauss–Hermite nodes in ln d, ascending: the mean of any power of the diameter up
 * to about the `count`-th is right to many digits, for geometric standard deviations up to 2.
 *
 * @param medianM number median diameter, metres
 * @param gsd geometric standard deviation, above 1
 * @param count 1 to 60
 */
export function logNormalSizes(medianM: number, gsd: number, count: number): SizeClass[] {
  const { nodes, weights } = gaussHermite(count);
  return Array.from(nodes, (node, i) => ({ diameterM: medianM * gsd ** node, share: weights[i] }));
}

/** Counted particles as shares; diameters of which there is none are left out. At least one count above 0. */
export function countedSizes(diametersM: readonly number[], counts: readonly number[]): SizeClass[] {
  const total = counts.reduce((sum, count) => sum + count, 0);
  return diametersM
    .map((diameterM, i) => ({ diameterM, share: counts[i] / total }))
    .filter(({ share }) => share > 0);
}
