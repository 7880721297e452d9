import type { Problem } from '../base/errors.ts';
import { inputError } from '../base/errors.ts';
import type { Curve, Point } from './files/curve.ts';
import { straight } from './files/curve.ts';
import { outlineOf } from './files/drawnOutline.ts';
import type { DrawnElement, DrawnPath } from './files/drawnPath.ts';
import { LARGEST_M, MOST_VERTICES, quoted } from './files/drawnPath.ts';
import type { OutlineElement } from './shape.ts';

const HEADERS = ['x_mm,y_mm,ring', 'x_mm,y_mm,ring,element,weight'];
const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;
const COUNT = /^[1-9]\d{0,5}$/;
const MAX_LISTED = 10;

/** A line of the file. */
interface Row {
  point: Point;
  ring: number;
  element: number;
  weight: number;
  line: number;
}

/** Whether a CSV has the columns of several rings. */
export function hasRingColumn(text: string): boolean {
  return headerOf(text).startsWith('x_mm,y_mm,ring');
}

function headerOf(text: string): string {
  return (/^\uFEFF?([^\r\n]*)/.exec(text)?.[1] ?? '').replace(/\s/g, '');
}

/**
 * Reads an outline of several rings from CSV: the header `x_mm,y_mm,ring`, or `x_mm,y_mm,ring,element,weight` for several elements, then a
 * point a line. The lines of a ring, closed, its last point not repeated, stand together and have its number; rings within others of
 * the same element are holes.
 *
 * @throws RimwrightError `input`: other headers, lines that are not such numbers (the first ten are listed), a ring that goes on later
 *   or has two elements, an element of two weights, and what `outlineOf` refuses
 */
export function readRingsCsv(text: string, file: string): OutlineElement[] {
  const columns = HEADERS.indexOf(headerOf(text)) + 1;
  if (columns === 0) {
    const expected = `the header ${HEADERS.join(', or ')}`;
    throw inputError([{ file, line: 1, found: quoted(text.split(/[\r\n]/, 1)[0]), expected }]);
  }
  const rows = readRows(text, columns === 1 ? 3 : 5, file);
  const rings: Row[][] = [];
  for (const row of rows) {
    const last = rings[rings.length - 1];
    if (last?.[0].ring === row.ring) last.push(row);
    else rings.push([row]);
  }
  refuseMixed(rings, file);
  const numbers = [...new Set(rings.map(([{ element }]) => element))].sort((a, b) => a - b);
  const elements = numbers.map((number): DrawnElement => {
    const own = rings.filter(([{ element }]) => element === number);
    return { weight: own[0][0].weight, loops: own.map(pathOf) };
  });
  return outlineOf(elements, file);
}

function readRows(text: string, fieldCount: 3 | 5, file: string): Row[] {
  const lines = text.split(/\r\n|\n|\r/);
  while (lines.length > 1 && lines[lines.length - 1].trim() === '') lines.pop();
  if (lines.length - 1 > MOST_VERTICES) {
    const found = `${lines.length - 1} points`;
    throw inputError([{ file, found, expected: `at most ${MOST_VERTICES} points` }]);
  }
  const rows: Row[] = [];
  const problems: Problem[] = [];
  for (let k = 1; k < lines.length && problems.length < MAX_LISTED; k++) {
    const fields = lines[k].split(',').map((field) => field.trim());
    const [x, y, weight = 1] = [fields[0], fields[1], fields[4]].map((field) =>
      field === undefined ? undefined : NUMBER.test(field) ? Number(field) : Number.NaN,
    ) as [number, number, number?];
    const [ring, element = '1'] = [fields[2] ?? '', fields[3]];
    const isSound = COUNT.test(ring) && COUNT.test(element) && Number.isFinite(weight) && weight !== 0;
    const point: Point = [x / 1000, y / 1000];
    if (fields.length !== fieldCount || !isSound || point.some(Number.isNaN)) {
      const expected =
        fieldCount === 3
          ? 'x, y and the number of the ring, such as 0.5,-0.25,1'
          : 'x, y, the numbers of ring and element, and a weight other than 0, such as 0.5,-0.25,1,1,-1';
      problems.push({ file, line: k + 1, found: quoted(lines[k]), expected });
    } else if (point.some((value) => Math.abs(value) > LARGEST_M)) {
      const expected = 'x and y between -1000 and 1000 mm';
      problems.push({ file, line: k + 1, found: quoted(lines[k]), expected });
    } else rows.push({ point, ring: Number(ring), element: Number(element), weight, line: k + 1 });
  }
  if (problems.length > 0) throw inputError(problems);
  return rows;
}

/** A ring stands in one place and in one element, and an element has one weight. */
function refuseMixed(rings: readonly (readonly Row[])[], file: string): void {
  const seen = new Set<number>();
  const weights = new Map<number, number>();
  for (const ring of rings) {
    const [{ ring: number, line, element, weight }] = ring;
    if (seen.has(number)) {
      const expected = 'the points of a ring in one place';
      throw inputError([{ file, line, found: `the ring ${number} again`, expected }]);
    }
    seen.add(number);
    const odd = ring.find((row) => row.element !== element);
    if (odd !== undefined) {
      const found = `the element ${odd.element} for a point of the ring ${number}`;
      throw inputError([{ file, line: odd.line, found, expected: `its element ${element}` }]);
    }
    const known = weights.get(element) ?? weight;
    const other = ring.find((row) => row.weight !== known);
    if (other !== undefined) {
      const found = `the weight ${other.weight} for the element ${element}`;
      throw inputError([{ file, line: other.line, found, expected: `its weight ${known}` }]);
    }
    weights.set(element, known);
  }
}

function pathOf(rows: readonly Row[]): DrawnPath {
  const curves = rows.map(({ point }, k): Curve => straight(point, rows[(k + 1) % rows.length].point));
  return { curves, place: { name: `the ring ${rows[0].ring}`, line: rows[0].line } };
}
