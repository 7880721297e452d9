import { inputError, RimwrightError } from '../base/errors.ts';
import { LegendreRules } from '../numeric/gaussLegendre.ts';
import { axialIrradiance } from '../optics/gaussianBeam.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import { linesOf } from '../optics/light.ts';
import { nodesArea, ringsRadius } from '../outline/area.ts';
import type { NodeDensity } from '../outline/boundaryNodes.ts';
import { boundaryNodes } from '../outline/boundaryNodes.ts';
import { ringNodes } from '../outline/ringNodes.ts';
import type { OutlineElement, Shape } from '../outline/shape.ts';
import { shapeRadius } from '../outline/shapeRadius.ts';
import { beamPath, particleIrradiance } from '../reading/beamPath.ts';
import { beamReading } from '../reading/beamReading.ts';
import { BeamShelf } from '../reading/beamShelf.ts';
import type { BoundaryNodes } from '../reading/boundaryReading.ts';
import { boundaryReading } from '../reading/boundaryReading.ts';
import type { Fringes } from '../reading/fringes.ts';
import { fringesAt } from '../reading/fringes.ts';
import { litArea } from '../reading/litArea.ts';
import type { MostPlaces, Symmetry } from '../reading/positions.ts';
import { flightPoints, flightRule, NO_FLIGHT, samplePositions } from '../reading/positions.ts';
import type { EdgeDensity } from '../reading/roughEdge.ts';
import type { Scenario } from '../reading/scenario.ts';
import { buildScenarios, coherence, driftedWavelengths } from '../reading/scenario.ts';
import { spreadOf } from '../reading/spreadOf.ts';
import { tableDensity } from '../reading/tableDensity.ts';
import type { Fields } from '../reading/tableShelf.ts';
import { TableShelf } from '../reading/tableShelf.ts';
import { correctionOf } from './correction.ts';
import type { ElementArea } from './cost.ts';
import { areaOverFloor, lobeRatio, measurementTime, requiredSnr } from './cost.ts';
import type { Population } from './population.ts';
import { populationCorrection, populationsOf } from './population.ts';
import { reachesOf } from './reaches.ts';
import type { Scores } from './scores.ts';
import type { Task } from './task.ts';

/** How finely a design is judged. */
export interface Fineness {
  /** Phase between neighbouring positions, radians (see `samplePositions`). */
  spacing: number;
  /** Wavelengths over the drift, and places over the depth. */
  drifts: number;
  depths: number;
  /** Most places for the particle, where an offset is so large that the spacing would ask for more. */
  most: MostPlaces;
  /** Boundary nodes per radian of phase. */
  perRadian: number;
}

/** For every candidate of a search. */
export const SEARCH_FINENESS: Fineness = {
  spacing: 0.5,
  drifts: 3,
  depths: 3,
  most: { circles: 12, steps: 24 },
  perRadian: 0.45,
};

/** For what is reported: ten times denser in position, and finer in the rest. */
export const REPORT_FINENESS: Fineness = {
  spacing: 0.16,
  drifts: 5,
  depths: 5,
  most: { circles: 160, steps: 1200 },
  perRadian: 0.9,
};

/** Scores, and the ratios reading/extinction that they come from: one for each scenario, depth and position. */
export interface Judgement {
  scores: Scores;
  ratios: Float64Array;
}

/** One detector element ready for integration. */
interface ElementNodes extends ElementArea {
  nodes: Float64Array;
}

/** The reading of nodes for a particle at (x, y), m²: over the irradiance on the axis at the particle's nominal place. */
type Reader = (nodes: BoundaryNodes, x: number, y: number) => number;

/** Scores designs for one task. Holds the solved particles and the radial tables, so make one and keep it. */
export class Judge {
  readonly task: Task;
  readonly scenarios: readonly Scenario[];
  /** Wavelength in the medium, metres. */
  readonly wavelengthM: number;
  readonly #fineness: Fineness;
  readonly #shelf: TableShelf;
  readonly #beamShelf: BeamShelf | null;
  readonly #spreadsM: readonly number[];
  readonly #rules = new LegendreRules();
  readonly #leastExtinctionM2: number;
  readonly #largestDiameterM: number;
  readonly #populations: readonly Population[];

  /**
   * @param fields those of the far zone, or the exact ones: see `farZoneError` for when that matters. In a focused beam they are
   *   the far zone's in any case: see `fieldsFor`.
   */
  constructor(task: Task, fineness: Fineness, fields: Fields = 'far') {
    this.task = task;
    this.#fineness = fineness;
    this.wavelengthM = task.light.wavelengthM / refractiveIndex(task.medium, task.light.wavelengthM)[0];
    this.scenarios = scenariosOf(task, fineness.drifts);
    const spreadsM = this.scenarios.map(({ particle }) => spreadOf(task.placement, particle.diameterM));
    this.#spreadsM = spreadsM;
    this.#shelf = new TableShelf(this.scenarios, spreadsM, fields);
    const { beam } = task.light;
    this.#beamShelf = beam === undefined ? null : new BeamShelf(this.scenarios, spreadsM, beam);
    this.#leastExtinctionM2 = Math.min(...this.scenarios.map(({ extinctionM2 }) => extinctionM2));
    this.#largestDiameterM = Math.max(...task.particles.map(({ diameterM }) => diameterM));
    this.#populations = populationsOf(this.scenarios);
  }

  /** κ = k/(2z) at the nominal wavelength, 1/m²; in a focused beam what stands for it (see `Fringes`). */
  kappa(distanceM: number): number {
    return this.#fringes(distanceM, 0).kappa;
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
    const { wavenumber } = coherence(this.scenarios[scenario]);
    const path = beamPath(beam, wavenumber, z, distanceM - z, this.#spreadsM[scenario]);
    return particleIrradiance(path, x * x + y * y) * axialIrradiance(beam, wavenumber, z);
  }

  #fringes(distanceM: number, placeM: number): Fringes {
    return fringesAt(this.task.light.beam, this.#wavenumber(), distanceM, placeM);
  }

  #wavenumber(): number {
    return (2 * Math.PI) / this.wavelengthM;
  }

  /** Phase that a step of the particle across the axis makes at the rim, rad/m. */
  #phasePerMetre(radiusM: number, distanceM: number): number {
    const { kappa, magnification, fallPerM } = this.#fringes(distanceM, 0);
    return Math.max(2 * kappa * magnification * radiusM, fallPerM);
  }

  /** Scores a shape as its family draws it; the ratios reading/extinction behind the correction come along. */
  scoreShape(shape: Shape, distanceM: number): Judgement {
    return this.#score(this.#shapeNodes(shape, distanceM), shapeRadius(shape), distanceM, shape);
  }

  /** Scores an outline given by its points. */
  scoreOutline(
    elements: readonly OutlineElement[],
    distanceM: number,
    symmetry: Symmetry = NO_SYMMETRY,
  ): Judgement {
    const radiusM = Math.max(...elements.map(({ rings }) => ringsRadius(rings)));
    return this.#score(this.#outlineNodes(elements, distanceM), radiusM, distanceM, symmetry);
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
    const nodes = this.#outlineNodes(elements, distanceM);
    const places = positions ?? this.#positions(radiusM, distanceM, NO_SYMMETRY);
    const depths = positions ? [0] : this.#depths();
    return { positions: places, depths, ratios: this.#ratios(nodes, radiusM, distanceM, places, depths) };
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
    const places = positions ?? this.#positions(radiusM, distanceM, NO_SYMMETRY);
    const flight = this.#flight(radiusM, distanceM);
    const points = new Float64Array((places.length * flight.length) / 2);
    for (let p = 0; p < places.length; p += 2) {
      for (let f = 0; f < flight.length; f++)
        points[(p * flight.length) / 2 + f] = places[p + (f % 2)] + flight[f];
    }
    const nodes = this.#outlineNodes(elements, distanceM);
    const ratios = this.#ratios(nodes, radiusM, distanceM, points, [0], NO_FLIGHT);
    return { positions: places, flight, ratios };
  }

  /**
   * What a unit of detector area adds to reading/extinction, 1/m², at the nominal depth: the mean over the flight.
   *
   * @param radiusM how far from the axis it will be asked for
   * @param place of the particle, metres
   * @throws RimwrightError `input` in a focused beam
   */
  edgeDensity(
    scenario: number,
    distanceM: number,
    radiusM: number,
    [px, py]: readonly [x: number, y: number],
  ): EdgeDensity {
    if (this.task.light.beam !== undefined) {
      const expected = 'beam: flat, for rough edges are not read in a focused beam';
      throw inputError([{ key: 'light.beam', found: 'a focused beam', expected }]);
    }
    const flight = this.#flight(radiusM, distanceM);
    const table = this.#shelf.tables(distanceM, radiusM + Math.hypot(px, py) + farthest(flight))[scenario];
    const points = flight.map((along, i) => along + (i % 2 === 0 ? px : py));
    return tableDensity(table, points, this.scenarios[scenario].extinctionM2);
  }

  /**
   * Ratios reading/extinction of a shape at a few places along one radius, whatever breaks its symmetry: for linear programs.
   *
   * @param radiusM radius of the outline whose sampling is wanted, at least the shape's own
   */
  shapeRatios(shape: Shape, distanceM: number, radiusM: number): Float64Array {
    const elements = this.#shapeNodes(shape, distanceM);
    const { offsetM } = this.task.placement;
    const perMetre = 2 * this.kappa(distanceM) * radiusM;
    const positions = samplePositions(offsetM, perMetre, this.#fineness.spacing, shape, MASK_PLACES);
    return flatten(this.#ratios(elements, radiusM, distanceM, positions, this.#depths()));
  }

  #shapeNodes(shape: Shape, distanceM: number): ElementNodes[] {
    const density = this.#density(distanceM);
    return shape.elements.map(({ weight, loops }) =>
      withArea(weight, boundaryNodes(loops, density, this.#rules)),
    );
  }

  #outlineNodes(elements: readonly OutlineElement[], distanceM: number): ElementNodes[] {
    const density = this.#density(distanceM);
    return elements.map(({ weight, rings }) => withArea(weight, ringNodes(rings, density, this.#rules)));
  }

  #density(distanceM: number): NodeDensity {
    const { placement, light } = this.task;
    const lines = linesOf(light).map(({ wavelengthM }) => wavelengthM);
    const shortest = (Math.min(...lines) - light.driftM) / light.wavelengthM;
    const places = [-placement.depthM, 0, placement.depthM].map((placeM) => this.#fringes(distanceM, placeM));
    const magnification = Math.max(...places.map((fringes) => fringes.magnification));
    return {
      kappa: Math.max(...places.map(({ kappa }) => kappa)) / shortest,
      offsetM: magnification * (placement.offsetM + (placement.crossing?.spanM ?? 0) / 2),
      perRadian: this.#fineness.perRadian,
      least: 6,
    };
  }

  #positions(radiusM: number, distanceM: number, symmetry: Symmetry): Float64Array {
    const { placement, light } = this.task;
    // A field's angle or a flight's heading breaks the outline's symmetry.
    const kept = light.polarizationRad === null && placement.crossing === null ? symmetry : NO_SYMMETRY;
    return samplePositions(
      placement.offsetM,
      this.#phasePerMetre(radiusM, distanceM),
      this.#fineness.spacing,
      kept,
      this.#fineness.most,
    );
  }

  #flight(radiusM: number, distanceM: number): Float64Array {
    return flightPoints(this.task.placement.crossing, this.#phasePerMetre(radiusM, distanceM));
  }

  #depths(): number[] {
    const { depthM } = this.task.placement;
    const count = this.#fineness.depths;
    if (depthM === 0) return [0];
    const others = Array.from({ length: count }, (_, i) => depthM * ((2 * i) / (count - 1) - 1));
    return [0, ...others.filter((depth) => depth !== 0)];
  }

  #ratios(
    elements: readonly ElementNodes[],
    radiusM: number,
    distanceM: number,
    positions: Float64Array,
    depths: readonly number[],
    flight = flightRule(this.task.placement.crossing, this.#phasePerMetre(radiusM, distanceM), this.#rules),
  ): Float64Array[] {
    const offsetM = farthest(positions) + farthest(flight.points);
    const count = positions.length / 2;
    const ratios = this.scenarios.map(() => new Float64Array(count * depths.length));
    depths.forEach((depth, d) => {
      const readers = this.#readers(distanceM, depth, radiusM, offsetM);
      for (let s = 0; s < ratios.length; s++) {
        const read = readers[s];
        const { extinctionM2 } = this.scenarios[s];
        for (let p = 0; p < count; p++) {
          let reading = 0;
          for (let f = 0; f < flight.weights.length; f++) {
            const x = positions[2 * p] + flight.points[2 * f];
            const y = positions[2 * p + 1] + flight.points[2 * f + 1];
            for (const { weight, nodes } of elements)
              reading += flight.weights[f] * weight * read(nodes, x, y);
          }
          ratios[s][d * count + p] = reading / extinctionM2;
        }
      }
    });
    return ratios;
  }

  /** One a scenario, for particles up to `offsetM` off the axis. */
  #readers(distanceM: number, placeM: number, radiusM: number, offsetM: number): Reader[] {
    const { beam } = this.task.light;
    if (beam === undefined || this.#beamShelf === null) {
      const flat = this.#shelf.tables(distanceM - placeM, radiusM + offsetM);
      return flat.map((table) => (nodes, x, y) => boundaryReading(table, nodes, x, y));
    }
    return this.#beamShelf.tables(distanceM, placeM, radiusM, offsetM).map((table) => {
      const axial = axialIrradiance(beam, table.path.wavenumber, placeM);
      return (nodes, x, y) => axial * beamReading(table, nodes, x, y);
    });
  }

  /** Elements with the areas that would collect as much power in a flat wave. */
  #lit(elements: readonly ElementNodes[], distanceM: number): readonly ElementArea[] {
    const { beam } = this.task.light;
    if (beam === undefined) return elements;
    return elements.map(({ weight, nodes }) => ({
      weight,
      areaM2: litArea(beam, this.#wavenumber(), distanceM, nodes),
    }));
  }

  #score(
    elements: readonly ElementNodes[],
    radiusM: number,
    distanceM: number,
    symmetry: Symmetry,
  ): Judgement {
    const { target, detector, light } = this.task;
    const positions = this.#positions(radiusM, distanceM, symmetry);
    const rows = this.#ratios(elements, radiusM, distanceM, positions, this.#depths());
    const ratios = flatten(rows);
    const { gain, worst, rms } = correctionOf(ratios, target.gain);
    if (!Number.isFinite(worst)) {
      throw new RimwrightError(
        'machine',
        `a score is not finite: outline of radius ${radiusM} m at ${distanceM} m`,
      );
    }
    const population = populationCorrection(this.#populations, rows, gain);
    const electronics = { ...detector, ...light };
    const extinctionM2 = this.#leastExtinctionM2;
    const lit = this.#lit(elements, distanceM);
    const scores: Scores = {
      gain,
      correction: { worst, rms, ...(population !== null && { population }) },
      lobe: { ratio: lobeRatio(radiusM, distanceM, this.wavelengthM, this.#largestDiameterM) },
      snr: {
        required: requiredSnr(lit, target.correction, gain, extinctionM2),
        time_s: measurementTime(lit, target.correction, gain, extinctionM2, electronics),
      },
      area_m2: elements.reduce((sum, { areaM2 }) => sum + areaM2, 0),
      radius_m: radiusM,
      areaOverFloor: areaOverFloor(elements, gain, this.wavelengthM, distanceM),
    };
    return { scores, ratios };
  }
}

/** Outlines are judged up to this many times the brief's largest radius: how far beyond is what leads a search back. */
export const BEYOND_RADIUS = 1.4;

/** Places along one radius: enough for a mask that a search only begins with, and few enough for its linear program. */
const MASK_PLACES: MostPlaces = { circles: 6, steps: 1 };

const NO_SYMMETRY: Symmetry = { folds: 1, mirror: false };

/** Solves the particles of a task for the widest cone and the largest phase that its limits allow. */
function scenariosOf(task: Task, drifts: number): Scenario[] {
  const { light, medium, particles, detector } = task;
  const tangent = Math.tan(light.sourceAngleRad ?? 0);
  // η = κρ² with the source's disc of places, z tan a, added to ρ.
  const phases = reachesOf(task).map(
    ({ distanceM, kappa, shadowM }) => kappa * (detector.radiusM[1] + shadowM + distanceM * tangent) ** 2,
  );
  const wavelengths = driftedWavelengths(light, drifts);
  return buildScenarios(light, medium, particles, wavelengths, coneHalfAngle(task), Math.max(...phases));
}

/** Half-angle of the cone in which light may fall on a detector, radians: how far amplitudes are asked for. */
export function coneHalfAngle(task: Task): number {
  const { light, placement, detector, particles } = task;
  const spreadM = Math.max(...particles.map(({ diameterM }) => spreadOf(placement, diameterM)));
  const tangents = reachesOf(task).map(({ distanceM, shadowM }) => {
    // A search tries outlines beyond the allowed radius, tables are built with some room to grow (TableShelf), and the
    // spread reaches 7.5 σ beyond them.
    const farthestM = BEYOND_RADIUS * detector.radiusM[1] + shadowM;
    return (1.35 * farthestM + 7.5 * spreadM) / distanceM;
  });
  return Math.min(1.5, Math.atan(Math.max(...tangents) + Math.tan(light.sourceAngleRad ?? 0)) + 1e-3);
}

function withArea(weight: number, nodes: Float64Array): ElementNodes {
  return { weight, nodes, areaM2: nodesArea(nodes) };
}

function farthest(positions: Float64Array): number {
  let squared = 0;
  for (let i = 0; i < positions.length; i += 2)
    squared = Math.max(squared, positions[i] ** 2 + positions[i + 1] ** 2);
  return Math.sqrt(squared);
}

function flatten(rows: readonly Float64Array[]): Float64Array {
  const out = new Float64Array(rows.reduce((sum, { length }) => sum + length, 0));
  let at = 0;
  for (const row of rows) {
    out.set(row, at);
    at += row.length;
  }
  return out;
}
