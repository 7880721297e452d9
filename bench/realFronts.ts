import { frontObjectives } from '../src/crew/trials.ts';
import { Workshop } from '../src/crew/workshop.ts';
import { Rounds } from '../src/run/rounds.ts';
import type { Aim } from '../src/score/aim.ts';
import { hypervolume } from '../src/search/hypervolume.ts';
import { presetBrief } from './sampleTask.ts';

/**
 * Real job: hypervolumes of the fronts that searches bring home, in logarithms of correction, time and radius, with the searches
 * for whole fronts and (share 0) by single aims alone, at equal candidates. Corner: 4 times the target, 1 ms, the largest radius.
 *
 * `npx tsx bench/realFronts.ts [brief …]`; all three take a quarter of an hour on one core.
 */
const CANDIDATES: Record<string, number> = { 'size-range': 4000, 'offset-range': 6000, 'road-dust': 6000 };
const SEEDS = [1, 2, 3];
const asked = process.argv.slice(2);

for (const name of asked.length > 0 ? asked : Object.keys(CANDIDATES)) {
  const { task, families } = await presetBrief(name);
  const workshop = new Workshop({ task, families });
  const { correction } = task.target;
  // As `rimwright search` asks.
  const aims: Aim[] = [
    ...[1, 0.3, 2.5].map((factor) => ({ measure: 'time' as const, correction: 0.99 * factor * correction })),
    { measure: 'radius', correction: 0.99 * correction },
  ];
  const corner = [4 * correction, 1e-3, task.detector.radiusM[1]].map(Math.log);
  for (const [label, share] of [
    ['whole fronts', {}],
    ['single aims', { spreadShare: 0 }],
  ] as const) {
    const volumes: string[] = [];
    for (const seed of SEEDS) {
      const quest = { task, ...workshop.space, aims, candidates: CANDIDATES[name] ?? 4000, seed, ...share };
      const rounds = new Rounds(quest, workshop, () => undefined);
      await rounds.run();
      const { front, best } = rounds.findings;
      const volume = hypervolume(front.map(frontObjectives), corner).toFixed(3);
      volumes.push(`${volume} (main aim ${best[0][0]?.value.toFixed(3)})`);
    }
    console.log(`real job, ${name}, ${label}, seeds 1 to 3: ${volumes.join('  ')}`);
  }
}
