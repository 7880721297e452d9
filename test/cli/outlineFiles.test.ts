import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { circle, dxfText } from '../outline/files/dxfText.ts';
import { folderWith, runHere, SQUARE } from './runCli.ts';

const DISC = '<svg width="96" height="96" viewBox="-1 -1 2 2"><circle r="0.4"/></svg>';

describe('outlines of any format', () => {
  it('stand side by side, by the ending of their name in capitals or not', async () => {
    const folder = folderWith({
      'square.csv': SQUARE,
      'disc.SVG': DISC,
      'disc.DXF': dxfText([circle(0, 0, 0.4)], null),
      'rings.csv': 'x_mm,y_mm,ring\n-1,-1,1\n1,-1,1\n1,1,1\n-1,1,1\n-.5,-.5,2\n.5,-.5,2\n0,.5,2\n',
    });
    const drawn = await runHere([
      'draw',
      join(folder, 'disc.DXF'),
      '--unit',
      'mm',
      '--distance',
      '20 mm',
      '--formats',
      'gds,csv,json',
      '--out',
      folder,
    ]);
    expect(drawn.code).toBe(0);
    expect(readdirSync(folder)).toEqual(expect.arrayContaining(['disc.gds', 'disc.csv', 'disc.json']));
    const names = ['square.csv', 'rings.csv', 'disc.DXF', 'disc.SVG', 'disc.gds', 'disc.csv', 'disc.json'];
    const files = names.map((name) => join(folder, name));
    const { code, stdout, stderr } = await runHere([
      'compare',
      'nominal-sphere',
      ...files,
      '--unit',
      'mm',
      '--json',
    ]);
    expect([code, stderr]).toEqual([0, '']);
    const areas: Record<string, number> = Object.fromEntries(
      JSON.parse(stdout).designs.map((design: { file: string; scores: { area_m2: number } }) => [
        design.file.slice(folder.length + 1),
        design.scores.area_m2 * 1e6,
      ]),
    );
    expect(areas['square.csv']).toBeCloseTo(1, 9);
    expect(areas['rings.csv']).toBeCloseTo(4 - 0.5, 9);
    for (const name of names.slice(2)) expect(areas[name] / (Math.PI * 0.16)).toBeCloseTo(1, 6);
  });

  it('tells which unit was taken, and asks for one where there is none', async () => {
    const folder = folderWith({ 'disc.svg': DISC, 'disc.dxf': dxfText([circle(0, 0, 0.4)], null) });
    const svg = [
      'reading',
      'nominal-sphere',
      '--position',
      '0 um, 0 um',
      '--outline',
      join(folder, 'disc.svg'),
    ];
    expect((await runHere(svg)).stderr).toContain('px are taken as 1/96 in');
    expect((await runHere([...svg, '--unit', 'mm'])).stderr).not.toContain('px');
    const dxf = await runHere(['reading', 'nominal-sphere', '--outline', join(folder, 'disc.dxf')]);
    expect([dxf.code, dxf.stderr]).toEqual([
      2,
      `${folder}/disc.dxf: found a drawing without unit, expected $INSUNITS in its header (4 for mm), or --unit mm\n`,
    ]);
    const unit = await runHere(['draw', join(folder, 'disc.dxf'), '--unit', 'inch']);
    expect([unit.code, unit.stderr]).toEqual([
      2,
      '--unit: found "inch", expected one of um, mm, cm, m, in\n',
    ]);
  });
});
