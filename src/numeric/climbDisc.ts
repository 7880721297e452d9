/** A place in the plane and the value there. */
export interface PlanePoint {
  x: number;
  y: number;
  value: number;
}

/**
 * Climbs to a local maximum of a function on a disc about the origin by a compass search (Kolda, Lewis & Torczon 2003): steps
 * along the radius and across it, halved where none of them leads uphill. What would leave the disc is set on its rim.
 *
 * @param start inside the disc; the result is never lower
 * @param step first step, and `least` the last
 */
export function climbDisc(
  f: (x: number, y: number) => number,
  start: PlanePoint,
  radius: number,
  step: number,
  least: number,
): PlanePoint {
  let best = start;
  for (let stride = Math.min(step, radius); stride >= least; stride /= 2) {
    let climbs = true;
    while (climbs) {
      climbs = false;
      const r = Math.hypot(best.x, best.y);
      const [u, v] = r > 0 ? [best.x / r, best.y / r] : [1, 0];
      for (const [along, across] of COMPASS) {
        const x = best.x + stride * (along * u - across * v);
        const y = best.y + stride * (along * v + across * u);
        const fit = Math.min(1, radius / Math.hypot(x, y));
        // A step out of the rim would end where it began.
        if (fit < 1 && across === 0 && r >= radius * (1 - 1e-12)) continue;
        const value = f(x * fit, y * fit);
        if (value > best.value) {
          best = { x: x * fit, y: y * fit, value };
          climbs = true;
          break;
        }
      }
    }
  }
  return best;
}

const COMPASS = [
  [1, 0],
  [-1, 0],
  [0, 1],
  [0, -1],
] as const;
