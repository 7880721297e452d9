import type { Curve, Point } from './curve.ts';
import { backwards } from './curve.ts';
import type { DrawnPath } from './drawnPath.ts';
import { pointText, refuseAt } from './drawnPath.ts';

/** Ends nearer than this belong together, metres: drawings are written to a nanometre or worse. */
export const JOINT_M = 1e-8;
/** And in parts of the drawing's size, for drawings with few decimals. */
const JOINT_SHARE = 1e-6;

/** One end of a path. */
interface End {
  path: number;
  atStart: boolean;
  point: Point;
}

/**
 * Closed paths of a drawing: those that are closed as they are, and chains of others whose ends meet.
 *
 * @param sizeM largest distance of the drawing from its origin
 * @throws RimwrightError `input` where an end meets no other, or more than one
 */
export function joinPaths(paths: readonly DrawnPath[], sizeM: number, file: string): DrawnPath[] {
  const jointM = Math.max(JOINT_M, JOINT_SHARE * sizeM);
  const closed: DrawnPath[] = [];
  const open: DrawnPath[] = [];
  for (const path of paths) (isClosed(path.curves, jointM) ? closed : open).push(path);
  return [...closed, ...chains(open, jointM, file)];
}

function isClosed(curves: readonly Curve[], jointM: number): boolean {
  return distance(curves[0].from, curves[curves.length - 1].to) <= jointM;
}

function chains(paths: readonly DrawnPath[], jointM: number, file: string): DrawnPath[] {
  const partner = endPartners(paths, jointM, file);
  const used = new Set<number>();
  const loops: DrawnPath[] = [];
  for (let first = 0; first < paths.length; first++) {
    if (used.has(first)) continue;
    const curves: Curve[] = [];
    let path = first;
    let forwards = true;
    while (!used.has(path)) {
      used.add(path);
      const own = paths[path].curves;
      for (const curve of forwards ? own : own.map(backwards).reverse()) curves.push(curve);
      const next = partner({ path, atStart: !forwards });
      path = next.path;
      forwards = next.atStart;
    }
    loops.push({ curves, place: paths[first].place });
  }
  return loops;
}

/** For each end of a path the one other end that it meets. */
function endPartners(paths: readonly DrawnPath[], jointM: number, file: string) {
  const ends: End[] = paths.flatMap(({ curves }, path) => [
    { path, atStart: true, point: curves[0].from },
    { path, atStart: false, point: curves[curves.length - 1].to },
  ]);
  const cells = new Map<string, End[]>();
  const cellOf = (metres: number) => Math.floor(metres / (2 * jointM));
  for (const end of ends) {
    const key = `${cellOf(end.point[0])} ${cellOf(end.point[1])}`;
    const cell = cells.get(key);
    if (cell) cell.push(end);
    else cells.set(key, [end]);
  }
  const meeting = (end: End) => {
    const [column, row] = end.point.map(cellOf);
    const found: End[] = [];
    for (let i = -1; i <= 1; i++) {
      for (let j = -1; j <= 1; j++) {
        for (const other of cells.get(`${column + i} ${row + j}`) ?? []) {
          if (other !== end && distance(other.point, end.point) <= jointM) found.push(other);
        }
      }
    }
    return found;
  };
  const partners = ends.map((end) => {
    const found = meeting(end);
    if (found.length === 1) return found[0];
    const { place } = paths[end.path];
    const where = `of ${place.name} at ${pointText(end.point)}`;
    if (found.length === 0) {
      const expected = `another end there: outlines are closed, with gaps of at most ${gapText(jointM)}`;
      return refuseAt(file, place, `an open end ${where}`, expected);
    }
    const others = found.length === 2 ? 'two others' : `${found.length} others`;
    return refuseAt(file, place, `an end ${where} that meets ${others}`, 'one other end at each joint');
  });
  return ({ path, atStart }: Pick<End, 'path' | 'atStart'>) => partners[2 * path + (atStart ? 0 : 1)];
}

function gapText(metres: number): string {
  return `${Number((metres * 1e6).toPrecision(2))} µm`;
}

function distance(a: Point, b: Point): number {
  return Math.hypot(a[0] - b[0], a[1] - b[1]);
}
