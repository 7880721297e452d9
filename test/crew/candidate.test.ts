import { describe, expect, it } from 'vitest';
import { tryCandidate } from '../../src/crew/candidate.ts';
import { Workshop } from '../../src/crew/workshop.ts';
import type { Variant } from '../../src/outline/families/family.ts';
import { SEARCH_FINENESS } from '../../src/score/fineness.ts';
import { Judge } from '../../src/score/judge.ts';
import { presetTask } from '../score/presetTasks.ts';

const task = await presetTask('road-dust');
const judge = new Judge(task, SEARCH_FINENESS);
const { space } = new Workshop({ task, families: ['disc'] });
const disc = space.variants.find(({ parameters }) => parameters.length === 1) as Variant;

/** A disc of that radius at the nearest distance. */
function tried(radiusM: number) {
  const [distanceM] = space.distances;
  const vector = Float64Array.of(judge.kappa(distanceM) * radiusM ** 2, 0);
  return tryCandidate(judge, space, disc, vector, { measure: 'time', correction: task.target.correction });
}

describe('tryCandidate', () => {
  it('reads what misses the limits of size by little, and not what misses them hopelessly', () => {
    // The lobe limit of 10 % allows 194 µm at 10 mm: 1.22 · 635 nm/4 µm = 11.1°, a tenth of it 1.11°.
    const [fits, little, hopeless, worse] = [1.5e-4, 3.5e-4, 8e-4, 1.2e-3].map(tried);
    expect(fits.candidate?.scores.lobe.ratio).toBeLessThan(0.1);
    expect(little.candidate?.scores.lobe.ratio).toBeGreaterThan(0.15);
    expect(hopeless.candidate).toBeNull();
    expect(worse.candidate).toBeNull();
    // Still in an order that leads back.
    const values = [little, hopeless, worse].map(({ value }) => value);
    expect(values).toEqual(values.toSorted((p, q) => p - q));
    const nothing = tryCandidate(judge, space, disc, Float64Array.of(1e6, 0), {
      measure: 'time',
      correction: 0.01,
    });
    expect(nothing.value).toBeGreaterThan(worse.value);
  });
});
