import optimjs from 'optimization-js';
import { randomStream } from '../src/base/random.ts';
import { tryCandidate } from '../src/crew/candidate.ts';
import { explore } from '../src/crew/explore.ts';
import type { Variant } from '../src/outline/families/family.ts';
import { Judge, SEARCH_FINENESS } from '../src/score/judge.ts';
import { searchSpace } from '../src/score/searchSpace.ts';
import { median, presetBrief } from './sampleTask.ts';

const SEEDS = 5;
const BUDGET = 2000;
const VARIANTS = ['rings-2', 'fourier-square-5-fold-6', 'sectors-hub-3-fold-2'];

/**
 * The search beside optimization-js on the real problem, at the same number of evaluations: exp of the value made small,
 * area over λz where the target is met, medians over seeds. The library's best of its random methods counts.
 */
export async function benchBaseline() {
  const { task } = await presetBrief('offset-range');
  const judge = new Judge(task, SEARCH_FINENESS);
  const space = searchSpace(task, ['rings', 'fourier', 'sectors'], judge);
  const aim = { measure: 'area', correction: task.target.correction } as const;
  const floor = judge.wavelengthM * task.detector.distanceM[0];
  return VARIANTS.map((id) => {
    const variant = space.variants.find((one) => one.id === id) as Variant;
    const seeds = Array.from({ length: SEEDS }, (_, i) => i + 1);
    const ours = seeds.map((seed) => {
      const job = {
        kind: 'explore',
        variant: id,
        aim,
        budget: BUDGET,
        seed,
        stream: 0,
        method: 'evolve',
      } as const;
      return Math.exp(explore(job, judge, space).best?.value ?? Number.POSITIVE_INFINITY) / floor;
    });
    const theirs = seeds.map((seed) => {
      const f = (x: number[]) => tryCandidate(judge, space, variant, Float64Array.from(x), aim).value;
      const box = variant.parameters.map(({ low, high }) => optimjs.Real(low, high));
      const methods = [optimjs.rs_minimize, optimjs.dummy_minimize];
      return Math.min(
        ...methods.map((m) => Math.exp(withSeed(seed, () => m(f, box, BUDGET).best_y)) / floor),
      );
    });
    return { variant: id, ours: median(ours), optimizationJs: median(theirs) };
  });
}

/** optimization-js draws from Math.random: it is lent a seeded source. */
function withSeed<Result>(seed: number, run: () => Result): Result {
  const original = Math.random;
  const source = randomStream(seed);
  Math.random = () => source.uniform();
  try {
    return run();
  } finally {
    Math.random = original;
  }
}
