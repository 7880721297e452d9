import { limitsBeside, MISS_WEIGHT, measureOf } from '../score/aim.ts';
import { correctionOf, LEAST_GAIN } from '../score/correction.ts';
import type { Outcome } from '../search/linearisedDescent.ts';
import { linearisedDescent } from '../search/linearisedDescent.ts';
import type { Trial } from './candidate.ts';
import type { Trials } from './trials.ts';

/** Largest gain that a descent considers: more than any handful of Fresnel zones gives. */
const LARGEST_GAIN = 40;

/** Spread of a gain, and of nothing else, is the same for every variant. */
const GAIN_SCALE = 0.1;

/**
 * Descent by linear programs from one point. Every reading of the brief is a limit of its own, |ratio/gain − 1| ≤ ε, which
 * is what makes it converge where the worst of them has kinks. A free gain is one more coordinate.
 *
 * The distance stays where it is.
 *
 * @param vector a candidate's vector
 * @param scales natural lengths of the variant's parameters
 * @returns the best vector found
 */
export function descend(trials: Trials, vector: Float64Array, scales: ArrayLike<number>): Float64Array {
  const { variant, judge, aim } = trials;
  const count = variant.parameters.length;
  const first = trials.try(vector);
  if (first.ratios === null || trials.left < count + 3) return vector;
  // Solved weights bring their gain with them.
  const gainFree = judge.task.target.gain === 'free' && !variant.weighted;
  // A step in the gain alone needs no new readings: the last point's are kept.
  let last: { vector: Float64Array; trial: Trial } = { vector, trial: first };
  const evaluate = (x: Float64Array): Outcome | null => {
    const asked = Float64Array.from([...x.slice(x.length - count), ...vector.slice(count)]);
    if (!asked.every((value, i) => value === last.vector[i]))
      last = { vector: asked, trial: trials.try(asked) };
    const { trial } = last;
    if (trial.ratios === null) return null;
    const { scores, misfit } = trial.candidate;
    const gain = gainFree ? x[0] : scores.gain;
    const measure =
      measureOf({ ...scores, gain: scores.gain }, aim.measure) * measureShare(scores.gain, gain, aim.measure);
    return {
      objective: Math.log(measure),
      limits: [
        ...correctionLimits(trial.ratios, gain, aim.correction),
        ...limitsBeside(scores, misfit, aim, judge.task).map(({ factor }) => factor - 1),
        ...Array.from(variant.margins?.(x.slice(x.length - count)) ?? [], (margin) => -margin),
      ],
    };
  };
  const own = (pick: (i: number) => number) => Array.from({ length: count }, (_, i) => pick(i));
  const gain = Math.min(LARGEST_GAIN, Math.max(LEAST_GAIN, correctionOf(first.ratios, 'free').gain));
  const result = linearisedDescent(
    evaluate,
    Float64Array.from([...(gainFree ? [gain] : []), ...vector.slice(0, count)]),
    {
      lower: Float64Array.from([...(gainFree ? [LEAST_GAIN] : []), ...own((i) => variant.parameters[i].low)]),
      upper: Float64Array.from([
        ...(gainFree ? [LARGEST_GAIN] : []),
        ...own((i) => variant.parameters[i].high),
      ]),
      scale: Float64Array.from([...(gainFree ? [GAIN_SCALE] : []), ...own((i) => scales[i])]),
      ...MISS_WEIGHT,
      maxEvaluations: trials.left,
    },
  );
  return Float64Array.from([...result.x.slice(result.x.length - count), ...vector.slice(count)]);
}

/** How a measure changes when another gain is taken: cost goes with 1/g, time with 1/g². */
function measureShare(from: number, to: number, measure: string): number {
  if (measure === 'cost') return from / to;
  return measure === 'time' ? (from / to) ** 2 : 1;
}

function correctionLimits(ratios: Float64Array, gain: number, allowed: number): number[] {
  const limits: number[] = [];
  for (const ratio of ratios) {
    const excess = (ratio / gain - 1) / allowed;
    limits.push(excess - 1, -excess - 1);
  }
  return limits;
}
