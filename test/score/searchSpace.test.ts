import { describe, expect, it } from 'vitest';
import { FAMILY_NAMES } from '../../src/outline/families/family.ts';
import { SEARCH_FINENESS } from '../../src/score/fineness.ts';
import { Judge } from '../../src/score/judge.ts';
import { searchSpace } from '../../src/score/searchSpace.ts';
import { presetTask } from './presetTasks.ts';

async function spaceOf(name: string, distanceM?: [number, number], families = FAMILY_NAMES) {
  const task = await presetTask(name);
  if (distanceM) task.detector = { ...task.detector, distanceM };
  const judge = new Judge(task, SEARCH_FINENESS);
  return { judge, task, space: searchSpace(task, [...families], judge) };
}

describe('searchSpace', () => {
  it('has one distance where the brief fixes it', async () => {
    expect((await spaceOf('nominal-sphere')).space.distances).toEqual([0.02]);
  });

  it('steps through a range of distances by no more than 2 %, both ends kept, on whole micrometres', async () => {
    const { distances } = (await spaceOf('road-dust')).space;
    expect(distances[0]).toBe(0.01);
    expect(distances[distances.length - 1]).toBe(0.06);
    for (let i = 1; i < distances.length; i++) {
      expect(distances[i]).toBeGreaterThan(distances[i - 1]);
      expect(distances[i] / distances[i - 1]).toBeLessThan(1.0201);
      expect(Math.abs(distances[i] * 1e6 - Math.round(distances[i] * 1e6))).toBeLessThan(1e-6);
    }
  });

  it('steps through a range that is narrower than the step', async () => {
    expect((await spaceOf('nominal-sphere', [0.02, 0.0201])).space.distances).toEqual([0.02, 0.0201]);
    expect((await spaceOf('nominal-sphere', [0.02, 0.0200005])).space.distances).toEqual([0.02, 0.0200005]);
  });

  it('lets phases run from the least radius at the largest distance to the largest at the least', async () => {
    const { space, judge } = await spaceOf('road-dust');
    const [{ low, high }] = space.variants[0].parameters;
    expect(low).toBeCloseTo(judge.kappa(0.06) * 50e-6 ** 2, 12);
    // κ R² = 1979 at 10 mm: beyond 400 nothing is searched.
    expect(high).toBe(400);
    const nominal = await spaceOf('nominal-sphere');
    expect(nominal.space.variants[0].parameters[0].high).toBeCloseTo(
      nominal.judge.kappa(0.02) * 0.4e-3 ** 2,
      9,
    );
  });

  it('keeps to the families of the brief, in their order', async () => {
    const { space } = await spaceOf('nominal-sphere', undefined, ['fourier', 'disc'] as never);
    expect(new Set(space.variants.map(({ family }) => family))).toEqual(new Set(['fourier', 'disc']));
    expect(space.variants[0].family).toBe('fourier');
  });
});
