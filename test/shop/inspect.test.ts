import { describe, expect, it } from 'vitest';
import { presetsFolder } from '../../src/base/presetsFolder.ts';
import { inspectOutline } from '../../src/shop/inspect.ts';
import { loadShop } from '../../src/shop/shelf.ts';
import { circle, polar, polygon, reversed, slot } from './rings.ts';

const etching = loadShop('photo-etching', presetsFolder());
const mask = loadShop('photomask', presetsFolder());
const rectangle = (widthUm: number, heightUm: number, x = 0, y = 0) =>
  polygon([x, y], [x + widthUm, y], [x + widthUm, y + heightUm], [x, y + heightUm]);

// The shops' numbers (an opening of 76.2 µm, webs of 50 µm, corners of 50 and 37.5 µm; 6 and 3 µm) stand in the presets.
describe('a shop', () => {
  it('takes a disc, and says so', () => {
    expect(inspectOutline([{ rings: [circle(400, 100)] }], etching)).toEqual({
      fits: true,
      notes: ['smallest opening 200 µm, no web: within the rules of photo-etching'],
      misfit: 0,
    });
  });

  it('names the opening that is too narrow, its place, and by what share', () => {
    const report = inspectOutline([{ rings: [rectangle(400, 60, 1000, -30)] }], etching);
    expect(report.fits).toBe(false);
    expect(report.misfit).toBeCloseTo(1 - 60 / 76.2, 9);
    expect(report.notes[0]).toMatch(
      /^the smallest opening, 60 µm at \(1\d{3}\.\d, 0\.0\) µm, is below the shop's 76\.2 µm$/,
    );
    expect(report.notes).toHaveLength(2);
  });

  it('names the web that is too narrow', () => {
    const discs = [circle(400, 100), circle(400, 100, [220, 0])];
    const report = inspectOutline([{ rings: discs }], etching);
    expect(report.misfit).toBeCloseTo(1 - 20 / 50, 2);
    expect(report.notes).toHaveLength(1);
    expect(report.notes[0]).toMatch(
      /^the smallest web, 20 µm at \(110\.\d, \d\.\d\) µm, is below the shop's 50 µm; a disc of that width stops at \(110\.0, 4\d\.\d\) µm, \(110\.0, -4\d\.\d\) µm$/,
    );
  });

  it('lets an opening of its smallest width pass, though a polygon is a little narrower than its circle', () => {
    expect(inspectOutline([{ rings: [circle(100, 38.1)] }], etching).fits).toBe(true);
    expect(inspectOutline([{ rings: [circle(100, 37.9)] }], etching).fits).toBe(false);
  });

  it('loses islands where nothing holds them, and keeps them on glass', () => {
    const rings = [circle(300, 900), reversed(circle(300, 500))];
    const etched = inspectOutline([{ rings }], etching);
    expect(etched).toMatchObject({ fits: false, misfit: 1 });
    expect(etched.notes).toEqual([
      'a piece of sheet around (0.0, 0.0) µm falls out: bridges are needed to hold it',
    ]);
    expect(inspectOutline([{ rings }], mask)).toMatchObject({ fits: true, misfit: 0 });
    const more = inspectOutline([{ rings: [...rings, circle(90, 300), reversed(circle(90, 100))] }], etching);
    expect(more.notes[0]).toMatch(/^2 pieces of sheet fall out, the largest around \(0\.0, 0\.0\) µm/);
  });

  it('rounds corners without refusing them, and says how far off the tip', () => {
    const tee = polygon(
      [0, 0],
      [900, 0],
      [900, 300],
      [600, 300],
      [600, 900],
      [300, 900],
      [300, 300],
      [0, 300],
    );
    const report = inspectOutline([{ rings: [tee] }], etching);
    expect(report.fits).toBe(true);
    // A circle in a right angle stays (√2 − 1) r from the tip: 20.7 µm and 15.5 µm.
    expect(report.notes[1]).toMatch(
      /^the tightest inside corner, drawn sharp at \(.*\) µm, will be rounded to a radius of 50 µm, up to 20\.7 µm off its tip$/,
    );
    expect(report.notes[2]).toMatch(
      /^the tightest outside corner, .* radius of 37\.5 µm, up to 15\.5 µm off its tip$/,
    );
    const slotted = inspectOutline([{ rings: [slot(500, 80, 40)] }], etching);
    expect(slotted).toMatchObject({ fits: true, notes: [expect.stringMatching('within the rules')] });
    const blob = inspectOutline([{ rings: [slot(500, 300, 40)] }], { ...etching, insideCornerRadiusM: 2e-4 });
    expect(blob.notes).toHaveLength(1);
    const egg = polar(720, (phi) => 300 / (1 + 0.5 * Math.cos(phi)) ** 0.2 / (1 + 0.9 * Math.cos(phi) ** 2));
    const tight = inspectOutline([{ rings: [egg] }], { ...etching, insideCornerRadiusM: 2e-4 });
    expect(tight.notes.join()).toMatch(/drawn with a radius of \d+ µm at .* rounded to a radius of 200 µm$/);
  });

  it('judges each element by itself, misfits first', () => {
    const good = { rings: [circle(300, 900)] };
    const bad = { rings: [circle(300, 20)] };
    const report = inspectOutline([good, bad], etching);
    expect(report.fits).toBe(false);
    expect(report.misfit).toBeCloseTo(1 - 40 / 76.2, 3);
    expect(report.notes[0]).toMatch(/^element 2: the smallest opening, 40 µm/);
    expect(report.notes.at(-1)).toBe(
      'element 1: smallest opening 1.8 mm, no web: within the rules of photo-etching',
    );
    // Neighbouring zones of different sign touch, and are not webs of one sheet.
    const zones = [{ rings: [circle(300, 500)] }, { rings: [circle(300, 900), reversed(circle(300, 500))] }];
    expect(inspectOutline(zones, mask).fits).toBe(true);
  });

  it('has nothing to cut where there are no rings', () => {
    expect(inspectOutline([{ rings: [] }], mask)).toEqual({
      fits: false,
      notes: ['there is nothing to cut'],
      misfit: 1,
    });
  });

  it('guides a search: the misfit falls steadily to 0 as an opening widens', () => {
    const misfits = [10, 30, 50, 70, 76.2, 90].map(
      (width) => inspectOutline([{ rings: [rectangle(400, width)] }], etching).misfit,
    );
    for (let k = 1; k < misfits.length; k++) expect(misfits[k]).toBeLessThanOrEqual(misfits[k - 1]);
    expect(misfits.map((misfit) => misfit > 0)).toEqual([true, true, true, true, false, false]);
  });
});
