import { ringArea } from '../area.ts';

interface Edge {
  fromX: number;
  fromY: number;
  toX: number;
  toY: number;
}

/**
 * The rings around polygons that share edges: where two edges run to and fro between the same points, there is no boundary. This undoes
 * keyholes, and joins the parts of a polygon that was cut along its diagonals.
 *
 * @param polygons flat [x0, y0, x1, y1, …], in either sense
 */
export function joinBoundaries(polygons: readonly Float64Array[]): Float64Array[] {
  const leaving = new Map<string, Edge[]>();
  for (const polygon of polygons) {
    for (const edge of edgesOf(polygon)) {
      const back = leaving.get(keyOf(edge.toX, edge.toY));
      const twin = back?.findIndex(({ toX, toY }) => toX === edge.fromX && toY === edge.fromY) ?? -1;
      if (back !== undefined && twin >= 0) {
        back.splice(twin, 1);
        continue;
      }
      const key = keyOf(edge.fromX, edge.fromY);
      const list = leaving.get(key);
      if (list) list.push(edge);
      else leaving.set(key, [edge]);
    }
  }
  const rings: Float64Array[] = [];
  for (const list of leaving.values()) {
    while (list.length > 0) rings.push(followRing(list.pop() as Edge, leaving));
  }
  return rings;
}

function keyOf(x: number, y: number): string {
  return `${x} ${y}`;
}

/** Edges with the inside on their left. */
function edgesOf(polygon: Float64Array): Edge[] {
  const n = polygon.length;
  const edges: Edge[] = [];
  const isLeft = ringArea(polygon) > 0;
  for (let i = 0; i < n; i += 2) {
    const next = (i + 2) % n;
    const [a, b] = isLeft ? [i, next] : [next, i];
    const edge = { fromX: polygon[a], fromY: polygon[a + 1], toX: polygon[b], toY: polygon[b + 1] };
    if (edge.fromX !== edge.toX || edge.fromY !== edge.toY) edges.push(edge);
  }
  return edges;
}

/** Follows edges back to the start, turning left as far as possible where several go on, and takes them off the list. */
function followRing(first: Edge, leaving: ReadonlyMap<string, Edge[]>): Float64Array {
  const points = [first.fromX, first.fromY];
  for (let edge = first; edge.toX !== first.fromX || edge.toY !== first.fromY; ) {
    points.push(edge.toX, edge.toY);
    const list = leaving.get(keyOf(edge.toX, edge.toY)) ?? [];
    const next = leftmost(edge, list);
    // As many edges arrive at a point as leave it, so there is always one.
    if (next === undefined) break;
    list.splice(list.indexOf(next), 1);
    edge = next;
  }
  return Float64Array.from(points);
}

function leftmost(edge: Edge, list: readonly Edge[]): Edge | undefined {
  if (list.length < 2) return list[0];
  const [dx, dy] = [edge.toX - edge.fromX, edge.toY - edge.fromY];
  const turn = ({ fromX, fromY, toX, toY }: Edge) => {
    const [ex, ey] = [toX - fromX, toY - fromY];
    return Math.atan2(dx * ey - dy * ex, dx * ex + dy * ey);
  };
  return list.reduce((best, one) => (turn(one) > turn(best) ? one : best));
}
