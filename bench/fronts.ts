import optimjs from 'optimization-js';
import { type RandomSource, randomStream } from '../src/base/random.ts';
import { hypervolume } from '../src/search/hypervolume.ts';
import { minimiseFront } from '../src/search/multiObjective.ts';
import { FRONT_PROBLEMS, type FrontProblem } from '../test/search/frontProblems.ts';
import { withSeed } from './withSeed.ts';

const SEEDS = Array.from({ length: 11 }, (_, k) => k + 1);
const EVALUATIONS = 10_000;

/** Weighted sums that the library's evaluations are shared out to. */
const DIRECTIONS = 50;

/**
 * The search for a front on the usual test problems, beside optimization-js: shares of the exact hypervolume of the whole
 * front (reference point 1.1), first quartile, median and third quartile over the seeds. The library knows one objective: it
 * gets random Chebyshev weights one after the other, all points that it tries count, and the better of its two methods
 * without derivatives is shown.
 */
export function benchFronts() {
  return FRONT_PROBLEMS.map((problem) => {
    const share = (points: readonly (readonly number[])[]) =>
      hypervolume(points, new Array<number>(problem.objectives).fill(1.1)) / problem.exact;
    const ours = SEEDS.map((seed) => share(searched(problem, seed)));
    const methods = [optimjs.rs_minimize, optimjs.dummy_minimize];
    const theirs = methods.map((method) =>
      quartiles(SEEDS.map((seed) => share(scalarised(problem, method, seed)))),
    );
    const better = theirs.reduce((a, b) => (a[1] >= b[1] ? a : b));
    const { name, variables } = problem;
    return { name, variables, evaluations: EVALUATIONS, ours: quartiles(ours), optimizationJs: better };
  });
}

function searched({ objectives, variables, f }: FrontProblem, seed: number) {
  const front = minimiseFront((x) => ({ objectives: f(x) }), {
    objectives,
    lower: new Float64Array(variables),
    upper: new Float64Array(variables).fill(1),
    budget: EVALUATIONS,
    random: randomStream(seed),
  });
  return front.map((point) => point.objectives);
}

/** All points that the library tries while it minimises max w_j f_j for one random w after another. */
function scalarised(
  { objectives, variables, f }: FrontProblem,
  method: typeof optimjs.rs_minimize,
  seed: number,
) {
  const seen: number[][] = [];
  const box = Array.from({ length: variables }, () => optimjs.Real(0, 1));
  const random = randomStream(seed, 1);
  withSeed(seed, () => {
    for (let k = 0; k < DIRECTIONS; k++) {
      const weights = randomWeights(objectives, random);
      const scalar = (x: number[]) => {
        const values = f(x);
        seen.push(values);
        return Math.max(...values.map((value, j) => weights[j] * value));
      };
      method(scalar, box, EVALUATIONS / DIRECTIONS);
    }
  });
  return seen.slice(0, EVALUATIONS);
}

/** Even on all weights that add up to 1. */
function randomWeights(count: number, random: RandomSource): number[] {
  const parts = Array.from({ length: count }, () => -Math.log(1 - random.uniform()));
  const sum = parts.reduce((total, part) => total + part, 0);
  return parts.map((part) => part / sum);
}

/** First quartile, median, third quartile of 4k + 3 values. */
function quartiles(values: readonly number[]): [number, number, number] {
  const sorted = values.toSorted((a, b) => a - b);
  const at = (share: number) => sorted[Math.round(share * (sorted.length + 1)) - 1];
  return [at(0.25), at(0.5), at(0.75)];
}
