import { describe, expect, it } from 'vitest';
import { constantIndex } from '../../src/optics/indexModel.ts';
import { polygonise } from '../../src/outline/polygonise.ts';
import { leadingFields } from '../../src/score/farZoneError.ts';
import { REPORT_FINENESS, SEARCH_FINENESS } from '../../src/score/fineness.ts';
import { Judge } from '../../src/score/judge.ts';
import type { Task } from '../../src/score/task.ts';
import { presetTask } from './presetTasks.ts';

const UM = 1e-6;
const DISTANCE_M = 0.02;
const DISC = [{ kind: 'arc', centre: [0, 0], radius: 150 * UM, from: 0, to: 2 * Math.PI } as const];
const ELEMENTS = [{ weight: 1, rings: [polygonise(DISC, 180)] }];
const SQUARE = [
  { weight: 1, rings: [Float64Array.of(-1, -1, 1, -1, 1, 1, -1, 1).map((at) => at * 120 * UM)] },
];
const PLACES = Float64Array.of(0, 0, 6 * UM, -8 * UM);
const LIGHT_WITH_ALL = {
  polarizationRad: 0.4,
  sourceAngleRad: 5e-4,
  also: [{ wavelengthM: 532e-9, linewidthM: 0, share: 0.3 }],
};

describe('Judge in a focused beam', () => {
  it('judges a waist of 5 m as the flat wave', async () => {
    const flat = await presetTask('tight-focus');
    const { beam: _, ...light } = flat.light;
    const placement = { ...flat.placement, depthM: 1e-3 };
    const wide = { ...flat, placement, light: { ...light, beam: { waistM: 5, focusM: 0 } } };
    const a = new Judge({ ...flat, placement, light }, SEARCH_FINENESS).scoreOutline(ELEMENTS, DISTANCE_M);
    const b = new Judge(wide, SEARCH_FINENESS).scoreOutline(ELEMENTS, DISTANCE_M);
    expect(b.ratios.length).toBe(a.ratios.length);
    a.ratios.forEach((ratio, i) => {
      expect(Math.abs(b.ratios[i] - ratio)).toBeLessThan(1e-6);
    });
    expect(b.scores.snr.required / a.scores.snr.required).toBeCloseTo(1, 6);
    expect(b.scores.snr.time_s / a.scores.snr.time_s).toBeCloseTo(1, 6);
    expect(b.scores.area_m2).toBe(a.scores.area_m2);
  });

  it('counts the light on the axis at the nominal place, wherever the particle is', async () => {
    const task = await presetTask('tight-focus');
    const judge = new Judge(task, SEARCH_FINENESS);
    const { waistM } = task.light.beam as { waistM: number };
    expect(judge.localIrradiance(0, DISTANCE_M, [0, 0, 0])).toBeCloseTo(1, 12);
    expect(judge.localIrradiance(0, DISTANCE_M, [waistM / 2, 0, 0])).toBeCloseTo(Math.exp(-0.5), 12);
    // One Rayleigh range behind the waist there is half the light on the axis.
    const rangeM = (Math.PI * waistM ** 2) / judge.wavelengthM;
    expect(judge.localIrradiance(0, DISTANCE_M, [0, 0, rangeM])).toBeCloseTo(0.5, 9);
  });

  it('reads several lines as the mean of each alone', async () => {
    const task = await tightTask();
    const also = [
      { wavelengthM: 532e-9, linewidthM: 0, share: 0.3 },
      { wavelengthM: 450e-9, linewidthM: 2e-9, share: 0.2 },
    ];
    const both = new Judge({ ...task, light: { ...task.light, also } }, SEARCH_FINENESS);
    const [found] = both.outlineRatios(SQUARE, DISTANCE_M, PLACES).ratios;
    const main = { wavelengthM: task.light.wavelengthM, linewidthM: 0, share: 0.5 };
    const sums = new Float64Array(found.length);
    let extinctionM2 = 0;
    let irradiance = 0;
    for (const { wavelengthM, linewidthM, share } of [main, ...also]) {
      const judge = new Judge(
        { ...task, light: { ...task.light, wavelengthM, linewidthM } },
        SEARCH_FINENESS,
      );
      const [row] = judge.outlineRatios(SQUARE, DISTANCE_M, PLACES).ratios;
      const own = share * judge.scenarios[0].extinctionM2;
      row.forEach((ratio, i) => {
        sums[i] += own * ratio;
      });
      extinctionM2 += own;
      irradiance += share * judge.localIrradiance(0, DISTANCE_M, [5 * UM, 0, 1e-3]);
    }
    found.forEach((ratio, i) => {
      expect(Math.abs(ratio - sums[i] / extinctionM2)).toBeLessThan(1e-5);
    });
    expect(both.localIrradiance(0, DISTANCE_M, [5 * UM, 0, 1e-3])).toBeCloseTo(irradiance, 9);
  });

  it('reads a source of an angular size as the mean of beams from all over it, each an outline that is shifted', async () => {
    const task = await tightTask();
    const angle = 3e-3;
    const wide = new Judge({ ...task, light: { ...task.light, sourceAngleRad: angle } }, REPORT_FINENESS);
    const plain = new Judge(
      { ...task, detector: { ...task.detector, radiusM: [2e-5, 6e-4] } },
      REPORT_FINENESS,
    );
    const found = wide.outlineRatios(SQUARE, DISTANCE_M, PLACES).ratios[0];
    const sums = new Float64Array(found.length);
    const [circles, around] = [40, 40];
    for (let i = 0; i < circles; i++) {
      for (let j = 0; j < around; j++) {
        const shift = DISTANCE_M * Math.tan(angle) * Math.sqrt((i + 0.5) / circles);
        const turn = (2 * Math.PI * (j + (i % 2) / 2)) / around;
        const [dx, dy] = [shift * Math.cos(turn), shift * Math.sin(turn)];
        const rings = SQUARE[0].rings.map((ring) => ring.map((at, n) => at - (n % 2 === 0 ? dx : dy)));
        const [row] = plain.outlineRatios([{ weight: 1, rings }], DISTANCE_M, PLACES).ratios;
        row.forEach((ratio, n) => {
          sums[n] += ratio / (circles * around);
        });
      }
    }
    const [still] = plain.outlineRatios(SQUARE, DISTANCE_M, PLACES).ratios;
    expect(Math.abs(still[1] - found[1])).toBeGreaterThan(1e-3);
    found.forEach((ratio, i) => {
      expect(Math.abs(ratio - sums[i])).toBeLessThan(2e-5);
    });
  });

  it.each([
    ['unpolarised', {}],
    ['polarised, two lines and a source', LIGHT_WITH_ALL],
  ])('tells the flux density that its readings are made of: %s', async (_name, light) => {
    const task = await tightTask();
    const judge = new Judge({ ...task, light: { ...task.light, ...light } }, REPORT_FINENESS);
    const [x, y] = [8 * UM, -5 * UM];
    const density = judge.edgeDensity(0, DISTANCE_M, 150 * UM, [x, y]);
    const ratioOf = (left: number, low: number, size: number) => {
      const [right, high] = [left + size, low + size];
      const rings = [Float64Array.of(left, low, right, low, right, high, left, high)];
      return judge.outlineRatios([{ weight: 1, rings }], DISTANCE_M, Float64Array.of(x, y)).ratios[0][0];
    };
    const out = new Float64Array(3);
    const step = 4 * UM;
    const largest = judge.edgeDensity(0, DISTANCE_M, 150 * UM, [x, y]);
    largest(0, 0, out);
    const size = Math.abs(out[0]);
    for (const [atX, atY] of [
      [0, 0],
      [60 * UM, -30 * UM],
      [-20 * UM, 90 * UM],
    ]) {
      density(atX, atY, out);
      const small = ratioOf(atX - step / 2, atY - step / 2, step) / step ** 2;
      expect(Math.abs(out[0] - small)).toBeLessThan(2e-3 * size);
      const across = new Float64Array(3);
      const before = new Float64Array(3);
      for (const [n, dx, dy] of [
        [1, step / 8, 0],
        [2, 0, step / 8],
      ]) {
        density(atX + dx, atY + dy, across);
        density(atX - dx, atY - dy, before);
        const slope = (across[0] - before[0]) / (step / 4);
        expect(Math.abs(out[n] - slope)).toBeLessThan((1e-2 * size) / (50 * UM));
      }
    }
  });

  it('has the exact fields where they are wanted', async () => {
    const task = await presetTask('tight-focus');
    const { beam: _, ...flat } = task.light;
    const particles = [{ diameterM: 50 * UM, index: constantIndex(1.5), material: '1.5' }];
    const near = { ...task, particles, light: { ...flat, beam: { waistM: 5, focusM: 0 } } };
    const [a, b, far] = (['exact', 'exact', 'far'] as const).map((fields, i) => {
      const judge = new Judge(i === 0 ? { ...near, light: flat } : near, SEARCH_FINENESS, fields);
      return judge.outlineRatios(ELEMENTS, DISTANCE_M, Float64Array.of(0, 0)).ratios[0][0];
    });
    expect(Math.abs(a - b)).toBeLessThan(1e-6);
    expect(Math.abs(a - far)).toBeGreaterThan(1e-3);
    expect(leadingFields({ ...near, target: { ...near.target, correction: 1e-3 } })).toBe('exact');
  });
});

/** The brief of the shelf with one bead, still and nearly on the axis. */
async function tightTask(): Promise<Task> {
  const task = await presetTask('tight-focus');
  const placement = { offsetM: 10 * UM, depthM: 0, spreadM: 0, crossing: null };
  const particles = [{ diameterM: 2 * UM, index: constantIndex(1.59), material: '1.59' }];
  return { ...task, particles, placement, light: { ...task.light, linewidthM: 0, driftM: 0 } };
}
