import { LegendreRules } from '../numeric/gaussLegendre.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import type { NodeDensity } from '../outline/boundaryNodes.ts';
import { densityAt } from '../reading/densityTable.ts';
import { farthestRead } from '../reading/placement.ts';
import type { Symmetry } from '../reading/positions.ts';
import type { ConditionReader } from './conditionReader.ts';
import type { Condition } from './conditions.ts';
import { SEARCH_FINENESS } from './fineness.ts';
import type { ElementNodes } from './judge.ts';
import { planeNodes } from './planeEdges.ts';
import type { PlaneGrid } from './planeGrid.ts';
import { planeGrid } from './planeGrid.ts';
import type { PlaneSymmetry } from './planeSymmetry.ts';
import { imagesOf, planeSymmetry } from './planeSymmetry.ts';
import { Sampling } from './sampling.ts';
import type { Task } from './task.ts';

/** Where in a cell densities are taken along the radius and the azimuth, as parts of its side, and how much each counts. */
interface CellRule {
  places: readonly number[];
  shares: readonly number[];
}

/** Gauss's rule of two points: a cell's integral errs by h⁴/4320 of its phase h. */
const GAUSS: CellRule = { places: [0.5 - Math.sqrt(1 / 12), 0.5 + Math.sqrt(1 / 12)], shares: [0.5, 0.5] };

/** Maclaurin's rule, the middles of thirds: as good to the third degree, and the middle of the cell is among them. */
const THIRDS: CellRule = { places: [1 / 6, 1 / 2, 5 / 6], shares: [3 / 8, 1 / 4, 3 / 8] };

/** Share of the cell that each of its nine middles of thirds stands for; the fifth is the middle of it all. */
export const FINE_SHARES: readonly number[] = THIRDS.shares.flatMap((along) =>
  THIRDS.shares.map((across) => along * across),
);

/** Points of a flight for each radian of phase along it, and beside them: a mean errs by less than 1e-6. */
const PER_RADIAN = 0.55;
const POINTS = 6;

/** Numbers of points come in steps of this many. */
const POINT_STEP = 4;

/** A place, and what each cell adds to the reading of a particle there. */
export interface PlaneRow {
  condition: Condition;
  position: readonly [x: number, y: number];
  added: Float64Array;
}

/**
 * The plane about the axis in cells, for tasks with a preferred direction, and what each of them adds to a ratio reading/extinction.
 *
 * The mean of a mask over the mirrors and the half turn that leave the task as it is keeps whatever the mask keeps. So only a quarter
 * of the plane, or a half of it, is unknown: each cell stands for all its images.
 */
export class PlaneCells {
  readonly count: number;
  /** Area of each cell with its images over λz. */
  readonly areas: Float64Array;
  readonly distanceM: number;
  readonly radiusM: number;
  /** η of that radius. */
  readonly largestPhase: number;
  /** Of all its masks. */
  readonly symmetry: Symmetry;
  readonly #mirrors: PlaneSymmetry;
  readonly #grid: PlaneGrid;
  readonly #task: Task;
  readonly #reader: ConditionReader;
  readonly #farthestM: number;
  readonly #density: NodeDensity;
  readonly #rules = new LegendreRules();
  readonly #annulusM2: number;
  readonly #flightPhase: number;

  /**
   * @param radiusM of the outermost cell's outer end, metres
   * @param finer how many times smaller cells are in both directions: for checks
   */
  constructor(task: Task, reader: ConditionReader, distanceM: number, radiusM: number, finer = 1) {
    const wavelengthM = task.light.wavelengthM / refractiveIndex(task.medium, task.light.wavelengthM)[0];
    const sampling = new Sampling(task, SEARCH_FINENESS, (2 * Math.PI) / wavelengthM, this.#rules);
    this.#density = sampling.density(distanceM);
    const { kappa } = this.#density;
    const { offsetM, crossing } = task.placement;
    this.largestPhase = sampling.fringes(distanceM, 0).kappa * radiusM * radiusM;
    this.#mirrors = planeSymmetry(task);
    this.symmetry = symmetryOf(this.#mirrors);
    this.#grid = planeGrid(radiusM, this.#mirrors, {
      largest: kappa * radiusM * radiusM,
      swing: 2 * kappa * radiusM * (offsetM + (crossing?.spanM ?? 0) / 2),
      finer,
    });
    const { pieces, first } = this.#grid;
    this.count = first[pieces.length];
    this.areas = new Float64Array(this.count);
    this.#annulusM2 = (Math.PI * radiusM * radiusM) / pieces.length;
    const annulus = this.#annulusM2 / (wavelengthM * distanceM);
    pieces.forEach((many, a) => {
      this.areas.fill(annulus / many, first[a], first[a + 1]);
    });
    this.distanceM = distanceM;
    this.radiusM = radiusM;
    this.#task = task;
    this.#reader = reader;
    this.#farthestM = farthestRead(task.placement);
    this.#flightPhase = 2 * kappa * (crossing?.spanM ?? 0);
  }

  /** First places to be told of: the axis, and the offset along and across the direction. */
  get firstPositions(): [x: number, y: number][] {
    const { offsetM } = this.#task.placement;
    const [x, y] = [offsetM * Math.cos(this.#mirrors.axisRad), offsetM * Math.sin(this.#mirrors.axisRad)];
    if (offsetM === 0) return [[0, 0]];
    return [
      [0, 0],
      [x, y],
      [-y, x],
    ];
  }

  /**
   * What each cell with its images adds to reading/extinction: the mean over the flight, if there is one.
   *
   * @param position of the particle, the middle of its flight, metres
   */
  row(condition: Condition, position: readonly [x: number, y: number]): PlaneRow {
    const added = new Float64Array(this.count);
    const fourth = GAUSS.shares[0] ** 2;
    this.#sample(condition, position, GAUSS, (cell, _, value) => {
      added[cell] += fourth * value;
    });
    return { condition, position, added };
  }

  /** What each cell would add if all of it were as in the middles of its thirds, nine numbers a cell. */
  fine({ condition, position }: PlaneRow): Float64Array {
    const values = new Float64Array(FINE_SHARES.length * this.count);
    this.#sample(condition, position, THIRDS, (cell, place, value) => {
      values[FINE_SHARES.length * cell + place] = value;
    });
    return values;
  }

  /** Takes at every place of every cell the density, mean over images and flight, times the cell's area, over the extinction. */
  #sample(
    condition: Condition,
    position: readonly [x: number, y: number],
    { places }: CellRule,
    take: (cell: number, place: number, value: number) => void,
  ): void {
    const view = { distanceM: this.distanceM, radiusM: this.radiusM, offsetM: this.#farthestM };
    const { table, extinctionM2 } = this.#reader.density(condition, view);
    const images = imagesOf(this.#mirrors, position);
    const { crossing, offsetM } = this.#task.placement;
    const spanM = crossing?.spanM ?? 0;
    const [hx, hy] = [Math.cos(crossing?.headingRad ?? 0), Math.sin(crossing?.headingRad ?? 0)];
    const flights = new Flights(spanM, this.#rules);
    const reachM = offsetM + spanM / 2;
    const { axisRad, wedgeRad, pieces, first } = this.#grid;
    for (let a = 0; a < pieces.length; a++) {
      const scale = (2 * this.#annulusM2) / (pieces[a] * images.length * extinctionM2);
      for (let piece = 0; piece < pieces[a]; piece++) {
        for (let j = 0; j < places.length; j++) {
          const azimuth = axisRad + (wedgeRad * (piece + places[j])) / pieces[a];
          const [cos, sin] = [Math.cos(azimuth), Math.sin(azimuth)];
          for (let i = 0; i < places.length; i++) {
            const rho = this.radiusM * Math.sqrt((a + places[i]) / pieces.length);
            const [x, y] = [rho * cos, rho * sin];
            const flight = flights.of(this.#flightPhase * (Math.abs(x * hx + y * hy) + reachM));
            let sum = 0;
            for (let n = 0; n < images.length; n += 2) {
              const [u, v] = [x - images[n], y - images[n + 1]];
              for (let f = 0; f < flight.places.length; f++) {
                const along = flight.places[f];
                sum += flight.weights[f] * densityAt(table, u - along * hx, v - along * hy);
              }
            }
            take(first[a] + piece, places.length * i + j, scale * sum);
          }
        }
      }
    }
  }

  /** A mask as weighted edges, ready to be read. */
  elementsOf(shares: Float64Array): ElementNodes[] {
    return [
      {
        weight: 1,
        nodes: planeNodes(this.#grid, shares, this.#density, this.#rules),
        areaM2: this.#annulusM2 * this.#grid.pieces.length,
      },
    ];
  }
}

/** As outlines tell it: their mirror is the x axis, which an axis at right angles is as good as. */
function symmetryOf({ axisRad, mirrors }: PlaneSymmetry): Symmetry {
  return { folds: 2, mirror: mirrors && Math.abs(Math.sin(2 * axisRad)) < 1e-9 };
}

/** Points of flights by the phase that runs along them. */
class Flights {
  readonly #spanM: number;
  readonly #rules: LegendreRules;
  readonly #held: { places: Float64Array; weights: Float64Array }[] = [];

  constructor(spanM: number, rules: LegendreRules) {
    this.#spanM = spanM;
    this.#rules = rules;
  }

  /** Places from the middle of the flight along its heading, metres, and their shares. */
  of(phase: number): { places: Float64Array; weights: Float64Array } {
    const step = Math.ceil((PER_RADIAN * phase) / POINT_STEP);
    this.#held[step] ??= this.#made(step);
    return this.#held[step];
  }

  #made(step: number): { places: Float64Array; weights: Float64Array } {
    if (this.#spanM === 0) return { places: new Float64Array(1), weights: Float64Array.of(1) };
    const { nodes, weights } = this.#rules.rule(POINTS + POINT_STEP * step);
    return {
      places: nodes.map((node) => (node * this.#spanM) / 2),
      weights: weights.map((weight) => weight / 2),
    };
  }
}
