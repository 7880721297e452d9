import { describe, expect, it } from 'vitest';
import { openBrief } from '../../src/run/openBrief.ts';
import { tradeGrid } from '../../src/run/tradeGrid.ts';

const OFFSET_RANGE = await openBrief('offset-range', { candidates: 300, seed: 9 });

describe('tradeGrid', () => {
  it('goes over the range that the brief gives, or from half to twice its value', async () => {
    const { axes, briefs } = await tradeGrid(OFFSET_RANGE, 'distance,offset', 3);
    expect(axes).toEqual([
      { key: 'detector.distance', values: ['10 mm', '20 mm', '40 mm'] },
      { key: 'placement.offset', values: ['5 um', '10 um', '20 um'] },
    ]);
    const pairs = briefs.map(({ task }) => [task.detector.distanceM, task.placement.offsetM]);
    expect(pairs[1]).toEqual([[0.01, 0.01], 1e-5]);
    expect(pairs[8]).toEqual([[0.04, 0.04], 2e-5]);
    // Everything else is the brief's own, with what the command line changed.
    for (const { search, families, title } of briefs) {
      expect({ search, families, title }).toEqual({
        search: { candidates: 300, seed: 9 },
        families: OFFSET_RANGE.brief.families,
        title: OFFSET_RANGE.brief.title,
      });
    }
  });

  it('takes ranges of its own, in even steps from 0, also for keys that the brief left out', async () => {
    const over = 'placement.spread = 0 um..3 um, target.correction=0.5 % to 2 %';
    const { axes, briefs } = await tradeGrid(OFFSET_RANGE, over, 3);
    expect(axes.map(({ values }) => values)).toEqual([
      ['0 um', '1.5 um', '3 um'],
      ['0.5 %', '1 %', '2 %'],
    ]);
    expect(briefs[5].task.placement.spreadM).toBeCloseTo(1.5e-6, 15);
    expect(briefs[5].task.target.correction).toBe(0.02);
  });

  it.each([
    ['distance', 'expected two keys of the brief'],
    ['distance,distance', 'expected two different keys'],
    ['distance,offse', 'did you mean offset?'],
    ['distance,spread', "expected its range, as in 'placement.spread="],
    ['distance,offset=20 um..5 um', 'expected a range that rises'],
    ['distance,offset=5 um..20 mm', 'with one unit'],
    ['distance,offset=few..many', 'expected numbers with their unit'],
    ['distance,offset=5 um', 'expected a range'],
    ['distance,offset=5..20', 'expected'],
    ['distance,offset=5 um..20 mm..3', 'expected a range'],
  ])('refuses %s', async (over, message) => {
    await expect(tradeGrid(OFFSET_RANGE, over, 2)).rejects.toMatchObject({
      code: 'input',
      message: expect.stringContaining(message),
    });
  });
});
