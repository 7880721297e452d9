import { describe, expect, it } from 'vitest';
import { drawCandidate, tryCandidate } from '../../src/crew/candidate.ts';
import type { ExploreJob } from '../../src/crew/explore.ts';
import { explore } from '../../src/crew/explore.ts';
import { frontObjectives } from '../../src/crew/trials.ts';
import { Workshop } from '../../src/crew/workshop.ts';
import type { FamilyName, Variant } from '../../src/outline/families/family.ts';
import { FAMILY_NAMES } from '../../src/outline/families/family.ts';
import { maskJobs, seedsOf } from '../../src/run/seeding.ts';
import type { Aim } from '../../src/score/aim.ts';
import { missedLimits } from '../../src/score/aim.ts';
import { SEARCH_FINENESS } from '../../src/score/fineness.ts';
import { Judge } from '../../src/score/judge.ts';
import type { SearchSpace } from '../../src/score/searchSpace.ts';
import { searchSpace } from '../../src/score/searchSpace.ts';
import type { Task } from '../../src/score/task.ts';
import { nonDominatedRanks } from '../../src/search/pareto.ts';
import { presetTask } from '../score/presetTasks.ts';

const AIM: Aim = { measure: 'area', correction: 0.01 };
const METHODS = ['glance', 'evolve', 'refine', 'seed'] as const;

const job = (variant: string, method: ExploreJob['method'], budget: number): ExploreJob => ({
  kind: 'explore',
  variant,
  aim: AIM,
  budget,
  seed: 3,
  stream: 5,
  method,
  ...(method === 'seed' ? { mask: { place: 0.5, gain: 1 } } : {}),
});

/** A search space whose variants note how often they draw, and whatever comes to them from outside their ranges. */
function watchedSpace(task: Task, families: readonly FamilyName[] = FAMILY_NAMES) {
  const judge = new Judge(task, SEARCH_FINENESS);
  const space = searchSpace(task, families, judge);
  const seen = { draws: 0, outside: [] as string[] };
  const watched = (variant: Variant): Variant => ({
    ...variant,
    draw(values, unitM) {
      seen.draws++;
      for (const [i, { name, low, high }] of variant.parameters.entries()) {
        if (!(values[i] >= low && values[i] <= high))
          seen.outside.push(`${variant.id} ${name}: ${values[i]}`);
      }
      return variant.draw(values, unitM);
    },
  });
  const watchedVariants: SearchSpace = { ...space, variants: space.variants.map(watched) };
  return { judge, space: watchedVariants, seen };
}

const NOMINAL = await presetTask('nominal-sphere');
/** A brief with a range of distances, and a free gain. */
const RANGE: Task = {
  ...(await presetTask('size-range')),
  detector: { ...NOMINAL.detector, distanceM: [0.015, 0.03], radiusM: [50e-6, 0.4e-3] },
};
const OFFSET = await presetTask('offset-range');

describe('explore', () => {
  const variants = watchedSpace(NOMINAL).space.variants.map(({ id }) => id);

  it.each(METHODS)(
    '%s: keeps every parameter within its range and never tries more than it may',
    (method) => {
      for (const task of [NOMINAL, RANGE]) {
        const { judge, space, seen } = watchedSpace(task);
        // A mask is a matter of rings.
        for (const id of variants.filter((one) => method !== 'seed' || one.startsWith('rings'))) {
          for (const budget of [1, 2, 7, 61]) {
            seen.draws = 0;
            const { evaluations } = explore(job(id, method, budget), judge, space);
            expect(evaluations, `${id}, ${budget}`).toBeLessThanOrEqual(budget);
            expect(seen.draws).toBe(evaluations);
          }
        }
        expect(seen.outside).toEqual([]);
      }
    },
  );

  it.each(METHODS)(
    '%s: brings home the best of what it tried, and a front without limits missed',
    (method) => {
      for (const id of method === 'seed'
        ? ['rings-2']
        : ['rings-2', 'fourier-square-3-fold-6', 'sectors-arc-2-fold-1']) {
        const { judge, space } = watchedSpace(RANGE);
        const { best, front } = explore(job(id, method, 300), judge, space);
        if (best === null) throw new Error(`${id}: nothing drawn`);
        const variant = space.variants.find((one) => one.id === id) as Variant;
        const again = tryCandidate(judge, space, variant, Float64Array.from(best.candidate.vector), AIM);
        expect(again.value).toBe(best.value);
        expect(again.candidate).toEqual(best.candidate);
        for (const { scores, misfit } of front) expect(missedLimits(scores, misfit, RANGE)).toEqual([]);
        expect(nonDominatedRanks(front.map(frontObjectives)).every((rank) => rank === 1)).toBe(true);
        for (const candidate of front) {
          const drawn = drawCandidate(judge, space, variant, candidate.vector);
          expect('shape' in drawn && space.distances.includes(drawn.distanceM)).toBe(true);
        }
      }
    },
  );

  it('does better with more to spend', () => {
    const { judge, space } = watchedSpace(OFFSET);
    const valueAt = (method: ExploreJob['method'], budget: number) =>
      explore(job('rings-2', method, budget), judge, space).best?.value ?? Number.POSITIVE_INFINITY;
    for (const method of ['glance', 'evolve'] as const) {
      expect(valueAt(method, 400)).toBeLessThanOrEqual(valueAt(method, 40));
    }
  });

  it('refines from where it is told to, and never ends worse', () => {
    const { judge, space } = watchedSpace(RANGE);
    const first = explore(job('ramp-peak-5-fold', 'glance', 60), judge, space).best;
    if (!first) throw new Error('nothing drawn');
    const refined = explore(
      { ...job('ramp-peak-5-fold', 'refine', 400), from: first.candidate.vector },
      judge,
      space,
    ).best;
    expect(refined?.value).toBeLessThanOrEqual(first.value);
  });

  it('goes from the rings of a least mask down to its bound, 1.136 λz on the offset brief', async () => {
    const { space } = new Workshop({ task: OFFSET, families: FAMILY_NAMES });
    const workshop = new Workshop({ task: OFFSET, families: FAMILY_NAMES });
    const jobs = maskJobs({ task: OFFSET, ...space }, 300).filter(({ masks }) => masks === 'any');
    const results = await Promise.all(jobs.map((one) => workshop.do(one)));
    const seeds = seedsOf({ task: OFFSET, ...space }, jobs, results);
    const seed = seeds.find(({ variant }) => variant === 'rings-2');
    const { best } = await workshop.do({ ...job('rings-2', 'seed', 200), from: seed?.vector ?? [] });
    expect(best?.candidate.scores.areaOverFloor).toBeLessThan(1.16);
    expect(best?.candidate.scores.correction.worst).toBeLessThan(0.0101);
  });
});

/** Does a job with a fresh workshop, with one that has done others before, and once more. */
async function resultsOf(name: string, id: string) {
  const preset = await presetTask(name);
  // A few distances will do: most of the time goes into their tables.
  const [nearestM] = preset.detector.distanceM;
  const distanceM: [number, number] = [nearestM, 1.04 * nearestM];
  const task = { ...preset, detector: { ...preset.detector, distanceM } };
  const aim: Aim = { measure: 'time', correction: task.target.correction };
  const asked: ExploreJob = { ...job(id, 'evolve', 60), aim };
  const fresh = new Workshop({ task, families: FAMILY_NAMES });
  const used = new Workshop({ task, families: FAMILY_NAMES });
  // Larger outlines at other distances: the tables grow.
  await used.do({ ...asked, variant: 'disc', method: 'glance', stream: 9 });
  await used.do({ ...asked, stream: 8 });
  return {
    first: await fresh.do(asked),
    afterOthers: await used.do(asked),
    again: await fresh.do(asked),
    ofAnotherStream: await fresh.do({ ...asked, stream: 6 }),
    ofAnotherSeed: await fresh.do({ ...asked, seed: 4 }),
  };
}

describe('Workshop', () => {
  it.each([
    ['offset-range', 'fourier-square-3-fold-6'],
    ['road-dust', 'rings-2'],
  ])('%s: does a job the same whatever it did before', async (name, id) => {
    const { first, afterOthers, again, ofAnotherStream, ofAnotherSeed } = await resultsOf(name, id);
    expect(afterOthers).toEqual(first);
    expect(again).toEqual(first);
    expect(ofAnotherStream).not.toEqual(first);
    expect(ofAnotherSeed).not.toEqual(first);
  });

  // A fault that is known: with a spread, tables are interpolated between places that hang on how far the table reaches, and
  // so do the last digits of a reading. Which worker does a job then shows, against what is promised.
  it('cells-in-water, with a spread: does a job the same whatever it did before', async () => {
    const { first, afterOthers } = await resultsOf('cells-in-water', 'ramp-peak-5-fold');
    expect(afterOthers).toEqual(first);
  });
});
