import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { keyholed } from '../../src/draw/keyhole.ts';
import { splitRing } from '../../src/draw/splitRing.ts';
import { ringArea } from '../../src/outline/area.ts';
import { joinBoundaries } from '../../src/outline/files/joinBoundaries.ts';
import { orientByNesting } from '../../src/outline/nesting.ts';
import { findSelfCrossing } from '../../src/outline/selfCrossing.ts';
import { regularRing } from './sampleDrawings.ts';

/** Whole numbers, so that areas are exact. */
const rounded = (ring: Float64Array) => ring.map((value) => Math.round(value * 1e9));
const reversed = (ring: Float64Array) => orientByNesting([ring])[0];

/** A comb of `count` deep teeth: hardly any vertex sees another far along the ring. */
function comb(count: number): Float64Array {
  const points = [0, 0];
  for (let k = 0; k < count; k++) points.push(10 * k, 5000, 10 * k + 5, 10);
  points.push(10 * count, 0);
  return reversed(Float64Array.from(points));
}

/** A band that winds around eight times. */
function spiral(count: number): Float64Array {
  const side = (offset: number) =>
    Array.from({ length: count }, (_, k) => {
      const angle = (16 * Math.PI * k) / count;
      const radius = 1000 + 1000 * (angle / (2 * Math.PI)) + offset;
      return [Math.round(radius * Math.cos(angle)), Math.round(radius * Math.sin(angle))];
    });
  return reversed(Float64Array.from([...side(0), ...side(400).reverse()].flat()));
}

function star(count: number): Float64Array {
  const random = randomStream(count);
  return Float64Array.from(
    Array.from({ length: count }, (_, k) => {
      const angle = (2 * Math.PI * k) / count;
      const radius = 1e6 * (0.2 + random.uniform());
      return [Math.round(radius * Math.cos(angle)), Math.round(radius * Math.sin(angle))];
    }).flat(),
  );
}

const RINGS: [string, Float64Array][] = [
  ['a circle', rounded(regularRing(1e-3, 3000))],
  ['a jagged star', star(1000)],
  ['a comb', comb(400)],
  ['a spiral', spiral(800)],
];

describe('splitRing', () => {
  it.each(RINGS)('cuts %s along diagonals, with exactly its area', (_, ring) => {
    const parts = splitRing(ring, 100);
    for (const part of parts) {
      expect(part.length / 2).toBeLessThanOrEqual(100);
      expect(ringArea(part)).toBeGreaterThan(0);
      expect(findSelfCrossing(part)).toBeNull();
    }
    expect(parts.reduce((sum, part) => sum + ringArea(part), 0)).toBe(ringArea(ring));
    const [joined, ...rest] = joinBoundaries(parts);
    expect(rest).toEqual([]);
    expect(joined).toHaveLength(ring.length);
    expect(ringArea(joined)).toBe(ringArea(ring));
  });
});

describe('keyholed', () => {
  const outer = rounded(regularRing(1e-3, 360));
  const hole = (x: number, y: number, radius: number) => rounded(regularRing(radius, 90, -1, [x, y]));
  const HOLES = {
    one: [hole(0, 0, 5e-4)],
    'two side by side': [hole(-4e-4, 0, 2e-4), hole(4e-4, 0, 2e-4)],
    'a crowd': Array.from({ length: 25 }, (_, k) =>
      hole(2e-4 * ((k % 5) - 2), 2e-4 * (Math.floor(k / 5) - 2), 8e-5),
    ),
  };

  it.each(Object.entries(HOLES))('takes %s out of a circle, and is undone by joining', (_, holes) => {
    const ring = keyholed(outer, holes);
    const area = [outer, ...holes].reduce((sum, one) => sum + ringArea(one), 0);
    expect(ringArea(ring)).toBe(area);
    expect(ring.length).toBe([outer, ...holes].reduce((sum, one) => sum + one.length + 4, -4));
    for (const parts of [[ring], splitRing(ring, 60)]) {
      expect(parts.reduce((sum, part) => sum + ringArea(part), 0)).toBe(area);
      const areas = joinBoundaries(parts).map(ringArea);
      expect(areas.sort((a, b) => b - a)).toEqual([outer, ...holes].map(ringArea).sort((a, b) => b - a));
    }
  });
});
