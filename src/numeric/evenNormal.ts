import type { QuadratureRule } from './gaussLegendre.ts';

/**
 * Evenly spaced rule for the mean over a standard normal variable cut off at ±reach; Σ weights = 1.
 * For e^{icu} it is exact (to e^−18) as long as |c| stays below 2π/spacing − 6, where many Gauss–Hermite nodes are spent on the tails.
 *
 * @param count 2 or more; none falls on 0 where it is even
 * @param reach in standard deviations; 7 leaves out 3e-12
 */
export function evenNormal(count: number, reach: number): QuadratureRule {
  const nodes = Float64Array.from({ length: count }, (_, i) => (reach * (2 * i + 1 - count)) / (count - 1));
  const weights = nodes.map((node) => Math.exp((-node * node) / 2));
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  return { nodes, weights: weights.map((weight) => weight / total) };
}
