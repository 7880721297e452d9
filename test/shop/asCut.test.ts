import { describe, expect, it } from 'vitest';
import { presetsFolder } from '../../src/base/presetsFolder.ts';
import { randomStream } from '../../src/base/random.ts';
import { ringArea } from '../../src/outline/area.ts';
import { isDrawn } from '../../src/outline/families/family.ts';
import { polygonise } from '../../src/outline/polygonise.ts';
import { asCut } from '../../src/shop/asCut.ts';
import type { Rings } from '../../src/shop/offset.ts';
import { difference, offset, union } from '../../src/shop/offset.ts';
import { listShops, loadShop } from '../../src/shop/shelf.ts';
import type { ShopRules } from '../../src/shop/shopRules.ts';
import { VARIANTS } from '../outline/drawings.ts';
import { circle, mapped, polygon, reversed, slot, star } from './rings.ts';

const UM = 1e-6;
const etching = loadShop('photo-etching', presetsFolder());
/** Rounds convex corners alone. */
const roundsInside = (radiusUm: number): ShopRules => ({
  ...etching,
  insideCornerRadiusM: radiusUm * UM,
  outsideCornerRadiusM: 0,
  smallestOpeningM: 2 * radiusUm * UM,
});
const areaUm2 = (rings: Rings) => rings.reduce((sum, ring) => sum + ringArea(ring), 0) / UM ** 2;
const cut = (rings: Rings, rules: ShopRules) => asCut([{ weight: 1, rings }], rules)[0].rings;
const square = (side: number, x = 0, y = 0) =>
  polygon([x, y], [x + side, y], [x + side, y + side], [x, y + side]);
const ell = polygon([0, 0], [300, 0], [300, 100], [100, 100], [100, 300], [0, 300]);

// A right angle rounded to a radius r loses (1 − π/4) r² (geometry).
describe('an outline as cut', () => {
  it('a square loses (4 − π) r² at its corners', () => {
    const lost = 1e4 - areaUm2(cut([square(100)], roundsInside(10)));
    expect(Math.abs(lost / 100 - (4 - Math.PI))).toBeLessThan(1e-3);
  });

  it('an L loses five such corners, and gains one that pokes in', () => {
    const rules = { ...roundsInside(10), outsideCornerRadiusM: 20 * UM };
    const change = areaUm2(cut([ell], rules)) - areaUm2([ell]);
    const corner = 1 - Math.PI / 4;
    expect(Math.abs(change - corner * (400 - 5 * 100))).toBeLessThan(0.5);
  });

  it('any angle: r² (tan(τ/2) − τ/2) for a turn τ', () => {
    const hexagon = circle(6, 100);
    const lost = areaUm2([hexagon]) - areaUm2(cut([hexagon], roundsInside(20)));
    expect(Math.abs(lost / 400 - 6 * (Math.tan(Math.PI / 6) - Math.PI / 6))).toBeLessThan(1e-3);
  });

  it('half of the kerf counts where it is more than the corner radius', () => {
    const wide = cut([square(100)], { ...roundsInside(1), kerfM: 20 * UM });
    expect(areaUm2(wide)).toBeCloseTo(areaUm2(cut([square(100)], roundsInside(10))), 6);
  });

  it('curves that are wide enough stay as they are, vertex by vertex', () => {
    const ring = [circle(400, 100), reversed(circle(400, 60))];
    expect(cut(ring, roundsInside(15))).toBe(ring);
    const both = [circle(400, 100), square(100, 200)];
    const [disc, rounded] = cut(both, roundsInside(15)).map((one) => areaUm2([one]));
    expect(Math.max(disc, rounded)).toBeCloseTo(areaUm2([circle(400, 100)]), 9);
  });

  it('only what is sharp moves: straight sides keep their place to the digit', () => {
    const [ring] = cut([square(100)], roundsInside(10));
    const xs = Array.from(ring.filter((_, i) => i % 2 === 0));
    expect(Math.min(...xs)).toBe(0);
    expect(Math.max(...xs)).toBe(100 * UM);
  });

  it('cutting what was cut changes nothing', () => {
    const rules = { ...roundsInside(8), outsideCornerRadiusM: 5 * UM };
    for (const rings of [[square(100)], [ell], [star(6, 100, 50)], [slot(100, 20, 12)]]) {
      const once = cut(rings, rules);
      const twice = cut(once, rules);
      const moved = areaUm2(difference(once, twice)) + areaUm2(difference(twice, once));
      expect(moved).toBeLessThan(1e-3 * 64);
    }
  });

  it('turned outlines are cut alike', () => {
    const rules = { ...roundsInside(8), outsideCornerRadiusM: 5 * UM };
    const area = areaUm2(cut([ell], rules));
    for (const angle of [0.3, 1.9]) {
      const [c, s] = [Math.cos(angle), Math.sin(angle)];
      const turned = mapped(ell, (x, y) => [c * x - s * y, s * x + c * y]);
      expect(areaUm2(cut([turned], rules))).toBeCloseTo(area, 3);
    }
  });

  it('a slot that the shop still cuts stays, though narrower than its corners; a narrower one goes', () => {
    // Etching cuts slots of 76.2 µm and rounds corners to 50 µm.
    const withSlot = (width: number) =>
      polygon(
        [0, 0],
        [400, 0],
        [400, 150],
        [900, 150],
        [900, 150 + width],
        [400, 150 + width],
        [400, 400],
        [0, 400],
      );
    const kept = areaUm2(cut([withSlot(80)], etching));
    const none = areaUm2(cut([withSlot(60)], etching));
    expect(kept - none).toBeGreaterThan(0.97 * 80 * 500);
    expect(none).toBeLessThan(400 * 400);
    expect(none).toBeGreaterThan(400 * 400 - 50 ** 2);
  });

  it('webs narrower than twice their rounding stay down to what the shop leaves standing', () => {
    const pair = (gap: number) => [square(400), square(400, 400 + gap)];
    expect(cut(pair(60), etching)).toHaveLength(2);
    expect(cut(pair(30), etching)).toHaveLength(1);
  });

  it('an opening smaller than the cutter is gone', () => {
    expect(cut([square(15)], roundsInside(10))).toEqual([]);
  });

  it('vertices lie on the shop’s grid', () => {
    const rules = { ...roundsInside(10), gridM: 1e-7 };
    const [ring] = cut([square(100.04)], rules);
    for (const value of ring) expect(Math.abs(value / 1e-7 - Math.round(value / 1e-7))).toBeLessThan(1e-6);
    expect(Math.max(...ring) / UM).toBeCloseTo(100, 9);
  });

  it.each(listShops(presetsFolder()))('$name leaves a large square a square', (rules) => {
    const side = 5000;
    const lost = side ** 2 - areaUm2(cut([square(side)], rules));
    const radiusUm = Math.max(rules.insideCornerRadiusM, rules.kerfM / 2) / UM;
    expect(Math.abs(lost / radiusUm ** 2 - (4 - Math.PI))).toBeLessThan(rules.gridM === 0 ? 2e-3 : 2e-2);
  });

  it.each(VARIANTS.map((variant) => [variant.id, variant] as const))(
    'covers what plain offsets leave: %s',
    (_, variant) => {
      const mask = { ...loadShop('photomask', presetsFolder()), smallestOpeningM: 6e-6, smallestWebM: 6e-6 };
      const random = randomStream(3);
      for (let k = 0; k < 2; k++) {
        const drawn = variant.draw(variant.start(random).values, 5e-5);
        if (!isDrawn(drawn)) continue;
        for (const { loops } of drawn.elements) {
          const rings = loops.map((loop) => polygonise(loop, 360));
          const roundedOff = offset(offset(rings, -mask.insideCornerRadiusM), mask.insideCornerRadiusM);
          const plain = offset(offset(roundedOff, mask.outsideCornerRadiusM), -mask.outsideCornerRadiusM);
          expect(Math.abs(areaUm2(cut(rings, mask)) - areaUm2(plain))).toBeLessThan(0.01 * areaUm2(rings));
        }
      }
    },
  );

  it('refuses coordinates that are not finite', () => {
    const broken = square(100);
    broken[3] = Number.NaN;
    expect(() => cut([broken], etching)).toThrow(/rings\[0\], point 1: found .*NaN/);
  });
});

describe('regions laid over each other', () => {
  it('union and difference of squares', () => {
    expect(areaUm2(union([square(100)], [square(100, 50, 50)]))).toBeCloseTo(17500, 6);
    expect(areaUm2(difference([square(100)], [square(100, 50, 50)]))).toBeCloseTo(7500, 6);
    expect(areaUm2(difference([square(100)], [square(20, 40, 40)]))).toBeCloseTo(9600, 6);
    expect(difference([square(100)], [square(120, -10, -10)])).toEqual([]);
  });

  it('islands stay, and edges that coincide do no harm', () => {
    const frame = [square(100), reversed(square(60, 20, 20))];
    expect(areaUm2(union(frame, [square(60, 20, 20)]))).toBeCloseTo(1e4, 6);
    expect(areaUm2(difference([square(100)], frame))).toBeCloseTo(3600, 6);
  });
});
