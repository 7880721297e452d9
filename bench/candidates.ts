import { fileURLToPath } from 'node:url';
import { Crew } from '../src/crew/crew.ts';
import type { ExploreJob } from '../src/crew/explore.ts';
import { median, presetBrief } from './sampleTask.ts';

const ROUNDS = 3;
const JOBS = 24;
const BUDGET = 700;

/** Candidates a second with one worker and with two, on the same jobs in turn, after a warm-up of each crew. */
export async function benchCandidates(preset = 'offset-range') {
  const { task, search } = await presetBrief(preset);
  const orders = { task, families: ['fourier'] as const };
  const entry = fileURLToPath(new URL('../dist/crew/worker.js', import.meta.url));
  const crews = await Promise.all([1, 2].map((size) => Crew.start(size, orders, entry)));
  const jobs = Array.from(
    { length: JOBS },
    (_, i): ExploreJob => ({
      kind: 'explore',
      variant: ['fourier-square-5-fold-6', 'fourier-square-3-fold-6'][i % 2],
      aim: { measure: 'area', correction: task.target.correction },
      budget: BUDGET,
      seed: search.seed,
      stream: i,
      method: 'evolve',
    }),
  );
  const rates: number[][] = [[], []];
  for (let round = 0; round <= ROUNDS; round++) {
    for (const [k, crew] of crews.entries()) {
      const from = performance.now();
      const results = await Promise.all(jobs.map((job) => crew.do(job)));
      const evaluations = results.reduce((sum, result) => sum + result.evaluations, 0);
      if (round > 0) rates[k].push((1000 * evaluations) / (performance.now() - from));
    }
  }
  await Promise.all(crews.map((crew) => crew.dismiss()));
  const candidatesPerSecond = rates.map((rate) => Math.round(median(rate)));
  const ratios = rates[1].map((rate, i) => rate / rates[0][i]);
  return { candidatesPerSecond, twoWorkersOverOne: median(ratios) };
}
