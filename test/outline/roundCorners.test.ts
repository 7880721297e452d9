import { describe, expect, it } from 'vitest';
import { ringArea } from '../../src/outline/area.ts';
import { roundCorners } from '../../src/outline/families/roundCorners.ts';
import { polygonise } from '../../src/outline/polygonise.ts';
import type { ArcSegment, Segment } from '../../src/outline/segment.ts';
import { pointOn } from '../../src/outline/segment.ts';

const SQUARE = [1e-3, 0, 0, 1e-3, -1e-3, 0, 0, -1e-3];
/** A star of four tips and four notches. */
const STAR = [3e-3, 0, 1e-3, 1e-3, 0, 3e-3, -1e-3, 1e-3, -3e-3, 0, -1e-3, -1e-3, 0, -3e-3, 1e-3, -1e-3];

function arcsOf(loop: readonly Segment[]): ArcSegment[] {
  return loop.filter((segment) => segment.kind === 'arc');
}

/** Direction of travel at t, as an angle. */
function heading(segment: Segment, t: number): number {
  const out = new Float64Array(4);
  pointOn(segment, t, out);
  return Math.atan2(out[3], out[2]);
}

function turnBetween(a: number, b: number): number {
  return Math.abs(Math.atan2(Math.sin(a - b), Math.cos(a - b)));
}

describe('roundCorners', () => {
  it.each([
    ['a square', SQUARE],
    ['a star', STAR],
  ])('gives every corner of %s the wanted radius, and arcs that touch both edges', (_, points) => {
    const loop = roundCorners(points, 0.1e-3);
    const arcs = arcsOf(loop);
    expect(arcs.length).toBe(points.length / 2);
    for (const { radius } of arcs) expect(radius).toBeCloseTo(0.1e-3, 12);
    for (const [i, segment] of loop.entries()) {
      const next = loop[(i + 1) % loop.length];
      expect(turnBetween(heading(segment, 1), heading(next, 0))).toBeLessThan(1e-9);
    }
  });

  it('rounds tips outwards and notches inwards', () => {
    const turns = arcsOf(roundCorners(STAR, 0.1e-3)).map(({ from, to }) => Math.sign(to - from));
    expect(turns).toEqual([1, -1, 1, -1, 1, -1, 1, -1]);
  });

  it('takes (1 − π/4) r² off each corner of a square', () => {
    const radius = 0.2e-3;
    const ring = polygonise(roundCorners(SQUARE, radius), 1440);
    expect(ringArea(ring)).toBeCloseTo(2e-6 - 4 * (1 - Math.PI / 4) * radius ** 2, 12);
  });

  it('takes the largest radius that fits half of each edge where the wanted one is larger', () => {
    // At right angles the arc touches at its own radius from the corner: half of the edge of √2 mm, a little less.
    const [arc] = arcsOf(roundCorners(SQUARE, 5e-3));
    expect(arc.radius).toBeCloseTo(0.499 * Math.SQRT2 * 1e-3, 12);
  });

  it('leaves corners sharp that ask for less than 0.1 µm, and straight ones', () => {
    for (const radius of [0, 1e-9, 0.99e-7]) {
      expect(roundCorners(SQUARE, radius).map(({ kind }) => kind)).toEqual(Array(4).fill('line'));
    }
    expect(arcsOf(roundCorners(SQUARE, 1.01e-7)).length).toBe(4);
    const withMiddle = [1e-3, 0, 0.5e-3, 0.5e-3, 0, 1e-3, -1e-3, 0, 0, -1e-3];
    expect(arcsOf(roundCorners(withMiddle, 0.1e-3)).length).toBe(4);
  });
});
