/** Points as a reader of a drawing gives them. */
export type Points = readonly { x: number; y: number }[];

/** The same points, from a flat ring of metres, in millimetres. */
export function ringInMm(ring: Float64Array): Points {
  return Array.from({ length: ring.length / 2 }, (_, k) => ({
    x: 1e3 * ring[2 * k],
    y: 1e3 * ring[2 * k + 1],
  }));
}

/** Signed area by trapezoids under the edges: another sum than the shoelace of the source. */
export function signedArea(points: Points): number {
  return points.reduce((sum, { x, y }, k) => {
    const next = points[(k + 1) % points.length];
    return sum + ((x - next.x) * (y + next.y)) / 2;
  }, 0);
}

/** [left, bottom, right, top] of all points. */
export function boundingBox(rings: readonly Points[]): number[] {
  const xs = rings.flatMap((points) => points.map(({ x }) => x));
  const ys = rings.flatMap((points) => points.map(({ y }) => y));
  return [Math.min(...xs), Math.min(...ys), Math.max(...xs), Math.max(...ys)];
}
