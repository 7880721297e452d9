import { LegendreRules } from '../numeric/gaussLegendre.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import { wavelengthRange } from '../optics/light.ts';
import type { Particle } from '../optics/particle.ts';
import { isTabled } from '../optics/particle.ts';
import { shiftedIndex } from '../optics/shiftedIndex.ts';
import { ringNodes } from '../outline/ringNodes.ts';
import { builtOutline, flatStretch } from '../reading/builtOutline.ts';
import type { FlightMeans } from '../reading/flightMeans.ts';
import { fringesAt } from '../reading/fringes.ts';
import { Readers } from '../reading/readers.ts';
import type { Scenario } from '../reading/scenario.ts';
import { spreadOf } from '../reading/spreadOf.ts';
import type { BuildPlan } from './buildPlan.ts';
import { BUILD_FINENESS, readingCount } from './buildPlan.ts';
import { elementNodes, nearestPlane, planesOf, weightedNodes } from './elementNodes.ts';
import { NO_SYMMETRY, Sampling } from './sampling.ts';
import type { ScenarioSolver } from './taskScenarios.ts';
import { scenarioSolver } from './taskScenarios.ts';
import { DEVIATIONS } from './tolerances.ts';

/** Solved particles with their tables, for builds that differ in the mask alone. */
interface Optics {
  key: string;
  scenarios: readonly Scenario[];
  readers: Readers;
}

/** Reads builds of a design in full: each is drawn, its particles are solved and its tables made anew. */
export class BuildReader {
  readonly #plan: BuildPlan;
  readonly #solve: ScenarioSolver;
  readonly #rules = new LegendreRules();
  readonly #sampling: Sampling;
  readonly #flights: FlightMeans;
  readonly #wavenumber: number;
  /** Farthest from the axis that an outline may reach, metres. */
  readonly #radiusM: number;
  #optics: Optics | null = null;

  constructor(plan: BuildPlan) {
    const { task, distanceM, radiusM, places, farthest } = plan;
    const { light, medium, detector } = task;
    this.#plan = plan;
    this.#wavenumber = (2 * Math.PI * refractiveIndex(medium, light.wavelengthM)[0]) / light.wavelengthM;
    // Sharp corners move by up to √10 of the shift (see `mitre`).
    this.#radiusM = radiusM + Math.sqrt(10) * farthest.shiftM + Math.hypot(farthest.xM, farthest.yM);
    const distances = [distanceM, ...plan.elements.flatMap((element) => element.distanceM ?? [])];
    const around = {
      ...task,
      particles: plan.lights.map(({ particle }) => resized(particle, -farthest.size)),
      detector: {
        ...detector,
        distanceM: [
          Math.min(...distances) - farthest.distanceM,
          Math.max(...distances) + farthest.distanceM,
        ] as [number, number],
        radiusM: [this.#radiusM, this.#radiusM] as [number, number],
      },
    };
    this.#solve = scenarioSolver(around);
    this.#sampling = new Sampling(around, BUILD_FINENESS, this.#wavenumber, this.#rules);
    this.#flights = this.#sampling.flights(
      places,
      radiusM,
      nearestPlane(plan.elements, distanceM),
      NO_SYMMETRY,
    );
  }

  /**
   * Writes a build's ratios reading/extinction: light by light, and in each depth by depth, place by place.
   *
   * @param deviations nine numbers, as `DEVIATIONS`
   * @param out as long as `readingCount` says
   */
  read(deviations: Float64Array, out: Float64Array): void {
    const { depthsM, elements, task, distanceM: nominalM } = this.#plan;
    const [shiftM, xM, yM, away, tiltXRad, tiltYRad] = deviations;
    const distanceM = nominalM + away;
    const optics = this.#opticsOf(deviations);
    const error = { shiftM, xM, yM, tiltXRad, tiltYRad };
    const built = elements.map((element) => {
      const ownM = (element.distanceM ?? nominalM) + away;
      const one = { ...builtOutline(element, error, this.#stretch(ownM)), distanceM: ownM };
      return elementNodes(one, ringNodes(one.rings, this.#sampling.density(ownM), this.#rules));
    });
    const planes = planesOf(built, distanceM).map((plane) => ({
      distanceM: plane.distanceM,
      nodes: weightedNodes(plane.elements),
    }));
    const { count, farthestM } = this.#flights;
    const offsetM = Math.max(farthestM, task.placement.offsetM);
    depthsM.forEach((depthM, d) => {
      const readers = planes.map((plane) =>
        optics.readers.at(plane.distanceM, depthM, this.#radiusM, offsetM),
      );
      optics.scenarios.forEach(({ extinctionM2 }, s) => {
        const from = (s * depthsM.length + d) * count;
        const row = out.subarray(from, from + count);
        const read = (x: number, y: number) =>
          planes.reduce((sum, { nodes }, p) => sum + readers[p][s](nodes, x, y), 0);
        this.#flights.means((x, y) => read(x, y) / extinctionM2, row);
      });
    });
  }

  /** Extinction of every light's particle in a build without deviations, m². */
  extinctionsM2(): number[] {
    return this.#opticsOf(new Float64Array(DEVIATIONS.length)).scenarios.map(
      ({ extinctionM2 }) => extinctionM2,
    );
  }

  #opticsOf([, , , distance, , , wavelength, index, size]: Float64Array): Optics {
    const key = `${distance} ${wavelength} ${index} ${size}`;
    if (this.#optics?.key === key) return this.#optics;
    const { task, lights, fields, farthest } = this.#plan;
    const [leastM, mostM] = wavelengthRange(task.light);
    const within = [leastM - farthest.wavelengthM, mostM + farthest.wavelengthM] as const;
    const scenarios = lights.flatMap(({ particle, wavelengthM }) => {
      const other = withIndex(resized(particle, size), index, within);
      const solved = this.#solve([other], [wavelengthM + wavelength]);
      return solved.map((one) => ({ ...one, tiltsAsPlaces: BUILD_FINENESS.tiltsAsPlaces }));
    });
    const spreadsM = scenarios.map(({ particle }) => spreadOf(task.placement, particle.diameterM));
    const readers = new Readers(scenarios, { spreadsM, beam: task.light.beam, fields });
    this.#optics = { key, scenarios, readers };
    return this.#optics;
  }

  #stretch(distanceM: number): (rho2: number, behindM: number) => number {
    const { beam } = this.#plan.task.light;
    if (beam === undefined) return flatStretch(distanceM);
    const { kappa } = fringesAt(beam, this.#wavenumber, distanceM, 0);
    return (_, behindM) => Math.sqrt(fringesAt(beam, this.#wavenumber, distanceM + behindM, 0).kappa / kappa);
  }
}

/** Whole particles grow: a core keeps its share. Those given by amplitudes are what they are. */
function resized(particle: Particle, size: number): Particle {
  return isTabled(particle) ? particle : { ...particle, diameterM: particle.diameterM * (1 + size) };
}

function withIndex(particle: Particle, shift: number, within: readonly [number, number]): Particle {
  if (isTabled(particle) || shift === 0) return particle;
  const { core } = particle;
  return {
    ...particle,
    index: shiftedIndex(particle.index, shift, within),
    ...(core && { core: { ...core, index: shiftedIndex(core.index, shift, within) } }),
  };
}

/** Room for the readings of one build. */
export function readingsOf(plan: BuildPlan): Float64Array {
  return new Float64Array(readingCount(plan));
}
