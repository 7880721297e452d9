import type { LegendreRules } from '../numeric/gaussLegendre.ts';

/** Points of a flight for each radian of phase along it, and beside them: a mean errs by less than 1e-6. */
const PER_RADIAN = 0.55;
const POINTS = 6;

/** Numbers of points come in steps of this many. */
const POINT_STEP = 4;

/** Points of one flight, the fewer the less phase runs along it as seen from a place of the plane. */
export class PlaneFlights {
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
