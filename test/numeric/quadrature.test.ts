import { describe, expect, it } from 'vitest';
import { evenNormal } from '../../src/numeric/evenNormal.ts';
import { gaussHermite } from '../../src/numeric/gaussHermite.ts';
import type { QuadratureRule } from '../../src/numeric/gaussLegendre.ts';
import { gaussLegendre, LegendreRules } from '../../src/numeric/gaussLegendre.ts';

function sum({ nodes, weights }: QuadratureRule, f: (x: number) => number): number {
  return nodes.reduce((total, x, i) => total + weights[i] * f(x), 0);
}

function expectSymmetric({ nodes, weights }: QuadratureRule): void {
  const n = nodes.length;
  for (let i = 0; i < n; i++) {
    if (i > 0) expect(nodes[i]).toBeGreaterThan(nodes[i - 1]);
    expect(nodes[i]).toBe(0 - nodes[n - 1 - i]);
    expect(weights[i]).toBe(weights[n - 1 - i]);
    expect(weights[i]).toBeGreaterThan(0);
  }
}

describe('gaussLegendre', () => {
  // Abramowitz & Stegun (1964), Table 25.4, 15 decimals.
  it.each([
    { count: 2, nodes: [0.577350269189626], weights: [1] },
    { count: 3, nodes: [0, 0.774596669241483], weights: [0.888888888888889, 0.555555555555556] },
    {
      count: 5,
      nodes: [0, 0.538469310105683, 0.906179845938664],
      weights: [0.568888888888889, 0.478628670499366, 0.236926885056189],
    },
    {
      count: 10,
      nodes: [0.148874338981631, 0.433395394129247, 0.679409568299024, 0.865063366688985, 0.973906528517172],
      weights: [
        0.295524224714753, 0.269266719309996, 0.219086362515982, 0.149451349150581, 0.066671344308688,
      ],
    },
  ])('has the printed nodes and weights of $count', ({ count, nodes, weights }) => {
    const rule = gaussLegendre(count);
    nodes.forEach((node, i) => {
      expect(Math.abs(rule.nodes[(count >> 1) + i] - node)).toBeLessThan(5.1e-16);
      expect(Math.abs(rule.weights[(count >> 1) + i] - weights[i])).toBeLessThan(1e-14);
    });
  });

  it('is exact up to degree 2n − 1, and not beyond', () => {
    for (const count of [1, 2, 3, 7, 16, 33]) {
      const rule = gaussLegendre(count);
      expectSymmetric(rule);
      for (let degree = 0; degree < 2 * count; degree += 2) {
        expect(Math.abs(sum(rule, (x) => x ** degree) - 2 / (degree + 1))).toBeLessThan(1e-14);
      }
      if (count < 16) {
        expect(Math.abs(sum(rule, (x) => x ** (2 * count)) - 2 / (2 * count + 1))).toBeGreaterThan(1e-9);
      }
    }
  });

  // ∫ e^{iωx} dx = 2 sin ω/ω
  it('follows many turns with large rules', () => {
    for (const [count, omega] of [
      [120, 150],
      [1000, 1500],
      [4000, 6000],
    ]) {
      const found = sum(gaussLegendre(count), (x) => Math.cos(omega * x));
      expect(Math.abs(found - (2 * Math.sin(omega)) / omega)).toBeLessThan(1e-13);
    }
  });

  it('is made once by LegendreRules', () => {
    const rules = new LegendreRules();
    expect(rules.rule(7)).toBe(rules.rule(7));
    expect(rules.rule(7)).toEqual(gaussLegendre(7));
    expect(new LegendreRules().rule(7)).not.toBe(rules.rule(7));
  });
});

describe('gaussHermite', () => {
  // Abramowitz & Stegun (1964), Table 25.10, for the weight e^{−x²}: nodes over √2, weights over √π.
  it.each([
    { count: 2, nodes: [0.7071067811865475], weights: [0.8862269254528] },
    { count: 3, nodes: [0, 1.224744871391589], weights: [1.181635900604, 0.2954089751509] },
    {
      count: 5,
      nodes: [0, 0.9585724646138185, 2.02018287045609],
      weights: [0.9453087204829, 0.3936193231522, 0.01995324205905],
    },
    {
      count: 10,
      nodes: [0.342901327223705, 1.036610829789514, 1.756683649299882, 2.53273167423279, 3.43615911883774],
      weights: [0.6108626337353, 0.2401386110823, 0.03387439445548, 0.001343645746781, 0.000007640432855233],
    },
  ])('has the printed nodes and weights of $count', ({ count, nodes, weights }) => {
    const rule = gaussHermite(count);
    nodes.forEach((node, i) => {
      const at = (count >> 1) + i;
      expect(Math.abs(rule.nodes[at] / Math.SQRT2 - node)).toBeLessThan(1e-14 * Math.max(1, node));
      expect(Math.abs((rule.weights[at] * Math.sqrt(Math.PI)) / weights[i] - 1)).toBeLessThan(1e-12);
    });
  });

  it('has the moments of the normal distribution up to degree 2n − 1', () => {
    for (let count = 1; count <= 60; count++) {
      const rule = gaussHermite(count);
      expectSymmetric(rule);
      let moment = 1;
      for (let degree = 0; degree < 2 * count && degree <= 40; degree += 2) {
        if (degree > 0) moment *= degree - 1;
        expect(Math.abs(sum(rule, (x) => x ** degree) / moment - 1)).toBeLessThan(1e-11);
      }
    }
  });

  // E cos cX = e^{−c²/2}
  it('follows cos up to √(n − 3) − 1, as the colours of a line need it', () => {
    for (const count of [4, 8, 20, 40, 60]) {
      const c = Math.sqrt(count - 3) - 1;
      const found = sum(gaussHermite(count), (x) => Math.cos(c * x));
      expect(Math.abs(found - Math.exp((-c * c) / 2))).toBeLessThan(1e-7);
    }
  });
});

describe('evenNormal', () => {
  it('has unit weight, no node on 0 where the count is even, and both ends', () => {
    for (const count of [2, 11, 64]) {
      const rule = evenNormal(count, 6);
      expectSymmetric(rule);
      expect(rule.nodes[0]).toBe(-6);
      expect(sum(rule, () => 1)).toBeCloseTo(1, 14);
      expect(rule.nodes.some((node) => node === 0)).toBe(count % 2 === 1);
    }
  });

  it('follows cos up to 2π over its spacing less six', () => {
    for (const count of [32, 64, 128]) {
      const c = (2 * Math.PI * (count - 1)) / 14 - 6;
      const miss = sum(evenNormal(count, 7), (x) => Math.cos(c * x)) - Math.exp((-c * c) / 2);
      expect(Math.abs(miss)).toBeLessThan(3e-8);
    }
  });
});
