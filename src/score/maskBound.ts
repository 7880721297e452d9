import type { LinearModels } from '../numeric/linearModel.ts';
import type { Fields } from '../reading/tableShelf.ts';
import { ConditionReader } from './conditionReader.ts';
import type { Condition } from './conditions.ts';
import { kindsOf } from './conditions.ts';
import type { LeastMask, MaskKind } from './maskProgram.ts';
import { MaskProgram } from './maskProgram.ts';
import { RadialCells } from './radialCells.ts';
import type { Task } from './task.ts';
import { WorstCases } from './worstCases.ts';

/** A proven bound for one distance and one gain. */
export interface MaskBound {
  gain: number;
  /** No mask has less (area / gain) over λz; null where none keeps the correction at all. */
  areaOverFloor: number | null;
  /** What was taken off for the finite size of cells and tables. */
  error: number;
  /** The mask that the program ended with, its own areaOverFloor and worst correction; null where there is none. */
  mask: { shares: Float64Array; areaOverFloor: number; worst: number } | null;
  /** Places that the program was told of. */
  places: number;
}

/** Share of the correction by which a mask may miss it anywhere before its worst places are added. */
const MISS = 0.01;

/** Programs solved for one gain, at most: more would tighten the bound no further than it can be told. */
export const MOST_CUTS = 40;

/**
 * The least area over gain for one distance: cutting planes. A program for few places is solved, the worst places of its mask
 * are found by climbing (`WorstCases`) and added, until no place is missed by more than a hundredth of the correction. Every
 * step's value is a bound, since places only add limits; the last one is the tightest.
 *
 * For briefs without a preferred direction: there the mean of a mask over all rotations keeps whatever the mask keeps, so that masks
 * which depend on the radius alone tell the least area of all.
 */
export class MaskBounds {
  readonly #task: Task;
  readonly #worst: WorstCases;
  readonly #cells: RadialCells;
  readonly #program: MaskProgram;

  /** @param radiusM of the circle that masks stay within, metres */
  constructor(
    task: Task,
    models: LinearModels,
    tools: BoundTools,
    distanceM: number,
    radiusM: number,
    kind: MaskKind,
  ) {
    this.#task = task;
    this.#worst = tools.worst;
    this.#cells = new RadialCells(task, tools.reader, distanceM, radiusM);
    this.#program = new MaskProgram(models, this.#cells, kind);
    for (const condition of tools.conditions) {
      for (const position of firstPositions(task)) this.#program.add(this.#cells.row(condition, position));
    }
  }

  /** η of the circle that masks stay within. */
  get largestPhase(): number {
    return this.#cells.largestPhase;
  }

  /**
   * @param cuts programs to be solved at most: fewer give a bound that is as true, and less tight
   * @throws RimwrightError `machine` where the solver fails
   */
  at(gain: number, cuts = MOST_CUTS): MaskBound {
    const { correction } = this.#task.target;
    const { distanceM, radiusM } = this.#cells;
    let least: LeastMask | null = null;
    let worst = Number.POSITIVE_INFINITY;
    for (let cut = 0; cut < cuts; cut++) {
      least = this.#program.solve(gain, correction);
      if (least === null) break;
      const discs = this.#cells.discsOf(least.shares);
      const cases = this.#worst.find(discs, radiusM, distanceM, gain, ROUND);
      worst = Math.abs(cases[0]?.correction ?? 0);
      if (worst <= correction * (1 + MISS)) break;
      for (const { condition, positionM, correction: missed } of cases) {
        if (Math.abs(missed) > correction * (1 + MISS))
          this.#program.add(this.#cells.row(condition, positionM));
      }
    }
    return {
      gain,
      areaOverFloor: least && least.proven / gain,
      error: (least?.error ?? 0) / gain,
      mask: least && { shares: least.shares, areaOverFloor: least.area / gain, worst },
      places: this.#program.places,
    };
  }

  dispose(): void {
    this.#program.dispose();
  }
}

/** What bounds at several distances share. */
export interface BoundTools {
  worst: WorstCases;
  reader: ConditionReader;
  /** Those that a program begins with. */
  conditions: readonly Condition[];
}

export function boundTools(task: Task, fields: Fields): BoundTools {
  const conditions = kindsOf(task).flatMap((kind) =>
    kind.diametersM.map((diameterM) => ({
      kind,
      diameterM,
      wavelengthM: task.light.wavelengthM,
      depthM: 0,
    })),
  );
  return { worst: new WorstCases(task, fields), reader: new ConditionReader(task, fields), conditions };
}

/** The axis and the rim of the offset disc, on both axes where something tells directions apart. */
function firstPositions(task: Task): [x: number, y: number][] {
  const { offsetM } = task.placement;
  if (offsetM === 0) return [[0, 0]];
  const onX: [number, number][] = [
    [0, 0],
    [offsetM, 0],
  ];
  return hasDirection(task) ? [...onX, [0, offsetM]] : onX;
}

/** Whether turning an outline about the axis makes a difference: polarised light or a flight. */
export function hasDirection({ light, placement }: Task): boolean {
  return light.polarizationRad !== null || placement.crossing !== null;
}

/** Circles about the axis. */
const ROUND = { folds: Number.POSITIVE_INFINITY, mirror: true };
