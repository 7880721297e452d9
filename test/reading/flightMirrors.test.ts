import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { flightMirrors, flightSymmetry } from '../../src/reading/flightMirrors.ts';
import { samplePositions } from '../../src/reading/positions.ts';

const HEADINGS = Array.from({ length: 24 }, (_, i) => (i * Math.PI) / 24);
const FOLDS = [1, 2, 3, 4, 5, 6, 8];

/** An outline's radius at an azimuth, with that symmetry and no other. */
function rim(folds: number, mirror: boolean): (phi: number) => number {
  return (phi) =>
    2 +
    Math.cos(folds * phi) +
    0.3 * Math.cos(2 * folds * phi) +
    (mirror ? 0 : 0.4 * Math.sin(2 * folds * phi));
}

function areAlike(f: (phi: number) => number, g: (phi: number) => number): boolean {
  return Array.from({ length: 97 }, (_, i) => i / 7).every((phi) => Math.abs(f(phi) - g(phi)) < 1e-9);
}

describe('flightMirrors', () => {
  it.each(FOLDS)('are those of a drawn outline of %d folds, for every heading', (folds) => {
    for (const mirror of [true, false]) {
      const radius = rim(folds, mirror);
      for (const heading of HEADINGS) {
        expect(flightMirrors({ folds, mirror }, heading, false)).toEqual({
          ends: areAlike(radius, (phi) => radius(2 * heading + Math.PI - phi)),
          sides: areAlike(radius, (phi) => radius(2 * heading - phi)),
          centre: areAlike(radius, (phi) => radius(phi + Math.PI)),
        });
      }
    }
  });

  it('are all there for circles, and half a turn alone in polarised light', () => {
    const circles = { folds: Number.POSITIVE_INFINITY, mirror: true };
    expect(flightMirrors(circles, 0.3, false)).toEqual({ ends: true, sides: true, centre: true });
    expect(flightMirrors({ folds: 4, mirror: true }, 0, true)).toEqual({
      ends: false,
      sides: false,
      centre: true,
    });
    expect(flightMirrors({ folds: 3, mirror: true }, 0, true).centre).toBe(false);
  });
});

describe('flightSymmetry', () => {
  it('leaves a wedge in which every place has an image', () => {
    const random = randomStream(5);
    for (const folds of FOLDS) {
      for (const heading of HEADINGS) {
        const mirrors = flightMirrors({ folds, mirror: folds % 3 !== 2 }, heading, false);
        const symmetry = flightSymmetry(mirrors, heading);
        const samples = samplePositions(1, 20, 0.2, symmetry);
        for (let turn = 0; turn < 10; turn++) {
          const [radius, angle] = [Math.sqrt(random.uniform()), 2 * Math.PI * random.uniform()];
          const images = [angle];
          if (mirrors.ends) images.push(...images.map((one) => 2 * heading + Math.PI - one));
          if (mirrors.sides) images.push(...images.map((one) => 2 * heading - one));
          if (mirrors.centre) images.push(...images.map((one) => one + Math.PI));
          const nearest = Math.min(
            ...images.map((one) => distanceTo(samples, radius * Math.cos(one), radius * Math.sin(one))),
          );
          // Neighbours are 0.2/20 apart along both directions.
          expect(nearest).toBeLessThan(0.01 / Math.SQRT2);
        }
      }
    }
  });
});

function distanceTo(samples: Float64Array, x: number, y: number): number {
  let nearest = Number.POSITIVE_INFINITY;
  for (let i = 0; i < samples.length; i += 2)
    nearest = Math.min(nearest, Math.hypot(samples[i] - x, samples[i + 1] - y));
  return nearest;
}
