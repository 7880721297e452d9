import { describe, expect, it } from 'vitest';
import { presetsFolder } from '../../src/base/presetsFolder.ts';
import { randomStream } from '../../src/base/random.ts';
import { ringArea } from '../../src/outline/area.ts';
import { isDrawn } from '../../src/outline/families/family.ts';
import { polygonise } from '../../src/outline/polygonise.ts';
import { findRingsCrossing } from '../../src/outline/selfCrossing.ts';
import { inspectOutline } from '../../src/shop/inspect.ts';
import { mend } from '../../src/shop/mend.ts';
import type { Rings } from '../../src/shop/offset.ts';
import { loadShop } from '../../src/shop/shelf.ts';
import { VARIANTS } from '../outline/drawings.ts';
import { circle, polygon, reversed } from './rings.ts';

const UM = 1e-6;
const etching = loadShop('photo-etching', presetsFolder());
const mask = loadShop('photomask', presetsFolder());
const areaUm2 = (rings: Rings) => rings.reduce((sum, ring) => sum + ringArea(ring), 0) / UM ** 2;
const rectangle = (width: number, height: number, x = 0, y = 0) =>
  polygon([x, y], [x + width, y], [x + width, y + height], [x, y + height]);

describe('mend', () => {
  it('leaves alone what the shop can cut', () => {
    const rings = [circle(400, 100)];
    const mended = mend(rings, etching);
    expect(mended).toMatchObject({ changes: [], differenceM2: 0, report: { fits: true } });
    expect(mended.rings).toBe(rings);
  });

  it('widens a slot that is a little too narrow', () => {
    const mended = mend([rectangle(600, 70)], etching);
    expect(mended.report.fits).toBe(true);
    expect(mended.changes[0]).toMatch(/^a narrow opening is widened, the opening of 70 µm at \(.*\) µm$/);
    expect(areaUm2(mended.rings) / (600 * 77)).toBeCloseTo(1, 1);
  });

  it('gives up a slot that is much too narrow, and a bar of sheet', () => {
    const flag = polygon(
      [0, 0],
      [400, 0],
      [400, 190],
      [900, 190],
      [900, 205],
      [400, 205],
      [400, 400],
      [0, 400],
    );
    const mended = mend([flag], etching);
    expect(mended.report.fits).toBe(true);
    expect(mended.changes[0]).toMatch(/given up/);
    expect(Math.abs(areaUm2(mended.rings) / 400 ** 2 - 1)).toBeLessThan(0.03);
    const pair = mend([rectangle(400, 400), rectangle(400, 400, 405)], etching);
    expect(pair.report.fits).toBe(true);
    expect(pair.rings).toHaveLength(1);
  });

  it('widens a bar that is nearly wide enough', () => {
    const mended = mend([rectangle(400, 400), rectangle(400, 400, 445)], etching);
    expect(mended.report.fits).toBe(true);
    expect(mended.rings).toHaveLength(2);
    expect(mended.changes[0]).toMatch(/^a narrow web is widened, the web of 45 µm/);
  });

  it('hangs islands on bridges', () => {
    const ring = [circle(400, 900), reversed(circle(400, 500))];
    const mended = mend(ring, etching);
    expect(mended.report.fits).toBe(true);
    expect(mended.rings).toHaveLength(3);
    expect(mended.changes[0]).toMatch(
      /^3 bridges, 50\.5 µm wide, hold what would fall out around \(0\.0, 0\.0\) µm$/,
    );
    // Three bars of 50.5 µm over a ring 400 µm wide, and some rounding.
    const taken = areaUm2(ring) - areaUm2(mended.rings);
    expect(Math.abs(taken / (3 * 50.5 * 400) - 1)).toBeLessThan(0.15);
    expect(mended.differenceM2 / UM ** 2).toBeCloseTo(taken, -2);
  });

  it('says so where nothing is left', () => {
    const mended = mend([circle(100, 2)], etching);
    expect(mended.report.fits).toBe(false);
  });

  it.each(VARIANTS.filter((_, k) => k % 16 === 1).map((variant) => [variant.id, variant] as const))(
    'makes what a shop can cut: %s',
    (_, variant) => {
      const random = randomStream(5);
      const drawn = variant.draw(variant.start(random).values, 4e-5);
      if (!isDrawn(drawn)) return;
      for (const { loops } of drawn.elements) {
        const rings = loops.map((loop) => polygonise(loop, 64));
        const mended = mend(rings, mask);
        expect(inspectOutline([{ rings: mended.rings }], mask)).toMatchObject({ fits: true });
        expect(findRingsCrossing(mended.rings)).toBeNull();
      }
    },
  );
});
