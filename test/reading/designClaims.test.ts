import { describe, expect, it } from 'vitest';
import { LegendreRules } from '../../src/numeric/gaussLegendre.ts';
import { nodesArea } from '../../src/outline/area.ts';
import { boundaryNodes } from '../../src/outline/boundaryNodes.ts';
import type { Segment } from '../../src/outline/segment.ts';
import { discNodes, kappaOf, polygonNodes, ratioOf, sphereScenario, square } from './setup.ts';

const DISTANCE_M = 0.02;

/** Saw teeth: `folds` runs of ρ² from low to high (in phase), each closed by a radial edge. */
function sawNodes(folds: number, low: number, high: number, kappa: number): Float64Array {
  const loop: Segment[] = [];
  const fold = (2 * Math.PI) / folds;
  const [inner, outer] = [Math.sqrt(low / kappa), Math.sqrt(high / kappa)];
  for (let n = 0; n < folds; n++) {
    const from = n * fold;
    const slope = (high - low) / (kappa * fold);
    loop.push({
      kind: 'polar',
      from,
      to: from + fold,
      folds: 1,
      squared: (phi, out) => {
        out[0] = low / kappa + slope * (phi - from);
        out[1] = slope;
      },
    });
    const [cos, sin] = [Math.cos(from + fold), Math.sin(from + fold)];
    loop.push({ kind: 'line', from: [outer * cos, outer * sin], to: [inner * cos, inner * sin] });
  }
  return boundaryNodes([loop], { kappa, offsetM: 0, perRadian: 0.9, least: 16 }, new LegendreRules());
}

describe('what design.md says that detectors read (spheres of index 1.59, 635 nm, 20 mm)', () => {
  it.each([
    [1e-6, 2.0],
    [2e-6, 1.999],
    [4e-6, 1.996],
  ])('section 3: a disc of η = π reads a sphere of %d m %d times', (diameterM, expected) => {
    const scenario = sphereScenario(diameterM);
    const kappa = kappaOf(scenario, DISTANCE_M);
    const nodes = discNodes(Math.sqrt(Math.PI / kappa), kappa);
    expect(ratioOf(scenario, DISTANCE_M, nodes)).toBeCloseTo(expected, 3);
  });

  it('section 6: a square of 1 mm reads 2 µm with a correction of −0.15625', () => {
    const scenario = sphereScenario(2e-6);
    const nodes = polygonNodes([square(0.5e-3)], kappaOf(scenario, DISTANCE_M));
    expect(Math.abs(ratioOf(scenario, DISTANCE_M, nodes) - 1 + 0.15625)).toBeLessThan(1e-5);
  });

  it('section 4: twelve ramps at a mean η of 6.3 read 2 µm within 0.15 %, on 9400 times its area', () => {
    const scenario = sphereScenario(2e-6);
    const nodes = sawNodes(12, 6.3 - Math.PI, 6.3 + Math.PI, kappaOf(scenario, DISTANCE_M));
    // Exact ramps read 0.117 % low; design.md gives 0.15 %.
    expect(Math.abs(ratioOf(scenario, DISTANCE_M, nodes) - 1 + 0.00117)).toBeLessThan(1e-5);
    expect(Math.abs(nodesArea(nodes) / scenario.extinctionM2 / 9400 - 1)).toBeLessThan(0.01);
  });

  // design.md gives 5.998 for three spheres; it holds for the smallest, and the scattered light takes its share of the others.
  it.each([
    [1e-6, 5.998],
    [2e-6, 5.996],
    [4e-6, 5.984],
  ])('section 3: three zones of weights +1, −1, +1 read a sphere of %d m %d times', (diameterM, expected) => {
    const scenario = sphereScenario(diameterM);
    const kappa = kappaOf(scenario, DISTANCE_M);
    const [one, two, three] = [1, 2, 3].map((n) =>
      ratioOf(scenario, DISTANCE_M, discNodes(Math.sqrt((n * Math.PI) / kappa), kappa)),
    );
    expect(one - (two - one) + (three - two)).toBeCloseTo(expected, 3);
  });
});
