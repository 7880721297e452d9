import type { Problem } from '../base/errors.ts';
import { inputError } from '../base/errors.ts';
import type { SizeClass } from './sizeDistribution.ts';
import { countedSizes } from './sizeDistribution.ts';

const HEADER = 'diameter_um,count';
const NUMBER = /^(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;
/** Every diameter is solved and judged for itself. */
const MOST_ROWS = 50;
const MOST_LISTED = 10;
const LARGEST_COUNT = 1e30;
const DIAMETERS_UM = [1e-5, 1e6] as const;

/**
 * Reads counted sizes: the header `diameter_um,count`, then one diameter a line, ascending, with the number of particles that it
 * stands for (a count, or anything in proportion to one). A byte order mark, CR LF, spaces and empty last lines are let through.
 *
 * @param text the file's content
 * @param file its name, for messages
 * @throws RimwrightError `input`: lines that are not two numbers, diameters beyond 1e-5 to 1e6 µm or not ascending (the first ten
 *   are listed), no rows or more than 50, no count above 0
 */
export function readCountsCsv(text: string, file: string): SizeClass[] {
  const lines = text.replace(/^\uFEFF/, '').split(/\r\n|\n|\r/);
  while (lines.length > 1 && lines[lines.length - 1].trim() === '') lines.pop();
  if (lines[0].replace(/\s/g, '') !== HEADER) {
    throw inputError([{ file, line: 1, found: quote(lines[0]), expected: `the header ${HEADER}` }]);
  }
  const rows = lines.length - 1;
  if (rows < 1 || rows > MOST_ROWS) {
    throw inputError([{ file, found: `${rows} rows`, expected: `1 to ${MOST_ROWS} rows` }]);
  }
  const problems: Problem[] = [];
  const diametersM: number[] = [];
  const counts: number[] = [];
  let before = 0;
  lines.slice(1).forEach((given, row) => {
    const refuse = (found: string, expected: string) =>
      problems.push({ file, line: row + 2, found, expected });
    const fields = given.split(',').map((field) => field.trim());
    const [diameterUm, count] = fields.map((field) => (NUMBER.test(field) ? Number(field) : Number.NaN));
    if (fields.length !== 2 || !(count <= LARGEST_COUNT) || Number.isNaN(diameterUm)) {
      refuse(quote(given), 'two numbers such as 2.5,130, the count 0 or more');
    } else if (diameterUm < DIAMETERS_UM[0] || diameterUm > DIAMETERS_UM[1]) {
      refuse(`${diameterUm} um`, `a diameter from ${DIAMETERS_UM.join(' to ')} um`);
    } else if (diameterUm <= before) {
      refuse(`${diameterUm} um after ${before} um`, 'diameters that ascend');
    } else {
      before = diameterUm;
      diametersM.push(Number((diameterUm * 1e-6).toPrecision(15)));
      counts.push(count);
    }
  });
  if (problems.length > 0) throw inputError(problems.slice(0, MOST_LISTED));
  if (!counts.some((count) => count > 0)) {
    throw inputError([{ file, found: 'no count above 0', expected: 'at least one particle' }]);
  }
  return countedSizes(diametersM, counts);
}

function quote(line: string): string {
  return JSON.stringify(line.length > 60 ? `${line.slice(0, 60)}…` : line);
}
