import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { LegendreRules } from '../../src/numeric/gaussLegendre.ts';
import { nodesArea, ringArea } from '../../src/outline/area.ts';
import { ringNodes } from '../../src/outline/ringNodes.ts';

/** Lengths in units of the radius where η = 1. */
const KAPPA = 1;
const RULES = new LegendreRules();
const nodesOf = (rings: Float64Array[], perRadian: number, offsetM = 0) =>
  ringNodes(rings, { kappa: KAPPA, offsetM, perRadian, least: 6 }, RULES);

/** (1/2π) ∮ (e^{iη} − 1) dφ about (px, py): the paraxial reading of design.md, section 3. */
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

/** Spiky rings of n vertices about a point beside the axis, η from 0.5 to 500. */
function randomRing(n: number, random: { uniform(): number }): Float64Array {
  const radius = Math.exp(3.4 * random.uniform() - 0.3);
  const aside = random.uniform() * 0.6 * radius;
  const ring = new Float64Array(2 * n);
  for (let i = 0; i < n; i++) {
    const angle = (2 * Math.PI * (i + 0.5 * random.uniform())) / n;
    const own = radius * (0.5 + 0.5 * random.uniform());
    ring[2 * i] = own * Math.cos(angle) + aside;
    ring[2 * i + 1] = own * Math.sin(angle);
  }
  return ring;
}

describe('ringNodes', () => {
  // What `NodeDensity.perRadian` promises, against four times as many nodes.
  it.each([
    [0.45, 2e-4],
    [0.9, 2e-6],
  ])('%d nodes a radian err by less than %d of the extinction', (perRadian, bound) => {
    const random = randomStream(5);
    for (const n of [3, 4, 6, 12, 40]) {
      for (let turn = 0; turn < 12; turn++) {
        const ring = randomRing(n, random);
        const offset = turn % 2 === 0 ? 0 : Math.abs(ring[0]);
        const [px, py] = [0.6 * offset, 0.8 * offset];
        const coarse = paraxial(nodesOf([ring], perRadian, offset), px, py);
        const fine = paraxial(nodesOf([ring], 3, offset), px, py);
        expect(Math.hypot(coarse[0] - fine[0], coarse[1] - fine[1])).toBeLessThan(bound);
      }
    }
  });

  it('encloses the area of its rings, holes by their sense of rotation', () => {
    const random = randomStream(8);
    for (const n of [3, 7, 50]) {
      const outer = randomRing(n, random);
      const hole = outer.map((value) => 0.3 * value).reverse();
      for (let i = 0; i < hole.length; i += 2) [hole[i], hole[i + 1]] = [hole[i + 1], hole[i]];
      const area = nodesArea(nodesOf([outer, hole], 0.45));
      expect(area / (ringArea(outer) * (1 - 0.3 ** 2))).toBeCloseTo(1, 12);
    }
  });

  it('passes over a vertex that is there twice', () => {
    const ring = Float64Array.of(-2, -1, 3, -1, 0, 4);
    const doubled = Float64Array.of(-2, -1, 3, -1, 3, -1, 0, 4, 0, 4);
    expect(nodesOf([doubled], 0.9)).toEqual(nodesOf([ring], 0.9));
  });
});
