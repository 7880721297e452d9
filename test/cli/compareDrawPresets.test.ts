import { existsSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { folderWith, runCli, runHere, SQUARE } from './runCli.ts';

/** A polygon of 720 corners with the area of a circle. */
function circle(radiusMm: number): [number, number][] {
  const step = (2 * Math.PI) / 720;
  const r = radiusMm * Math.sqrt(step / Math.sin(step));
  return Array.from({ length: 720 }, (_, k) => [r * Math.cos(k * step), r * Math.sin(k * step)]);
}

const csvOf = (ring: readonly [number, number][]) =>
  `x_mm,y_mm\n${ring.map((point) => point.join(',')).join('\n')}\n`;

/** The first zone of 635 nm at 20 mm: √(λz) (design.md, section 3, gain). */
const ZONE_MM = 1e3 * Math.sqrt(635e-9 * 0.02);

const ZONE_DISC = {
  id: 'zone',
  family: 'disc',
  distance_m: 0.02,
  elements: [{ weight: 1, rings_mm: [circle(ZONE_MM)] }],
};

describe('rimwright compare', () => {
  it('ranks those that meet the target first, and gives the shape of a front', async () => {
    const folder = folderWith({
      'square.csv': SQUARE,
      'zone.json': JSON.stringify(ZONE_DISC),
      'small.csv': csvOf(circle(ZONE_MM / 2)),
    });
    const files = ['square.csv', 'small.csv', 'zone.json'].map((file) => join(folder, file));
    const { code, stdout } = await runHere(['compare', 'size-range', ...files, '--json']);
    expect(code).toBe(0);
    const { brief, designs, recommended } = JSON.parse(stdout);
    expect(brief.title).toBe('Spheres of three sizes on the axis');
    // Only what meets the target as drawn is built over and over.
    expect(designs.map((design: { yield?: number }) => design.yield !== undefined)).toEqual([
      true,
      false,
      false,
    ]);
    expect(designs[0].yield).toBeGreaterThan(0);
    expect(recommended).toEqual({ id: 'zone', reason: expect.stringMatching('it alone meets the target') });
    expect(designs.map(({ id }: { id: string }) => id)).toEqual(['zone', 'small', 'square']);
    expect(designs.map(({ rank }: { rank: number }) => rank)).toEqual([1, 2, 3]);
    expect(designs[0].file).toBe(files[2]);
    expect(designs[0]).toMatchObject({ meetsTarget: true, family: 'disc' });
    // A disc of the first zone reads twice the extinction (design.md: 2.000, 1.999 and 1.996 for these spheres).
    expect(designs[0].scores.gain).toBeCloseTo(1.998, 3);
    expect(Object.keys(designs[0].scores)).toContain('shop');
  });

  it('shows one row a file, and what the shop says', async () => {
    const folder = folderWith({ 'square.csv': SQUARE, 'zone.json': JSON.stringify(ZONE_DISC) });
    const files = ['square.csv', 'zone.json'].map((file) => join(folder, file));
    const args = ['compare', 'calibration-spheres', ...files, '--distance', '20 mm'];
    const { code, stdout } = await runHere(args);
    expect(code).toBe(0);
    expect(stdout).toMatch(/\n1 {2}zone +[\d.]+/);
    expect(stdout).toMatch(/\n2 {2}square +[\d.]+/);
    expect(stdout.replace(/\s+/g, ' ')).toContain('zone.json: smallest opening');
    const table = stdout.split('\n\n')[0];
    for (const line of table.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
    expect(stdout).toMatch(/\n(Recommended: zone, since|No recommendation: none meets the target;)/);
  });

  it('gives every broken file’s message and no scores at all', async () => {
    const folder = folderWith({
      'square.csv': SQUARE,
      'bow.csv': 'x_mm,y_mm\n0,0\n1,1\n1,0\n0,1\n',
      'zone.json': JSON.stringify({ ...ZONE_DISC, distance_m: '20 mm', wieght: 1 }),
    });
    const files = ['square.csv', 'bow.csv', 'missing.csv', 'zone.json'];
    const { code, stdout, stderr } = await runCli(['compare', 'nominal-sphere', ...files], folder);
    expect([code, stdout]).toEqual([2, '']);
    expect(stderr.split('\n')).toEqual([
      'bow.csv:2: found the edge from line 2 meeting the edge from line 4 at x = 0.5 mm, y = 0.5 mm, expected an outline that does not cross or touch itself',
      'missing.csv: found no such file, expected a file that can be read',
      'zone.json: wieght: found an unknown key, expected only id, family, distance_m, elements, fields, otherFields, asDrawn, scores, rank, meetsTarget',
      'zone.json: distance_m: found "20 mm", expected a distance from 0.0001 to 10 m',
      '',
    ]);
  });
});

describe('rimwright draw', () => {
  it('draws what a design’s file says, and never over a drawing without being told', async () => {
    const folder = folderWith({
      'front.json': JSON.stringify({ designs: [ZONE_DISC, { ...ZONE_DISC, id: 'b' }] }),
    });
    const args = ['draw', 'front.json#zone', '--out', 'shop/floor'];
    const { code, stdout } = await runCli(args, folder);
    expect([code, stdout]).toEqual([0, 'shop/floor/zone.dxf\nshop/floor/zone.svg\n']);
    const dxf = readFileSync(join(folder, 'shop/floor/zone.dxf'), 'utf8');
    expect(dxf).toContain('ELEMENT_1');
    writeFileSync(join(folder, 'shop/floor/zone.svg'), 'mine');
    const again = await runCli([...args, '--formats', 'svg'], folder);
    expect(again.code).toBe(2);
    expect(again.stderr).toBe(
      'shop/floor/zone.svg: found a file of that name, expected a new name, or --force to replace it\n',
    );
    expect(readFileSync(join(folder, 'shop/floor/zone.svg'), 'utf8')).toBe('mine');
    expect((await runCli([...args, '--force'], folder)).code).toBe(0);
    expect(readFileSync(join(folder, 'shop/floor/zone.svg'), 'utf8')).toContain('<svg');
    expect(readdirSync(join(folder, 'shop/floor')).sort()).toEqual(['zone.dxf', 'zone.svg']);
  });

  it('draws a CSV at a distance, and asks for it', async () => {
    const folder = folderWith({ 'My Square.csv': SQUARE });
    const file = join(folder, 'My Square.csv');
    const without = await runHere(['draw', file, '--out', folder]);
    expect(without.code).toBe(2);
    expect(without.stderr).toContain('found an outline without a distance, expected a distance');
    const drawn = await runHere(['draw', file, '--out', folder, '--distance', '20 mm', '--formats', 'dxf']);
    expect(drawn.stdout).toBe(`${join(folder, 'my-square.dxf')}\n`);
    expect(existsSync(join(folder, 'my-square.svg'))).toBe(false);
  });

  it.each([
    ['front.json', 'found 2 designs and no id, expected one of the ids zone, b'],
    ['front.json#zon', 'found the id "zon", expected one of the ids zone, b (did you mean zone?)'],
    ['square.csv#zone', 'found the id "zone", expected a front.json with it'],
    ['evil.json', 'id: found "../../evil", expected a name of up to 60 letters'],
    ['text.json', 'found text that is not JSON'],
  ])('refuses %s', async (name, message) => {
    const folder = folderWith({
      'front.json': JSON.stringify({ designs: [ZONE_DISC, { ...ZONE_DISC, id: 'b' }] }),
      'evil.json': JSON.stringify({ ...ZONE_DISC, id: '../../evil' }),
      'text.json': 'nothing\nof value',
      'square.csv': SQUARE,
    });
    const { code, stderr } = await runHere(['draw', join(folder, name), '--out', join(folder, 'out')]);
    expect(code).toBe(2);
    expect(stderr).toContain(message);
    expect(stderr.trim().split('\n')).toHaveLength(1);
    expect(existsSync(join(folder, 'out'))).toBe(false);
  });
});

describe('rimwright presets', () => {
  it('lists the whole shelf with ranges and sources', async () => {
    const { code, stdout } = await runHere(['presets']);
    expect(code).toBe(0);
    for (const heading of ['MEDIA', 'MATERIALS', 'SHOPS', 'BRIEFS']) expect(stdout).toContain(`${heading}\n`);
    expect(stdout).toContain('  air  Air of a room');
    expect(stdout).toContain('Light from 300 nm to 1.7 µm. Source: Ciddor (1996)');
    expect(stdout).toContain('  road-dust  Road-dust monitor, extinction channel');
    for (const line of stdout.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
    const json = JSON.parse((await runHere(['presets', '--json'])).stdout);
    expect(Object.keys(json)).toEqual(['media', 'materials', 'shops', 'briefs']);
    expect(json.media[0]).toMatchObject({ name: 'air', rangeM: [3e-7, 1.7e-6] });
    expect(Object.keys(JSON.parse((await runHere(['presets', 'shops', '--json'])).stdout))).toEqual([
      'shops',
    ]);
  });

  it('prints one preset as it stands on the shelf, so that it can be changed', async () => {
    for (const [shelf, name] of [
      ['briefs', 'road-dust'],
      ['shops', 'photomask'],
      ['media', 'water'],
    ]) {
      const file = new URL(`../../presets/${shelf}/${name}.yaml`, import.meta.url);
      expect((await runHere(['presets', shelf, name])).stdout).toBe(readFileSync(file, 'utf8'));
    }
    const unknown = await runHere(['presets', 'briefs', '../shops/photomask']);
    expect(unknown.code).toBe(2);
    expect((await runHere(['presets', 'brief'])).stderr).toContain('(did you mean briefs?)');
  });
});
