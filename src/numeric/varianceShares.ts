/** How much of an output's variance a group of inputs makes. */
export interface VarianceShare {
  /** Alone: the share that goes if the group were known (Sobol' first-order index). */
  alone: number;
  /** With all that it takes part in: the share that stays if all others were known (total index). */
  total: number;
}

/**
 * Variance-based shares of groups of independent inputs (Sobol', 2001), by the estimators that Saltelli et al. (2010, Table 2)
 * recommend: for the first order theirs, (b), and for the total that of Jansen (1999), (f), in samples A and B and A with a group
 * of its columns from B.
 *
 * @param draw writes the next point of a sample; samples 0 and 1 must be independent of each other
 * @param groups for each group the places of its inputs in a point
 * @param evaluate gives the outputs at a point; the array may be used again
 * @param count points of each sample: (groups + 2) · count evaluations
 * @returns for each output one share a group; 0 where an output does not vary
 */
export function varianceShares(
  draw: (sample: 0 | 1, point: Float64Array) => void,
  inputs: number,
  groups: readonly (readonly number[])[],
  evaluate: (point: Float64Array) => ArrayLike<number>,
  outputs: number,
  count: number,
): VarianceShare[][] {
  const [a, b, mixed] = [0, 0, 0].map(() => new Float64Array(inputs));
  const [sums, squares] = [new Float64Array(outputs), new Float64Array(outputs)];
  const alone = groups.map(() => new Float64Array(outputs));
  const total = groups.map(() => new Float64Array(outputs));
  // The first-order estimator keeps less noise about an output whose mean is near nothing.
  let middle: Float64Array | null = null;
  for (let n = 0; n < count; n++) {
    draw(0, a);
    draw(1, b);
    const ofA = Float64Array.from(evaluate(a));
    middle ??= Float64Array.from(ofA);
    const ofB = Float64Array.from(evaluate(b));
    for (let o = 0; o < outputs; o++) {
      const [one, other] = [ofA[o] - middle[o], ofB[o] - middle[o]];
      sums[o] += one + other;
      squares[o] += one * one + other * other;
    }
    groups.forEach((members, g) => {
      mixed.set(a);
      for (const member of members) mixed[member] = b[member];
      const of = evaluate(mixed);
      for (let o = 0; o < outputs; o++) {
        const change = of[o] - ofA[o];
        alone[g][o] += (ofB[o] - (middle as Float64Array)[o]) * change;
        total[g][o] += (change * change) / 2;
      }
    });
  }
  return Array.from({ length: outputs }, (_, o) => {
    const mean = sums[o] / (2 * count);
    const variance = squares[o] / (2 * count) - mean * mean;
    const share = (sum: number) => (variance > 0 ? sum / count / variance : 0);
    return groups.map((_, g) => ({ alone: share(alone[g][o]), total: share(total[g][o]) }));
  });
}
