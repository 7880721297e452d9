import { orientation } from '../outline/orientation.ts';

/**
 * Whether a straight line from vertex `i` of a ring to the point (x, y) begins inside: between the edges that meet there. For rings
 * whose inside is on the left (O'Rourke, Computational Geometry in C, 1998, section 1.5).
 */
export function startsInside(ring: Float64Array, i: number, x: number, y: number): boolean {
  const n = ring.length;
  const [px, py] = [ring[(i + n - 2) % n], ring[(i + n - 1) % n]];
  const [cx, cy] = [ring[i], ring[i + 1]];
  const [nx, ny] = [ring[(i + 2) % n], ring[(i + 3) % n]];
  if (orientation(cx, cy, nx, ny, px, py) >= 0) {
    return orientation(cx, cy, x, y, px, py) > 0 && orientation(x, y, cx, cy, nx, ny) > 0;
  }
  return !(orientation(cx, cy, x, y, nx, ny) >= 0 && orientation(x, y, cx, cy, px, py) >= 0);
}

/** Whether a straight line between two vertices meets no edge of a ring but at those vertices. */
export function isFree(ax: number, ay: number, bx: number, by: number, ring: Float64Array): boolean {
  const [left, right] = [Math.min(ax, bx), Math.max(ax, bx)];
  const [bottom, top] = [Math.min(ay, by), Math.max(ay, by)];
  const n = ring.length;
  for (let i = 0, j = n - 2; i < n; j = i, i += 2) {
    const [cx, cy, dx, dy] = [ring[j], ring[j + 1], ring[i], ring[i + 1]];
    if (Math.max(cx, dx) < left || Math.min(cx, dx) > right) continue;
    if (Math.max(cy, dy) < bottom || Math.min(cy, dy) > top) continue;
    if (meets(ax, ay, bx, by, cx, cy, dx, dy)) return false;
  }
  return true;
}

/** Whether two edges have a point in common, other than an end of both. */
function meets(
  ax: number,
  ay: number,
  bx: number,
  by: number,
  cx: number,
  cy: number,
  dx: number,
  dy: number,
): boolean {
  const sideC = orientation(ax, ay, bx, by, cx, cy);
  const sideD = orientation(ax, ay, bx, by, dx, dy);
  if (sideC * sideD > 0) return false;
  const sharesC = (cx === ax && cy === ay) || (cx === bx && cy === by);
  const sharesD = (dx === ax && dy === ay) || (dx === bx && dy === by);
  if (sharesC || sharesD) {
    // With an end in common, edges meet elsewhere only where one runs along the other.
    if (sideC !== 0 || sideD !== 0) return false;
    const [sx, sy, ox, oy] = sharesC ? [cx, cy, dx, dy] : [dx, dy, cx, cy];
    const [tx, ty] = sx === ax && sy === ay ? [bx, by] : [ax, ay];
    return (ox - sx) * (tx - sx) + (oy - sy) * (ty - sy) > 0;
  }
  const sideA = orientation(cx, cy, dx, dy, ax, ay);
  const sideB = orientation(cx, cy, dx, dy, bx, by);
  return sideA * sideB <= 0;
}
