import { describe, expect, it } from 'vitest';
import { constantIndex } from '../../src/optics/indexModel.ts';
import { judgeOutline } from '../../src/run/judgeOutline.ts';
import { planBuilds } from '../../src/run/planBuilds.ts';
import { BuildReader, readingsOf } from '../../src/score/buildReader.ts';
import type { Task } from '../../src/score/task.ts';
import { DEVIATIONS, type Deviations } from '../../src/score/tolerances.ts';

const TASK: Task = {
  light: {
    ...{ wavelengthM: 635e-9, linewidthM: 0, driftM: 1e-9, polarizationRad: null },
    ...{ irradianceWm2: 5e4, intensityNoisePerHz: 0 },
  },
  medium: constantIndex(1),
  particles: [1e-6, 2e-6].map((diameterM) => ({ diameterM, index: constantIndex(1.59), material: '1.59' })),
  placement: { offsetM: 5e-6, depthM: 1e-4, spreadM: 0, crossing: null },
  detector: { distanceM: [0.02, 0.02], radiusM: [2e-5, 1e-3], responsivityAW: 0.42, noiseCurrentA: 2e-12 },
  target: { correction: 0.05, gain: 'free', lobe: null, timeS: null },
  shop: null,
};

/** An ellipse with a corner cut off: no symmetry that a mistake could hide behind. */
const RING = Float64Array.from({ length: 120 }, (_, i) => {
  const angle = (Math.PI * (i - (i % 2))) / 60;
  return i % 2 === 0 ? 1.1e-4 * Math.cos(angle) : Math.min(7e-5, 9e-5 * Math.sin(angle));
});
const GIVEN = {
  ...{ id: 'own', family: 'given' as const, distanceM: 0.02, file: 'own.csv' },
  elements: [{ weight: 1, rings: [RING] }],
};
const FARTHEST: Deviations = {
  ...{ shiftM: 2e-6, xM: 4e-6, yM: 4e-6, distanceM: 1e-4, tiltXRad: 0.02, tiltYRad: 0.02 },
  ...{ wavelengthM: 1e-9, index: 0.01, size: 0.05 },
};

const planned = planBuilds(GIVEN, judgeOutline(TASK, GIVEN, null));
const plan = { ...planned.plan, farthest: FARTHEST };
const reader = new BuildReader(plan);

function readBuild(deviations: Partial<Deviations>): Float64Array {
  const out = readingsOf(plan);
  reader.read(
    Float64Array.from(DEVIATIONS, (name) => deviations[name] ?? 0),
    out,
  );
  return out;
}

/** Readings of the first lights, the brief's particles in its light, at the nominal depth, by a judge of another task. */
function judgeElsewhere(changes: Partial<Task>, distanceM = 0.02, places = plan.places): number[] {
  const task = { ...TASK, ...changes, light: { ...TASK.light, ...changes.light, driftM: 0 } };
  const { judge } = judgeOutline(task, GIVEN, distanceM);
  return judge.outlineRatios(GIVEN.elements, distanceM, places).ratios.flatMap((row) => [...row]);
}

function nominalDepth(out: Float64Array): number[] {
  const count = plan.places.length / 2;
  return [0, 1].flatMap((light) => {
    const from = light * plan.depthsM.length * count;
    return [...out.subarray(from, from + count)];
  });
}

function largestDifference(a: ArrayLike<number>, b: ArrayLike<number>): number {
  expect(a.length).toBe(b.length);
  return Math.max(...Array.from(a, (value, i) => Math.abs(value - b[i])));
}

describe('BuildReader', () => {
  it('reads the drawing as a judge does', () => {
    expect(largestDifference(nominalDepth(readBuild({})), judgeElsewhere({}))).toBeLessThan(2e-5);
  });

  it('reads the drawing as badly as its certified worst case', () => {
    const { gain, correction } = planned.scores;
    const worst = Math.max(...readBuild({}).map((ratio) => Math.abs(ratio / gain - 1)));
    expect(worst / (correction.certified ?? 0)).toBeCloseTo(1, 3);
  });

  it('takes a shifted mask for a particle on the other side', () => {
    const [xM, yM] = [3e-6, -2e-6];
    const places = plan.places.map((value, i) => value - (i % 2 === 0 ? xM : yM));
    expect(
      largestDifference(nominalDepth(readBuild({ xM, yM })), judgeElsewhere({}, 0.02, places)),
    ).toBeLessThan(2e-5);
  });

  it('takes distance, wavelength, index and size as a brief would', () => {
    const at = (changes: Partial<Task>, distanceM?: number) => judgeElsewhere(changes, distanceM);
    const particles = (factor: number, index: number) =>
      TASK.particles.map((one) => ({
        ...{ diameterM: one.diameterM * factor, index: constantIndex(index), material: 'other' },
      }));
    const cases: [Partial<Deviations>, number[]][] = [
      [{ distanceM: 8e-5 }, at({}, 0.02008)],
      [{ wavelengthM: -7e-10 }, at({ light: { ...TASK.light, wavelengthM: 634.3e-9 } })],
      [{ index: 0.008 }, at({ particles: particles(1, 1.598) })],
      [{ size: -0.03 }, at({ particles: particles(0.97, 1.59) })],
    ];
    const drawing = nominalDepth(readBuild({}));
    for (const [deviations, expected] of cases) {
      expect(largestDifference(drawing, expected)).toBeGreaterThan(2e-4);
      expect(largestDifference(nominalDepth(readBuild(deviations)), expected)).toBeLessThan(3e-5);
    }
  });

  it('reads the same whatever was read before', () => {
    const build = { xM: 1e-6, size: 0.02, tiltYRad: 0.01, shiftM: -1e-6 };
    const first = readBuild(build);
    readBuild({ distanceM: 5e-5 });
    expect(readBuild(build)).toEqual(first);
  });
});
