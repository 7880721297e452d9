import { LegendreRules } from '../numeric/gaussLegendre.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import type { Particle } from '../optics/particle.ts';
import type { FlightMeans } from '../reading/flightMeans.ts';
import type { Symmetry } from '../reading/positions.ts';
import type { Fields } from '../reading/tableShelf.ts';
import { Climber } from './climber.ts';
import { ConditionReader } from './conditionReader.ts';
import type { Condition, Kind } from './conditions.ts';
import { kindsOf, particleOf } from './conditions.ts';
import type { ElementNodes } from './elementNodes.ts';
import { nearestPlane, planesOf, weightedNodes } from './elementNodes.ts';
import { SEARCH_FINENESS } from './fineness.ts';
import type { FirstConditions } from './firstConditions.ts';
import { firstConditions } from './firstConditions.ts';
import { NO_SYMMETRY, Sampling } from './sampling.ts';
import type { Case, Scene } from './scene.ts';
import { largestOf } from './scene.ts';
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
    const climber = new Climber(this.#task, scene);
    const reached = this.#starts(scene).map((start) => climber.climb(start));
    return distinct(reached).map(({ condition, x, y, sign, value }) => ({
      correction: sign * value,
      ratio: gain * (1 + sign * value),
      condition,
      particle: particleOf(condition),
      wavelengthM: condition.wavelengthM,
      depthM: condition.depthM,
      positionM: [x, y],
    }));
  }

  /**
   * What each element reads over the extinction in a case that was found, for a weight of one.
   *
   * @param elements, radiusM, distanceM of the design that it was found for
   */
  ratiosAt(
    elements: readonly ElementNodes[],
    radiusM: number,
    distanceM: number,
    { condition, positionM }: WorstCase,
  ): number[] {
    return elements.map((element) => {
      const { flightsOf, corrections } = this.#scene(
        [{ ...element, weight: 1 }],
        radiusM,
        distanceM,
        1,
        NO_SYMMETRY,
      );
      return 1 + corrections(condition, flightsOf(Float64Array.from(positionM)))[0];
    });
  }

  #scene(
    elements: readonly ElementNodes[],
    radiusM: number,
    distanceM: number,
    gain: number,
    symmetry: Symmetry,
  ): Scene {
    const { offsetM, crossing } = this.#task.placement;
    const nearestM = nearestPlane(elements, distanceM);
    const places = this.#sampling.positions(radiusM, nearestM, symmetry);
    const flightsOf = (middles: Float64Array) =>
      this.#sampling.flights(middles, radiusM, nearestM, NO_SYMMETRY);
    const flights = flightsOf(places);
    const farthestM = Math.max(flights.farthestM, offsetM + (crossing?.spanM ?? 0) / 2);
    const planes = planesOf(elements, distanceM).map((plane) => ({
      nodes: weightedNodes(plane.elements),
      view: { distanceM: plane.distanceM, radiusM, offsetM: farthestM },
    }));
    return {
      planes,
      places,
      flights,
      flightsOf,
      phasePerMetre: this.#sampling.phasePerMetre(radiusM, nearestM),
      corrections: (condition, those) => {
        const ratios = new Float64Array(those.count);
        const further = new Float64Array(those.count);
        planes.forEach(({ nodes, view }, p) => {
          const read = this.#reader.at(condition, view);
          those.means((x, y) => read(nodes, x, y), p === 0 ? ratios : further);
          if (p > 0) for (let i = 0; i < ratios.length; i++) ratios[i] += further[i];
        });
        return ratios.map((ratio) => ratio / gain - 1);
      },
    };
  }

  /** First looks at every condition, at the places that tell most; the worst of them, apart from each other. */
  #starts(scene: Scene): Case[] {
    const places = this.#tellingPlaces(scene);
    const flights = scene.flightsOf(places);
    const looks = this.#firstOf(scene, flights).flatMap((condition) => {
      const corrections = scene.corrections(condition, flights);
      return SIGNS.map((sign) => largestOf(condition, places, corrections, sign));
    });
    const kept = distinct(looks);
    return kept.filter(({ value }) => value >= WORTH * kept[0].value).slice(0, CLIMBS);
  }

  /** Conditions of the first look: of a large outline or a wide line, whose tables take long, only every second or third of those between. */
  #firstOf({ planes }: Scene, flights: FlightMeans): Condition[] {
    const reader = this.#reader;
    let steps = 0;
    for (const { nodes, view } of planes) {
      const table = reader.colours * (SOLVING_EFFORT + TABLE_EFFORT * reader.tableSize(view));
      steps += table + (flights.count * nodes.length) / 4;
    }
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
          const corrections = scene.corrections(condition, scene.flights);
          for (const sign of SIGNS) {
            const { x, y } = largestOf(condition, scene.places, corrections, sign);
            told.set(`${x} ${y}`, [x, y]);
          }
        }
      }
    }
    return Float64Array.from([...told.values()].flat());
  }
}

/** The worst first, without those that are one maximum with a worse one. */
function distinct(cases: readonly Case[]): Case[] {
  const kept: Case[] = [];
  for (const one of cases.toSorted((p, q) => q.value - p.value)) {
    const { kind, wavelengthM, diameterM } = one.condition;
    const isOther = kept.every(
      ({ sign, condition }) =>
        sign !== one.sign ||
        condition.kind !== kind ||
        (Math.PI * Math.abs(condition.diameterM - diameterM)) / wavelengthM >= APART,
    );
    if (isOther) kept.push(one);
  }
  return kept;
}
