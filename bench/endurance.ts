import type { ExploreJob } from '../src/crew/explore.ts';
import { Workshop } from '../src/crew/workshop.ts';
import { presetBrief } from './sampleTask.ts';

/** Candidates in all, and between two looks at the memory. */
const CANDIDATES = 1_000_000;
const LOOK = 100_000;
const BUDGET = 2000;

/** What one worker holds over a million candidates of every family, at every distance of a brief. */
const { task, families, search } = await presetBrief('size-range');
const roaming = { ...task, detector: { ...task.detector, distanceM: [0.01, 0.04] as [number, number] } };
const workshop = new Workshop({ task: roaming, families });
const { variants } = workshop.space;
let tried = 0;
let looked = 0;
const megabytes: number[] = [];
const started = performance.now();
for (let stream = 0; tried < CANDIDATES; stream++) {
  const job: ExploreJob = {
    kind: 'explore',
    variant: variants[stream % variants.length].id,
    aim: { measure: 'time', correction: task.target.correction },
    budget: BUDGET,
    seed: search.seed,
    stream,
    method: stream % 2 === 0 ? 'evolve' : 'glance',
  };
  tried += (await workshop.do(job)).evaluations;
  if (tried - looked < LOOK) continue;
  looked = tried;
  globalThis.gc?.();
  const { heapUsed, arrayBuffers } = process.memoryUsage();
  megabytes.push((heapUsed + arrayBuffers) / 1e6);
  const seconds = (performance.now() - started) / 1000;
  console.log(
    `${tried} candidates, ${Math.round(tried / seconds)} a second: ${megabytes[megabytes.length - 1].toFixed(1)} MB held`,
  );
}
const [first, second] = [megabytes.slice(0, 5), megabytes.slice(-5)].map((half) => Math.max(...half));
console.log(
  `most in the first half ${first.toFixed(1)} MB, in the second ${second.toFixed(1)} MB: ratio ${(second / first).toFixed(3)}`,
);
