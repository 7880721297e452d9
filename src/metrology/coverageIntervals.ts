/** Ends of an interval. */
export type Interval = [least: number, most: number];

/**
 * The interval that leaves equal probabilities on both sides (JCGM 101:2008, 7.7.2).
 *
 * @param sorted values, ascending
 */
export function symmetricInterval(sorted: Float64Array, coverage: number): Interval {
  const held = heldBy(sorted, coverage);
  const first = Math.floor((sorted.length - held) / 2);
  return [sorted[first], sorted[Math.min(sorted.length - 1, first + held)]];
}

/** The shortest interval of that probability (JCGM 101:2008, 7.7.4). */
export function shortestInterval(sorted: Float64Array, coverage: number): Interval {
  const held = heldBy(sorted, coverage);
  let best = 0;
  for (let first = 1; first + held < sorted.length; first++) {
    if (sorted[first + held] - sorted[first] < sorted[best + held] - sorted[best]) best = first;
  }
  return [sorted[best], sorted[best + held]];
}

function heldBy(sorted: Float64Array, coverage: number): number {
  return Math.min(sorted.length - 1, Math.floor(coverage * sorted.length + 0.5));
}
