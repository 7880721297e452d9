import { describe, expect, it } from 'vitest';
import { labelPoint } from '../../src/draw/labelPoint.ts';
import type { OutlineElement } from '../../src/outline/shape.ts';
import { regularRing, SAMPLES } from './sampleDrawings.ts';

/** Turns of all rings about a point, by summing angles: another way than the crossings of the source. */
function turns({ rings }: OutlineElement, [px, py]: readonly [number, number]): number {
  let sum = 0;
  for (const ring of rings) {
    for (let k = 0; k < ring.length; k += 2) {
      const next = (k + 2) % ring.length;
      const [ax, ay, bx, by] = [ring[k] - px, ring[k + 1] - py, ring[next] - px, ring[next + 1] - py];
      sum += Math.atan2(ax * by - ay * bx, ax * bx + ay * by);
    }
  }
  return sum / (2 * Math.PI);
}

describe('labelPoint', () => {
  it('lies in an opening, also of a thin ring or one of several pieces', () => {
    const thin = { weight: 1, rings: [regularRing(205.6e-6, 512), regularRing(204.3e-6, 512, -1)] };
    const pieces = {
      weight: 1,
      rings: [regularRing(1e-5, 5, 1, [-1e-4, 0]), regularRing(2e-5, 6, 1, [1e-4, 5e-5])],
    };
    const elements = [thin, pieces, ...Object.values(SAMPLES).flatMap((drawing) => drawing.elements)];
    for (const element of elements) expect(turns(element, labelPoint(element))).toBeCloseTo(1, 9);
  });

  it('keeps off the centre mark', () => {
    expect(Math.hypot(...labelPoint(SAMPLES.disc.elements[0]))).toBeGreaterThan(0.25e-3);
  });
});
