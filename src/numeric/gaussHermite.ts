import type { QuadratureRule } from './gaussLegendre.ts';

/**
 * Gauss–Hermite rule for the mean over a standard normal variable: Σ weights[i] f(nodes[i]) ≈ E f(X), Σ weights = 1.
 * Newton's method on the orthonormal Hermite polynomials, one root after the other with the found ones divided out.
 *
 * @param count 1 to 60; exact for polynomials of degree 2·count − 1
 */
export function gaussHermite(count: number): QuadratureRule {
  const nodes = new Float64Array(count);
  const weights = new Float64Array(count);
  const half = count >> 1;
  for (let i = 0; i < half; i++) {
    let x = i === 0 ? Math.sqrt(4 * count + 2) : nodes[count - i] * 0.98;
    let slope = 1;
    for (let pass = 0; pass < 200; pass++) {
      const [value, before] = hermite(count, x);
      slope = Math.sqrt(count) * before;
      // Dividing the known roots out (±, since they come in pairs) keeps Newton from falling back on one of them.
      let known = count % 2 === 1 ? 1 / x : 0;
      for (let j = 0; j < i; j++) {
        const root = nodes[count - 1 - j];
        known += 1 / (x - root) + 1 / (x + root);
      }
      const step = value / (slope - value * known);
      x -= step;
      if (Math.abs(step) < 1e-15 * x) break;
    }
    const [, before] = hermite(count, x);
    nodes[count - 1 - i] = x;
    nodes[i] = -x;
    weights[i] = weights[count - 1 - i] = 1 / (count * before * before);
  }
  if (count % 2 === 1) {
    const [, before] = hermite(count, 0);
    weights[half] = 1 / (count * before * before);
  }
  return { nodes, weights };
}

/** Orthonormal Hermite polynomials of the normal distribution: [h_n(x), h_{n−1}(x)]. */
function hermite(n: number, x: number): [number, number] {
  let before = 0;
  let value = 1;
  for (let j = 0; j < n; j++) {
    const next = (x * value - Math.sqrt(j) * before) / Math.sqrt(j + 1);
    before = value;
    value = next;
  }
  return [value, before];
}
