import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { LegendreRules } from '../../src/numeric/gaussLegendre.ts';
import { nodesArea } from '../../src/outline/area.ts';
import { boundaryNodes } from '../../src/outline/boundaryNodes.ts';
import { isDrawn } from '../../src/outline/families/family.ts';
import type { Loop } from '../../src/outline/shape.ts';
import { drawn, KAPPA, loopsOf, UNIT_M, VARIANTS, variantNamed } from './drawings.ts';

const rules = new LegendreRules();
const nodesAt = (loops: readonly Loop[], perRadian: number, offsetM: number) =>
  boundaryNodes(loops, { kappa: KAPPA, offsetM, perRadian, least: 6 }, rules);

/**
 * (1/2π) ∮ (e^{iη} − 1) dφ about a particle at (px, py): the paraxial reading of design.md, section 3, and a second way to
 * it that knows no tables.
 */
function paraxial(nodes: Float64Array, px: number, py: number): [re: number, im: number] {
  let [re, im] = [0, 0];
  for (let i = 0; i < nodes.length; i += 4) {
    const [x, y] = [nodes[i] - px, nodes[i + 1] - py];
    const squared = x * x + y * y;
    const turn = (x * nodes[i + 3] - y * nodes[i + 2]) / (2 * Math.PI * squared);
    re += (Math.cos(KAPPA * squared) - 1) * turn;
    im += Math.sin(KAPPA * squared) * turn;
  }
  return [re, im];
}

function distance([a, b]: [number, number], [c, d]: [number, number]): number {
  return Math.hypot(a - c, b - d);
}

describe('boundaryNodes', () => {
  it.each(VARIANTS.map((variant) => [variant.id, variant] as const))(
    '%s: area and reading converge as nodes are added',
    (_, variant) => {
      const random = randomStream(21);
      // Of the extinction: what a search gets by with, what a report has, and more.
      const worst = { 0.45: 0, 0.9: 0, 1.35: 0 };
      for (let turn = 0; turn < 16; turn++) {
        const shape = variant.draw(variant.start(random).values, UNIT_M);
        if (!isDrawn(shape)) continue;
        const offsetM = turn % 2 === 0 ? 0 : 10e-6;
        const [px, py] = [0.8 * offsetM, 0.6 * offsetM];
        const finest = nodesAt(loopsOf(shape), 3, offsetM);
        for (const perRadian of [0.45, 0.9, 1.35] as const) {
          const nodes = nodesAt(loopsOf(shape), perRadian, offsetM);
          expect(nodes.length).toBeLessThanOrEqual(finest.length);
          expect(Math.abs(nodesArea(nodes) / nodesArea(finest) - 1)).toBeLessThan(1e-7);
          const off = distance(paraxial(nodes, px, py), paraxial(finest, px, py));
          worst[perRadian] = Math.max(worst[perRadian], off);
        }
      }
      expect(worst[0.45]).toBeLessThan(5e-4);
      // Many small rectangles have as many ends, each with an error of its own.
      expect(worst[0.9]).toBeLessThan(variant.family === 'grid' ? 4e-5 : 2e-5);
      expect(worst[1.35]).toBeLessThan(5e-6);
    },
  );

  it('reads e^{iη} − 1 from a disc', () => {
    for (const eta of [0.3, Math.PI, 7, 30]) {
      const nodes = nodesAt(loopsOf(drawn(variantNamed('disc'), [eta])), 0.9, 0);
      expect(distance(paraxial(nodes, 0, 0), [Math.cos(eta) - 1, Math.sin(eta)])).toBeLessThan(1e-12);
    }
  });

  it('reads −1 from ramps that span a whole wave: their share of e^{iη} vanishes (design.md, section 4)', () => {
    for (const id of ['ramp-saw-5-fold', 'ramp-peak-8-fold']) {
      for (const low of [1.3, 4]) {
        const nodes = nodesAt(loopsOf(drawn(variantNamed(id), [low, low + 2 * Math.PI])), 1.35, 0);
        expect(distance(paraxial(nodes, 0, 0), [-1, 0])).toBeLessThan(1e-7);
      }
    }
  });

  it('reads Bessel functions from a boundary of one cosine: the mean of e^{iη} is e^{ic₀} J₀(c₁)', () => {
    // Jacobi–Anger expansion; J₀(2.404825557695773) = 0 (Abramowitz & Stegun, table 9.5), J₀(1) = 0.7651976865579666 (9.1).
    const shapeOf = (c1: number) => drawn(variantNamed('fourier-square-4-fold-6'), [5, c1, 0, 0, 0, 0]);
    const zero = nodesAt(loopsOf(shapeOf(2.404825557695773)), 0.9, 0);
    expect(distance(paraxial(zero, 0, 0), [-1, 0])).toBeLessThan(1e-7);
    const one = nodesAt(loopsOf(shapeOf(1)), 0.9, 0);
    const j0 = 0.7651976865579666;
    expect(distance(paraxial(one, 0, 0), [j0 * Math.cos(5) - 1, j0 * Math.sin(5)])).toBeLessThan(1e-7);
  });

  it('gives every fold the same whole number of nodes', () => {
    const shape = drawn(variantNamed('fourier-square-5-fold-6'), [6, 3, 1, 0.5, -0.5, 0.2]);
    for (const perRadian of [0.3, 0.45, 0.9, 2]) {
      expect((nodesAt(loopsOf(shape), perRadian, 1e-5).length / 4) % 5).toBe(0);
    }
  });

  it('sees the bends of a curve whose phase hardly runs, and of corners that look small from the axis', () => {
    // Faults of an earlier version: four nodes a fold, and two on an arc, read these 5e-2 and 3e-3 wrong.
    const cases = [
      drawn(variantNamed('fourier-square-6-fold-6'), [1.69, 0.138, 0.004, 0.62, -0.388, -0.079]),
      drawn(variantNamed('fourier-radius-5-fold-6'), [0.95, 0.394, -0.18, 0.134, -0.057, 0.078]),
      drawn(variantNamed('polygon-star-12'), [10.622, 1.659, 0.32]),
      drawn(variantNamed('polygon-regular-3'), [4.645, 0.115]),
    ];
    for (const shape of cases) {
      const [coarse, fine] = [0.45, 3].map((perRadian) => nodesAt(loopsOf(shape), perRadian, 1e-5));
      for (const [px, py] of [
        [0, 0],
        [1e-5, 0],
        [0, 1e-5],
      ]) {
        expect(distance(paraxial(coarse, px, py), paraxial(fine, px, py))).toBeLessThan(2e-4);
      }
    }
  });
});
