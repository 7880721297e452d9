import type { Problem } from '../base/errors.ts';
import { inputError } from '../base/errors.ts';
import { findSelfCrossing } from './selfCrossing.ts';

const HEADER = 'x_mm,y_mm';
const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;
const MAX_POINTS = 100_000;
const MAX_MM = 1000;
const MAX_LISTED = 10;

/**
 * Reads an outline from CSV: the header `x_mm,y_mm`, then one point a line of one closed ring in either sense of
 * rotation, the last point not repeated. A byte order mark, CR LF, spaces and an empty last line are let through.
 *
 * @param text the file's content
 * @param file its name, for messages
 * @returns [x0, y0, x1, y1, …] in metres, 3 to 100 000 points, in the file's order
 * @throws RimwrightError `input`: lines that are not two numbers within ±1000 mm (the first ten are listed), a point
 *   given twice in a row or again at the end, too few or too many points, no area, a ring that crosses or touches itself
 */
export function readOutlineCsv(text: string, file: string): Float64Array {
  const lines = text.replace(/^\uFEFF/, '').split(/\r\n|\n|\r/);
  while (lines.length > 1 && lines[lines.length - 1].trim() === '') lines.pop();
  if (lines[0].replace(/\s/g, '') !== HEADER) {
    throw inputError([{ file, line: 1, found: quote(lines[0]), expected: `the header ${HEADER}` }]);
  }
  const count = lines.length - 1;
  if (count < 3 || count > MAX_POINTS) {
    throw inputError([{ file, found: `${count} points`, expected: `3 to ${MAX_POINTS} points` }]);
  }
  const points = readPoints(lines, file);
  refuseRepeats(points, file);
  refuseBadShape(points, file);
  return points;
}

/** Point k stands in line k + 2, after the header. */
const lineOfPoint = (k: number) => k + 2;

function readPoints(lines: readonly string[], file: string): Float64Array {
  const points = new Float64Array(2 * (lines.length - 1));
  const problems: Problem[] = [];
  for (let k = 0; k < lines.length - 1 && problems.length < MAX_LISTED; k++) {
    const fields = lines[k + 1].split(',').map((field) => field.trim());
    const valuesMm = fields.map((field) => (NUMBER.test(field) ? Number(field) : Number.NaN));
    const line = lineOfPoint(k);
    if (fields.length !== 2 || valuesMm.some(Number.isNaN)) {
      problems.push({ file, line, found: quote(lines[k + 1]), expected: 'two numbers such as 0.5,-0.25' });
    } else if (valuesMm.some((value) => Math.abs(value) > MAX_MM)) {
      const expected = `x and y between -${MAX_MM} and ${MAX_MM} mm`;
      problems.push({ file, line, found: quote(lines[k + 1]), expected });
    } else {
      points[2 * k] = valuesMm[0] / 1000;
      points[2 * k + 1] = valuesMm[1] / 1000;
    }
  }
  if (problems.length > 0) throw inputError(problems);
  return points;
}

function refuseRepeats(points: Float64Array, file: string): void {
  const count = points.length / 2;
  for (let k = 0; k < count; k++) {
    const next = (k + 1) % count;
    if (points[2 * k] !== points[2 * next] || points[2 * k + 1] !== points[2 * next + 1]) continue;
    const atEnd = next === 0;
    throw inputError([
      {
        file,
        line: lineOfPoint(atEnd ? k : next),
        found: atEnd ? 'the first point again at the end' : `the same point as in line ${lineOfPoint(k)}`,
        expected: atEnd ? 'a ring whose last point is not repeated' : 'each point once',
      },
    ]);
  }
}

function refuseBadShape(points: Float64Array, file: string): void {
  if (liesOnOneLine(points)) {
    throw inputError([{ file, found: 'points on one line', expected: 'an outline that encloses an area' }]);
  }
  const crossing = findSelfCrossing(points);
  if (crossing === null) return;
  const place = [crossing.x, crossing.y].map((metres) => Number((metres * 1000).toPrecision(6)));
  const [from, other] = [lineOfPoint(crossing.i), lineOfPoint(crossing.j)];
  throw inputError([
    {
      file,
      line: from,
      found: `the edge from line ${from} meeting the edge from line ${other} at x = ${place[0]} mm, y = ${place[1]} mm`,
      expected: 'an outline that does not cross or touch itself',
    },
  ]);
}

/** Whether no point lies farther from the line through point 0 and the point farthest from it than 1e-9 of its length. */
function liesOnOneLine(points: Float64Array): boolean {
  const [x0, y0] = points;
  let farX = 0;
  let farY = 0;
  for (let k = 2; k < points.length; k += 2) {
    const [dx, dy] = [points[k] - x0, points[k + 1] - y0];
    if (Math.hypot(dx, dy) > Math.hypot(farX, farY)) [farX, farY] = [dx, dy];
  }
  const widest = 1e-9 * (farX * farX + farY * farY);
  for (let k = 2; k < points.length; k += 2) {
    if (Math.abs(farX * (points[k + 1] - y0) - farY * (points[k] - x0)) > widest) return false;
  }
  return true;
}

function quote(line: string): string {
  return JSON.stringify(line.length > 60 ? `${line.slice(0, 60)}…` : line);
}
