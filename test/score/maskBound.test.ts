import { describe, expect, it } from 'vitest';
import { LinearModels } from '../../src/numeric/linearModel.ts';
import { ringLoop } from '../../src/outline/ring.ts';
import type { Shape } from '../../src/outline/shape.ts';
import { REPORT_FINENESS } from '../../src/score/fineness.ts';
import { Judge } from '../../src/score/judge.ts';
import type { MaskBound } from '../../src/score/maskBound.ts';
import { boundTools, MaskBounds } from '../../src/score/maskBound.ts';
import type { MaskKind } from '../../src/score/maskProgram.ts';
import { ringsOf, stepsOf } from '../../src/score/maskSteps.ts';
import type { Task } from '../../src/score/task.ts';
import { presetTask } from './presetTasks.ts';

const Z = 0.02;
const R = 0.4e-3;
const models = await LinearModels.load();
const nominal = await presetTask('nominal-sphere');
const offset = await presetTask('offset-range');
const sizes = await presetTask('size-range');

function boundOf(task: Task, kind: MaskKind, gain = 1, radiusM = R): MaskBound & { largestPhase: number } {
  const bounds = new MaskBounds(task, models, boundTools(task, 'far'), {
    distanceM: Z,
    radiusM,
    kind,
    cells: 'radial',
  });
  const bound = { ...bounds.at(gain), largestPhase: bounds.largestPhase };
  bounds.dispose();
  return bound;
}

const nominalAny = boundOf(nominal, 'any');
const offsetAny = boundOf(offset, 'any');

describe('MaskBounds', () => {
  it('is what thin rings at the best phases need for one sphere on the axis, paraxially', () => {
    // Ring k reads ∫ sin(η + δ) dη / cos δ, δ = arg S(0). Six zones fit; of half-width w each reads 2 sin w / cos δ.
    const judge = new Judge(nominal, REPORT_FINENESS);
    const [re, im] = judge.scenarios[0].colours[0].sphere.forward;
    const zones = 6;
    const halfWidth = Math.asin((0.99 * Math.cos(Math.atan2(im, re))) / (2 * zones));
    expect(Math.abs((nominalAny.areaOverFloor ?? 0) / (2 * zones * halfWidth) - 1)).toBeLessThan(0.01);
  });

  it('lies a little below the mask that the program found, which keeps the correction everywhere', () => {
    for (const { areaOverFloor, mask, error } of [nominalAny, offsetAny]) {
      expect(areaOverFloor).toBeLessThan(mask?.areaOverFloor ?? 0);
      expect(areaOverFloor).toBeGreaterThan(0.998 * (mask?.areaOverFloor ?? 9));
      expect(mask?.worst).toBeLessThan(0.0101);
      expect(error).toBeLessThan(1e-3);
    }
  });

  it('stands at 1.136 λz on the offset brief: above what its three sizes alone ask for', () => {
    expect(offsetAny.areaOverFloor).toBeGreaterThan(1.134);
    expect(offsetAny.areaOverFloor).toBeLessThan(1.137);
    const threeSizes = {
      ...offset,
      particles: offset.particles.map(({ range: _, ...particle }) => particle),
    };
    expect(boundOf(threeSizes as Task, 'any').areaOverFloor).toBeLessThan(
      (offsetAny.areaOverFloor ?? 0) - 1e-4,
    );
  });

  it('is not beaten by any ring that keeps the correction, from a sweep over all', () => {
    // One ring of any inner and outer phase, judged on its own: the bound is for all masks, so for these.
    const judge = new Judge(nominal, REPORT_FINENESS);
    const unitM = 1 / Math.sqrt(judge.kappa(Z));
    let least = Number.POSITIVE_INFINITY;
    for (let inner = 0.02; inner < 8; inner += 0.01) {
      for (let width = 0.9; width < 1.3; width += 0.005) {
        const rims = [inner + width * Math.PI, inner];
        const loops = rims.map((rim, i) => ringLoop(Math.sqrt(rim) * unitM, i === 0 ? 1 : -1));
        const shape: Shape = { elements: [{ weight: 1, loops }], folds: Infinity, mirror: true };
        const { correction, areaOverFloor } = judge.scoreShape(shape, Z).scores;
        if (correction.worst <= 0.01) least = Math.min(least, areaOverFloor);
      }
    }
    expect(least).toBeGreaterThan(nominalAny.areaOverFloor ?? 9);
  });

  it('for stars is at least that for any mask, and what a disc needs at a gain of two', () => {
    const star = boundOf(sizes, 'star', 2).areaOverFloor ?? 0;
    expect(star).toBeGreaterThan(boundOf(sizes, 'any', 2).areaOverFloor ?? 9);
    // A disc of η = π reads twice the extinction: π/2 times the floor, less what the correction lets through.
    expect(star).toBeGreaterThan(0.97 * (Math.PI / 2));
    expect(star).toBeLessThan(Math.PI / 2);
  });

  it('asks less for a looser correction, and at least as much over a larger gain', () => {
    const looser = { ...offset, target: { ...offset.target, correction: 0.03 } };
    expect(boundOf(looser, 'any').areaOverFloor).toBeLessThan(offsetAny.areaOverFloor ?? 0);
    const bounds = new MaskBounds(sizes, models, boundTools(sizes, 'far'), {
      distanceM: Z,
      radiusM: R,
      kind: 'any',
      cells: 'radial',
    });
    const overGain = [0.5, 1, 2, 4].map((gain) => bounds.at(gain).areaOverFloor ?? 0);
    expect(overGain.toSorted((a, b) => a - b)).toEqual(overGain);
    bounds.dispose();
  });

  it('is none where no mask keeps the correction', () => {
    // Within η = 0.3 even an open detector reads a third of the extinction; and no gain of 30 fits six zones of two each.
    expect(boundOf(nominal, 'any', 1, R * Math.sqrt(0.3 / 39.6)).areaOverFloor).toBeNull();
    expect(boundOf(nominal, 'any', 30).areaOverFloor).toBeNull();
  });

  it('has rings that nearly do what its mask does, for a descent to sharpen', () => {
    const steps = stepsOf(offsetAny.mask?.shares ?? new Float64Array(1), offsetAny.largestPhase);
    const judge = new Judge(offset, REPORT_FINENESS);
    const unitM = 1 / Math.sqrt(judge.kappa(Z));
    const loops = ringsOf(steps, 2).map((rim, i) => ringLoop(Math.sqrt(rim) * unitM, i % 2 === 1 ? 1 : -1));
    const shape: Shape = { elements: [{ weight: 1, loops }], folds: Infinity, mirror: true };
    const { correction, areaOverFloor } = judge.scoreShape(shape, Z).scores;
    expect(areaOverFloor).toBeCloseTo(offsetAny.mask?.areaOverFloor ?? 0, 1);
    expect(correction.worst).toBeLessThan(0.03);
  });
});
