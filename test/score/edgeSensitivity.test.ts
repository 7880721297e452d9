import { describe, expect, it } from 'vitest';
import { edgeSensitivities } from '../../src/score/edgeSensitivity.ts';
import { REPORT_FINENESS } from '../../src/score/fineness.ts';
import { Judge } from '../../src/score/judge.ts';
import { regularRing } from '../draw/sampleDrawings.ts';
import { presetTask } from './presetTasks.ts';

// Second method: the difference of two readings, of edges a little outside and inside.
describe('edgeSensitivities', () => {
  it('is the slope of the reading as an edge moves', async () => {
    const task = await presetTask('size-range');
    const judge = new Judge(task, REPORT_FINENESS);
    const outline = (outerM: number, innerM: number) => [
      { weight: 1, rings: [regularRing(outerM, 2000), regularRing(innerM, 2000, -1)] },
    ];
    const [outerM, innerM, stepM] = [92e-6, 60.6e-6, 1e-8];
    const found = edgeSensitivities(judge, outline(outerM, innerM), 0.02);
    expect(found.map(({ element, ring }) => [element, ring]).sort()).toEqual([
      [0, 0],
      [0, 1],
    ]);
    const read = (outer: number, inner: number) =>
      judge.outlineRatios(outline(outer, inner), 0.02, Float64Array.of(0, 0)).ratios.map(([ratio]) => ratio);
    const here = read(outerM, innerM);
    expect(Math.min(...here)).toBeGreaterThan(0.5);
    const slope = (wider: number[], narrower: number[]) =>
      here.map((ratio, s) => (wider[s] - narrower[s]) / (2 * stepM * ratio));
    const slopes = [
      slope(read(outerM + stepM, innerM), read(outerM - stepM, innerM)),
      // A wider opening has a smaller hole.
      slope(read(outerM, innerM - stepM), read(outerM, innerM + stepM)),
    ];
    for (const { ring, perMetre } of found) {
      const largest = slopes[ring].reduce((p, q) => (Math.abs(q) > Math.abs(p) ? q : p));
      expect(perMetre / largest).toBeCloseTo(1, 4);
    }
    expect(Math.abs(found[0].perMetre)).toBeGreaterThan(Math.abs(found[1].perMetre));
  });
});
