import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { polygonise } from '../../src/outline/polygonise.ts';
import { fieldsFor, leadingFields } from '../../src/score/farZoneError.ts';
import { SEARCH_FINENESS } from '../../src/score/fineness.ts';
import { Judge } from '../../src/score/judge.ts';
import { presetTask } from './presetTasks.ts';

const UM = 1e-6;
const DISTANCE_M = 0.02;
const DISC = [{ kind: 'arc', centre: [0, 0], radius: 150 * UM, from: 0, to: 2 * Math.PI } as const];
const ELEMENTS = [{ weight: 1, rings: [polygonise(DISC, 180)] }];

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

  it('has the fields of the far zone only, and no rough edges', async () => {
    const task = await presetTask('tight-focus');
    expect(fieldsFor(task, 'exact')).toBe('far');
    expect(leadingFields(task)).toBe('far');
    const judge = new Judge(task, SEARCH_FINENESS);
    expect(() => judge.edgeDensity(0, DISTANCE_M, 150 * UM, [0, 0])).toThrow(RimwrightError);
  });
});
