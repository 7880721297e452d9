import { describe, expect, it } from 'vitest';
import type { FamilyName } from '../../src/outline/families/family.ts';
import type { Brief } from '../../src/run/brief.ts';
import type { CourseOptions } from '../../src/run/course.ts';
import type { Progress } from '../../src/run/progress.ts';
import { FRONT_REACH, missesOf } from '../../src/run/ranking.ts';
import { search, smallest } from '../../src/run/search.ts';
import { REPORT_FINENESS } from '../../src/score/fineness.ts';
import { Judge } from '../../src/score/judge.ts';
import { worstOf } from '../../src/score/scores.ts';
import { nonDominatedRanks } from '../../src/search/pareto.ts';
import { builtWorker } from '../crew/builtWorker.ts';
import { presetBrief } from '../score/presetTasks.ts';

const crewOf = (workers: number): CourseOptions => ({ workers, workerEntry: builtWorker() });

/** A brief of the shelf with a budget, and families, of its own. */
async function briefOf(name: string, candidates?: number, families?: FamilyName[]): Promise<Brief> {
  const brief = await presetBrief(name);
  return {
    ...brief,
    ...(families ? { families } : {}),
    search: { ...brief.search, ...(candidates ? { candidates } : {}) },
  };
}

describe('search', () => {
  it('finds the same for the same seed, with one worker or two', async () => {
    const brief = await briefOf('offset-range', 600);
    const found = [];
    for (const workers of [1, 2]) {
      const { seconds, ...rest } = await search(brief, crewOf(workers));
      expect(seconds).toBeGreaterThan(0);
      found.push(rest);
    }
    expect(found[1]).toEqual(found[0]);
    const other = await search({ ...brief, search: { ...brief.search, seed: 2 } }, crewOf(2));
    expect(other.designs).not.toEqual(found[0].designs);
  });

  it('ranks designs that no other one beats, all within reach of the target and within every other limit', async () => {
    const brief = await briefOf('offset-range', 1500);
    const { designs } = await search(brief, crewOf(2));
    expect(designs.length).toBeGreaterThan(5);
    const objectives = designs.map(({ scores }) => [worstOf(scores), scores.snr.time_s, scores.radius_m]);
    expect(designs.map(({ rank }) => rank)).toEqual(nonDominatedRanks(objectives));
    expect(designs[0].rank).toBe(1);
    expect(new Set(designs.map(({ id }) => id)).size).toBe(designs.length);
    for (const [i, design] of designs.entries()) {
      const { target } = brief.task;
      expect(design.id.startsWith(design.family)).toBe(true);
      expect(worstOf(design.scores)).toBeLessThanOrEqual(FRONT_REACH * target.correction);
      const misses = missesOf(design, brief.task).map(({ limit }) => limit);
      expect(misses.filter((limit) => limit !== 'target.correction')).toEqual([]);
      expect(design.meetsTarget).toBe(misses.length === 0);
      if (i > 0) {
        const [before, here] = [designs[i - 1], design];
        expect(here.rank > before.rank || here.scores.snr.time_s >= before.scores.snr.time_s).toBe(true);
      }
    }
    expect(designs.some(({ meetsTarget }) => meetsTarget)).toBe(true);
    // Scores are those of the points that the design holds.
    const [{ elements, distanceM, scores }] = designs;
    const again = new Judge(brief.task, REPORT_FINENESS).scoreOutline(elements, distanceM).scores;
    expect(again.correction.worst).toBeCloseTo(scores.correction.worst, 4);
    expect(again.area_m2).toBeCloseTo(scores.area_m2, 15);
  });

  it.each([100, 1200])('tries no more than %i candidates where the brief says so', async (candidates) => {
    const reports: Progress[] = [];
    const options = { ...crewOf(2), onProgress: (progress: Progress) => reports.push(progress) };
    const { evaluations, designs, stopped } = await search(
      await briefOf('nominal-sphere', candidates),
      options,
    );
    expect(evaluations).toBeLessThanOrEqual(candidates);
    expect(evaluations).toBeGreaterThan(0.5 * candidates);
    expect(stopped).toBe(false);
    expect(designs.length).toBeGreaterThan(0);
    // Progress only ever goes on, and never says more than was done.
    const counts = reports.map((progress) => progress.evaluations);
    expect(counts).toEqual([...counts].sort((a, b) => a - b));
    expect(counts[counts.length - 1]).toBeLessThanOrEqual(evaluations);
    for (const report of reports) expect(report.candidates).toBe(candidates);
  });

  it('gives what it has found when it is stopped', async () => {
    const controller = new AbortController();
    let reports = 0;
    const options = {
      ...crewOf(2),
      signal: controller.signal,
      onProgress: () => {
        if (++reports === 25) controller.abort();
      },
    };
    const brief = await briefOf('offset-range', 50_000);
    const { stopped, designs, evaluations } = await search(brief, options);
    expect(stopped).toBe(true);
    expect(evaluations).toBeLessThan(40_000);
    expect(designs.length).toBeGreaterThan(0);
  });

  it('gives nothing, and takes no time for it, when it is stopped before it starts', async () => {
    const options = { ...crewOf(1), signal: AbortSignal.abort() };
    const { stopped, designs, evaluations } = await search(await briefOf('offset-range', 50_000), options);
    expect({ stopped, designs, evaluations }).toEqual({ stopped: true, designs: [], evaluations: 0 });
  });
});

describe('smallest', () => {
  it('says what comes nearest, and what it misses, where nothing meets the target', async () => {
    // One disc cannot read the extinction itself with one gain for three sizes off the axis.
    const brief = await briefOf('offset-range', 600, ['disc']);
    const { design, nearest, misses } = await smallest(brief, 'area', crewOf(2));
    expect(design).toBeNull();
    expect(nearest?.family).toBe('disc');
    expect(nearest?.meetsTarget).toBe(false);
    expect(misses.map(({ limit }) => limit)).toEqual(['target.correction']);
    const { certified = 0, worst = 0 } = nearest?.scores.correction ?? {};
    // What the exact fields add at the samples is taken to be added to the certified worst.
    const added = Math.max(0, (nearest?.otherFields?.worst ?? 0) - worst);
    expect(certified).toBeGreaterThan(0.01);
    expect(misses[0].factor).toBeCloseTo((certified + added) / 0.01, 9);
  });

  it('makes small what it is asked to', async () => {
    const brief = await briefOf('nominal-sphere', 1500);
    const found = [];
    for (const measure of ['radius', 'area'] as const)
      found.push((await smallest(brief, measure, crewOf(2))).design);
    const [byRadius, byArea] = found;
    expect(byRadius?.scores.radius_m).toBeLessThan(byArea?.scores.radius_m ?? 0);
    expect(byArea?.scores.area_m2).toBeLessThan(byRadius?.scores.area_m2 ?? 0);
  });

  /**
   * How near a search comes to the floor of λz (design.md, section 3). What the target lets through and the phase of the
   * amplitude bring the floor for one sphere to 0.96; a disc, or sectors that enclose the axis, cannot go below π/2.
   */
  it.each<
    [
      name: string,
      measure: 'area' | 'cost',
      families: FamilyName[] | undefined,
      candidates: number,
      most: number,
    ]
  >([
    ['nominal-sphere', 'area', undefined, 3000, 1.05],
    ['nominal-sphere', 'area', ['fourier', 'sectors'], 3000, 1.72],
    ['size-range', 'cost', undefined, 4000, 1.05],
    ['size-range', 'cost', ['disc'], 1000, 1.671],
    ['offset-range', 'area', undefined, 4000, 1.6],
    ['offset-range', 'area', ['fourier'], 5000, 2.8],
  ])('%s by %s with families %j', async (name, measure, families, candidates, most) => {
    const brief = await briefOf(name, candidates, families);
    const { design, evaluations, misses } = await smallest(brief, measure, crewOf(2));
    expect(design).not.toBeNull();
    expect(misses).toEqual([]);
    expect(evaluations).toBeLessThanOrEqual(brief.search.candidates);
    expect(design?.meetsTarget).toBe(true);
    expect(design?.scores.correction.certified).toBeLessThanOrEqual(brief.task.target.correction);
    expect(design?.scores.areaOverFloor).toBeLessThan(most);
    expect(design?.scores.areaOverFloor).toBeGreaterThan(0.9);
    if (families?.includes('disc')) {
      // The first Fresnel zone: π over a gain of two.
      expect(Math.abs((design?.scores.areaOverFloor ?? 0) - Math.PI / 2)).toBeLessThan(0.1);
      expect(design?.scores.gain).toBeCloseTo(2, 1);
    }
    if (brief.task.target.gain === 'one') expect(design?.scores.gain).toBe(1);
  });
});
