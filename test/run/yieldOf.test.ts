import { describe, expect, it } from 'vitest';
import { constantIndex } from '../../src/optics/indexModel.ts';
import type { BriefTolerances } from '../../src/run/briefTolerances.ts';
import { yieldOf } from '../../src/run/yieldOf.ts';
import type { Task } from '../../src/score/task.ts';
import { NO_TOLERANCE } from '../../src/score/tolerances.ts';

const TASK: Task = {
  light: {
    ...{ wavelengthM: 635e-9, linewidthM: 0, driftM: 1e-9, polarizationRad: null },
    ...{ irradianceWm2: 5e4, intensityNoisePerHz: 0 },
  },
  medium: constantIndex(1),
  particles: [1e-6, 2e-6].map((diameterM) => ({ diameterM, index: constantIndex(1.59), material: '1.59' })),
  placement: { offsetM: 4e-6, depthM: 0, spreadM: 0, crossing: null },
  detector: { distanceM: [0.02, 0.02], radiusM: [2e-5, 1e-3], responsivityAW: 0.42, noiseCurrentA: 2e-12 },
  target: { correction: 0.02, gain: 'free', lobe: null, timeS: null },
  shop: null,
};

/** A disc of about the first zone, which reads twice the extinction. */
const GIVEN = {
  ...{ id: 'disc', family: 'given' as const, distanceM: 0.02, file: 'disc.csv' },
  elements: [{ weight: 1, rings: [circle(1.125e-4, 180)] }],
};

function circle(radiusM: number, points: number): Float64Array {
  return Float64Array.from({ length: 2 * points }, (_, i) => {
    const angle = (2 * Math.PI * Math.floor(i / 2)) / points;
    return radiusM * (i % 2 === 0 ? Math.cos(angle) : Math.sin(angle));
  });
}

const NONE: BriefTolerances = {
  ...{ edge: NO_TOLERANCE, kerf: NO_TOLERANCE, place: NO_TOLERANCE, distance: NO_TOLERANCE },
  ...{ tilt: NO_TOLERANCE, wavelength: NO_TOLERANCE, index: NO_TOLERANCE, size: NO_TOLERANCE },
  averagingS: null,
};
const rms = (size: number) => ({ law: 'rms' as const, size });
const limits = (size: number) => ({ law: 'limits' as const, size });
const SOME: BriefTolerances = {
  ...{ edge: limits(1.5e-6), kerf: limits(1e-6), place: rms(1.5e-6), distance: limits(1e-4) },
  ...{ tilt: rms(0.01), wavelength: limits(1e-9), index: limits(0.004), size: rms(0.01), averagingS: 1 },
};

/** P(N < z), Abramowitz & Stegun (1964), 26.2.17: to 1e-7. */
function normalProbability(z: number): number {
  if (z < 0) return 1 - normalProbability(-z);
  const t = 1 / (1 + 0.2316419 * z);
  const tail = [0.31938153, -0.356563782, 1.781477937, -1.821255978, 1.330274429].reduceRight(
    (sum, c) => (sum + c) * t,
    0,
  );
  return 1 - (Math.exp((-z * z) / 2) / Math.sqrt(2 * Math.PI)) * tail;
}

describe('yieldOf', () => {
  it('is the normal probability where noise alone varies, about the one reading that there is', async () => {
    const task = {
      ...TASK,
      light: { ...TASK.light, driftM: 0 },
      particles: [TASK.particles[1]],
      placement: { ...TASK.placement, offsetM: 0 },
      target: { ...TASK.target, gain: 'one' as const, correction: 1.02 },
    };
    const without = await yieldOf(task, GIVEN, NONE, { builds: 100 });
    expect(without.yield).toBe(1);
    // Noise as large as a third of the target, for a reading that is off by c: |c + noise| stays within the target.
    const { drawing: c } = without;
    const probe = await yieldOf(task, GIVEN, { ...NONE, averagingS: 1 }, { builds: 100 });
    const perRootSecond = probe.tolerances[0].size;
    const averagingS = (perRootSecond / 0.03) ** 2;
    const found = await yieldOf(task, GIVEN, { ...NONE, averagingS }, { builds: 20_000 });
    expect(found.tolerances[0].size).toBeCloseTo(0.03, 9);
    const [up, down] = [(1.02 - c) / 0.03, (-1.02 - c) / 0.03];
    const expected = normalProbability(up) - normalProbability(down);
    expect(expected).toBeGreaterThan(0.2);
    expect(expected).toBeLessThan(0.97);
    expect(Math.abs(found.yield - expected)).toBeLessThan(
      4 * Math.sqrt((expected * (1 - expected)) / 20_000),
    );
    expect(found.interval[0]).toBeLessThan(expected);
    expect(found.interval[1]).toBeGreaterThan(expected);
    expect(found.tolerances).toHaveLength(1);
    expect(found.tolerances[0].worst.total).toBeCloseTo(1, 1);
    expect(found.tolerances[0].without).toBe(1);
  });

  it('agrees build by build with reading each in full', async () => {
    const task = { ...TASK, target: { ...TASK.target, correction: 0.012 } };
    const few = { ...SOME, kerf: NO_TOLERANCE, tilt: NO_TOLERANCE, index: NO_TOLERANCE };
    const fast = await yieldOf(task, GIVEN, few, { builds: 300 });
    const full = await yieldOf(task, GIVEN, few, { builds: 300, inFull: true, quick: true });
    expect(full.near).toBeNull();
    expect(full.yield).toBeGreaterThan(0.1);
    expect(full.yield).toBeLessThan(0.9);
    // All builds near the target were read in full.
    expect(fast.yield).toBe(full.yield);
    // What was said of other builds holds for these.
    const errors = fast.worsts.map((worst, i) => worst - full.worsts[i]);
    expect(Math.max(...errors.map(Math.abs))).toBeLessThan(2 * fast.surface.error.largest);
    expect(fast.surface.error.rms).toBeLessThan(0.08 * task.target.correction);
    // The one that spoils most leaves the highest yield when it is gone.
    const [most] = fast.tolerances.toSorted((p, q) => q.worst.total - p.worst.total);
    expect(most.without).toBe(Math.max(...fast.tolerances.map(({ without }) => without)));
  });

  it('gives the same for the same seed, and other builds for another', async () => {
    const options = { builds: 300, quick: true };
    const here = await yieldOf(TASK, GIVEN, SOME, options);
    expect(await yieldOf(TASK, GIVEN, SOME, options)).toEqual(here);
    expect((await yieldOf(TASK, GIVEN, SOME, { ...options, seed: 2 })).worsts).not.toEqual(here.worsts);
  });

  it('calibrates what all particles have in common away', async () => {
    const edge = { ...NONE, edge: limits(2e-6) };
    const nominal = await yieldOf(TASK, GIVEN, edge, { builds: 500, gain: 'nominal' });
    const recalibrated = await yieldOf(TASK, GIVEN, edge, { builds: 500, gain: 'recalibrated' });
    expect(nominal.gain).toEqual({ is: 'nominal', drawing: recalibrated.gain.drawing });
    expect(recalibrated.worst.most95).toBeLessThan(nominal.worst.most95);
    expect((await yieldOf(TASK, GIVEN, edge, { builds: 100, quick: true })).gain.is).toBe('recalibrated');
  });

  it('refuses tolerances that leave no instrument', async () => {
    const cases: [Partial<BriefTolerances>, RegExp][] = [
      [{ distance: rms(3e-3) }, /tolerances.distance: found builds up to 1[25](\.\d+)? mm off/],
      [{ index: limits(0.4) }, /tolerances.index: found builds up to 0.42/],
      [{ size: rms(0.2) }, /tolerances.size: found builds up to 100 % off/],
      [{ wavelength: limits(9e-8) }, /tolerances.wavelength: .* within 63.5 nm of the wavelength/],
    ];
    for (const [changed, message] of cases) {
      await expect(yieldOf(TASK, GIVEN, { ...NONE, ...changed }, { builds: 100 })).rejects.toThrow(message);
    }
  });
});

it('warns where edges may meet', async () => {
  const ring = (radiusM: number, turn: 1 | -1) =>
    circle(turn * radiusM, 60).map((v, i) => (i % 2 ? turn * v : v));
  const rings = { ...GIVEN, elements: [{ weight: 1, rings: [ring(1.1e-4, 1), ring(1.05e-4, -1)] }] };
  const warningsFor = async (edgeM: number) =>
    (await yieldOf(TASK, rings, { ...NONE, edge: limits(edgeM) }, { builds: 100, quick: true })).warnings;
  expect(await warningsFor(1e-6)).toEqual([]);
  expect((await warningsFor(3e-6))[0]).toMatch(
    /^Edges that move by 3 µm close this outline's narrowest place, (5|4.99) µm/,
  );
});
