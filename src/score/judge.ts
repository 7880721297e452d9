import { LegendreRules } from '../numeric/gaussLegendre.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import { ringsRadius } from '../outline/area.ts';
import { boundaryNodes } from '../outline/boundaryNodes.ts';
import { ringNodes } from '../outline/ringNodes.ts';
import type { OutlineElement, Shape } from '../outline/shape.ts';
import { shapeRadius } from '../outline/shapeRadius.ts';
import { irradianceAt } from '../reading/beamLines.ts';
import type { FlightMeans } from '../reading/flightMeans.ts';
import { plainFlights } from '../reading/flightMeans.ts';
import type { Symmetry } from '../reading/positions.ts';
import { NO_FLIGHT } from '../reading/positions.ts';
import { Readers } from '../reading/readers.ts';
import type { EdgeDensity } from '../reading/roughEdge.ts';
import type { Scenario } from '../reading/scenario.ts';
import { spreadOf } from '../reading/spreadOf.ts';
import type { Fields, TableShelf } from '../reading/tableShelf.ts';
import type { ElementNodes } from './elementNodes.ts';
import { elementNodes, nearestPlane } from './elementNodes.ts';
import { elementRatios } from './elementRatios.ts';
import type { Fineness } from './fineness.ts';
import { NO_SYMMETRY, Sampling } from './sampling.ts';
import type { Judgement, SampledReadings } from './scorer.ts';
import { Scorer, shiftRows } from './scorer.ts';
import type { Task } from './task.ts';
import { taskScenarios } from './taskScenarios.ts';
import type { ApartReadings } from './weigher.ts';
import { weigh } from './weigher.ts';

export type { ElementNodes };

/** Scores designs for one task. Holds the solved particles and the radial tables, so make one and keep it. */
export class Judge {
  readonly task: Task;
  readonly scenarios: readonly Scenario[];
  /** Wavelength in the medium, metres. */
  readonly wavelengthM: number;
  readonly #readers: Readers;
  readonly #spreadsM: readonly number[];
  readonly #rules = new LegendreRules();
  readonly #sampling: Sampling;
  readonly #scorer: Scorer;

  /**
   * @param fields those of the far zone, or the exact ones: see `farZoneError` for when that matters
   */
  constructor(task: Task, fineness: Fineness, fields: Fields = 'far') {
    this.task = task;
    this.wavelengthM = task.light.wavelengthM / refractiveIndex(task.medium, task.light.wavelengthM)[0];
    const { tiltsAsPlaces } = fineness;
    this.scenarios = taskScenarios(task, fineness.drifts).map((scenario) => ({ ...scenario, tiltsAsPlaces }));
    this.#sampling = new Sampling(task, fineness, (2 * Math.PI) / this.wavelengthM, this.#rules);
    const spreadsM = this.scenarios.map(({ particle }) => spreadOf(task.placement, particle.diameterM));
    this.#spreadsM = spreadsM;
    this.#readers = new Readers(this.scenarios, { spreadsM, beam: task.light.beam, fields });
    this.#scorer = new Scorer(task, this.scenarios, this.wavelengthM);
  }

  /** Its tables for a flat wave, which judges of the same task in other threads can share. */
  get tables(): TableShelf {
    return this.#readers.flat;
  }

  /** κ = k/(2z) at the nominal wavelength, 1/m²; in a focused beam what stands for it (see `Fringes`). */
  kappa(distanceM: number): number {
    return this.#sampling.fringes(distanceM, 0).kappa;
  }

  /** Phase, or change of the light itself, that a step of the particle across the axis makes at the rim, rad/m. */
  phasePerMetre(radiusM: number, distanceM: number): number {
    return this.#sampling.phasePerMetre(radiusM, distanceM);
  }

  /**
   * Irradiance at a place of the particle over that on the axis at its nominal place, as a mean over its random motion:
   * 1 in a flat wave.
   *
   * @param place metres
   */
  localIrradiance(scenario: number, distanceM: number, [x, y, z]: readonly [number, number, number]): number {
    const { beam } = this.task.light;
    if (beam === undefined) return 1;
    const spreadM = this.#spreadsM[scenario];
    return irradianceAt(this.scenarios[scenario], beam, { x, y, z, distanceM, spreadM });
  }

  /**
   * Scores a shape as its family draws it; the ratios reading/extinction behind the correction come along.
   *
   * @param correction that free weights are solved for; the target's if left out
   * @param shift what is added to each ratio, for what the shape leaves out; passed over where it is not as long, or weights are free
   */
  scoreShape(shape: Shape, distanceM: number, correction?: number, shift?: Float64Array | null): Judgement {
    const nodes = this.shapeNodes(shape, distanceM);
    const radiusM = shapeRadius(shape);
    if (shape.freeWeights) {
      const apart = this.#readApart(nodes, radiusM, distanceM, shape, shape);
      return this.judge(weigh(this.task, apart, correction ?? this.task.target.correction));
    }
    const read = this.#read(nodes, radiusM, distanceM, shape, shape);
    return this.judge(shift ? shiftRows(read, shift) : read);
  }

  /** Scores an outline given by its points. */
  scoreOutline(
    elements: readonly OutlineElement[],
    distanceM: number,
    symmetry: Symmetry = NO_SYMMETRY,
  ): Judgement {
    return this.judge(this.readOutline(elements, distanceM, symmetry));
  }

  /** Reads an outline given by its points over all samples, for `judge`. */
  readOutline(
    elements: readonly OutlineElement[],
    distanceM: number,
    symmetry: Symmetry = NO_SYMMETRY,
  ): SampledReadings {
    const radiusM = Math.max(...elements.map(({ rings }) => ringsRadius(rings)));
    // Drawn as points, an outline keeps its symmetry nearly: enough to choose places by, and each is read for itself.
    return this.#read(this.outlineNodes(elements, distanceM), radiusM, distanceM, symmetry, NO_SYMMETRY);
  }

  /** As `readOutline`, each element for itself, for `weigh`; the elements' own weights do not count. */
  readApart(
    elements: readonly OutlineElement[],
    distanceM: number,
    symmetry: Symmetry = NO_SYMMETRY,
  ): ApartReadings {
    const radiusM = Math.max(...elements.map(({ rings }) => ringsRadius(rings)));
    return this.#readApart(this.outlineNodes(elements, distanceM), radiusM, distanceM, symmetry, NO_SYMMETRY);
  }

  /**
   * Ratios reading/extinction of an outline, one row a scenario.
   *
   * @param positions flat [x0, y0, x1, y1, …], metres; without it the sampling that scores use
   * @returns for each scenario the ratios, positions of the nominal depth first
   */
  outlineRatios(
    elements: readonly OutlineElement[],
    distanceM: number,
    positions?: Float64Array,
  ): { positions: Float64Array; depths: readonly number[]; ratios: Float64Array[] } {
    const radiusM = Math.max(...elements.map(({ rings }) => ringsRadius(rings)));
    const nodes = this.outlineNodes(elements, distanceM);
    const nearestM = nearestPlane(elements, distanceM);
    const places = positions ?? this.#sampling.positions(radiusM, nearestM, NO_SYMMETRY);
    const depths = positions ? [0] : this.#sampling.depths();
    const flights = this.#sampling.flights(places, radiusM, nearestM, NO_SYMMETRY);
    return { positions: places, depths, ratios: this.#ratios(nodes, radiusM, distanceM, flights, depths) };
  }

  /**
   * Ratios reading/extinction of an outline along the particle's flight, at the nominal depth. Without a crossing a flight is
   * one point.
   *
   * @param positions middles of the flights, as for `outlineRatios`
   * @returns `flight`: its points relative to its middle; for each scenario the ratios, flight by flight
   */
  outlineFlights(
    elements: readonly OutlineElement[],
    distanceM: number,
    positions?: Float64Array,
  ): { positions: Float64Array; flight: Float64Array; ratios: Float64Array[] } {
    const radiusM = Math.max(...elements.map(({ rings }) => ringsRadius(rings)));
    const nearestM = nearestPlane(elements, distanceM);
    const places = positions ?? this.#sampling.positions(radiusM, nearestM, NO_SYMMETRY);
    const flight = this.#sampling.flight(radiusM, nearestM);
    const points = new Float64Array((places.length * flight.length) / 2);
    for (let p = 0; p < places.length; p += 2) {
      for (let f = 0; f < flight.length; f++)
        points[(p * flight.length) / 2 + f] = places[p + (f % 2)] + flight[f];
    }
    const nodes = this.outlineNodes(elements, distanceM);
    const stills = plainFlights(points, NO_FLIGHT);
    const ratios = this.#ratios(nodes, radiusM, distanceM, stills, [0]);
    return { positions: places, flight, ratios };
  }

  /**
   * What a unit of detector area adds to reading/extinction, 1/m², at the nominal depth: the mean over the flight.
   *
   * @param radiusM how far from the axis it will be asked for
   * @param place of the particle, metres
   */
  edgeDensity(
    scenario: number,
    distanceM: number,
    radiusM: number,
    [px, py]: readonly [x: number, y: number],
  ): EdgeDensity {
    const flight = this.#sampling.flight(radiusM, distanceM);
    const points = flight.map((along, i) => along + (i % 2 === 0 ? px : py));
    const density = this.#readers.density(scenario, distanceM, radiusM, points);
    const { extinctionM2 } = this.scenarios[scenario];
    return (x, y, out) => {
      density(x, y, out);
      for (let i = 0; i < 3; i++) out[i] /= extinctionM2;
    };
  }

  /** Boundary nodes of a shape, dense enough for every place, depth and line of the task. */
  shapeNodes(shape: Shape, distanceM: number): ElementNodes[] {
    return shape.elements.map((element) => {
      const density = this.#sampling.density(element.distanceM ?? distanceM);
      return elementNodes(element, boundaryNodes(element.loops, density, this.#rules));
    });
  }

  /** As `shapeNodes`, of an outline given by its points. */
  outlineNodes(elements: readonly OutlineElement[], distanceM: number): ElementNodes[] {
    return elements.map((element) => {
      const density = this.#sampling.density(element.distanceM ?? distanceM);
      return elementNodes(element, ringNodes(element.rings, density, this.#rules));
    });
  }

  #ratios(
    elements: readonly ElementNodes[],
    radiusM: number,
    distanceM: number,
    flights: FlightMeans,
    depths: readonly number[],
  ): Float64Array[] {
    return elementRatios(this.scenarios, this.#readers, { elements, radiusM, distanceM }, flights, depths);
  }

  #read(
    elements: readonly ElementNodes[],
    radiusM: number,
    distanceM: number,
    symmetry: Symmetry,
    nodesSymmetry: Symmetry,
  ): SampledReadings {
    const flights = this.#flights(elements, radiusM, distanceM, symmetry, nodesSymmetry);
    const rows = this.#ratios(elements, radiusM, distanceM, flights, this.#sampling.depths());
    return { elements, radiusM, distanceM, rows };
  }

  #readApart(
    elements: readonly ElementNodes[],
    radiusM: number,
    distanceM: number,
    symmetry: Symmetry,
    nodesSymmetry: Symmetry,
  ): ApartReadings {
    const flights = this.#flights(elements, radiusM, distanceM, symmetry, nodesSymmetry);
    const depths = this.#sampling.depths();
    const apart = elements.map((element) =>
      this.#ratios([{ ...element, weight: 1 }], radiusM, distanceM, flights, depths),
    );
    return { elements, radiusM, distanceM, apart };
  }

  #flights(
    elements: readonly ElementNodes[],
    radiusM: number,
    distanceM: number,
    symmetry: Symmetry,
    nodesSymmetry: Symmetry,
  ): FlightMeans {
    const nearestM = nearestPlane(elements, distanceM);
    const positions = this.#sampling.positions(radiusM, nearestM, symmetry);
    return this.#sampling.flights(positions, radiusM, nearestM, nodesSymmetry);
  }

  /**
   * Scores of a design from its readings.
   *
   * @param found further ratios reading/extinction that a free gain takes in: of cases worse than the samples
   */
  judge(readings: SampledReadings, found: readonly number[] = []): Judgement {
    return this.#scorer.score(readings, found);
  }
}
