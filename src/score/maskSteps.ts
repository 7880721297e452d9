/** A mask that depends on the radius alone, as steps outwards: `share` of the azimuth is open up to the phase `end`. */
export interface MaskStep {
  /** η = κρ² at the step's outer end. */
  end: number;
  /** 0 to 1. */
  share: number;
}

/** Shares that differ by less than this are one step. */
const SAME = 1e-6;

/** Least open share of a ring. */
const LEAST_SHARE = 0.02;

/** The steps of a mask of cells of equal area. */
export function stepsOf(shares: Float64Array, largestPhase: number): MaskStep[] {
  const steps: MaskStep[] = [];
  for (let j = 0; j < shares.length; j++) {
    const share = Math.min(1, Math.max(0, shares[j]));
    if (j > 0 && Math.abs(share - steps[steps.length - 1].share) < SAME) steps.pop();
    steps.push({ end: (largestPhase * (j + 1)) / shares.length, share });
  }
  return steps;
}

/**
 * The rings that a mask stands for, as rims in phase, ascending: opening, closing, opening …
 *
 * A step that is open in part at the end of a ring moves that rim; one alone becomes a thinner ring in its middle. Of more
 * rings than `most` the widest are kept.
 */
export function ringsOf(steps: readonly MaskStep[], most: number): number[] {
  const rings: [number, number][] = [];
  const startOf = (i: number) => (i === 0 ? 0 : steps[i - 1].end);
  const openOf = (i: number) => steps[i].share * (steps[i].end - startOf(i));
  for (let i = 0; i < steps.length; i++) {
    if (steps[i].share < LEAST_SHARE) continue;
    let last = i;
    while (last + 1 < steps.length && steps[last + 1].share >= LEAST_SHARE) last++;
    if (last === i) {
      const middle = (startOf(i) + steps[i].end) / 2;
      rings.push([middle - openOf(i) / 2, middle + openOf(i) / 2]);
    } else {
      rings.push([steps[i].end - openOf(i), startOf(last) + openOf(last)]);
    }
    i = last;
  }
  return rings
    .sort((p, q) => q[1] - q[0] - (p[1] - p[0]))
    .slice(0, most)
    .sort((p, q) => p[0] - q[0])
    .flat();
}

/**
 * A star that opens at every radius what a falling mask does: the phase that it reaches at a share of half a fold's azimuth, from
 * the tip (0) to the valley (1).
 */
export function starProfile(steps: readonly MaskStep[]): (share: number) => number {
  return (share) => {
    let phase = 0;
    for (const step of steps) {
      if (step.share < share) break;
      phase = step.end;
    }
    return phase;
  };
}
