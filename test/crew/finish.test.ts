import { describe, expect, it } from 'vitest';
import { Workshop } from '../../src/crew/workshop.ts';
import { ringArea, ringsRadius } from '../../src/outline/area.ts';
import { FAMILY_NAMES } from '../../src/outline/families/family.ts';
import { findRingsCrossing } from '../../src/outline/selfCrossing.ts';
import { REPORT_FINENESS } from '../../src/score/fineness.ts';
import { Judge } from '../../src/score/judge.ts';
import { searchSpace } from '../../src/score/searchSpace.ts';
import { presetTask } from '../score/presetTasks.ts';

const OFFSET = await presetTask('offset-range');
const CANDIDATES = [
  { variant: 'disc', vector: [3] },
  { variant: 'rings-2', vector: [0.98, 2.09, 11, 11.2] },
  { variant: 'ramp-saw-12-fold', vector: [3.1, 9.4] },
  { variant: 'fourier-square-5-fold-6', vector: [5, 2, 0.5, 0.2, 0, 0.1] },
  { variant: 'polygon-star-5', vector: [9, 3, 0.1] },
  { variant: 'sectors-arc-2-fold-1', vector: [0.8, 1, 4] },
];

/** Families of one element; `layouts.test.ts` has those of several. */
const SINGLE = FAMILY_NAMES.filter((name) => name !== 'grid' && name !== 'splitter');

describe('finish', async () => {
  const judge = new Judge(OFFSET, REPORT_FINENESS);
  const space = searchSpace(OFFSET, FAMILY_NAMES, judge);
  const { designs } = await new Workshop({ task: OFFSET, families: FAMILY_NAMES }).do({
    kind: 'finish',
    candidates: CANDIDATES,
  });

  it('gives one design a candidate, in their order', () => {
    expect(designs.map(({ family }) => family)).toEqual(SINGLE);
    for (const { distanceM } of designs) expect(distanceM).toBe(0.02);
  });

  it('judges exactly the points that go to the files', () => {
    for (const { elements, scores } of designs) {
      for (const { rings } of elements) {
        for (const ring of rings)
          expect(ring.every((value) => value === Math.round(value * 1e9) / 1e9)).toBe(true);
        expect(findRingsCrossing(rings)).toBeNull();
        expect(scores.area_m2).toBeCloseTo(
          rings.reduce((sum, ring) => sum + ringArea(ring), 0),
          18,
        );
        expect(scores.radius_m).toBe(ringsRadius(rings));
      }
      // Without the help of its symmetry the outline is worth the same.
      const blind = judge.scoreOutline(elements, 0.02).scores;
      expect(Math.abs(blind.correction.worst - scores.correction.worst)).toBeLessThan(
        0.05 * OFFSET.target.correction,
      );
    }
  });

  it('has points enough to read as the curve does', () => {
    for (const [i, { scores }] of designs.entries()) {
      const { variant: id, vector } = CANDIDATES[i];
      const variant = space.variants.find((one) => one.id === id);
      const shape = variant?.draw(vector, 1 / Math.sqrt(judge.kappa(0.02)));
      if (!shape || !('elements' in shape)) throw new Error(`${id} is not drawn`);
      const curve = judge.scoreShape(shape, 0.02).scores;
      expect(Math.abs(curve.correction.worst - scores.correction.worst)).toBeLessThan(2e-4);
      expect(Math.abs(curve.area_m2 / scores.area_m2 - 1)).toBeLessThan(1e-4);
    }
  });

  it('is the same from a workshop, again and again', async () => {
    const workshop = new Workshop({ task: OFFSET, families: FAMILY_NAMES });
    const job = { kind: 'finish', candidates: CANDIDATES.slice(0, 3) } as const;
    expect((await workshop.do(job)).designs).toEqual(designs.slice(0, 3));
    expect((await workshop.do(job)).designs).toEqual(designs.slice(0, 3));
  });

  it('asks the shop where there is one', async () => {
    for (const { shop } of designs) expect(shop).toEqual({ fits: true, notes: [], misfit: 0 });
    const { shop } = await presetTask('road-dust');
    const asked = new Workshop({ task: { ...OFFSET, shop }, families: FAMILY_NAMES });
    // Two rings leave the sheet between them without hold; a star can be cut.
    const [, rings, , , star] = (await asked.do({ kind: 'finish', candidates: CANDIDATES })).designs;
    expect(star.shop.fits).toBe(true);
    expect(star.shop.notes.length).toBeGreaterThan(0);
    expect(rings.shop.misfit > 0).toBe(!rings.shop.fits);
  });
});
