import type { BoundaryNodes } from '../reading/boundaryReading.ts';
import type { Reader } from '../reading/readers.ts';
import { Readers } from '../reading/readers.ts';
import type { Scenario } from '../reading/scenario.ts';
import { spreadOf } from '../reading/spreadOf.ts';
import type { Fields } from '../reading/tableShelf.ts';
import type { Condition, Kind } from './conditions.ts';
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

/** A solved particle, and its tables at the distance that was asked for last. */
interface Solved {
  scenario: Scenario;
  distanceM: number;
  readers: Readers;
}

/** Most particles that are kept solved. */
const CAPACITY = 600;

/** Reads under any condition of a task, not only under those that a judge samples. */
export class ConditionReader {
  readonly #task: Task;
  readonly #fields: Fields;
  readonly #solve: ScenarioSolver;
  readonly #held = new Map<Kind, Map<string, Solved>>();
  #size = 0;

  constructor(task: Task, fields: Fields) {
    this.#task = task;
    this.#fields = fields;
    this.#solve = scenarioSolver(task);
  }

  at(condition: Condition, { distanceM, radiusM, offsetM }: View): RatioReader {
    const { scenario, readers } = this.#solved(condition, distanceM);
    const read: Reader = readers.at(distanceM, condition.depthM, radiusM, offsetM)[0];
    return (nodes, x, y) => read(nodes, x, y) / scenario.extinctionM2;
  }

  #solved(condition: Condition, distanceM: number): Solved {
    const { kind, diameterM, wavelengthM } = condition;
    const key = `${diameterM} ${wavelengthM}`;
    const ofKind = this.#held.get(kind) ?? new Map<string, Solved>();
    this.#held.set(kind, ofKind);
    const held = ofKind.get(key);
    if (held?.distanceM === distanceM) return held;
    const scenario = held?.scenario ?? this.#solve([particleOf(condition)], [wavelengthM])[0];
    const solved = { scenario, distanceM, readers: this.#readers(scenario) };
    if (!held && ++this.#size > CAPACITY) {
      this.#held.clear();
      this.#size = 1;
      this.#held.set(kind, new Map([[key, solved]]));
    } else ofKind.set(key, solved);
    return solved;
  }

  #readers(scenario: Scenario): Readers {
    const { placement, light } = this.#task;
    const spreadsM = [spreadOf(placement, scenario.particle.diameterM)];
    return new Readers([scenario], { spreadsM, beam: light.beam, fields: this.#fields });
  }
}
