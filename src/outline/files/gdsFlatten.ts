import { inputError } from '../../base/errors.ts';
import { MOST_VERTICES, refuseAt } from './drawnPath.ts';
import type { GdsBoundary, GdsCell, GdsLibrary, GdsReference } from './gdsCells.ts';
import { byteAt } from './gdsRecords.ts';
import type { Matrix } from './svgTransform.ts';
import { moved, multiply, SAME_PLACE } from './svgTransform.ts';

/** References that are followed, all levels together. */
const MOST_CELLS = 100_000;
/** Levels of cells within cells. */
const DEEPEST = 100;
/** Turned points are rounded to this part of a database unit, so that edges that belong together stay so. */
const ROUNDING = 1024;

/**
 * All polygons of the one cell that no other refers to, with those of the cells within it.
 *
 * @throws RimwrightError `input` where there is no such cell or more than one, for unknown cells, cells within themselves, and too many
 */
export function flattenGds({ cells }: GdsLibrary, file: string): { top: string; boundaries: GdsBoundary[] } {
  const top = topCell(cells, file);
  const boundaries: GdsBoundary[] = [];
  let vertices = 0;
  let visits = 0;
  const visit = (cell: GdsCell, matrix: Matrix, within: readonly string[]): void => {
    visits++;
    vertices += cell.boundaries.reduce((sum, { points }) => sum + points.length / 2, 0);
    if (visits > MOST_CELLS || vertices > MOST_VERTICES) {
      const what = visits > MOST_CELLS ? `${MOST_CELLS} cells` : `${MOST_VERTICES} points`;
      throw inputError([{ file, found: `more than ${what}`, expected: `at most ${what}` }]);
    }
    for (const boundary of cell.boundaries) boundaries.push(placed(boundary, matrix));
    for (const reference of cell.references) {
      const inner = cells.get(reference.cell);
      const name = JSON.stringify(reference.cell);
      if (inner === undefined) refuseAt(file, byteAt(reference.at), `the cell ${name}`, 'a cell of the file');
      if (within.length >= DEEPEST) {
        refuseAt(file, byteAt(reference.at), `the cell ${name} more than ${DEEPEST} deep`, 'cells less deep');
      }
      if (within.includes(reference.cell)) {
        refuseAt(file, byteAt(reference.at), `the cell ${name} within itself`, 'cells that end somewhere');
      }
      for (const place of placesOf(reference)) {
        visit(inner, multiply(matrix, place), [...within, reference.cell]);
      }
    }
  };
  visit(top, SAME_PLACE, [top.name]);
  return { top: top.name, boundaries };
}

function topCell(cells: ReadonlyMap<string, GdsCell>, file: string): GdsCell {
  const inner = new Set([...cells.values()].flatMap(({ references }) => references.map(({ cell }) => cell)));
  const tops = [...cells.values()].filter(
    ({ name, boundaries, references }) => !inner.has(name) && boundaries.length + references.length > 0,
  );
  if (tops.length === 1) return tops[0];
  const names = tops.slice(0, 10).map(({ name }) => JSON.stringify(name));
  const found = tops.length === 0 ? 'no cell with an outline' : `the cells ${names.join(', ')} side by side`;
  throw inputError([{ file, found, expected: 'one cell that no other refers to' }]);
}

function placed(boundary: GdsBoundary, matrix: Matrix): GdsBoundary {
  if (matrix === SAME_PLACE) return boundary;
  const points = new Float64Array(boundary.points.length);
  for (let i = 0; i < points.length; i += 2) {
    const [x, y] = moved(matrix, [boundary.points[i], boundary.points[i + 1]]);
    points[i] = Math.round(x * ROUNDING) / ROUNDING;
    points[i + 1] = Math.round(y * ROUNDING) / ROUNDING;
  }
  return { ...boundary, points };
}

function* placesOf({ points, columns, rows, isMirrored, scale, turnRad }: GdsReference): Generator<Matrix> {
  const [cos, sin] = [scale * Math.cos(turnRad), scale * Math.sin(turnRad)];
  const side = isMirrored ? -1 : 1;
  const [x, y, acrossX = x, acrossY = y, upX = x, upY = y] = points;
  for (let i = 0; i < columns; i++) {
    for (let j = 0; j < rows; j++) {
      const [right, up] = [i / columns, j / rows];
      const placeX = x + right * (acrossX - x) + up * (upX - x);
      const placeY = y + right * (acrossY - y) + up * (upY - y);
      yield [cos, sin, -side * sin, side * cos, placeX, placeY];
    }
  }
}
