import { describe, expect, it } from 'vitest';
import { presetsFolder } from '../../src/base/presetsFolder.ts';
import { randomStream } from '../../src/base/random.ts';
import { isDrawn } from '../../src/outline/families/family.ts';
import { polygonise } from '../../src/outline/polygonise.ts';
import { measureOutline } from '../../src/shop/measureOutline.ts';
import { loadShop } from '../../src/shop/shelf.ts';
import type { ShopRules } from '../../src/shop/shopRules.ts';
import { WIDTH_SLACK, widthMisfit } from '../../src/shop/widthMisfit.ts';
import { VARIANTS } from '../outline/drawings.ts';

const mask = loadShop('photomask', presetsFolder());

/** Radius at a phase of 1. */
const UNIT_M = 5e-5;

/** Widths between edges of the whole outline: what `inspectOutline` begins with. */
function misfitBetweenEdges(
  elements: readonly { rings: readonly Float64Array[] }[],
  rules: ShopRules,
): number {
  const misfits = elements.flatMap(({ rings }) => {
    const { smallestOpening, smallestWeb } = measureOutline(rings);
    const opening = 1 - (smallestOpening?.widthM ?? 0) / rules.smallestOpeningM;
    const web = 1 - (smallestWeb?.widthM ?? Infinity) / rules.smallestWebM;
    return [opening, web].map((misfit) => (misfit > WIDTH_SLACK ? misfit : 0));
  });
  return Math.max(0, ...misfits);
}

describe('widthMisfit', () => {
  it.each(VARIANTS.map((variant) => [variant.id, variant] as const))(
    'is that of the whole inspection: %s',
    (_, variant) => {
      const random = randomStream(7);
      let missed = 0;
      const short: number[] = [];
      for (let k = 0; k < 3; k++) {
        const drawn = variant.draw(variant.start(random).values, UNIT_M);
        if (!isDrawn(drawn)) continue;
        const elements = drawn.elements.map(({ loops }) => ({
          rings: loops.map((loop) => polygonise(loop, 96)),
        }));
        // Rules from far below to far above most widths of these outlines.
        for (const scale of [0.5, 4, 60]) {
          const rules: ShopRules = {
            ...mask,
            smallestOpeningM: scale * mask.smallestOpeningM,
            smallestWebM: scale * mask.smallestWebM,
          };
          const whole = misfitBetweenEdges(elements, rules);
          const part = widthMisfit(elements, rules, drawn);
          expect(part).toBeLessThan(whole + 1e-9);
          short.push(whole - part);
          expect(widthMisfit(elements, rules, { folds: 1, mirror: false })).toBeCloseTo(whole, 12);
          if (whole > 0) missed++;
        }
      }
      expect(missed).toBeGreaterThan(0);
      // Where two sides close in on each other, a vertex more or less decides where they begin to face; folds alike to a nanometre differ there.
      short.sort((a, b) => a - b);
      expect(short[Math.floor(0.7 * short.length)]).toBeLessThan(1e-3);
      expect(short[short.length - 1]).toBeLessThan(0.2);
    },
  );

  it('is 1 for islands that fall out, and where nothing is cut', () => {
    const ring = (radiusM: number, sense: 1 | -1) =>
      polygonise([{ kind: 'arc', centre: [0, 0], radius: radiusM, from: 0, to: sense * 2 * Math.PI }], 96);
    const rings = [ring(1e-3, 1), ring(5e-4, -1)];
    const whole = { folds: Number.POSITIVE_INFINITY, mirror: true };
    expect(widthMisfit([{ rings }], mask, whole)).toBe(0);
    expect(widthMisfit([{ rings }], loadShop('photo-etching', presetsFolder()), whole)).toBe(1);
    expect(widthMisfit([{ rings: [] }], mask, whole)).toBe(1);
  });
});
