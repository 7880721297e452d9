import { frontObjectives } from '../src/crew/trials.ts';
import { Workshop } from '../src/crew/workshop.ts';
import { Rounds } from '../src/run/rounds.ts';
import type { Aim } from '../src/score/aim.ts';
import { hypervolume } from '../src/search/hypervolume.ts';
import { presetBrief } from './sampleTask.ts';

const CANDIDATES: Record<string, number> = { 'size-range': 4000, 'offset-range': 6000, 'road-dust': 6000 };
const SEEDS = [1, 2, 3];

/**
 * Real job: hypervolumes of the fronts that searches bring home, in logarithms of correction, time and radius, with the searches
 * for whole fronts and by single aims alone, at equal candidates. Corner: 4 times the target, 1 ms, the largest radius.
 *
 * @param names briefs of the shelf; road-dust takes some minutes
 */
export async function benchRealFronts(names: readonly string[]) {
  const rows = [];
  for (const name of names) {
    const { task, families } = await presetBrief(name);
    const workshop = new Workshop({ task, families });
    const { correction } = task.target;
    // As `rimwright search` asks.
    const aims: Aim[] = [
      ...[1, 0.3, 2.5].map((factor) => ({
        measure: 'time' as const,
        correction: 0.99 * factor * correction,
      })),
      { measure: 'radius', correction: 0.99 * correction },
    ];
    const corner = [4 * correction, 1e-3, task.detector.radiusM[1]].map(Math.log);
    const candidates = CANDIDATES[name] ?? 4000;
    const volumes = async (share: { spreadShare?: number }) => {
      const found: number[] = [];
      for (const seed of SEEDS) {
        const quest = { task, ...workshop.space, aims, candidates, seed, ...share };
        const rounds = new Rounds(quest, workshop, () => undefined);
        await rounds.run();
        found.push(hypervolume(rounds.findings.front.map(frontObjectives), corner));
      }
      return found;
    };
    rows.push({
      name,
      candidates,
      wholeFronts: await volumes({}),
      singleAims: await volumes({ spreadShare: 0 }),
    });
  }
  return rows;
}
