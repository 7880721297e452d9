import { describe, expect, it } from 'vitest';
import type { FamilyName } from '../../src/outline/families/family.ts';
import { FAMILY_NAMES } from '../../src/outline/families/family.ts';
import { search } from '../../src/run/search.ts';
import { REPORT_FINENESS, SEARCH_FINENESS } from '../../src/score/fineness.ts';
import { Judge } from '../../src/score/judge.ts';
import { builtWorker } from '../crew/builtWorker.ts';
import { presetBrief } from '../score/presetTasks.ts';

/** Designs of a search to look at: whichever meet the target with the least time. */
const COUNT = 2;

/**
 * A worst correction is that of the places tried. What is reported must not grow by more than a twentieth of the target
 * when ten times as many are tried.
 */
describe('places where the particle is tried', () => {
  it.each<[name: string, candidates: number, families: readonly FamilyName[]]>([
    ['offset-range', 900, FAMILY_NAMES],
    // Without rings, whose seeds would take most of the time on this brief.
    ['road-dust', 1200, ['disc', 'ramp', 'fourier', 'polygon', 'sectors']],
  ])(
    '%s: ten times as many find no correction that is worse by a twentieth of the target',
    async (name, candidates, families) => {
      const brief = { ...(await presetBrief(name)), families: [...families] };
      const { task } = brief;
      const options = { workers: 2, workerEntry: builtWorker() };
      const { designs } = await search({ ...brief, search: { ...brief.search, candidates } }, options);
      const onTarget = designs.filter(({ meetsTarget }) => meetsTarget);
      const best = (onTarget.length > 0 ? onTarget : designs).slice(0, COUNT);
      expect(best.length).toBeGreaterThan(0);
      const denser = new Judge(task, {
        ...REPORT_FINENESS,
        spacing: REPORT_FINENESS.spacing / Math.sqrt(10),
      });
      const coarser = new Judge(task, SEARCH_FINENESS);
      for (const { elements, distanceM, scores } of best) {
        const dense = denser.scoreOutline(elements, distanceM);
        const coarse = coarser.scoreOutline(elements, distanceM);
        expect(dense.ratios.length).toBeGreaterThan(20 * coarse.ratios.length);
        const { worst } = dense.scores.correction;
        expect(worst - scores.correction.worst).toBeLessThan(0.05 * task.target.correction);
        // What leads the search is hardly coarser: 0.007 of the target was the most seen.
        expect(worst - coarse.scores.correction.worst).toBeLessThan(0.05 * task.target.correction);
      }
    },
  );
});
