import type { FlightMeans } from '../reading/flightMeans.ts';
import type { View } from './conditionReader.ts';
import type { Condition } from './conditions.ts';

/** The elements of a design in one plane, and how far its tables reach. */
interface ScenePlane {
  nodes: Float64Array;
  view: View;
}

/** One design as the search for its worst cases looks at it. */
export interface Scene {
  /** All elements of each plane as one list (see `weightedNodes`). */
  planes: readonly ScenePlane[];
  /** Places that stand for all: flat [x0, y0, …], metres; and the flights through them. */
  places: Float64Array;
  flights: FlightMeans;
  flightsOf: (middles: Float64Array) => FlightMeans;
  phasePerMetre: number;
  /** Corrections of flights, or of places where the particle stays, under one condition. */
  corrections: (condition: Condition, flights: FlightMeans) => Float64Array;
}

/** One place under one condition, where `sign` times the correction is large. */
export interface Case {
  condition: Condition;
  /** Metres. */
  x: number;
  y: number;
  sign: 1 | -1;
  /** sign · correction */
  value: number;
}

/** Of places under one condition the one where `sign` times the correction is largest. */
export function largestOf(
  condition: Condition,
  places: Float64Array,
  corrections: Float64Array,
  sign: 1 | -1,
): Case {
  let worst = 0;
  for (let p = 1; p < corrections.length; p++) {
    if (sign * corrections[p] > sign * corrections[worst]) worst = p;
  }
  const [x, y] = places.subarray(2 * worst);
  return { condition, x, y, sign, value: sign * corrections[worst] };
}
