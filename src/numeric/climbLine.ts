/** A place on a line and the value there. */
export interface LinePoint {
  at: number;
  value: number;
}

/** Part of a bracket that a trial keeps away from the best point, so that brackets shrink. */
const APART = 0.1;
/** Golden section's share of the wider side. */
const GOLDEN = 0.382;

/**
 * Climbs to a local maximum of a smooth function on [low, high]: steps uphill until the best point has a lower one on either
 * side or lies at an end, then tries the vertex of the parabola through the three, or golden section where that leads nowhere.
 *
 * @param start between low and high, with its value; the result is never lower
 * @param step first step, above 0
 * @param evaluations most that are spent
 */
export function climbLine(
  f: (at: number) => number,
  start: LinePoint,
  step: number,
  [low, high]: readonly [number, number],
  evaluations: number,
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
  while (left > 0 && above.at - below.at > 1e-9 * (high - low)) {
    const trial = tryAt(nextTrial(below, best, above));
    const [lower, upper] = trial.at < best.at ? [trial, best] : [best, trial];
    if (trial.value > best.value) {
      [below, above] = trial === lower ? [below, best] : [best, above];
      best = trial;
    } else [below, above] = trial === lower ? [lower, above] : [below, upper];
  }
  return [below, above].reduce((most, point) => (point.value > most.value ? point : most), best);
}

function nextTrial(below: LinePoint, best: LinePoint, above: LinePoint): number {
  const [p, q] = [best.at - below.at, above.at - best.at];
  if (p > 0 && q > 0) {
    const [fallP, fallQ] = [(best.value - below.value) / p, (best.value - above.value) / q];
    const vertex = best.at + (p * q * (fallP / p - fallQ / q)) / (2 * (fallP + fallQ) || 1);
    const apart = APART * Math.min(p, q);
    if (Math.abs(vertex - best.at) >= apart && vertex > below.at && vertex < above.at) return vertex;
    // The best point is the vertex as far as that can be told: the wider side closes in.
    if (Math.abs(vertex - best.at) < apart) return p > q ? best.at - apart : best.at + apart;
  }
  return p > q ? best.at - GOLDEN * p : best.at + GOLDEN * q;
}
