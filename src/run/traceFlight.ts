import { inputError } from '../base/errors.ts';
import type { OutlineElement } from '../outline/shape.ts';
import type { Judge } from '../score/judge.ts';
import { csvText } from './csvText.ts';

/** Rows of one file: more are of no use to anybody. */
const MOST_ROWS = 500_000;

const HEADER = [
  'particle_um',
  'material',
  'wavelength_nm',
  'offset_x_um',
  'offset_y_um',
  'along_um',
  'x_um',
  'y_um',
  'extinction_um2',
  'reading_um2',
  'correction',
];

/**
 * The reading along the particle's flight as CSV: particle by particle, for each its wavelengths, for each the flights, for
 * each its points in the order of time. The mean over a flight is what the flight reads.
 *
 * Columns: the flight's middle (`offset`), the place along the flight from its middle (`along`), the particle's place, and
 * what the outline reads there at the nominal depth.
 *
 * @param positions middles of the flights, flat [x0, y0, …], metres; without it the places that scores are taken over
 * @throws RimwrightError `input` for a brief without a crossing, or more than 500 000 rows
 */
export function traceFlight(
  judge: Judge,
  elements: readonly OutlineElement[],
  distanceM: number,
  positions?: Float64Array,
): string {
  const { crossing } = judge.task.placement;
  if (crossing === null) {
    const expected = 'a brief with placement.crossing, or a reading without --trace';
    throw inputError([{ key: '--trace', found: 'a brief whose particles do not fly', expected }]);
  }
  const flights = judge.outlineFlights(elements, distanceM, positions);
  const { flight } = flights;
  const points = flight.length / 2;
  const total = flights.ratios.reduce((sum, { length }) => sum + length, 0);
  if (total > MOST_ROWS) {
    const expected = `at most ${MOST_ROWS}: ask for one place with --position`;
    throw inputError([{ key: '--trace', found: `${total} rows`, expected }]);
  }
  const [cos, sin] = [Math.cos(crossing.headingRad), Math.sin(crossing.headingRad)];
  const rows = flights.ratios.flatMap((row, s) => {
    const { particle, wavelengthM, extinctionM2 } = judge.scenarios[s];
    return Array.from(row, (ratio, i) => {
      const [p, f] = [Math.floor(i / points), i % points];
      const [x, y] = [flights.positions[2 * p], flights.positions[2 * p + 1]];
      const [dx, dy] = [flight[2 * f], flight[2 * f + 1]];
      return [
        inUnits(particle.diameterM, 1e6),
        particle.material,
        inUnits(wavelengthM, 1e9),
        ...[x, y, dx * cos + dy * sin, x + dx, y + dy].map(inMicrometres),
        inUnits(extinctionM2, 1e12),
        inUnits(ratio * extinctionM2, 1e12),
        inUnits(ratio - 1, 1),
      ];
    });
  });
  return csvText([HEADER, ...rows]);
}

/** Places to a picometre. */
function inMicrometres(metres: number): number {
  return Math.round(metres * 1e12) / 1e6 + 0;
}

/** Ten digits: well below a reading's own error. */
function inUnits(value: number, perUnit: number): number {
  return Number((value * perUnit).toPrecision(10));
}
