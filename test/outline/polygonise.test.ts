import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { ringArea, ringsRadius } from '../../src/outline/area.ts';
import { isDrawn } from '../../src/outline/families/family.ts';
import { polygonise } from '../../src/outline/polygonise.ts';
import { ringLoop } from '../../src/outline/ring.ts';
import type { Segment } from '../../src/outline/segment.ts';
import { drawn, ringsOf, someValues, UNIT_M, VARIANTS, variantNamed } from './drawings.ts';

/** Whether the point at i is the one before it once more. */
function isRepeated(ring: Float64Array, i: number): boolean {
  const j = (i + ring.length - 2) % ring.length;
  return ring[i] === ring[j] && ring[i + 1] === ring[j + 1];
}

describe('polygonise', () => {
  it('puts every point on a grid of 1 nm and repeats none in a row', () => {
    const random = randomStream(31);
    for (const variant of VARIANTS) {
      for (let turn = 0; turn < 6; turn++) {
        const shape = variant.draw(someValues(variant, random, turn), UNIT_M);
        if (!isDrawn(shape)) continue;
        for (const ring of ringsOf(shape, turn === 0 ? 1440 : 180)) {
          expect(ring.every((value) => value === Math.round(value * 1e9) / 1e9)).toBe(true);
          const repeats = [...ring.keys()].filter((i) => i % 2 === 0 && isRepeated(ring, i));
          expect(repeats, variant.id).toEqual([]);
        }
      }
    }
  });

  it('keeps the area of circles, and with it the mean of ρ² over their rims', () => {
    for (const radiusM of [20e-6, 100e-6, 1e-3]) {
      for (const vertices of [16, 96, 180]) {
        const ring = polygonise(ringLoop(radiusM, 1), vertices);
        expect(ring.length).toBe(2 * vertices);
        // Rounding moves each vertex by up to 0.7 nm, in all directions alike.
        expect(Math.abs(ringArea(ring) / (Math.PI * radiusM ** 2) - 1)).toBeLessThan(1e-9 / radiusM);
        expect(ringArea(polygonise(ringLoop(radiusM, -1), vertices))).toBeCloseTo(-ringArea(ring), 15);
      }
    }
  });

  it('keeps the area of arcs about any centre, outwards and inwards', () => {
    const [outer, inner] = [100e-6, 60e-6];
    for (const turn of [0.3, Math.PI / 2, 3]) {
      const at = (radius: number, angle: number) =>
        [radius * Math.cos(angle), radius * Math.sin(angle)] as const;
      const sector = polygonise(
        [
          { kind: 'line', from: at(inner, 0), to: at(outer, 0) },
          { kind: 'arc', centre: [0, 0], radius: outer, from: 0, to: turn },
          { kind: 'line', from: at(outer, turn), to: at(inner, turn) },
          { kind: 'arc', centre: [0, 0], radius: inner, from: turn, to: 0 },
        ],
        48,
      );
      expect(ringArea(sector) / ((turn / 2) * (outer ** 2 - inner ** 2))).toBeCloseTo(1, 4);
      // The ends stay where the straight edges meet them.
      expect(Array.from(sector.subarray(0, 4))).toEqual([inner, 0, outer, 0]);
    }
  });

  it('keeps the sense of rotation and the corners of straight edges', () => {
    const ring = polygonise(
      [
        { kind: 'line', from: [1e-3, 0], to: [0, 1e-3] },
        { kind: 'line', from: [0, 1e-3], to: [-1e-3, 0] },
        { kind: 'line', from: [-1e-3, 0], to: [1e-3, 0] },
      ],
      96,
    );
    expect(Array.from(ring)).toEqual([1e-3, 0, 0, 1e-3, -1e-3, 0]);
  });

  it('gives every fold as many vertices', () => {
    for (const [id, values] of [
      ['ramp-saw-12-fold', [2, 8.3]],
      ['ramp-peak-8-fold', [2, 8.3]],
      ['fourier-square-5-fold-6', [5, 2, 0.5, 0.2, 0, 0]],
    ] as const) {
      const shape = drawn(variantNamed(id), values);
      for (const vertices of [96, 180, 1440]) {
        expect((ringsOf(shape, vertices)[0].length / 2) % shape.folds).toBe(0);
      }
    }
  });

  it('takes no chord of an arc shorter than the grid can tell', () => {
    const arc = (radius: number): Segment => ({ kind: 'arc', centre: [0, 0], radius, from: 0, to: Math.PI });
    const halfDisc = (radius: number) =>
      polygonise([arc(radius), { kind: 'line', from: [-radius, 0], to: [radius, 0] }], 1440);
    const tiny = halfDisc(1e-7);
    expect(tiny.length / 2).toBeLessThan(34);
    for (let i = 2; i + 1 < tiny.length; i += 2) {
      expect(Math.hypot(tiny[i] - tiny[i - 2], tiny[i + 1] - tiny[i - 1])).toBeGreaterThan(8e-9);
    }
    expect(halfDisc(1e-5).length / 2).toBe(721);
  });

  it('comes nearer to curves the more vertices it has', () => {
    const shape = drawn(variantNamed('fourier-square-3-fold-6'), [5, 2, 0.5, -0.4, 0.2, 0.1]);
    const exact = 5 * UNIT_M ** 2 * Math.PI;
    const [coarse, fine] = [96, 768].map((vertices) => 1 - ringArea(ringsOf(shape, vertices)[0]) / exact);
    expect(coarse).toBeLessThan(2e-3);
    expect(Math.abs(fine)).toBeLessThan(coarse / 50);
    expect(ringsRadius(ringsOf(shape, 768))).toBeLessThanOrEqual(Math.sqrt(7.4) * UNIT_M + 1e-9);
  });
});
