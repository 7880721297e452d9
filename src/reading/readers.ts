import { RimwrightError } from '../base/errors.ts';
import type { GaussianBeam } from '../optics/gaussianBeam.ts';
import { axialIrradiance } from '../optics/gaussianBeam.ts';
import { addBeamDensity } from './beamDensity.ts';
import { beamFringes } from './beamPath.ts';
import { beamReading } from './beamReading.ts';
import type { LineTable } from './beamShelf.ts';
import { BeamShelf } from './beamShelf.ts';
import type { BoundaryNodes } from './boundaryReading.ts';
import { boundaryReading } from './boundaryReading.ts';
import type { DensityTable } from './densityTable.ts';
import { densityTable } from './densityTable.ts';
import { farthest } from './flightMeans.ts';
import type { EdgeDensity } from './roughEdge.ts';
import type { Scenario } from './scenario.ts';
import { sourceDirections } from './sourceDirections.ts';
import { tableDensity } from './tableDensity.ts';
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
  /** Tables for a flat wave. */
  readonly flat: TableShelf;
  readonly #focused: BeamShelf | null;
  readonly #sourceAngleRad: number;

  constructor(scenarios: readonly Scenario[], { spreadsM, beam, fields }: ReaderOptions) {
    this.#beam = beam;
    this.#sourceAngleRad = scenarios[0]?.sourceAngleRad ?? 0;
    this.flat = new TableShelf(scenarios, spreadsM, fields);
    this.#focused = beam === undefined ? null : new BeamShelf(scenarios, spreadsM, beam, fields);
  }

  /** One a scenario, for outlines of that radius and particles up to `offsetM` off the axis, `placeM` towards the detector. */
  at(distanceM: number, placeM: number, radiusM: number, offsetM: number): Reader[] {
    const beam = this.#beam;
    if (beam === undefined || this.#focused === null) {
      return this.flat
        .tables(distanceM - placeM, radiusM + offsetM)
        .map((table) => (nodes, x, y) => boundaryReading(table, nodes, x, y));
    }
    return this.#focused.tables(distanceM, placeM, radiusM, offsetM).map((tables) => {
      const lit = litTables(tables, beam, placeM);
      const { tangents, weights } = this.#directions(tables, distanceM, radiusM, offsetM);
      return (nodes, x, y) => {
        let sum = 0;
        for (let i = 0; i < weights.length; i++) {
          const [tx, ty] = [tangents[2 * i], tangents[2 * i + 1]];
          for (const { share, table } of lit) {
            const [px, py] = [x - placeM * tx, y - placeM * ty];
            sum += weights[i] * share * beamReading(table, nodes, px, py, distanceM * tx, distanceM * ty);
          }
        }
        return sum;
      };
    });
  }

  /**
   * What a unit of detector area adds to the reading of a scenario, with its two derivatives: the mean over places of the particle
   * at the nominal depth.
   *
   * @param radiusM how far from the axis it will be asked for
   * @param points places, flat [x0, y0, …], metres
   */
  density(scenario: number, distanceM: number, radiusM: number, points: Float64Array): EdgeDensity {
    const offsetM = farthest(points);
    const beam = this.#beam;
    if (beam === undefined || this.#focused === null) {
      return tableDensity(this.flat.tables(distanceM, radiusM + offsetM)[scenario], points, 1);
    }
    const tables = this.#focused.tables(distanceM, 0, radiusM, offsetM)[scenario];
    const { tangents, weights } = this.#directions(tables, distanceM, radiusM, offsetM);
    return (x, y, out) => {
      out.fill(0, 0, 3);
      for (let i = 0; i < weights.length; i++) {
        const at = [x - distanceM * tangents[2 * i], y - distanceM * tangents[2 * i + 1]] as const;
        for (let p = 0; p < points.length; p += 2) {
          for (const { share, table } of tables) {
            const weight = (2 * share * weights[i]) / points.length;
            addBeamDensity(table, weight, at, [points[p], points[p + 1]], out);
          }
        }
      }
    };
  }

  /**
   * The density of every scenario in a flat wave over the place, for a particle on the axis `placeM` towards the detector: see `DensityTable`.
   *
   * @throws RimwrightError `input` in a focused beam, where it does not depend on the distance from the particle's axis alone
   */
  densityTables(distanceM: number, placeM: number, radiusM: number, offsetM: number): DensityTable[] {
    if (this.#beam !== undefined) throw new RimwrightError('input', 'a focused beam has no radial density');
    return this.flat.tables(distanceM - placeM, radiusM + offsetM).map(densityTable);
  }

  #directions(tables: readonly LineTable[], distanceM: number, radiusM: number, offsetM: number) {
    // Beams of another direction move fringes and light over the plane, as a shift of the outline would.
    const swings = tables.map(({ table }) => {
      const { kappa, magnification } = beamFringes(table.path);
      return 2 * kappa * (radiusM + magnification * offsetM) * distanceM * Math.tan(this.#sourceAngleRad);
    });
    return sourceDirections(this.#sourceAngleRad, Math.max(...swings));
  }
}

function litTables(tables: readonly LineTable[], beam: GaussianBeam, placeM: number): LineTable[] {
  return tables.map(({ share, table }) => ({
    share: share * axialIrradiance(beam, table.path.wavenumber, placeM),
    table,
  }));
}
