/** Nodes and weights of a quadrature rule; `nodes[i]` carries `weights[i]`. */
export interface QuadratureRule {
  nodes: Float64Array;
  weights: Float64Array;
}

/**
 * Gauss–Legendre rule of `count` nodes on [−1, 1], exact for polynomials of degree 2·count − 1.
 * Newton's method on P_n from Tricomi's starting values (Abramowitz & Stegun 25.4.29).
 *
 * @param count 1 to a few thousand
 */
export function gaussLegendre(count: number): QuadratureRule {
  const nodes = new Float64Array(count);
  const weights = new Float64Array(count);
  for (let i = 0; i < (count + 1) >> 1; i++) {
    let x = Math.cos((Math.PI * (i + 0.75)) / (count + 0.5));
    let slope = 1;
    for (let pass = 0; pass < 20; pass++) {
      let before = 1;
      let value = x;
      for (let n = 2; n <= count; n++) {
        const next = ((2 * n - 1) * x * value - (n - 1) * before) / n;
        before = value;
        value = next;
      }
      slope = (count * (before - x * value)) / (1 - x * x);
      const step = value / slope;
      x -= step;
      if (Math.abs(step) < 1e-15) break;
    }
    if (count % 2 === 1 && i === count >> 1) x = 0;
    nodes[i] = -x;
    nodes[count - 1 - i] = x;
    weights[i] = weights[count - 1 - i] = 2 / ((1 - x * x) * slope * slope);
  }
  return { nodes, weights };
}

/** Keeps the rules already made, so that a search makes each once. Pass one along; it is never shared behind the scenes. */
export class LegendreRules {
  readonly #rules: QuadratureRule[] = [];

  /** The rule of `count` nodes, 1 or more. */
  rule(count: number): QuadratureRule {
    let rule = this.#rules[count];
    if (!rule) {
      rule = gaussLegendre(count);
      this.#rules[count] = rule;
    }
    return rule;
  }
}
