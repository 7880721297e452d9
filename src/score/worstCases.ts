import { climbDisc } from '../numeric/climbDisc.ts';
import { climbLine } from '../numeric/climbLine.ts';
import { LegendreRules } from '../numeric/gaussLegendre.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import type { Particle } from '../optics/particle.ts';
import type { FlightMeans } from '../reading/flightMeans.ts';
import type { Symmetry } from '../reading/positions.ts';
import type { Fields } from '../reading/tableShelf.ts';
import type { View } from './conditionReader.ts';
import { ConditionReader } from './conditionReader.ts';
import type { Condition, FirstConditions, Kind } from './conditions.ts';
import { firstConditions, kindsOf, particleOf } from './conditions.ts';
import { SEARCH_FINENESS } from './fineness.ts';
import type { ElementNodes } from './judge.ts';
import { NO_SYMMETRY, Sampling } from './sampling.ts';
import type { Task } from './task.ts';

/** Where a design reads worst, and what it reads there. */
export interface WorstCase {
  /** ratio/gain − 1, with its sign. */
  correction: number;
  /** reading/extinction */
  ratio: number;
  condition: Condition;
  particle: Particle;
  /** Of the main line, vacuum, metres. */
  wavelengthM: number;
  /** From the nominal place towards the detector, metres. */
  depthM: number;
  /** Metres; the middle of a flight. */
  positionM: [x: number, y: number];
}

/** A case on the way to a local maximum of `sign` times the correction. */
interface Climb {
  condition: Condition;
  x: number;
  y: number;
  sign: 1 | -1;
  /** sign · correction */
  value: number;
}

const SIGNS = [1, -1] as const;

/** Steps along boundaries that solving a particle for one colour is worth, and one number of a table; all that a first look may take: a few seconds. */
const SOLVING_EFFORT = 2e5;
const TABLE_EFFORT = 10;
const MOST_STEPS = 1e9;
/** Local maxima that are climbed to, and the share of the worst first look below which none is. */
const CLIMBS = 5;
const WORTH = 0.9;
/** First looks of one kind and sign whose size parameters lie nearer than this are one maximum. */
const APART = 0.25;
/** Rounds over place, wavelength, depth and diameter, and the gain in correction that is worth another, over the worst. */
const ROUNDS = 3;
const LEAST_GAIN = 1e-3;
/** First and last step of a place, radians of phase at the rim (see `samplePositions`). */
const PLACE_STEPS = [0.25, 0.015] as const;
/** First step of a diameter in size parameter: as those that telling diameters are found with. */
const SIZE_STEP = 0.01;
/** Readings that need a table of their own, for each line that is climbed along. */
const TABLES = { diameter: 7, wavelength: 4, depth: 4 } as const;

/**
 * Finds where designs for one task read worst, not among samples, but by climbing: over the particle's place, the depth, the
 * wavelength, and the diameter within every range of the brief.
 *
 * A first look takes the ends of every range, diameters half a size parameter apart, and those at which the forward amplitude's
 * phase has an extreme (see `tellingDiameters`), at those places where the brief's own particles read most and least. The
 * worst few are climbed from, one coordinate after the other, each with its own table. What may be passed over: resonances
 * of clear spheres narrower than 0.01 in size parameter and, where a range holds more than 100 telling
 * diameters, or an outline is so large that tables take long, maxima that are none of the sharpest.
 *
 * Holds solved particles, and tables of the last distance: make one and keep it, and ask distance by distance.
 */
export class WorstCases {
  readonly #task: Task;
  readonly #kinds: readonly Kind[];
  readonly #first: FirstConditions;
  readonly #reader: ConditionReader;
  readonly #sampling: Sampling;
  readonly #rules = new LegendreRules();

  constructor(task: Task, fields: Fields = 'far') {
    this.#task = task;
    this.#kinds = kindsOf(task);
    this.#first = firstConditions(task, this.#kinds);
    this.#reader = new ConditionReader(task, fields);
    const { wavelengthM } = task.light;
    const wavenumber = (2 * Math.PI * refractiveIndex(task.medium, wavelengthM)[0]) / wavelengthM;
    this.#sampling = new Sampling(task, SEARCH_FINENESS, wavenumber, this.#rules);
  }

  /**
   * Local maxima of |ratio/gain − 1|, the worst first; those of one sign and kind of particle differ in diameter.
   *
   * @param elements any weighted loops, as nodes (see `Judge.shapeNodes`)
   * @param radiusM of the circle around them
   * @param symmetry of the elements: the places that stand for all of them
   */
  find(
    elements: readonly ElementNodes[],
    radiusM: number,
    distanceM: number,
    gain: number,
    symmetry: Symmetry,
  ): WorstCase[] {
    const scene = this.#scene(elements, radiusM, distanceM, gain, symmetry);
    const climbs = this.#starts(scene).map((start) => this.#climb(scene, start));
    return distinct(climbs).map(({ condition, x, y, sign, value }) => ({
      correction: sign * value,
      ratio: gain * (1 + sign * value),
      condition,
      particle: particleOf(condition),
      wavelengthM: condition.wavelengthM,
      depthM: condition.depthM,
      positionM: [x, y],
    }));
  }

  #scene(
    elements: readonly ElementNodes[],
    radiusM: number,
    distanceM: number,
    gain: number,
    symmetry: Symmetry,
  ): Scene {
    const { offsetM, crossing } = this.#task.placement;
    const places = this.#sampling.positions(radiusM, distanceM, symmetry);
    const flightsOf = (middles: Float64Array) =>
      this.#sampling.flights(middles, radiusM, distanceM, NO_SYMMETRY);
    const flights = flightsOf(places);
    const farthestM = Math.max(flights.farthestM, offsetM + (crossing?.spanM ?? 0) / 2);
    return {
      nodes: weightedNodes(elements),
      view: { distanceM, radiusM, offsetM: farthestM },
      gain,
      places,
      flights,
      flightsOf,
      phasePerMetre: this.#sampling.phasePerMetre(radiusM, distanceM),
    };
  }

  /** Corrections of flights, or of places where the particle stays, under one condition. */
  #corrections(condition: Condition, { nodes, view, gain }: Scene, flights: FlightMeans): Float64Array {
    const read = this.#reader.at(condition, view);
    const ratios = new Float64Array(flights.count);
    flights.means((x, y) => read(nodes, x, y), ratios);
    return ratios.map((ratio) => ratio / gain - 1);
  }

  /** First looks at every condition, at the places that tell most; the worst of them, apart from each other. */
  #starts(scene: Scene): Climb[] {
    const places = this.#tellingPlaces(scene);
    const flights = scene.flightsOf(places);
    const looks = this.#firstOf(scene, flights).flatMap((condition) => {
      const corrections = this.#corrections(condition, scene, flights);
      return SIGNS.map((sign) => startOf(condition, places, corrections, sign));
    });
    const kept = distinct(looks);
    return kept.filter(({ value }) => value >= WORTH * kept[0].value).slice(0, CLIMBS);
  }

  /** Conditions of the first look: of a large outline or a wide line, whose tables take long, only every second or third of those between. */
  #firstOf({ nodes, view }: Scene, flights: FlightMeans): Condition[] {
    const reader = this.#reader;
    const table = reader.colours * (SOLVING_EFFORT + TABLE_EFFORT * reader.tableSize(view));
    const steps = table + (flights.count * nodes.length) / 4;
    const { given, between } = this.#first;
    const stride = Math.ceil((between.length * steps) / MOST_STEPS);
    return [...given, ...between.filter((_, i) => (i + Math.floor(i / stride)) % stride === 0)];
  }

  /** Where the brief's own particles read most and least, at the nominal wavelength and every depth; and the axis. */
  #tellingPlaces(scene: Scene): Float64Array {
    const { light, placement } = this.#task;
    const told = new Map<string, readonly [number, number]>([['0 0', [0, 0]]]);
    const depths = placement.depthM === 0 ? [0] : [-placement.depthM, 0, placement.depthM];
    for (const kind of this.#kinds) {
      for (const diameterM of kind.diametersM) {
        for (const depthM of depths) {
          const condition = { kind, diameterM, wavelengthM: light.wavelengthM, depthM };
          const corrections = this.#corrections(condition, scene, scene.flights);
          for (const sign of SIGNS) {
            const { x, y } = startOf(condition, scene.places, corrections, sign);
            told.set(`${x} ${y}`, [x, y]);
          }
        }
      }
    }
    return Float64Array.from([...told.values()].flat());
  }

  /** From a first look to a local maximum over everything. */
  #climb(scene: Scene, start: Climb): Climb {
    let best = this.#climbPlace(scene, start, true);
    for (let round = 0; round < ROUNDS; round++) {
      const before = best.value;
      best = this.#climbWavelength(scene, best);
      best = this.#climbDepth(scene, best);
      best = this.#climbDiameter(scene, best);
      best = this.#climbPlace(scene, best, false);
      if (best.value - before < LEAST_GAIN * Math.abs(best.value)) break;
    }
    return best;
  }

  /** @param anywhere whether to look over the whole disc before climbing */
  #climbPlace(scene: Scene, from: Climb, anywhere: boolean): Climb {
    const { offsetM } = this.#task.placement;
    if (offsetM === 0) return from;
    const { places, flights, flightsOf, phasePerMetre } = scene;
    const { condition, sign } = from;
    let start = from;
    if (anywhere) {
      const found = startOf(condition, places, this.#corrections(condition, scene, flights), sign);
      if (found.value > start.value) start = found;
    }
    const [first, last] = PLACE_STEPS.map((phase) => phase / phasePerMetre);
    const value = (x: number, y: number) =>
      sign * this.#corrections(condition, scene, flightsOf(Float64Array.of(x, y)))[0];
    const steps = [Math.min(first, offsetM / 3), Math.min(last, offsetM / 50)] as const;
    return { ...start, ...climbDisc(value, start, offsetM, ...steps) };
  }

  /** The diameter goes with the wavelength, as far as it may: a sphere's ripple hangs on their ratio. */
  #climbWavelength(scene: Scene, from: Climb): Climb {
    const { wavelengthM, driftM } = this.#task.light;
    if (driftM === 0) return from;
    const { condition } = from;
    const { leastM, largestM } = condition.kind;
    return this.#climbAlong(scene, from, {
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

  #climbDepth(scene: Scene, from: Climb): Climb {
    const { depthM } = this.#task.placement;
    if (depthM === 0) return from;
    const { condition } = from;
    return this.#climbAlong(scene, from, {
      at: condition.depthM,
      range: [-depthM, depthM],
      step: depthM,
      tables: TABLES.depth,
      conditionAt: (at) => ({ ...condition, depthM: at }),
    });
  }

  #climbDiameter(scene: Scene, from: Climb): Climb {
    const { condition } = from;
    const { leastM, largestM } = condition.kind;
    if (leastM === largestM) return from;
    return this.#climbAlong(scene, from, {
      at: condition.diameterM,
      range: [leastM, largestM],
      step: Math.min((SIZE_STEP * condition.wavelengthM) / Math.PI, (largestM - leastM) / 4),
      tables: TABLES.diameter,
      conditionAt: (at) => ({ ...condition, diameterM: at }),
    });
  }

  #climbAlong(scene: Scene, from: Climb, { at, range, step, tables, conditionAt }: Line): Climb {
    const flight = scene.flightsOf(Float64Array.of(from.x, from.y));
    const f = (place: number) => from.sign * this.#corrections(conditionAt(place), scene, flight)[0];
    const tolerance = LEAST_GAIN * from.value;
    const options = { step, tolerance, evaluations: tables };
    const reached = climbLine(f, { at, value: from.value }, range, options);
    return { ...from, condition: conditionAt(reached.at), value: reached.value };
  }
}

/** One design as it is looked at. */
interface Scene {
  nodes: Float64Array;
  view: View;
  gain: number;
  /** Places that stand for all: flat [x0, y0, …], metres; and the flights through them. */
  places: Float64Array;
  flights: FlightMeans;
  flightsOf: (middles: Float64Array) => FlightMeans;
  phasePerMetre: number;
}

/** One coordinate of a condition, to climb along. */
interface Line {
  at: number;
  range: [low: number, high: number];
  step: number;
  tables: number;
  conditionAt: (at: number) => Condition;
}

/** All elements as one list of nodes: a reading is linear in the tangents. */
function weightedNodes(elements: readonly ElementNodes[]): Float64Array {
  const all = new Float64Array(elements.reduce((sum, { nodes }) => sum + nodes.length, 0));
  let at = 0;
  for (const { weight, nodes } of elements) {
    all.set(nodes, at);
    for (let i = at; i < at + nodes.length; i += 4) {
      all[i + 2] *= weight;
      all[i + 3] *= weight;
    }
    at += nodes.length;
  }
  return all;
}

function startOf(condition: Condition, places: Float64Array, corrections: Float64Array, sign: 1 | -1): Climb {
  let worst = 0;
  for (let p = 1; p < corrections.length; p++) {
    if (sign * corrections[p] > sign * corrections[worst]) worst = p;
  }
  const [x, y] = places.subarray(2 * worst);
  return { condition, x, y, sign, value: sign * corrections[worst] };
}

/** The worst first, without those that are one maximum with a worse one. */
function distinct(climbs: readonly Climb[]): Climb[] {
  const kept: Climb[] = [];
  for (const climb of climbs.toSorted((p, q) => q.value - p.value)) {
    const { kind, wavelengthM, diameterM } = climb.condition;
    const isOther = kept.every(
      ({ sign, condition }) =>
        sign !== climb.sign ||
        condition.kind !== kind ||
        (Math.PI * Math.abs(condition.diameterM - diameterM)) / wavelengthM >= APART,
    );
    if (isOther) kept.push(climb);
  }
  return kept;
}
