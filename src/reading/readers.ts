import type { GaussianBeam } from '../optics/gaussianBeam.ts';
import { axialIrradiance } from '../optics/gaussianBeam.ts';
import { beamReading } from './beamReading.ts';
import { BeamShelf } from './beamShelf.ts';
import type { BoundaryNodes } from './boundaryReading.ts';
import { boundaryReading } from './boundaryReading.ts';
import type { RadialTable } from './radialTable.ts';
import type { Scenario } from './scenario.ts';
import type { Fields } from './tableShelf.ts';
import { TableShelf } from './tableShelf.ts';

/** The reading of nodes for a particle at (x, y), m²: over the irradiance on the axis at the particle's nominal place. */
export type Reader = (nodes: BoundaryNodes, x: number, y: number) => number;

/** What the light asks of a reading. */
export interface ReaderOptions {
  /** Rms random motion per axis in each scenario, metres. */
  spreadsM: readonly number[];
  /** Focused beam; undefined for a flat wave. */
  beam: GaussianBeam | undefined;
  fields: Fields;
}

/** Readers of every scenario, in a flat wave or a focused beam: the one place that tells the two apart. */
export class Readers {
  readonly #beam: GaussianBeam | undefined;
  readonly #flat: TableShelf;
  readonly #focused: BeamShelf | null;

  constructor(scenarios: readonly Scenario[], { spreadsM, beam, fields }: ReaderOptions) {
    this.#beam = beam;
    this.#flat = new TableShelf(scenarios, spreadsM, fields);
    this.#focused = beam === undefined ? null : new BeamShelf(scenarios, spreadsM, beam);
  }

  /** One a scenario, for outlines of that radius and particles up to `offsetM` off the axis, `placeM` towards the detector. */
  at(distanceM: number, placeM: number, radiusM: number, offsetM: number): Reader[] {
    const beam = this.#beam;
    if (beam === undefined || this.#focused === null) {
      return this.tables(distanceM - placeM, radiusM + offsetM).map(
        (table) => (nodes, x, y) => boundaryReading(table, nodes, x, y),
      );
    }
    return this.#focused.tables(distanceM, placeM, radiusM, offsetM).map((table) => {
      const axial = axialIrradiance(beam, table.path.wavenumber, placeM);
      return (nodes, x, y) => axial * beamReading(table, nodes, x, y);
    });
  }

  /** The radial tables of a flat wave, one a scenario. */
  tables(distanceM: number, radiusM: number): readonly RadialTable[] {
    return this.#flat.tables(distanceM, radiusM);
  }
}
