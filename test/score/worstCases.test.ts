import { describe, expect, it } from 'vitest';
import type { OutlineElement, Shape } from '../../src/outline/shape.ts';
import { shapeRadius } from '../../src/outline/shapeRadius.ts';
import { Certifier } from '../../src/score/certifier.ts';
import { kindsOf, particleOf } from '../../src/score/conditions.ts';
import { leadingFields } from '../../src/score/farZoneError.ts';
import type { Fineness } from '../../src/score/fineness.ts';
import { REPORT_FINENESS, SEARCH_FINENESS } from '../../src/score/fineness.ts';
import { guardedTask } from '../../src/score/guards.ts';
import { Judge } from '../../src/score/judge.ts';
import type { Task } from '../../src/score/task.ts';
import { tellingDiameters } from '../../src/score/tellingDiameters.ts';
import type { WorstCase } from '../../src/score/worstCases.ts';
import { WorstCases } from '../../src/score/worstCases.ts';
import { drawn, ringsOf, variantNamed } from '../outline/drawings.ts';
import { presetTask } from './presetTasks.ts';

/** Searches found these: a ring on target for the offset brief, and others of all kinds for the rest. */
const DESIGNS: [brief: string, variant: string, vector: number[], distanceM: number][] = [
  ['offset-range', 'rings-2', [0.98, 2.09, 11, 11.2], 0.02],
  ['offset-range', 'fourier-square-5-fold-6', [5, 2, 0.5, 0.2, 0, 0.1], 0.02],
  ['size-range', 'ramp-saw-12-fold', [3.1, 9.4], 0.02],
  ['road-dust', 'polygon-star-5', [9, 3, 0.1], 0.02],
  ['coated-pigment', 'disc', [3], 0.02],
  ['fine-aerosol', 'rings-1', [0.6, 3.4], 0.03],
  ['spray-droplets', 'disc', [3.1], 0.05],
  ['tight-focus', 'rings-1', [0.5, 3.2], 0.02],
];

/** As in a search, but ten times as many places, and no fewer wavelengths and depths. */
const DENSE: Fineness = { ...SEARCH_FINENESS, spacing: 0.16, most: { circles: 40, steps: 80 } };

interface Arranged {
  task: Task;
  judge: Judge;
  shape: Shape;
  distanceM: number;
}

async function arrange([brief, variant, vector, distanceM]: (typeof DESIGNS)[number]): Promise<Arranged> {
  const task = await presetTask(brief);
  const judge = new Judge(task, REPORT_FINENESS, leadingFields(task));
  return {
    task,
    judge,
    shape: drawn(variantNamed(variant), vector, 1 / Math.sqrt(judge.kappa(distanceM))),
    distanceM,
  };
}

function casesOf({ task, judge, shape, distanceM }: Arranged, gain: number): WorstCase[] {
  const worst = new WorstCases(task, leadingFields(task));
  return worst.find(judge.shapeNodes(shape, distanceM), shapeRadius(shape), distanceM, gain, shape);
}

/** The same task with particles that fill every range evenly, and nothing else in it changed. */
function filled(task: Task, most: number): Task {
  const particles = kindsOf(task).flatMap((kind) => {
    const { leastM, largestM } = kind;
    const count = leastM === largestM ? 1 : most;
    return Array.from({ length: count }, (_, i) =>
      particleOf({
        kind,
        diameterM: count === 1 ? leastM : leastM + ((largestM - leastM) * i) / (count - 1),
      }),
    );
  });
  return { ...task, particles };
}

describe('WorstCases', () => {
  it.each(DESIGNS)(
    '%s, %s: no dense scan of sizes, places, light and depths exceeds it',
    async (...design) => {
      const arranged = await arrange(design);
      const { task, judge, shape, distanceM } = arranged;
      const { gain, correction } = judge.scoreShape(shape, distanceM).scores;
      const [worst] = casesOf(arranged, gain);
      const dense = new Judge(filled(task, 120), DENSE, leadingFields(task));
      const { ratios } = dense.scoreShape(shape, distanceM);
      const scanned = ratios.reduce((most, ratio) => Math.max(most, Math.abs(ratio / gain - 1)), 0);
      // A hundredth of the target; a scan that finds far less would prove nothing.
      const slack = 0.01 * task.target.correction;
      expect(Math.abs(worst.correction)).toBeGreaterThan(scanned - slack);
      expect(Math.abs(worst.correction)).toBeGreaterThan(correction.worst - slack);
      expect(Math.abs(worst.correction)).toBeLessThan(1.1 * scanned);
    },
  );

  it('names places that a judge reads the same at, within every range, the worst first', async () => {
    for (const design of [DESIGNS[1], DESIGNS[6]]) {
      const arranged = await arrange(design);
      const { task, shape, distanceM } = arranged;
      const cases = casesOf(arranged, 1.02);
      const sizes = cases.map(({ correction }) => Math.abs(correction));
      expect(sizes).toEqual(sizes.toSorted((a, b) => b - a));
      for (const { correction, ratio, particle, wavelengthM, depthM, positionM } of cases) {
        expect(ratio).toBeCloseTo(1.02 * (1 + correction), 12);
        expect(Math.abs(wavelengthM - task.light.wavelengthM)).toBeLessThan(task.light.driftM + 1e-15);
        expect(Math.abs(depthM)).toBeLessThanOrEqual(task.placement.depthM);
        expect(Math.hypot(...positionM)).toBeLessThan(task.placement.offsetM * (1 + 1e-9));
        const there: Task = {
          ...task,
          light: { ...task.light, wavelengthM, driftM: 0 },
          particles: [particle],
        };
        const judge = new Judge(there, REPORT_FINENESS, leadingFields(task));
        // At its depth the detector is that much nearer.
        const elements: OutlineElement[] = [{ weight: 1, rings: ringsOf(shape, 1440) }];
        const read = judge.outlineRatios(elements, distanceM - depthM, Float64Array.from(positionM));
        expect(read.ratios[0][0]).toBeCloseTo(ratio, 4);
      }
    }
  });

  it('is linear in the weights: two halves are the whole', async () => {
    const arranged = await arrange(DESIGNS[0]);
    const { task, judge, shape, distanceM } = arranged;
    const nodes = judge.shapeNodes(shape, distanceM);
    const halves = [...nodes, ...nodes].map((element) => ({ ...element, weight: 0.5 }));
    const find = (elements: typeof nodes) =>
      new WorstCases(task).find(elements, shapeRadius(shape), distanceM, 1, shape)[0];
    expect(find(halves).correction).toBeCloseTo(find(nodes).correction, 9);
    expect(find(halves).particle.diameterM).toBeCloseTo(find(nodes).particle.diameterM, 9);
  });

  it('leaves single diameters as they are', async () => {
    const arranged = await arrange(['nominal-sphere', 'disc', [3], 0.02]);
    const { scores } = arranged.judge.scoreShape(arranged.shape, 0.02);
    const cases = casesOf(arranged, scores.gain);
    expect(cases).toHaveLength(1);
    expect(cases[0].particle.diameterM).toBe(2e-6);
    expect(Math.abs(cases[0].correction)).toBeCloseTo(scores.correction.worst, 9);
  });
});

describe('Certifier', () => {
  it('sets a free gain between the worst cases, and never certifies less than the samples show', async () => {
    const { task, judge, shape, distanceM } = await arrange(DESIGNS[3]);
    const elements = [{ weight: 1, rings: ringsOf(shape, 360) }];
    const sampled = judge.scoreOutline(elements, distanceM).scores;
    const { scores } = new Certifier(judge, leadingFields(task)).scoreOutline(elements, distanceM);
    const { certified = 0, worst, certifiedAt } = scores.correction;
    expect(certified).toBeGreaterThanOrEqual(worst);
    expect(certified).toBeGreaterThanOrEqual(sampled.correction.worst);
    const cases = new WorstCases(task).find(
      judge.outlineNodes(elements, distanceM),
      scores.radius_m,
      distanceM,
      sampled.gain,
      { folds: 1, mirror: false },
    );
    const before = Math.max(...cases.map(({ correction }) => Math.abs(correction)));
    expect(certified).toBeLessThanOrEqual(
      before * (scores.gain > sampled.gain ? 1 : sampled.gain / scores.gain) + 1e-9,
    );
    expect(certifiedAt?.diameter_m).toBeGreaterThan(0.99e-6);
    expect(scores.areaOverFloor * scores.gain).toBeCloseTo(sampled.areaOverFloor * sampled.gain, 9);
  });
});

describe('tellingDiameters', () => {
  it('are none for a single diameter or a table, and lie inside a range', async () => {
    const { light, medium, particles } = await presetTask('road-dust');
    const [range, single] = kindsOf({ particles });
    expect(tellingDiameters(single, medium, light)).toEqual([]);
    const telling = tellingDiameters(range, medium, light).map(({ diameterM }) => diameterM);
    expect(telling.length).toBeGreaterThan(20);
    expect(telling.every((diameterM) => diameterM > 1e-6 && diameterM < 4e-6)).toBe(true);
  });

  it('guard a search: two for each range, and nothing else in the task changes', async () => {
    const task = await presetTask('coated-pigment');
    const guarded = guardedTask(task);
    const added = guarded.particles.slice(task.particles.length);
    expect(guarded).toEqual({ ...task, particles: [...task.particles, ...added] });
    expect(added).toHaveLength(4);
    // A distribution's shares already add up to one.
    expect(added.every(({ population }) => population === undefined)).toBe(true);
  });
});
