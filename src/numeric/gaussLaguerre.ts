import type { QuadratureRule } from './gaussLegendre.ts';

/**
 * Gauss–Laguerre rule: Σ weights[i] f(nodes[i]) ≈ ∫₀^∞ e^(−u) f(u) du, Σ weights = 1 (Abramowitz & Stegun 25.4.45).
 * Newton's method on L_n, one root after the other with the found ones divided out.
 *
 * @param count 1 to 60; exact for polynomials of degree 2·count − 1
 */
export function gaussLaguerre(count: number): QuadratureRule {
  const nodes = new Float64Array(count);
  const weights = new Float64Array(count);
  for (let i = 0; i < count; i++) {
    // From below, Newton climbs to the next root without passing it. The gaps grow, so half the last one is still below.
    let x = i === 0 ? 0 : nodes[i - 1] + (nodes[i - 1] - (nodes[i - 2] ?? 0)) / 2;
    for (let pass = 0; pass < 500; pass++) {
      const [value, slope] = laguerre(count, x);
      let known = 0;
      for (let j = 0; j < i; j++) known += 1 / (x - nodes[j]);
      const step = value / (slope - value * known);
      x -= step;
      if (Math.abs(step) < 1e-12 * x) break;
    }
    nodes[i] = x;
    const [, slope] = laguerre(count, x);
    weights[i] = 1 / (x * slope * slope);
  }
  return { nodes, weights };
}

/** L_n and its derivative at x. */
function laguerre(n: number, x: number): [value: number, slope: number] {
  let before = 0;
  let value = 1;
  // x L_n' = n (L_n − L_(n−1)) would lose the slope at 0: both run up together.
  let slopeBefore = 0;
  let slope = 0;
  for (let j = 0; j < n; j++) {
    const next = ((2 * j + 1 - x) * value - j * before) / (j + 1);
    const nextSlope = ((2 * j + 1 - x) * slope - value - j * slopeBefore) / (j + 1);
    before = value;
    value = next;
    slopeBefore = slope;
    slope = nextSlope;
  }
  return [value, slope];
}
