import { LegendreRules } from '../numeric/gaussLegendre.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import { boundaryNodes } from '../outline/boundaryNodes.ts';
import { ringLoop } from '../outline/ring.ts';
import { plainFlights } from '../reading/flightMeans.ts';
import { farthestRead } from '../reading/placement.ts';
import type { FlightRule } from '../reading/positions.ts';
import type { ConditionReader } from './conditionReader.ts';
import type { Condition } from './conditions.ts';
import { REPORT_FINENESS } from './fineness.ts';
import type { ElementNodes } from './judge.ts';
import type { MaskCells } from './maskProgram.ts';
import { Sampling } from './sampling.ts';
import type { Task } from './task.ts';

/** Fine cells in each cell of a mask. */
const SPLIT = 4;

/** Phase of one cell, and the least and most cells of a mask. */
const CELL_PHASE = 0.08;
const LEAST_CELLS = 240;
const MOST_CELLS = 4000;

/** Differences of open shares below this are the solver's rounding. */
const LEAST_SHARE = 1e-7;

/** The plane around the axis in annuli of equal area, and what each of them adds to a ratio reading/extinction. */
export class RadialCells implements MaskCells {
  readonly count: number;
  readonly split = SPLIT;
  readonly fineArea: number;
  /** Outer radius of every fine cell, metres. */
  readonly radiiM: Float64Array;
  readonly distanceM: number;
  readonly radiusM: number;
  /** η of that radius. */
  readonly largestPhase: number;
  readonly symmetry = { folds: Number.POSITIVE_INFINITY, mirror: true };
  readonly mostNodes = Number.POSITIVE_INFINITY;
  readonly #task: Task;
  readonly #discs: Float64Array[];
  readonly #reader: ConditionReader;
  readonly #flight: FlightRule;
  readonly #farthestM: number;

  /** @param radiusM of the outermost cell's outer end, metres */
  constructor(task: Task, reader: ConditionReader, distanceM: number, radiusM: number) {
    const wavelengthM = task.light.wavelengthM / refractiveIndex(task.medium, task.light.wavelengthM)[0];
    const rules = new LegendreRules();
    const sampling = new Sampling(task, REPORT_FINENESS, (2 * Math.PI) / wavelengthM, rules);
    this.largestPhase = sampling.fringes(distanceM, 0).kappa * radiusM * radiusM;
    this.count = Math.ceil(Math.min(MOST_CELLS, Math.max(LEAST_CELLS, this.largestPhase / CELL_PHASE)));
    const fine = SPLIT * this.count;
    this.fineArea = (Math.PI * radiusM * radiusM) / (fine * wavelengthM * distanceM);
    this.radiiM = Float64Array.from({ length: fine }, (_, j) => radiusM * Math.sqrt((j + 1) / fine));
    this.distanceM = distanceM;
    this.radiusM = radiusM;
    this.#task = task;
    this.#reader = reader;
    this.#flight = sampling.flightRule(radiusM, distanceM);
    this.#farthestM = farthestRead(task.placement);
    const density = sampling.density(distanceM);
    this.#discs = Array.from(this.radiiM, (rim) => boundaryNodes([ringLoop(rim, 1)], density, rules));
  }

  /**
   * What each fine cell adds to reading/extinction: the mean over the flight, if there is one.
   *
   * @param position of the particle, the middle of its flight, metres
   */
  row(condition: Condition, position: readonly [x: number, y: number]): Float64Array {
    const flight = plainFlights(Float64Array.from(position), this.#flight);
    const view = { distanceM: this.distanceM, radiusM: this.radiusM, offsetM: this.#farthestM };
    const read = this.#reader.at(condition, view);
    const mean = new Float64Array(1);
    let before = 0;
    return Float64Array.from(this.#discs, (nodes) => {
      flight.means((x, y) => read(nodes, x, y), mean);
      const cell = mean[0] - before;
      before = mean[0];
      return cell;
    });
  }

  /** The axis and the rim of the offset disc, on both axes where something tells directions apart. */
  get firstPositions(): [x: number, y: number][] {
    const { light, placement } = this.#task;
    const { offsetM } = placement;
    if (offsetM === 0) return [[0, 0]];
    const onX: [number, number][] = [
      [0, 0],
      [offsetM, 0],
    ];
    const isRound = light.polarizationRad === null && placement.crossing === null;
    return isRound ? onX : [...onX, [0, offsetM]];
  }

  /** A mask as weighted discs, ready to be read. */
  elementsOf(shares: Float64Array): ElementNodes[] {
    const discs: ElementNodes[] = [];
    for (let j = 0; j < shares.length; j++) {
      const weight = shares[j] - (shares[j + 1] ?? 0);
      const fine = SPLIT * (j + 1) - 1;
      if (Math.abs(weight) > LEAST_SHARE)
        discs.push({ weight, nodes: this.#discs[fine], areaM2: Math.PI * this.radiiM[fine] ** 2 });
    }
    return discs;
  }
}
