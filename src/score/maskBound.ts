import type { LinearModels } from '../numeric/linearModel.ts';
import type { Symmetry } from '../reading/positions.ts';
import type { Fields } from '../reading/tableShelf.ts';
import { ConditionReader } from './conditionReader.ts';
import type { Condition } from './conditions.ts';
import { kindsOf } from './conditions.ts';
import type { ElementNodes } from './judge.ts';
import type { LeastMask, MaskKind } from './maskProgram.ts';
import { MaskProgram } from './maskProgram.ts';
import { PlaneCells } from './planeCells.ts';
import { PlaneProgram } from './planeProgram.ts';
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
  /** The mask that the program ended with, its own areaOverFloor, and its worst correction as far as that was looked for; null where there is none. */
  mask: { shares: Float64Array; areaOverFloor: number; worst: number | null } | null;
  /** Places that the program was told of. */
  places: number;
}

/** Share of the correction by which a mask may miss it anywhere before its worst places are added. */
const MISS = 0.01;

/** Programs solved for one gain, at most: more would tighten the bound no further than it can be told. */
const MOST_CUTS = 40;

/**
 * The least area over gain for one distance: cutting planes. A program for few places is solved, the worst places of its mask
 * are found by climbing (`WorstCases`) and added, until no place is missed by more than a hundredth of the correction. Every
 * step's value is a bound, since places only add limits; the last one is the tightest.
 *
 * In a brief without a preferred direction the mean of a mask over all rotations keeps whatever the mask keeps, so that masks which
 * depend on the radius alone tell the least area of all. In any other the cells are those of the plane (see `PlaneCells`).
 */
export class MaskBounds {
  readonly #task: Task;
  readonly #worst: WorstCases;
  readonly #told: Told;

  constructor(task: Task, models: LinearModels, tools: BoundTools, choice: BoundChoice) {
    const { distanceM, radiusM, kind, cells } = choice;
    this.#task = task;
    this.#worst = tools.worst;
    if (cells === 'plane') {
      const plane = new PlaneCells(task, tools.reader, distanceM, radiusM);
      this.#told = telling(plane, new PlaneProgram(models, plane));
    } else {
      const annuli = new RadialCells(task, tools.reader, distanceM, radiusM);
      this.#told = telling(annuli, new MaskProgram(models, annuli, kind));
    }
    for (const condition of tools.conditions) {
      for (const position of this.#told.cells.firstPositions) this.#told.tell(condition, position);
    }
  }

  /** η of the circle that masks stay within. */
  get largestPhase(): number {
    return this.#told.cells.largestPhase;
  }

  /**
   * @param correction what masks may read wrong; the brief's target if left out
   * @param cuts how often the worst places of a mask are looked for and added, at most: fewer give a bound that is as true, and less tight
   * @throws RimwrightError `machine` where the solver fails
   */
  at(gain: number, correction = this.#task.target.correction, cuts = MOST_CUTS): MaskBound {
    const { cells, program, tell } = this.#told;
    const { distanceM, radiusM, symmetry } = cells;
    let least: LeastMask | null = null;
    let worst: number | null = null;
    let nodes = 0;
    for (let cut = 0; ; cut++) {
      least = program.solve(gain, correction);
      if (least === null || cut === cuts) break;
      const elements = cells.elementsOf(least.shares);
      const cases = this.#worst.find(elements, radiusM, distanceM, gain, symmetry);
      worst = Math.abs(cases[0]?.correction ?? 0);
      nodes += elements.reduce((sum, element) => sum + element.nodes.length / 4, 0);
      if (worst <= correction * (1 + MISS) || nodes > cells.mostNodes) break;
      const before = program.places;
      for (const { condition, positionM, correction: missed } of cases) {
        if (Math.abs(missed) > correction * (1 + MISS)) tell(condition, positionM);
      }
      // What is missed at places that the program knows of is the error of its cells.
      if (program.places === before) break;
    }
    const proof = least?.prove();
    return {
      gain,
      areaOverFloor: proof ? proof.proven / gain : null,
      error: (proof?.error ?? 0) / gain,
      mask: least && { shares: least.shares, areaOverFloor: least.area / gain, worst },
      places: program.places,
    };
  }

  dispose(): void {
    this.#told.program.dispose();
  }
}

/** One distance, and which masks are meant. */
export interface BoundChoice {
  distanceM: number;
  /** Of the circle that masks stay within, metres. */
  radiusM: number;
  /** On the plane, any. */
  kind: MaskKind;
  /** `radial` is for tasks without a preferred direction; in others it gives masks to begin a search with, and no bound for all. */
  cells: 'radial' | 'plane';
}

/** Cells of either kind. */
interface Cells<Row> {
  distanceM: number;
  radiusM: number;
  largestPhase: number;
  /** Of its masks. */
  symmetry: Symmetry;
  /** Boundary nodes of all masks of one gain whose worst places are looked for, at most: beyond them the bound is left as true, and less tight. */
  mostNodes: number;
  /** Where a program is told of each particle first. */
  firstPositions: [x: number, y: number][];
  row: (condition: Condition, position: readonly [x: number, y: number]) => Row;
  /** A mask, ready to be read. */
  elementsOf: (shares: Float64Array) => ElementNodes[];
}

/** A program of either kind. */
interface Program<Row> {
  readonly places: number;
  add: (row: Row) => void;
  solve: (gain: number, correction: number) => LeastMask | null;
  dispose: () => void;
}

/** A program with its cells, whatever a row of them is. */
interface Told {
  cells: Omit<Cells<unknown>, 'row'>;
  program: Omit<Program<unknown>, 'add'>;
  /** Adds a place, unless the program knows it. */
  tell: (condition: Condition, position: readonly [x: number, y: number]) => void;
}

function telling<Row>(cells: Cells<Row>, program: Program<Row>): Told {
  const known = new Set<string>();
  return {
    cells,
    program,
    tell: (condition, position) => {
      const { kind, diameterM, wavelengthM, depthM } = condition;
      const key = [kind.id, diameterM, wavelengthM, depthM, ...position].join(' ');
      if (!known.has(key)) program.add(cells.row(condition, position));
      known.add(key);
    },
  };
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

/** Whether turning an outline about the axis makes a difference: polarised light or a flight. */
export function hasDirection({ light, placement }: Task): boolean {
  return light.polarizationRad !== null || placement.crossing !== null;
}
