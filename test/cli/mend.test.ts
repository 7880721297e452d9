import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { folderWith, runHere } from './runCli.ts';

/** A square of 400 µm with a slot of 70 µm: etching asks for 76.2 µm. */
const FLAG = 'x_mm,y_mm\n0,0\n0.4,0\n0.4,0.19\n0.9,0.19\n0.9,0.26\n0.4,0.26\n0.4,0.4\n0,0.4\n';

describe('rimwright mend', () => {
  it('writes a design that the shop can cut, and says what was changed', async () => {
    const folder = folderWith({ 'flag.csv': FLAG });
    const out = join(folder, 'mended.json');
    const args = ['mend', 'size-range', '--outline', join(folder, 'flag.csv'), '--distance', '20 mm'];
    const { code, stdout } = await runHere([...args, '--shop', 'photo-etching', '--out', out]);
    expect(code).toBe(0);
    expect(stdout).toContain('a narrow opening is widened, the opening of 70 µm at (');
    expect(stdout).toMatch(/Area 0\.195 mm² before, 0\.\d+ mm² after/);
    const design = JSON.parse(readFileSync(out, 'utf8'));
    expect(design).toMatchObject({ id: 'flag-mended', distance_m: 0.02 });
    const again = await runHere([
      'mend',
      'size-range',
      '--outline',
      out,
      '--shop',
      'photo-etching',
      '--json',
    ]);
    expect(again.code).toBe(0);
    const { changes, area_m2 } = JSON.parse(again.stdout);
    expect(changes.filter((change: string) => !change.startsWith('corners'))).toEqual([]);
    expect(area_m2.difference).toBeLessThan(1e-4 * area_m2.before);
  });

  it('exits with 1 where nothing is left to cut', async () => {
    const dot = 'x_mm,y_mm\n0,0\n0.004,0\n0.004,0.004\n0,0.004\n';
    const folder = folderWith({ 'dot.csv': dot });
    const args = ['mend', 'size-range', '--outline', join(folder, 'dot.csv'), '--distance', '20 mm'];
    const { code, stdout } = await runHere([...args, '--shop', 'photo-etching', '--json']);
    expect(code).toBe(1);
    expect(JSON.parse(stdout)).toMatchObject({ design: null, notes: ['there is nothing to cut'] });
  });

  it('asks for a shop, and for one on the shelf', async () => {
    const folder = folderWith({ 'flag.csv': FLAG });
    const args = ['mend', 'size-range', '--outline', join(folder, 'flag.csv'), '--distance', '20 mm'];
    const none = await runHere(args);
    expect(none.code).toBe(2);
    expect(none.stderr).toContain('shop: found none, expected a shop in the brief, or --shop NAME');
    const unknown = await runHere([...args, '--shop', 'wire-edn']);
    expect(unknown.code).toBe(2);
    expect(unknown.stderr).toContain('did you mean wire-edm?');
  });
});
