import type { FlightRule } from './positions.ts';

/** The reading of one place, metres. */
export type ReadPlace = (x: number, y: number) => number;

/** Means of readings over flights through several middles: how to read, once for every table. */
export interface FlightMeans {
  /** How many middles there are. */
  count: number;
  /** Farthest place from the axis that is read, metres. */
  farthestM: number;
  /** Writes the mean over each flight into `out`, `count` numbers. */
  means(read: ReadPlace, out: Float64Array): void;
}

/**
 * Reads every flight at its own points. `FlightGrid` gives the same means from fewer readings where flights lie close together.
 *
 * @param middles flat [x0, y0, …], metres
 */
export function plainFlights(middles: Float64Array, { points, weights }: FlightRule): FlightMeans {
  return {
    count: middles.length / 2,
    farthestM: farthest(middles) + farthest(points),
    means(read, out) {
      for (let p = 0; p < out.length; p++) {
        let mean = 0;
        for (let f = 0; f < weights.length; f++) {
          mean += weights[f] * read(middles[2 * p] + points[2 * f], middles[2 * p + 1] + points[2 * f + 1]);
        }
        out[p] = mean;
      }
    },
  };
}

/** Largest distance of flat [x0, y0, …] from the axis. */
export function farthest(places: Float64Array): number {
  let squared = 0;
  for (let i = 0; i < places.length; i += 2) squared = Math.max(squared, places[i] ** 2 + places[i + 1] ** 2);
  return Math.sqrt(squared);
}
