import { climbDisc } from '../numeric/climbDisc.ts';
import { climbLine } from '../numeric/climbLine.ts';
import type { Condition } from './conditions.ts';
import type { Case, Scene } from './scene.ts';
import { largestOf } from './scene.ts';
import type { Task } from './task.ts';

/** Rounds over place, wavelength, depth and diameter, and the gain in correction that is worth another, over the worst. */
const ROUNDS = 3;
const LEAST_GAIN = 1e-3;
/** First and last step of a place, radians of phase at the rim (see `samplePositions`). */
const PLACE_STEPS = [0.25, 0.015] as const;
/** First step of a diameter in size parameter: as those that telling diameters are found with. */
const SIZE_STEP = 0.01;
/** Readings that need a table of their own, for each line that is climbed along. */
const TABLES = { diameter: 7, wavelength: 4, depth: 4 } as const;

/** Climbs from cases of one scene to local maxima over the place, the wavelength, the depth and the diameter, one after the other. */
export class Climber {
  readonly #task: Task;
  readonly #scene: Scene;

  constructor(task: Task, scene: Scene) {
    this.#task = task;
    this.#scene = scene;
  }

  /** From a first look to a local maximum over everything. */
  climb(start: Case): Case {
    let best = this.#climbPlace(start, true);
    for (let round = 0; round < ROUNDS; round++) {
      const before = best.value;
      best = this.#climbWavelength(best);
      best = this.#climbDepth(best);
      best = this.#climbDiameter(best);
      best = this.#climbPlace(best, false);
      if (best.value - before < LEAST_GAIN * Math.abs(best.value)) break;
    }
    return best;
  }

  /** @param anywhere whether to look over the whole disc before climbing */
  #climbPlace(from: Case, anywhere: boolean): Case {
    const { offsetM } = this.#task.placement;
    if (offsetM === 0) return from;
    const { places, flights, flightsOf, phasePerMetre, corrections } = this.#scene;
    const { condition, sign } = from;
    let start = from;
    if (anywhere) {
      const found = largestOf(condition, places, corrections(condition, flights), sign);
      if (found.value > start.value) start = found;
    }
    const [first, last] = PLACE_STEPS.map((phase) => phase / phasePerMetre);
    const value = (x: number, y: number) =>
      sign * corrections(condition, flightsOf(Float64Array.of(x, y)))[0];
    const steps = [Math.min(first, offsetM / 3), Math.min(last, offsetM / 50)] as const;
    return { ...start, ...climbDisc(value, start, offsetM, ...steps) };
  }

  /** The diameter goes with the wavelength, as far as it may: a sphere's ripple hangs on their ratio. */
  #climbWavelength(from: Case): Case {
    const { wavelengthM, driftM } = this.#task.light;
    if (driftM === 0) return from;
    const { condition } = from;
    const { leastM, largestM } = condition.kind;
    return this.#climbAlong(from, {
      at: condition.wavelengthM,
      range: [wavelengthM - driftM, wavelengthM + driftM],
      step: driftM,
      tables: TABLES.wavelength,
      conditionAt: (at) => {
        const diameterM = (condition.diameterM * at) / condition.wavelengthM;
        return { ...condition, wavelengthM: at, diameterM: Math.min(largestM, Math.max(leastM, diameterM)) };
      },
    });
  }

  #climbDepth(from: Case): Case {
    const { depthM } = this.#task.placement;
    if (depthM === 0) return from;
    const { condition } = from;
    return this.#climbAlong(from, {
      at: condition.depthM,
      range: [-depthM, depthM],
      step: depthM,
      tables: TABLES.depth,
      conditionAt: (at) => ({ ...condition, depthM: at }),
    });
  }

  #climbDiameter(from: Case): Case {
    const { condition } = from;
    const { leastM, largestM } = condition.kind;
    if (leastM === largestM) return from;
    return this.#climbAlong(from, {
      at: condition.diameterM,
      range: [leastM, largestM],
      step: Math.min((SIZE_STEP * condition.wavelengthM) / Math.PI, (largestM - leastM) / 4),
      tables: TABLES.diameter,
      conditionAt: (at) => ({ ...condition, diameterM: at }),
    });
  }

  #climbAlong(from: Case, { at, range, step, tables, conditionAt }: Line): Case {
    const flight = this.#scene.flightsOf(Float64Array.of(from.x, from.y));
    const f = (place: number) => from.sign * this.#scene.corrections(conditionAt(place), flight)[0];
    const tolerance = LEAST_GAIN * from.value;
    const options = { step, tolerance, evaluations: tables };
    const reached = climbLine(f, { at, value: from.value }, range, options);
    return { ...from, condition: conditionAt(reached.at), value: reached.value };
  }
}

/** One coordinate of a condition, to climb along. */
interface Line {
  at: number;
  range: [low: number, high: number];
  step: number;
  tables: number;
  conditionAt: (at: number) => Condition;
}
