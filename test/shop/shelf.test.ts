import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { presetsFolder } from '../../src/base/presetsFolder.ts';
import { listShops, loadShop } from '../../src/shop/shelf.ts';
import { readShopPreset } from '../../src/shop/shopPreset.ts';
import practice from '../reference/shop-practice.json' with { type: 'json' };

const INCH_M = 0.0254;

function refusal(action: () => unknown): RimwrightError {
  try {
    action();
  } catch (error) {
    if (error instanceof RimwrightError) return error;
    throw error;
  }
  throw new Error('nothing was refused');
}

describe('the shops on the shelf', () => {
  it('are listed by name', () => {
    expect(listShops(presetsFolder()).map(({ name }) => name)).toEqual([
      'laser-cutting',
      'photo-etching',
      'photodiode-die',
      'photomask',
      'wire-edm',
    ]);
  });

  it.each(listShops(presetsFolder()))(
    '$name says whose practice it is, to ask, and what is dangerous',
    (shop) => {
      expect(loadShop(shop.name, presetsFolder())).toEqual(shop);
      expect(shop.source).toMatch(
        /^(Common practice among shops|Our own estimate), no standard and no published source/,
      );
      expect(shop.cautions.length).toBeGreaterThanOrEqual(3);
      expect(shop.cautions[0]).toContain('ask yours');
      expect(shop.cautions.at(-1)).toMatch(/licensed.*follow local codes/);
      for (const caution of shop.cautions) expect(caution).toMatch(/^[A-Z].*\.$/);
      expect(shop.smallestOpeningM).toBeGreaterThanOrEqual(shop.kerfM);
      expect(shop.insideCornerRadiusM).toBeLessThanOrEqual(shop.smallestOpeningM);
    },
  );

  it('photo-etching follows common practice for its foil', () => {
    const { etching } = practice;
    const shop = loadShop('photo-etching', presetsFolder());
    const t = shop.thicknessM ?? 0;
    expect(t).toBe(5e-5);
    const opening = Math.max(etching.slotOverT.value * t, etching.openingFloorIn.value * INCH_M);
    expect(shop.smallestOpeningM).toBeCloseTo(opening, 12);
    expect(shop.smallestWebM).toBeCloseTo(etching.webOverT.value * t, 12);
    expect(shop.insideCornerRadiusM).toBeCloseTo(etching.insideRadiusOverT.value * t, 12);
    expect(shop.outsideCornerRadiusM).toBeCloseTo(etching.outsideRadiusOverT.value * t, 12);
    const tolerance = Math.max(etching.toleranceOverT.value * t, etching.toleranceFloorMm.value / 1000);
    expect(shop.edgeToleranceM).toBeCloseTo(tolerance, 12);
    expect(shop.islands).toBe('fall out');
  });

  it('laser cutting takes the cautious end of common practice', () => {
    const { laser } = practice;
    const shop = loadShop('laser-cutting', presetsFolder());
    const t = shop.thicknessM ?? 0;
    expect(t).toBe(5e-4);
    const opening = Math.max(laser.openingOverT.value * t, laser.openingFloorMm.value / 1000);
    expect(shop.smallestOpeningM).toBeCloseTo(opening, 12);
    expect(shop.smallestWebM).toBeCloseTo(laser.edgeDistanceOverT.value[1] * t, 12);
    const [narrow, wide] = laser.kerfIn.value.map((inch) => inch * INCH_M);
    expect(shop.kerfM).toBeCloseTo((narrow + wide) / 2, 12);
    expect(shop.insideCornerRadiusM).toBeCloseTo(wide / 2, 5);
    expect(shop.edgeToleranceM).toBeCloseTo(laser.accuracyMm.value / 1000, 12);
    expect(shop.islands).toBe('fall out');
  });

  it('a photomask holds islands, and has no sheet', () => {
    const { photomask } = practice;
    const shop = loadShop('photomask', presetsFolder());
    expect(shop.thicknessM).toBeNull();
    expect(shop.smallestOpeningM).toBeCloseTo(photomask.smallestFeatureUm.value * 1e-6, 12);
    expect(shop.smallestWebM).toBeCloseTo(photomask.smallestFeatureUm.value * 1e-6, 12);
    // A width is off by twice what each of its edges is.
    expect(shop.edgeToleranceM).toBeCloseTo((photomask.widthToleranceUm.value / 2) * 1e-6, 7);
    expect(shop.islands).toBe('held');
  });

  it('wire EDM follows common practice for its wire', () => {
    const { wireEdm } = practice;
    const shop = loadShop('wire-edm', presetsFolder());
    const wireM = wireEdm.wireIn.value * INCH_M;
    const [narrow, wide] = wireEdm.kerfIn.value.map((inch) => inch * INCH_M);
    expect(shop.kerfM).toBeCloseTo((narrow + wide) / 2, 12);
    expect(shop.insideCornerRadiusM).toBeCloseTo(wireEdm.insideRadiusOverWire.value[1] * wireM, 7);
    expect(shop.smallestOpeningM).toBeGreaterThan(shop.kerfM);
    expect(shop.islands).toBe('fall out');
  });

  it('a die says that its numbers are our own', () => {
    const shop = loadShop('photodiode-die', presetsFolder());
    expect(shop.source).toMatch(/^Our own estimate/);
    expect(shop.islands).toBe('held');
    expect(shop.gridM).toBeCloseTo(1e-7, 15);
  });

  it('unknown names are refused, with what there is', () => {
    const error = refusal(() => loadShop('photo-ething', presetsFolder()));
    expect(error.code).toBe('input');
    expect(error.message).toBe(
      'found "photo-ething", expected one of the shops on the shelf: laser-cutting, photo-etching, photodiode-die, photomask, wire-edm (did you mean photo-etching?)',
    );
    expect(refusal(() => loadShop('../media/air', presetsFolder())).code).toBe('input');
  });

  it('a missing folder is a fault of the machine', () => {
    expect(refusal(() => listShops(join(presetsFolder(), 'nowhere'))).code).toBe('machine');
  });
});

describe('a preset with mistakes is refused', () => {
  const text = readFileSync(join(presetsFolder(), 'shops', 'photomask.yaml'), 'utf8');

  it.each([
    ['an unknown key', text.replace('kerfUm', 'curfUm'), /kerfUm: found nothing/],
    ['a missing key', text.replace(/^gridUm.*$/m, ''), /gridUm: found nothing/],
    [
      'a width of nothing',
      text.replace(/^smallestWebUm: 6/m, 'smallestWebUm: 0'),
      /:5: smallestWebUm: found 0/,
    ],
    ['a word for a number', text.replace(/^kerfUm: 0/m, 'kerfUm: thin'), /kerfUm: found "thin"/],
    [
      'unknown islands',
      text.replace('held', 'glued'),
      /islands: found "glued", expected one of held, fall out/,
    ],
  ])('%s', (_, wrong, message) => {
    const error = refusal(() => readShopPreset('photomask', wrong, 'photomask.yaml'));
    expect(error.code).toBe('input');
    expect(error.message).toMatch(message);
  });
});
