import { describe, expect, it } from 'vitest';
import { LinearModels } from '../../src/numeric/linearModel.ts';
import { ringLoop } from '../../src/outline/ring.ts';
import type { Loop, Shape } from '../../src/outline/shape.ts';
import { ConditionReader } from '../../src/score/conditionReader.ts';
import { kindsOf } from '../../src/score/conditions.ts';
import { SEARCH_FINENESS } from '../../src/score/fineness.ts';
import { Judge } from '../../src/score/judge.ts';
import type { MaskBound } from '../../src/score/maskBound.ts';
import { boundTools, MaskBounds } from '../../src/score/maskBound.ts';
import { PlaneCells } from '../../src/score/planeCells.ts';
import { PlaneProgram } from '../../src/score/planeProgram.ts';
import { planeProof } from '../../src/score/planeProof.ts';
import type { Task } from '../../src/score/task.ts';
import { presetTask } from './presetTasks.ts';

const Z = 0.02;
const R = 0.2e-3;
const models = await LinearModels.load();
const offset = await presetTask('offset-range');
const still: Task = { ...offset, placement: { ...offset.placement, offsetM: 5e-6 } };
const polarised: Task = { ...still, light: { ...still.light, polarizationRad: 0.4 } };
const flight: Task = {
  ...still,
  placement: { ...still.placement, crossing: { spanM: 30e-6, headingRad: Math.PI / 2 } },
};
/** The field is neither along the heading nor across it: half a turn is all that is left. */
const both: Task = { ...flight, light: { ...flight.light, polarizationRad: 0.4 } };

function boundOf(task: Task, cells: 'radial' | 'plane', kind: 'any' | 'star' = 'any'): MaskBound {
  const choice = { distanceM: Z, radiusM: R, kind, cells };
  const bounds = new MaskBounds(task, models, boundTools(task, 'far'), choice);
  const bound = bounds.at(1);
  bounds.dispose();
  return bound;
}

const stillPlane = boundOf(still, 'plane');
const polarisedPlane = boundOf(polarised, 'plane');
const flightPlane = boundOf(flight, 'plane');

describe('MaskBounds on the plane', () => {
  it('is the radial bound where nothing has a direction, less its own error', () => {
    const radial = boundOf(still, 'radial');
    const [plane, least] = [stillPlane.areaOverFloor ?? 0, radial.areaOverFloor ?? 0];
    expect(plane).toBeLessThan(least + radial.error);
    expect(plane).toBeGreaterThan(least - 4 * stillPlane.error);
    expect(stillPlane.error).toBeLessThan(2e-3);
  });

  it('lies a little below the mask that the program found, which keeps the correction everywhere', () => {
    for (const { areaOverFloor, mask } of [polarisedPlane, flightPlane]) {
      expect(areaOverFloor).toBeLessThan(mask?.areaOverFloor ?? 0);
      expect(areaOverFloor).toBeGreaterThan(0.99 * (mask?.areaOverFloor ?? 9));
      expect(mask?.worst).toBeLessThan(0.0102);
    }
  });

  it('lets a mask make use of the direction: never more than what radial masks need', () => {
    for (const [task, { areaOverFloor, error }] of [
      [polarised, polarisedPlane],
      [flight, flightPlane],
    ] as const) {
      expect(areaOverFloor).toBeLessThan((boundOf(task, 'radial').areaOverFloor ?? 0) + error);
    }
  });

  it('hardly changes when a field is added to a flight at an angle that leaves no mirror, only half a turn', () => {
    const bound = boundOf(both, 'plane').areaOverFloor ?? 0;
    expect(Math.abs(bound / (flightPlane.areaOverFloor ?? 9) - 1)).toBeLessThan(0.02);
  });

  it('is none where no mask keeps the correction', () => {
    // η is 9.9 at the rim: two zones of a gain of two each, no more.
    const choice = { distanceM: Z, radiusM: R, kind: 'any', cells: 'plane' } as const;
    const bounds = new MaskBounds(polarised, models, boundTools(polarised, 'far'), choice);
    expect(bounds.at(6).areaOverFloor).toBeNull();
    expect(bounds.at(1).areaOverFloor).toBeCloseTo(polarisedPlane.areaOverFloor ?? 0, 2);
    bounds.dispose();
  });

  it('turns with the direction', () => {
    const turned = { ...polarised, light: { ...polarised.light, polarizationRad: 1.3 } };
    const [one, other] = [polarisedPlane, boundOf(turned, 'plane')];
    expect(Math.abs((one.areaOverFloor ?? 0) - (other.areaOverFloor ?? 9))).toBeLessThan(one.error);
  });

  it('is not beaten by any ring, whole or cut along or across the direction, that keeps the correction', () => {
    // A sweep, judged with no part of the program, at a correction that single rings can keep; `open` is the open part of each quarter.
    const openings = [
      [0, 1],
      [0, 0.85],
      [0.15, 1],
    ] as const;
    for (const [task, axis] of [
      [polarised, 0.4],
      [flight, Math.PI / 2],
    ] as const) {
      const loose: Task = { ...task, target: { ...task.target, correction: 0.2 } };
      const bound = boundOf(loose, 'plane').areaOverFloor ?? 9;
      const judge = new Judge(loose, SEARCH_FINENESS);
      const unitM = 1 / Math.sqrt(judge.kappa(Z));
      const kept = openings.map((open) => {
        let least = Number.POSITIVE_INFINITY;
        for (let inner = 0; inner < 2.4; inner += 0.2) {
          for (let width = 0.9; width < 4; width += 0.1) {
            const shape = cutRing(
              axis,
              open,
              [inner, inner + width].map((rim) => Math.sqrt(rim) * unitM),
            );
            const { correction, areaOverFloor } = judge.scoreShape(shape, Z).scores;
            if (correction.worst <= 0.2) least = Math.min(least, areaOverFloor);
          }
        }
        return least;
      });
      expect(Math.min(...kept)).toBeLessThan(2 * bound);
      expect(Math.min(...kept)).toBeGreaterThan(bound);
    }
  });
});

/** A ring of which each quarter turn from the axis is open from one part of it to another, mirrored in the axis and its normal. */
function cutRing(
  axis: number,
  [from, to]: readonly [number, number],
  [inner, outer]: readonly number[],
): Shape {
  if (to - from === 1) {
    const loops = inner === 0 ? [ringLoop(outer, 1)] : [ringLoop(outer, 1), ringLoop(inner, -1)];
    return { elements: [{ weight: 1, loops }], folds: Infinity, mirror: true };
  }
  const part = Math.PI / 2;
  const loops = [0, 1, 2, 3].map((quarter): Loop => {
    const [start, end] = quarter % 2 === 0 ? [from, to] : [1 - to, 1 - from];
    const [first, last] = [axis + part * (quarter + start), axis + part * (quarter + end)];
    const at = (radius: number, angle: number) =>
      [radius * Math.cos(angle), radius * Math.sin(angle)] as const;
    const inside: Loop =
      inner === 0 ? [] : [{ kind: 'arc', centre: [0, 0], radius: inner, from: last, to: first }];
    return [
      { kind: 'arc', centre: [0, 0], radius: outer, from: first, to: last },
      { kind: 'line', from: at(outer, last), to: at(inner, last) },
      ...inside,
      { kind: 'line', from: at(inner, first), to: at(outer, first) },
    ];
  });
  return { elements: [{ weight: 1, loops }], folds: 1, mirror: false };
}

describe('planeProof', () => {
  it('takes off more than what cells of a third of the size change, for the same prices', () => {
    for (const task of [polarised, flight, both]) {
      const reader = new ConditionReader(task, 'far');
      const [coarse, fine] = [1, 3].map((finer) => new PlaneCells(task, reader, Z, R, finer));
      const program = new PlaneProgram(models, coarse);
      const { wavelengthM } = task.light;
      const places = kindsOf(task).flatMap((kind) =>
        kind.diametersM.flatMap((diameterM) =>
          coarse.firstPositions.map((position) => ({
            condition: { kind, diameterM, wavelengthM, depthM: 0 },
            position,
          })),
        ),
      );
      for (const { condition, position } of places) program.add(coarse.row(condition, position));
      const least = program.solve(1, 0.01);
      const rows = places.map(({ condition, position }) => fine.row(condition, position));
      const prices = least?.prices ?? new Float64Array(0);
      const [one, other] = [least?.prove(), planeProof(fine, rows, prices, 0.99, 1.01)];
      expect(other.proven + other.error).toBeGreaterThan(one?.proven ?? 9);
      const sums = [one, other].map((proof) => (proof?.proven ?? 0) + (proof?.error ?? 0));
      expect(Math.abs(sums[0] - sums[1])).toBeLessThan(one?.error ?? 0);
      expect(other.error).toBeLessThan(one?.error ?? 0);
      program.dispose();
    }
  });
});

describe('PlaneCells', () => {
  it('add up to what the boundary of all of them reads', () => {
    for (const task of [polarised, both]) {
      const reader = new ConditionReader(task, 'far');
      const cells = new PlaneCells(task, reader, Z, R);
      const [kind] = kindsOf(task);
      const condition = { kind, diameterM: 2e-6, wavelengthM: task.light.wavelengthM, depthM: 0 };
      const shares = Float64Array.from(cells.areas, (_, cell) => (Math.floor(cell / 5) % 3) / 2);
      const [element] = cells.elementsOf(shares);
      // Half a turn keeps the mask; the mirrors do so only for the field alone.
      const position = [3e-6, -2e-6] as const;
      const { added } = cells.row(condition, position);
      const sum = shares.reduce((total, share, cell) => total + share * added[cell], 0);
      const read = reader.at(condition, { distanceM: Z, radiusM: R, offsetM: 40e-6 });
      const { crossing } = task.placement;
      const steps = crossing === null ? 1 : 400;
      let mean = 0;
      for (let i = 0; i < steps; i++) {
        const along = (crossing?.spanM ?? 0) * ((i + 0.5) / steps - 0.5);
        const heading = crossing?.headingRad ?? 0;
        const [x, y] = [position[0] + along * Math.cos(heading), position[1] + along * Math.sin(heading)];
        mean += read(element.nodes, x, y) / steps;
      }
      expect(Math.abs(sum - mean)).toBeLessThan(2e-4);
    }
  });
});
