import { describe, expect, it } from 'vitest';
import { Workshop } from '../../src/crew/workshop.ts';
import { ringArea } from '../../src/outline/area.ts';
import type { OutlineElement } from '../../src/outline/shape.ts';
import { designToJson } from '../../src/run/designJson.ts';
import { readDesignJson } from '../../src/run/readDesignJson.ts';
import { SEARCH_FINENESS } from '../../src/score/fineness.ts';
import { Judge } from '../../src/score/judge.ts';
import { searchSpace } from '../../src/score/searchSpace.ts';
import type { Task } from '../../src/score/task.ts';
import { presetTask } from '../score/presetTasks.ts';

const FAMILIES = ['disc', 'rings', 'grid', 'splitter'] as const;
const NOISY = await presetTask('noisy-laser');
const areaOf = ({ rings }: OutlineElement) => rings.reduce((sum, ring) => sum + ringArea(ring), 0);
const weighed = { weighedFor: 0.05 };

describe('finish, of layouts', async () => {
  const { designs } = await new Workshop({ task: NOISY, families: FAMILIES }).do({
    kind: 'finish',
    candidates: [
      { variant: 'rings-weighted-4', vector: [3.1, 6.3, 9.4, 12.6, 0], ...weighed },
      { variant: 'grid-4-by-4', vector: [1.5, 1, 0.1], ...weighed },
      { variant: 'splitter-2', vector: [0, 6.3, 0, 3.1, 0.2], ...weighed },
    ],
  });

  it('balances the weighted areas of the very points, with the largest weight at 1', () => {
    for (const { elements } of designs) {
      const parts = elements.map((element) => element.weight * areaOf(element));
      const size = parts.reduce((sum, part) => sum + Math.abs(part), 0);
      expect(Math.abs(parts.reduce((sum, part) => sum + part, 0)) / size).toBeLessThan(1e-12);
      expect(Math.max(...elements.map(({ weight }) => Math.abs(weight)))).toBe(1);
    }
  });

  it('leaves of the intensity noise what the rejection of common modes lets through', () => {
    const [{ elements, distanceM, scores }] = designs;
    const time = (task: Task) =>
      new Judge(task, SEARCH_FINENESS).scoreOutline(elements, distanceM).scores.snr.time_s;
    const { detector, light } = NOISY;
    expect(detector.commonModeLeak).toBeCloseTo(1e-4, 12);
    const quiet = time({ ...NOISY, light: { ...light, intensityNoisePerHz: 0 } });
    expect(time({ ...NOISY, detector: { ...detector, commonModeLeak: 0 } }) / quiet).toBeCloseTo(1, 9);
    expect(scores.snr.time_s).toBeGreaterThan(quiet);
    expect(scores.snr.time_s).toBeLessThan(1.2 * quiet);
  });

  it('puts the second detector of a splitter at a distance of the grid, as far away as the variant says', () => {
    const { elements, distanceM, scores } = designs[2];
    const { distances } = searchSpace(NOISY, FAMILIES, new Judge(NOISY, SEARCH_FINENESS));
    expect(elements.map(({ share }) => share)).toEqual([0.5, 0.5]);
    expect(elements[0].distanceM).toBeUndefined();
    expect(distances).toContain(elements[1].distanceM);
    expect((elements[1].distanceM ?? 0) / distanceM).toBeGreaterThan(1.97);
    expect((elements[1].distanceM ?? 0) / distanceM).toBeLessThan(2.03);
    expect(scores.correction.certified).toBeGreaterThan(0);
  });

  it('goes to files and back with weights, distances and shares', () => {
    designs.forEach((design, i) => {
      const json = designToJson({ ...design, id: `design-${i}`, rank: 1, meetsTarget: true });
      const { elements } = readDesignJson(JSON.parse(JSON.stringify(json)), 'design.json');
      expect(elements.map(({ weight, share, distanceM }) => ({ weight, share, distanceM }))).toEqual(
        design.elements.map(({ weight, share, distanceM }) => ({ weight, share, distanceM })),
      );
    });
  });
});

describe('a balanced layout in light of −130 dB/Hz', async () => {
  const { designs } = await new Workshop({ task: NOISY, families: FAMILIES }).do({
    kind: 'finish',
    // What a search of 2500 candidates found.
    candidates: [
      { variant: 'rings-weighted-4', vector: [3.224, 6.569, 12.038, 15.621, 0], weighedFor: 0.0099 },
    ],
  });
  const [{ scores, elements, distanceM }] = designs;

  it('meets the target of 1 % in a fiftieth of the least time that any single element could have', () => {
    expect(scores.correction.certified).toBeLessThan(0.01);
    // All of the light's noise over the floor of area over gain, λz (see DEVELOPERS.md): RIN (λz)² over (ε C)².
    const judge = new Judge(NOISY, SEARCH_FINENESS);
    const least = Math.min(...judge.scenarios.map(({ extinctionM2 }) => extinctionM2));
    const floorS = 1e-13 * ((judge.wavelengthM * distanceM) / (0.01 * least)) ** 2;
    expect(scores.snr.time_s).toBeLessThan(floorS / 50);
    expect(elements.map(({ weight }) => Math.sign(weight))).toEqual([1, -1, 1, -1]);
  });
});

describe('searchSpace', () => {
  const idsOf = (changes: Partial<Task['detector']>) => {
    const task = { ...NOISY, detector: { ...NOISY.detector, ...changes } };
    const { variants } = searchSpace(task, FAMILIES, new Judge(task, SEARCH_FINENESS));
    return variants.map(({ id }) => id);
  };

  it('draws balanced layouts alone, single elements alone, or both, as the brief says', () => {
    const balanced = idsOf({ balanced: true });
    const one = idsOf({ balanced: false, elements: 'one' });
    const both = idsOf({ balanced: false, elements: 'several' });
    expect(balanced).toEqual([
      'rings-weighted-2',
      'rings-weighted-4',
      'rings-weighted-apart-3',
      'rings-weighted-sectors-3-fold',
      'grid-4-by-4',
      'grid-3-by-5',
      'splitter-1.5',
      'splitter-2',
    ]);
    expect(one).toEqual([
      'disc',
      'rings-1',
      'rings-2',
      'rings-2-open',
      'rings-3',
      'rings-3-open',
      'rings-4',
      'rings-4-open',
    ]);
    expect(new Set(both)).toEqual(new Set([...balanced, ...one]));
    // A brief with one distance has no room for a second plane.
    expect(idsOf({ distanceM: [0.02, 0.02] }).some((id) => id.startsWith('splitter'))).toBe(false);
  });
});
