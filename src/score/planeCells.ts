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
import { PlaneFlights } from './planeFlights.ts';
import type { PlaneGrid } from './planeGrid.ts';
import { cellIntegrals, neighbours, planeGrid } from './planeGrid.ts';
import type { PlaneSymmetry } from './planeSymmetry.ts';
import { imagesOf, planeSymmetry } from './planeSymmetry.ts';
import { Sampling } from './sampling.ts';
import type { Task } from './task.ts';

/** Middles of thirds of a cell's side, and Maclaurin's shares of them: as good to the third degree. */
const THIRDS = [1 / 6, 1 / 2, 5 / 6];
const THIRD_SHARES = [3 / 8, 1 / 4, 3 / 8];

/** Share of the cell that each of its nine middles of thirds stands for; the fifth is the middle of it all. */
export const FINE_SHARES: readonly number[] = THIRD_SHARES.flatMap((along) =>
  THIRD_SHARES.map((across) => along * across),
);

/** Phase between the circles of first places. */
const PLACE_SWING = 5;

/** A place, and what each cell adds to the reading of a particle there. */
export interface PlaneRow {
  condition: Condition;
  position: readonly [x: number, y: number];
  /** If all of the cell were as in its middle. */
  middles: Float32Array;
  /** In all. */
  added: Float32Array;
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
  readonly mostNodes = 30_000;
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

  /**
   * First places to be told of: the axis, and circles out to the offset with places from the direction to its normal; the more of
   * them, the farther fringes swing over the offset, for finding each by its being missed takes long.
   */
  get firstPositions(): [x: number, y: number][] {
    const { offsetM } = this.#task.placement;
    const { axisRad, mirrors } = this.#mirrors;
    const swing = 2 * this.#density.kappa * this.radiusM * offsetM;
    const circles = Math.min(3, Math.ceil(swing / PLACE_SWING));
    const steps = Math.min(4, circles + 1) * (mirrors ? 1 : 2);
    const places: [number, number][] = [[0, 0]];
    for (let circle = 1; circle <= circles; circle++) {
      const radius = (offsetM * circle) / circles;
      for (let step = 0; step <= steps - (mirrors ? 0 : 1); step++) {
        const azimuth = axisRad + ((mirrors ? Math.PI / 2 : Math.PI) * step) / steps;
        places.push([radius * Math.cos(azimuth), radius * Math.sin(azimuth)]);
      }
    }
    return places;
  }

  /**
   * What each cell with its images adds to reading/extinction: the mean over the flight, if there is one.
   *
   * @param position of the particle, the middle of its flight, metres
   */
  row(condition: Condition, position: readonly [x: number, y: number]): PlaneRow {
    const middles = new Float32Array(this.count);
    const add = this.#adder(condition, position);
    this.#eachCell((cell, annulus, piece) => {
      middles[cell] = add(annulus, piece, 0.5, 0.5);
    });
    return { condition, position, middles, added: cellIntegrals(this.#grid, middles) };
  }

  /**
   * What each of some cells would add if all of it were as in the middles of its thirds, nine numbers a cell, in the order of the cells.
   *
   * @param chosen 1 for each of those cells
   */
  fine({ condition, position }: PlaneRow, chosen: Uint8Array): Float64Array {
    const values = new Float64Array(FINE_SHARES.length * chosen.reduce((sum, one) => sum + one, 0));
    const add = this.#adder(condition, position);
    let at = 0;
    this.#eachCell((cell, annulus, piece) => {
      if (chosen[cell] === 0) return;
      for (const along of THIRDS) {
        for (const across of THIRDS) values[at++] = add(annulus, piece, along, across);
      }
    });
    return values;
  }

  /** Those cells in which, or beside which, a function of the plane falls below a limit, from its values in their middles. */
  around(middles: Float64Array, limit: number): Uint8Array {
    const chosen = new Uint8Array(this.count);
    this.#eachCell((cell, annulus, piece) => {
      const isBelow =
        middles[cell] < limit ||
        neighbours(this.#grid, annulus, piece).some((other) => middles[other] < limit);
      chosen[cell] = isBelow ? 1 : 0;
    });
    return chosen;
  }

  #eachCell(take: (cell: number, annulus: number, piece: number) => void): void {
    const { pieces, first } = this.#grid;
    for (let a = 0; a < pieces.length; a++) {
      for (let piece = 0; piece < pieces[a]; piece++) take(first[a] + piece, a, piece);
    }
  }

  /** The density at a place of a cell, mean over images and flight, times the cell's area, over the extinction. */
  #adder(condition: Condition, position: readonly [x: number, y: number]) {
    const view = { distanceM: this.distanceM, radiusM: this.radiusM, offsetM: this.#farthestM };
    const { table, extinctionM2 } = this.#reader.density(condition, view);
    const images = imagesOf(this.#mirrors, position);
    const { crossing, offsetM } = this.#task.placement;
    const spanM = crossing?.spanM ?? 0;
    const [hx, hy] = [Math.cos(crossing?.headingRad ?? 0), Math.sin(crossing?.headingRad ?? 0)];
    const flights = new PlaneFlights(spanM, this.#rules);
    const reachM = offsetM + spanM / 2;
    const { radiusM } = this;
    const { axisRad, wedgeRad, pieces } = this.#grid;
    const scale = (2 * this.#annulusM2) / (images.length * extinctionM2);
    return (annulus: number, piece: number, along: number, across: number): number => {
      const azimuth = axisRad + (wedgeRad * (piece + across)) / pieces[annulus];
      const rho = radiusM * Math.sqrt((annulus + along) / pieces.length);
      const [x, y] = [rho * Math.cos(azimuth), rho * Math.sin(azimuth)];
      const { places, weights } = flights.of(this.#flightPhase * (Math.abs(x * hx + y * hy) + reachM));
      let sum = 0;
      for (let n = 0; n < images.length; n += 2) {
        const [u, v] = [x - images[n], y - images[n + 1]];
        for (let f = 0; f < places.length; f++) {
          sum += weights[f] * densityAt(table, u - places[f] * hx, v - places[f] * hy);
        }
      }
      return (scale * sum) / pieces[annulus];
    };
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
