/** A place on a line and the value there. */
export interface LinePoint {
  at: number;
  value: number;
}

/** How a climb begins and when it has done enough. */
export interface ClimbOptions {
  /** First step, above 0. */
  step: number;
  /** Gain in value that another evaluation is worth. */
  tolerance: number;
  /** Most evaluations. */
  evaluations: number;
}

/** Share of the narrower side that a trial keeps away from the best point, so that brackets shrink. */
const APART = 0.1;

/**
 * Climbs to a local maximum of a smooth function on [low, high]: steps uphill, longer and longer, until the best point lies at an end or has
 * a lower one on either side; then to the vertex of the parabola through the three, until that promises no more.
 *
 * @param start between low and high, with its value; the result is never lower
 */
export function climbLine(
  f: (at: number) => number,
  start: LinePoint,
  [low, high]: readonly [number, number],
  { step, tolerance, evaluations }: ClimbOptions,
): LinePoint {
  let left = evaluations;
  const tryAt = (at: number): LinePoint => {
    left--;
    return { at, value: f(at) };
  };
  let best = start;
  let [below, above] = [best, best];
  if (best.at > low) below = tryAt(Math.max(low, best.at - step));
  if (best.at < high) above = tryAt(Math.min(high, best.at + step));
  while (left > 0 && Math.max(below.value, above.value) > best.value) {
    const stride = 2 * (above.at - below.at);
    if (above.value > below.value) {
      [below, best] = [best, above];
      if (best.at < high) above = tryAt(Math.min(high, best.at + stride));
    } else {
      [above, best] = [best, below];
      if (best.at > low) below = tryAt(Math.max(low, best.at - stride));
    }
  }
  while (left > 0 && below.at < best.at && best.at < above.at) {
    const { at, gain } = vertex(below, best, above);
    if (gain < tolerance) break;
    const trial = tryAt(at);
    const [lower, upper] = trial.at < best.at ? [trial, best] : [best, trial];
    if (trial.value > best.value) {
      [below, above] = trial === lower ? [below, best] : [best, above];
      best = trial;
    } else [below, above] = trial === lower ? [lower, above] : [below, upper];
  }
  return [below, above].reduce((most, point) => (point.value > most.value ? point : most), best);
}

/** Where the parabola through three points is highest, kept apart from the best of them, and what it gains there. */
function vertex(below: LinePoint, best: LinePoint, above: LinePoint): { at: number; gain: number } {
  const [p, q] = [best.at - below.at, above.at - best.at];
  const [fallP, fallQ] = [(best.value - below.value) / p, (best.value - above.value) / q];
  const bend = (fallP + fallQ) / (p + q);
  const slope = (fallP * q - fallQ * p) / (p + q);
  const away = slope / (2 * bend);
  const gain = (slope * away) / 2;
  const apart = APART * Math.min(p, q);
  if (bend === 0) return { at: best.at, gain: 0 };
  const at = best.at + Math.sign(away || 1) * Math.max(apart, Math.abs(away));
  return { at: Math.min(above.at - apart, Math.max(below.at + apart, at)), gain };
}
