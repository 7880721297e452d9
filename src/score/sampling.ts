import type { LegendreRules } from '../numeric/gaussLegendre.ts';
import { linesOf } from '../optics/light.ts';
import type { NodeDensity } from '../outline/boundaryNodes.ts';
import { FlightGrid } from '../reading/flightGrid.ts';
import type { FlightMeans } from '../reading/flightMeans.ts';
import { plainFlights } from '../reading/flightMeans.ts';
import { flightMirrors, flightSymmetry } from '../reading/flightMirrors.ts';
import type { Fringes } from '../reading/fringes.ts';
import { fringesAt } from '../reading/fringes.ts';
import { farthestRead } from '../reading/placement.ts';
import type { FlightRule, Symmetry } from '../reading/positions.ts';
import { flightPoints, flightRule, samplePositions } from '../reading/positions.ts';
import type { Fineness } from './fineness.ts';
import type { Task } from './task.ts';

/** An outline without any symmetry that is known of. */
export const NO_SYMMETRY: Symmetry = { folds: 1, mirror: false };

/** Where and how densely a task is sampled: places of the particle, points of its flight, nodes of a boundary. */
export class Sampling {
  readonly #task: Task;
  readonly #fineness: Fineness;
  /** 1/m, in the medium. */
  readonly #wavenumber: number;
  readonly #rules: LegendreRules;

  constructor(task: Task, fineness: Fineness, wavenumber: number, rules: LegendreRules) {
    this.#task = task;
    this.#fineness = fineness;
    this.#wavenumber = wavenumber;
    this.#rules = rules;
  }

  /** What interference looks like at a distance, for a particle `placeM` towards the detector. */
  fringes(distanceM: number, placeM: number): Fringes {
    return fringesAt(this.#task.light.beam, this.#wavenumber, distanceM, placeM);
  }

  /** Phase that a step of the particle across the axis makes at the rim, rad/m. */
  phasePerMetre(radiusM: number, distanceM: number): number {
    const { kappa, magnification, fallPerM } = this.fringes(distanceM, 0);
    return Math.max(2 * kappa * magnification * radiusM, fallPerM);
  }

  /** How densely boundaries are sampled for every place, depth and line. */
  density(distanceM: number): NodeDensity {
    const { placement, light } = this.#task;
    const { beam, driftM } = light;
    const fringes = linesOf(light).flatMap(({ wavelengthM }) => {
      const wavenumber = (this.#wavenumber * light.wavelengthM) / (wavelengthM - driftM);
      return [-placement.depthM, 0, placement.depthM].map((placeM) =>
        fringesAt(beam, wavenumber, distanceM, placeM),
      );
    });
    const magnification = Math.max(...fringes.map((one) => one.magnification));
    // Tilted beams of a source move what is seen; a flat wave's table holds their mean.
    const shiftM = beam === undefined ? 0 : distanceM * Math.tan(light.sourceAngleRad ?? 0);
    return {
      kappa: Math.max(...fringes.map(({ kappa }) => kappa)),
      offsetM: magnification * farthestRead(placement) + shiftM,
      perRadian: this.#fineness.perRadian,
      least: 6,
    };
  }

  /** Places of the particle, the middles of its flights, for an outline of that radius: flat [x0, y0, …], metres. */
  positions(radiusM: number, distanceM: number, symmetry: Symmetry): Float64Array {
    const { placement, light } = this.#task;
    const { crossing } = placement;
    const isPolarised = light.polarizationRad !== null;
    // A field's angle or a flight's heading breaks the outline's symmetry.
    const still = isPolarised ? NO_SYMMETRY : symmetry;
    const kept =
      crossing === null
        ? still
        : flightSymmetry(flightMirrors(symmetry, crossing.headingRad, isPolarised), crossing.headingRad);
    return samplePositions(
      placement.offsetM,
      this.phasePerMetre(radiusM, distanceM),
      this.#fineness.spacing,
      kept,
      this.#fineness.most,
    );
  }

  /** Points of the flight at equal times, relative to its middle: flat, metres. */
  flight(radiusM: number, distanceM: number): Float64Array {
    return flightPoints(this.#task.placement.crossing, this.phasePerMetre(radiusM, distanceM));
  }

  /** Places along the beam, the nominal one first, metres. */
  depths(): number[] {
    const { depthM } = this.#task.placement;
    const count = this.#fineness.depths;
    if (depthM === 0) return [0];
    const others = Array.from({ length: count }, (_, i) => depthM * ((2 * i) / (count - 1) - 1));
    return [0, ...others.filter((depth) => depth !== 0)];
  }

  /** Points and weights of the flight, for its mean. */
  flightRule(radiusM: number, distanceM: number): FlightRule {
    const { placement } = this.#task;
    // Fringes pass a particle the faster, the farther it is from the far rim.
    const farthestM = radiusM + farthestRead(placement);
    return flightRule(placement.crossing, this.phasePerMetre(farthestM, distanceM), this.#rules);
  }

  /**
   * How flights with those middles are read: without a crossing each is one point.
   *
   * @param symmetry of the outline's boundary nodes: readings of mirror images are taken once
   */
  flights(middles: Float64Array, radiusM: number, distanceM: number, symmetry: Symmetry): FlightMeans {
    const { placement, light } = this.#task;
    const { crossing } = placement;
    const rule = this.flightRule(radiusM, distanceM);
    const plain = plainFlights(middles, rule);
    // In a focused beam readings end where the light does, which no polynomial follows.
    if (crossing === null || light.beam !== undefined) return plain;
    const mirrors = flightMirrors(symmetry, crossing.headingRad, light.polarizationRad !== null);
    const { kappa } = this.density(distanceM);
    const phasePerMetre = 2 * kappa * (radiusM + farthestRead(placement));
    const grid = new FlightGrid(middles, crossing, { phasePerMetre, mirrors, tail: this.#fineness.tail });
    return grid.readings < (middles.length / 2) * rule.weights.length ? grid : plain;
  }
}
