import { nearAmplitudes } from './nearAmplitudes.ts';
import type { RadialTable } from './radialTable.ts';
import { buildRadialTable } from './radialTable.ts';
import type { Scenario } from './scenario.ts';

/** Which fields of the sphere a reading is computed from: those of its far zone, or the exact ones at the detector's distance. */
export type Fields = 'far' | 'exact';

/** The tables of every scenario at one distance and reach, in memory that threads share. */
export interface SharedTables {
  key: string;
  tables: RadialTable[];
}

/** Ratio of neighbouring reaches of tables. */
const REACH_STEP = 1.3;

/** Numbers that all tables together may hold: 256 MB. */
const CAPACITY = 32_000_000;

/**
 * Keeps the radial tables of every scenario by distance, and builds them when first asked for.
 * Their reach comes in steps of 1.3; the least recently used distances go first when the shelf is full.
 */
export class TableShelf {
  readonly #scenarios: readonly Scenario[];
  readonly #spreadsM: readonly number[];
  readonly #fields: Fields;
  /** By distance and reach. */
  readonly #held = new Map<string, { tables: RadialTable[]; size: number }>();
  #size = 0;
  /** Built here, and not told to other threads so far; null where nobody asks. */
  #fresh: SharedTables[] | null = null;

  /** @param spreadsM rms random motion per axis in each scenario, metres */
  constructor(scenarios: readonly Scenario[], spreadsM: readonly number[], fields: Fields = 'far') {
    this.#scenarios = scenarios;
    this.#spreadsM = spreadsM;
    this.#fields = fields;
  }

  /** One table a scenario, in their order, good to at least `radiusM` from the particle's axis. */
  tables(distanceM: number, radiusM: number): readonly RadialTable[] {
    // Reaches come in steps, so that a table does not depend on what was asked for before, nor is built for every outline.
    const step = Math.ceil(Math.log(radiusM) / Math.log(REACH_STEP));
    const key = `${distanceM} ${step}`;
    const held = this.#held.get(key);
    if (held) {
      this.#held.delete(key);
      this.#held.set(key, held);
      return held.tables;
    }
    const reach = REACH_STEP ** step;
    const tables = this.#scenarios.map((scenario, s) =>
      buildRadialTable(this.#seenFrom(scenario, distanceM), distanceM, reach, this.#spreadsM[s]),
    );
    if (this.#fresh === null) return this.#keep(key, tables);
    const shared = tables.map(inSharedMemory);
    this.#fresh.push({ key, tables: shared });
    return this.#keep(key, shared);
  }

  /** From now on tables are built in shared memory, and those built since the last call come back, for other threads' shelves of the same scenarios. */
  fresh(): SharedTables[] {
    const built = this.#fresh ?? [];
    this.#fresh = [];
    return built;
  }

  /** Takes in what another thread has built. */
  take({ key, tables }: SharedTables): void {
    if (!this.#held.has(key)) this.#keep(key, tables);
  }

  #keep(key: string, tables: RadialTable[]): RadialTable[] {
    const size = tables.reduce((sum, { mean, twofold }) => sum + mean.length + (twofold?.length ?? 0), 0);
    this.#held.set(key, { tables, size });
    this.#size += size;
    for (const [oldest, { size: its }] of this.#held) {
      if (this.#size <= CAPACITY || oldest === key) break;
      this.#drop(oldest, its);
    }
    return tables;
  }

  #seenFrom(scenario: Scenario, distanceM: number): Scenario {
    if (this.#fields === 'far') return scenario;
    const colours = scenario.colours.map((colour) => ({
      ...colour,
      sphere: nearAmplitudes(colour.sphere, distanceM),
    }));
    return { ...scenario, colours };
  }

  #drop(key: string, size: number): void {
    this.#held.delete(key);
    this.#size -= size;
  }
}

function inSharedMemory(table: RadialTable): RadialTable {
  return { ...table, mean: shared(table.mean), twofold: table.twofold && shared(table.twofold) };
}

function shared(values: Float64Array): Float64Array {
  const copy = new Float64Array(new SharedArrayBuffer(values.byteLength));
  copy.set(values);
  return copy;
}
