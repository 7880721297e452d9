import { describe, expect, it } from 'vitest';
import { constantIndex } from '../../src/optics/indexModel.ts';
import { mieCoefficients } from '../../src/optics/mieCoefficients.ts';
import type { Particle } from '../../src/optics/particle.ts';
import { isTabled } from '../../src/optics/particle.ts';
import { particleAmplitudes } from '../../src/optics/particleAmplitudes.ts';
import { readAmplitudeCsv } from '../../src/optics/readAmplitudeCsv.ts';
import { amplitudesAt } from '../../src/optics/sphereAmplitudes.ts';
import { steps, tableOf } from './tableOf.ts';

const WAVELENGTH_M = 635e-9;
const MEDIUM = constantIndex(1.33);
const HALF_ANGLE = 0.3;

const solve = (particle: Particle) => particleAmplitudes(particle, MEDIUM, WAVELENGTH_M, HALF_ANGLE);
const sphere = (diameterM: number, n: number, k = 0) =>
  ({ diameterM, index: constantIndex(n, k), material: 'any' }) satisfies Particle;
const coated = (diameterM: number, n: number, share: number, coreN: number, coreK = 0) => ({
  ...sphere(diameterM, n),
  core: { share, index: constantIndex(coreN, coreK) },
});

/** Largest difference of S1 and S2 over the cone, over |S(0)|. */
function difference(a: Particle, b: Particle): number {
  const [first, second] = [solve(a), solve(b)];
  const [p, q] = [new Float64Array(4), new Float64Array(4)];
  let largest = 0;
  for (let i = 0; i <= 100; i++) {
    const cos = Math.cos((HALF_ANGLE * i) / 100);
    amplitudesAt(first, cos, p);
    amplitudesAt(second, cos, q);
    for (let j = 0; j < 4; j++) largest = Math.max(largest, Math.abs(p[j] - q[j]));
  }
  return largest / Math.hypot(...first.forward);
}

describe('particleAmplitudes', () => {
  it('of a core that is of the shell is that of one sphere', () => {
    expect(difference(coated(3e-6, 1.59, 0.6, 1.59), sphere(3e-6, 1.59))).toBeLessThan(1e-12);
  });

  it('of a shell that fades is that of the core, and of a core that fades that of the shell', () => {
    // The optical path that is still missing, k d |Δn| (1 − share), and the share of the volume that is another's.
    expect(difference(coated(3e-6, 1.4, 0.9999, 1.59, 0.1), sphere(3e-6, 1.59, 0.1))).toBeLessThan(2e-3);
    expect(difference(coated(3e-6, 1.4, 0.01, 1.59), sphere(3e-6, 1.4))).toBeLessThan(1e-4);
    expect(difference(coated(3e-6, 1.4, 0.6, 1.59), sphere(3e-6, 1.4))).toBeGreaterThan(0.1);
  });

  it('takes the share as one of the diameter: a shell of nearly the medium leaves a sphere of that diameter', () => {
    expect(difference(coated(4e-6, 1.33 * (1 + 1e-6), 0.5, 1.59), sphere(2e-6, 1.59))).toBeLessThan(1e-4);
  });

  it('of a table is that of the sphere that the table was computed for', () => {
    const x = (Math.PI * 2e-6 * 1.33) / WAVELENGTH_M;
    const table = readAmplitudeCsv(tableOf(mieCoefficients(x, [1.59 / 1.33, 0]), steps(1, 30)), 'a.csv');
    const tabled = { diameterM: 2e-6, material: 'a.csv', amplitudes: table };
    expect(difference(tabled, sphere(2e-6, 1.59))).toBeLessThan(1e-6);
    const [ours, theirs] = [solve(tabled), solve(sphere(2e-6, 1.59))];
    expect(ours.extinctionM2 / theirs.extinctionM2).toBeCloseTo(1, 12);
    expect(ours.coefficients).toBeUndefined();
    expect([isTabled(tabled), isTabled(sphere(2e-6, 1.59))]).toEqual([true, false]);
  });

  it('names a table that ends too early', () => {
    const table = readAmplitudeCsv(tableOf(mieCoefficients(10, [1.2, 0]), steps(1, 10)), 'a.csv');
    const tabled = { diameterM: 2e-6, material: 'a.csv', amplitudes: table };
    expect(() => solve(tabled)).toThrow(
      'a.csv: found amplitudes up to 10 deg, expected amplitudes up to 17.1887 deg',
    );
  });
});
