import type { FlightMeans } from '../reading/flightMeans.ts';
import type { Readers } from '../reading/readers.ts';
import type { Scenario } from '../reading/scenario.ts';
import type { ElementNodes } from './elementNodes.ts';
import { factorOf, planesOf } from './elementNodes.ts';

/** What is read. */
interface Elements {
  elements: readonly ElementNodes[];
  /** Of the circle around them, metres. */
  radiusM: number;
  distanceM: number;
}

/**
 * Ratios reading/extinction of the weighted sum of elements, plane by plane.
 *
 * @param depths places of the particle along the beam, metres
 * @returns a row for each scenario: flight by flight, depth after depth
 */
export function elementRatios(
  scenarios: readonly Scenario[],
  readersOf: Readers,
  { elements, radiusM, distanceM }: Elements,
  flights: FlightMeans,
  depths: readonly number[],
): Float64Array[] {
  const { count, farthestM } = flights;
  const ratios = scenarios.map(() => new Float64Array(count * depths.length));
  const further = new Float64Array(count);
  depths.forEach((depth, d) => {
    planesOf(elements, distanceM).forEach((plane, p) => {
      const readers = readersOf.at(plane.distanceM, depth, radiusM, farthestM);
      for (let s = 0; s < ratios.length; s++) {
        const read = readers[s];
        const row = ratios[s].subarray(d * count, (d + 1) * count);
        const out = p === 0 ? row : further;
        flights.means((x, y) => {
          let reading = 0;
          for (const element of plane.elements) reading += factorOf(element) * read(element.nodes, x, y);
          return reading;
        }, out);
        if (p > 0) for (let i = 0; i < count; i++) row[i] += further[i];
      }
    });
  });
  ratios.forEach((row, s) => {
    for (let i = 0; i < row.length; i++) row[i] /= scenarios[s].extinctionM2;
  });
  return ratios;
}
