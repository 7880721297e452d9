import type { GaussianBeam } from '../optics/gaussianBeam.ts';
import type { BeamLine } from './beamLines.ts';
import { beamLines } from './beamLines.ts';
import type { BeamTable } from './beamTable.ts';
import { buildBeamTable } from './beamTable.ts';
import type { Scenario } from './scenario.ts';
import type { Fields } from './tableShelf.ts';

/** Numbers that all tables together may hold: 256 MB. */
const CAPACITY = 32_000_000;

/** The table of one line, with its share of the light (see `BeamLine`). */
export interface LineTable {
  share: number;
  table: BeamTable;
}

interface Held {
  radiusM: number;
  offsetM: number;
  tables: LineTable[][];
  size: number;
}

/** What `TableShelf` is to a flat wave: keeps the tables of every scenario in a focused beam, by distance and by place along the beam. */
export class BeamShelf {
  readonly #lines: readonly BeamLine[][];
  readonly #spreadsM: readonly number[];
  readonly #beam: GaussianBeam;
  readonly #fields: Fields;
  readonly #held = new Map<string, Held>();
  #size = 0;

  /** @param spreadsM rms random motion per axis in each scenario, metres */
  constructor(
    scenarios: readonly Scenario[],
    spreadsM: readonly number[],
    beam: GaussianBeam,
    fields: Fields = 'far',
  ) {
    this.#lines = scenarios.map(beamLines);
    this.#fields = fields;
    this.#spreadsM = spreadsM;
    this.#beam = beam;
  }

  /**
   * The tables of each scenario's lines, in their order. A source's tilted beams reach as far beyond as they lie off the axis.
   *
   * @param distanceM from the particle's nominal place to the detector plane
   * @param placeM z of the particle from its nominal place
   * @param radiusM, offsetM farthest points of the outline, and places of the particle, from the axis
   */
  tables(distanceM: number, placeM: number, radiusM: number, offsetM: number): readonly LineTable[][] {
    const key = `${distanceM} ${placeM}`;
    const held = this.#held.get(key);
    if (held && held.radiusM >= radiusM && held.offsetM >= offsetM) {
      this.#held.delete(key);
      this.#held.set(key, held);
      return held.tables;
    }
    if (held) this.#drop(key, held.size);
    // Some room to grow spares a rebuild for every slightly larger outline; offsets are the brief's, and do not grow.
    const reach = {
      radiusM: Math.max(radiusM * 1.3, held?.radiusM ?? 0),
      offsetM: Math.max(offsetM, held?.offsetM ?? 0),
    };
    const tables = this.#lines.map((lines, s) =>
      lines.map(({ share, scenario }) => {
        const tangent = Math.tan(scenario.sourceAngleRad ?? 0);
        const table = buildBeamTable(scenario, this.#beam, {
          placeM,
          distanceM: distanceM - placeM,
          spreadM: this.#spreadsM[s],
          radiusM: reach.radiusM + distanceM * tangent,
          offsetM: reach.offsetM + Math.abs(placeM) * tangent,
          fields: this.#fields,
        });
        return { share, table };
      }),
    );
    const size = tables.flat().reduce((sum, { table }) => sum + table.pieces.length, 0);
    this.#held.set(key, { ...reach, tables, size });
    this.#size += size;
    for (const [oldest, { size: its }] of this.#held) {
      if (this.#size <= CAPACITY || oldest === key) break;
      this.#drop(oldest, its);
    }
    return tables;
  }

  #drop(key: string, size: number): void {
    this.#held.delete(key);
    this.#size -= size;
  }
}
