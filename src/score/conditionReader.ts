import type { BoundaryNodes } from '../reading/boundaryReading.ts';
import type { DensityTable } from '../reading/densityTable.ts';
import { Readers } from '../reading/readers.ts';
import type { Scenario } from '../reading/scenario.ts';
import { spreadOf } from '../reading/spreadOf.ts';
import type { Fields } from '../reading/tableShelf.ts';
import type { Condition } from './conditions.ts';
import { particleOf } from './conditions.ts';
import type { Task } from './task.ts';
import type { ScenarioSolver } from './taskScenarios.ts';
import { scenarioSolver } from './taskScenarios.ts';

/** From where and how far tables are asked for, metres. */
export interface View {
  distanceM: number;
  radiusM: number;
  offsetM: number;
}

/** Reading/extinction of nodes for a particle at (x, y). */
export type RatioReader = (nodes: BoundaryNodes, x: number, y: number) => number;

/** Most particles that are kept solved. */
const MOST_SOLVED = 600;

/** Numbers that all tables together may hold: 160 MB. */
const CAPACITY = 20_000_000;

/** Tables of a focused beam are larger than those of a flat wave: by about this much. */
const BEAM_SIZE = 30;

/** Reads under any condition of a task, not only under those that a judge samples. Holds tables as far as there is room. */
export class ConditionReader {
  readonly #task: Task;
  readonly #fields: Fields;
  readonly #solve: ScenarioSolver;
  readonly #scenarios = new Map<string, Scenario>();
  readonly #readers = new Map<string, Readers>();

  constructor(task: Task, fields: Fields) {
    this.#task = task;
    this.#fields = fields;
    this.#solve = scenarioSolver(task);
  }

  at(condition: Condition, view: View): RatioReader {
    const { scenario, readers } = this.#held(condition, view);
    const { distanceM, radiusM, offsetM } = view;
    const read = readers.at(distanceM, condition.depthM, radiusM, offsetM)[0];
    return (nodes, x, y) => read(nodes, x, y) / scenario.extinctionM2;
  }

  /**
   * What a unit of detector area adds to a reading, and the extinction that it is over, m².
   *
   * @throws RimwrightError `input` in a focused beam, whose density has no such table
   */
  density(condition: Condition, view: View): { table: DensityTable; extinctionM2: number } {
    const { scenario, readers } = this.#held(condition, view);
    const { distanceM, radiusM, offsetM } = view;
    const tables = readers.densityTables(distanceM, condition.depthM, radiusM, offsetM);
    return { table: tables[0], extinctionM2: scenario.extinctionM2 };
  }

  #held(condition: Condition, view: View): { scenario: Scenario; readers: Readers } {
    const { kind, diameterM, wavelengthM } = condition;
    const key = `${kind.id} ${diameterM} ${wavelengthM}`;
    const seen = `${key} ${view.distanceM}`;
    const scenario = held(this.#scenarios, key, MOST_SOLVED, () => {
      // A climb asks for hundreds of tables.
      return { ...this.#solve([particleOf(condition)], [wavelengthM])[0], tiltsAsPlaces: true };
    });
    const most = Math.max(1, Math.floor(CAPACITY / this.tableSize(view)));
    const readers = held(this.#readers, seen, most, () => this.#readersOf(scenario));
    return { scenario, readers };
  }

  /** Numbers that the table of one condition holds, about. */
  tableSize({ distanceM, radiusM, offsetM }: View): number {
    const { light, placement } = this.#task;
    const kappa = Math.PI / (light.wavelengthM * (distanceM - placement.depthM));
    // Eight cells a radian, four numbers a cell, and a reach of up to 1.3 times what is asked for (see TableShelf).
    const size = 32 * (1 + kappa * (1.3 * (radiusM + offsetM)) ** 2);
    const depths = placement.depthM === 0 ? 1 : 3;
    return size * depths * (light.polarizationRad === null ? 1 : 2) * (light.beam ? BEAM_SIZE : 1);
  }

  /** Colours that the light of one condition stands for, about. */
  get colours(): number {
    const [scenario] = this.#scenarios.values();
    return scenario?.colours.length ?? 1;
  }

  #readersOf(scenario: Scenario): Readers {
    const { placement, light } = this.#task;
    const spreadsM = [spreadOf(placement, scenario.particle.diameterM)];
    return new Readers([scenario], { spreadsM, beam: light.beam, fields: this.#fields });
  }
}

/** What a map holds by that key, made where it is not there; of more than `most` the oldest go. */
function held<T>(map: Map<string, T>, key: string, most: number, make: () => T): T {
  let value = map.get(key);
  if (value === undefined) {
    value = make();
    map.set(key, value);
    for (const oldest of map.keys()) {
      if (map.size <= most) break;
      map.delete(oldest);
    }
  }
  return value;
}
