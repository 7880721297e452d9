import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { nodesArea, ringArea } from '../../src/outline/area.ts';
import { isDrawn } from '../../src/outline/families/family.ts';
import { pointOn } from '../../src/outline/segment.ts';
import { findRingsCrossing } from '../../src/outline/selfCrossing.ts';
import type { Loop } from '../../src/outline/shape.ts';
import {
  drawn,
  LIMITS,
  loopsOf,
  mirrored,
  nodesOf,
  ringsOf,
  someValues,
  turned,
  UNIT_M,
  VARIANTS,
  variantNamed,
} from './drawings.ts';

const byName = VARIANTS.map((variant) => [variant.id, variant] as const);

/** Largest distance from one segment's end to the next one's start, metres. */
function largestGap(loop: Loop): number {
  const end = new Float64Array(4);
  const start = new Float64Array(4);
  const gaps = loop.map((segment, i) => {
    pointOn(segment, 1, end);
    pointOn(loop[(i + 1) % loop.length], 0, start);
    return Math.hypot(end[0] - start[0], end[1] - start[1]);
  });
  return Math.max(...gaps);
}

/** Whether every point of a set lies within 2 nm of one of another set: each is rounded to a grid of 1 nm. */
function coveredBy(points: readonly Float64Array[], others: readonly Float64Array[]): boolean {
  const cell = 4e-9;
  const key = (x: number, y: number) => `${x} ${y}`;
  const cells = new Map<string, [number, number][]>();
  for (const ring of others) {
    for (let i = 0; i < ring.length; i += 2) {
      const name = key(Math.floor(ring[i] / cell), Math.floor(ring[i + 1] / cell));
      cells.set(name, [...(cells.get(name) ?? []), [ring[i], ring[i + 1]]]);
    }
  }
  const isNear = (x: number, y: number) => {
    for (let dx = -1; dx <= 1; dx++) {
      for (let dy = -1; dy <= 1; dy++) {
        const held = cells.get(key(Math.floor(x / cell) + dx, Math.floor(y / cell) + dy)) ?? [];
        if (held.some(([px, py]) => Math.hypot(px - x, py - y) < 2e-9)) return true;
      }
    }
    return false;
  };
  return points.every((ring) => {
    for (let i = 0; i < ring.length; i += 2) if (!isNear(ring[i], ring[i + 1])) return false;
    return true;
  });
}

describe('every variant', () => {
  it('has a name and a family of its own kind', () => {
    expect(new Set(VARIANTS.map(({ id }) => id)).size).toBe(VARIANTS.length);
    for (const { id, family } of VARIANTS) expect(id.startsWith(family)).toBe(true);
  });

  it.each(byName)('%s draws simple rings that do not meet, all over its ranges', (_, variant) => {
    const random = randomStream(11);
    const broken: number[][] = [];
    let came = 0;
    for (let turn = 0; turn < 200; turn++) {
      const values = someValues(variant, random, turn);
      const shape = variant.draw(values, UNIT_M);
      if (!isDrawn(shape)) continue;
      came++;
      // Coarser than what the search shows to the shop, and now and then as densely as in the files.
      const vertices = turn % 25 === 0 ? 720 : 48;
      // Detectors behind a splitter do not lie in one plane.
      const planes =
        variant.family === 'splitter'
          ? shape.elements.map((element) => ringsOf({ ...shape, elements: [element] }, vertices))
          : [ringsOf(shape, vertices)];
      if (planes.some((rings) => findRingsCrossing(rings) || rings.some(({ length }) => length < 6)))
        broken.push(values);
    }
    expect(broken).toEqual([]);
    expect(came).toBeGreaterThan(60);
  });

  it.each(byName)('%s closes its loops, the opening on the left, holes run the other way', (_, variant) => {
    const random = randomStream(12);
    // Series of many harmonics take as many nodes.
    const turns = variant.parameters.length > 12 ? 4 : 40;
    for (let turn = 0; turn < turns; turn++) {
      const shape = variant.draw(someValues(variant, random, turn), UNIT_M);
      if (!isDrawn(shape)) continue;
      for (const element of shape.elements) {
        for (const loop of element.loops) expect(largestGap(loop)).toBeLessThan(1e-15);
        // Of nested circles the outermost comes first, and they are cut in turn.
        const signs = element.loops.map((loop) => Math.sign(ringArea(ringsOf(shapeOf(loop), 96)[0])));
        const isNested = ['rings', 'splitter'].includes(variant.family) && element.loops[0].length === 1;
        const expected = element.loops.map((_, i) => (isNested && i % 2 === 1 ? -1 : 1));
        expect(signs).toEqual(expected);
        expect(nodesArea(nodesOf(element))).toBeGreaterThan(0);
      }
    }
  });

  it.each(byName)('%s repeats itself and mirrors as it says', (_, variant) => {
    const random = randomStream(13);
    for (let turn = 0; turn < 6; turn++) {
      const shape = variant.draw(someValues(variant, random, turn), UNIT_M);
      if (!isDrawn(shape)) continue;
      const rings = ringsOf(shape, 96);
      // The polygon of a circle repeats itself at every one of its corners.
      const folds = Number.isFinite(shape.folds) ? shape.folds : 96;
      expect(
        coveredBy(
          rings.map((ring) => turned(ring, (2 * Math.PI) / folds)),
          rings,
        ),
      ).toBe(true);
      if (shape.mirror) expect(coveredBy(rings.map(mirrored), rings)).toBe(true);
    }
  });

  it.each(byName)('%s starts within its ranges, and mostly draws from there', (_, variant) => {
    const { parameters } = variant;
    let came = 0;
    for (let seed = 0; seed < 100; seed++) {
      const { values, spreads } = variant.start(randomStream(seed));
      expect(values.length).toBe(parameters.length);
      expect(spreads.length).toBe(parameters.length);
      for (const [i, { low, high }] of parameters.entries()) {
        expect(values[i]).toBeGreaterThanOrEqual(low);
        expect(values[i]).toBeLessThanOrEqual(high);
        expect(spreads[i]).toBeGreaterThan(0);
      }
      if (isDrawn(variant.draw(values, UNIT_M))) came++;
    }
    expect(came).toBeGreaterThanOrEqual(80);
  });

  it.each(byName.filter(([, { margins }]) => margins))(
    '%s draws where its margins hold, and little beyond',
    (_, variant) => {
      const random = randomStream(14);
      const seen = { drawn: 0, misdrawn: 0 };
      for (let turn = 0; turn < 300; turn++) {
        const values = someValues(variant, random, turn);
        const least = Math.min(...(variant.margins?.(values) ?? []));
        const shape = variant.draw(values, UNIT_M);
        seen[isDrawn(shape) ? 'drawn' : 'misdrawn']++;
        if (least >= 0) expect(isDrawn(shape)).toBe(true);
        if (least < -0.05) expect(isDrawn(shape)).toBe(false);
        if (!isDrawn(shape)) {
          expect(shape.misdrawnBy).toBeGreaterThan(0);
          expect(shape.misdrawnBy).toBeLessThanOrEqual(-least);
          expect(shape.misdrawnBy).toBeGreaterThan(-least - 0.051);
        }
      }
      expect(Math.min(seen.drawn, seen.misdrawn)).toBeGreaterThan(0);
    },
  );

  it.each(byName.filter(([, { margins }]) => !margins))(
    '%s draws anything but nothing at all',
    (_, variant) => {
      const random = randomStream(15);
      for (let turn = 0; turn < 100; turn++) {
        const shape = variant.draw(someValues(variant, random, turn), UNIT_M);
        // Only rings may vanish, where every one is too thin to be cut, and grids whose gaps leave nothing.
        if (!isDrawn(shape)) expect(variant.id).toMatch(/^rings-([12](-open)?|weighted.*)$|^grid|^splitter/);
      }
    },
  );
});

/** Areas over λz: a disc of phase η covers λz · η, since η = πρ²/(λz). */
describe('areas in closed form', () => {
  const lambdaZ = Math.PI * UNIT_M * UNIT_M;
  const areas = (id: string, values: number[]) => {
    const shape = drawn(variantNamed(id), values);
    const nodes = nodesArea(nodesOf(shape.elements[0]));
    const polygon = ringsOf(shape, 1440).reduce((sum, ring) => sum + ringArea(ring), 0);
    return { nodes: nodes / lambdaZ, polygon: polygon / lambdaZ };
  };
  const cases: [id: string, values: number[], phase: number, tolerance: number][] = [
    ['disc', [Math.PI], Math.PI, 1e-5],
    ['rings-1', [2, 7.5], 5.5, 1e-5],
    // Rims come in any order.
    ['rings-2', [20, 1, 4, 12], 11, 1e-5],
    ['rings-2-open', [9, 2, 6], 5, 1e-5],
    // The mean of a height that runs evenly in azimuth is the middle of its ends.
    ['ramp-saw-12-fold', [6.28, 12.56], 9.42, 1e-4],
    ['ramp-peak-5-fold', [1, 8], 4.5, 1e-4],
    // Heights 1 5 2 7 (1) over runs 1 2 1 4 of 8: (3·1 + 3.5·2 + 4.5·1 + 4·4)/8.
    ['ramp-knots-3-fold', [1, 5, 2, 7, 0.2, 0.4, 0.2, 0.8], 30.5 / 8, 1e-4],
    // Cosines have no mean; of a radius, half the square of each amplitude stays, and what keeps it off the axis.
    ['fourier-square-3-fold-6', [5, 2, 0.5, -0.4, 0.2, 0.1], 5, 1e-4],
    ['fourier-square-1-fold-6-sines', [5, 2, 0.5, 0, 0, 0.1, 1, -0.5, 0, 0.2, 0], 5, 1e-4],
    ['fourier-radius-5-fold-6', [2, 0.4, 0.2, 0, 0, 0], 4 + (0.16 + 0.04) / 2 + 0.005, 1e-4],
    // Sharp square: half of the square of its diagonal, over π.
    ['polygon-regular-4', [8, 0], 16 / Math.PI, 1e-5],
    // Two thirds of the azimuth out to 9, the rest out to 1.
    ['sectors-hub-3-fold-1', [1, 2 / 3, 9], 6 + 1 / 3, 1e-5],
    ['sectors-hub-3-fold-2', [1, 0.5, 9, 0.25, 5], 4.5 + 1.25 + 0.25, 1e-5],
    ['sectors-arc-5-fold-2', [0.5, 1, 3, 0.25, 8, 4], 1 + 1, 1e-5],
  ];

  it.each(cases)('%s of %j covers %f λz', (id, values, phase, tolerance) => {
    const { nodes, polygon } = areas(id, values);
    expect(nodes).toBeCloseTo(phase, 10);
    expect(Math.abs(polygon / phase - 1)).toBeLessThan(tolerance);
  });
});

describe('weighted elements', () => {
  const areasOf = (id: string, values: number[]) =>
    drawn(variantNamed(id), values).elements.map((element) => nodesArea(nodesOf(element)));
  const radius = (eta: number) => Math.sqrt(eta) * UNIT_M;
  const annulus = (inner: number, outer: number) => Math.PI * (outer * outer - inner * inner);
  const half = LIMITS.gapM / 2;

  it('share the gap between them', () => {
    const [disc, ring] = areasOf('rings-weighted-2', [7, 3]);
    expect(disc / annulus(0, radius(3) - half)).toBeCloseTo(1, 9);
    expect(ring / annulus(radius(3) + half, radius(7))).toBeCloseTo(1, 9);
    // Of annuli that lie apart anyway nothing is taken.
    const apart = areasOf('rings-weighted-apart-3', [1, 2, 3, 4, 5, 6]);
    [1, 3, 5].forEach((inner, i) => {
      expect(apart[i] / annulus(radius(inner), radius(inner + 1))).toBeCloseTo(1, 9);
    });
  });

  it('cut annuli into sectors with gaps of even width', () => {
    const [disc, open, between] = areasOf('rings-weighted-sectors-3-fold', [3, 6, 9, 0.4]);
    expect(disc / annulus(0, radius(3) - half)).toBeCloseTo(1, 9);
    const [inner, outer] = [radius(3) + half, radius(6) - half];
    const gaps = 3 * LIMITS.gapM * (outer - inner);
    expect(open / (0.4 * annulus(inner, outer) - gaps)).toBeCloseTo(1, 4);
    expect(between / (0.6 * annulus(inner, outer) - gaps)).toBeCloseTo(1, 4);
  });

  it('leave out what the gap leaves nothing of, and stand as far out in a farther plane as their phase says', () => {
    expect(areasOf('rings-weighted-2', [3, 3.0001]).length).toBe(1);
    const [near, far] = drawn(variantNamed('splitter-2'), [0, 4, 1, 5]).elements;
    expect([near.distanceRatio, far.distanceRatio, near.share, far.share]).toEqual([undefined, 2, 0.5, 0.5]);
    expect(nodesArea(nodesOf(far)) / annulus(radius(2), radius(10))).toBeCloseTo(1, 9);
  });

  it('keep photodiodes one gap apart at the least', () => {
    expect(variantNamed('grid-4-by-4').draw([1e-4, 1], UNIT_M)).toHaveProperty('misdrawnBy');
    const total = areasOf('grid-3-by-5', [2, 3, 0.75]).reduce((sum, area) => sum + area, 0);
    const [across, up] = [radius(2), radius(3)];
    expect(total / (15 * (across - 0.25 * across) * (up - 0.25 * across))).toBeCloseTo(1, 9);
  });
});

describe('rings', () => {
  it('merges rims that are too close, and misdraws what has no ring left', () => {
    const thin = drawn(variantNamed('rings-2'), [2, 2.0005, 3, 5]);
    expect(loopsOf(thin).length).toBe(2);
    // A gap of 5e-4 in phase joins two rings.
    expect(loopsOf(drawn(variantNamed('rings-2'), [2, 3, 3.0005, 5])).length).toBe(2);
    expect(variantNamed('rings-1').draw([2, 2.0005], UNIT_M)).toEqual({ misdrawnBy: 1 });
  });

  it('merges rims that a grid of 1 nm could make touch', () => {
    // At η = 36 a phase of 0.0012 is 6.4 nm wide, a phase of 0.0025 13 nm.
    expect(isDrawn(variantNamed('rings-1').draw([36, 36.0012], UNIT_M))).toBe(false);
    expect(isDrawn(variantNamed('rings-1').draw([36, 36.0025], UNIT_M))).toBe(true);
  });
});

describe('limits of phase', () => {
  it('stay within the ranges of every parameter that is a phase', () => {
    for (const { family, parameters } of VARIANTS) {
      if (family === 'fourier') continue;
      for (const { high } of parameters) expect(high).toBeLessThanOrEqual(LIMITS.high);
    }
  });
});

function shapeOf(loop: Loop) {
  return { elements: [{ weight: 1, loops: [loop] }], folds: 1, mirror: false };
}
