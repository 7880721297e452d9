import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { folderWith, runCli, runHere, SQUARE } from './runCli.ts';

/** The sphere of design.md, section 6: 2 µm, index 1.59, 635 nm, 20 mm behind it, in vacuum. */
const NOMINAL = `title: Nominal
light: { wavelength: 635 nm }
medium: 1.0
particles: [{ diameter: 2 um, index: 1.59 }]
detector: { distance: 10 mm to 60 mm, radius: 20 um to 2 mm }
target: { correction: 1 % }
`;

const nominalWith = (section: string, line: string) =>
  NOMINAL.includes(`${section}: {`)
    ? NOMINAL.replace(`${section}: {`, `${section}: { ${line},`)
    : `${NOMINAL}${section}: { ${line} }\n`;

/** Readings of the square, as JSON, in this process. */
async function readSquare(brief: string, ...args: string[]) {
  const folder = folderWith({ 'brief.yaml': brief, 'square.csv': SQUARE });
  const files = [join(folder, 'brief.yaml'), '--outline', join(folder, 'square.csv')];
  const { code, stdout, stderr } = await runHere(['reading', ...files, '--json', ...args]);
  return { code, stderr, ...(stdout === '' ? null : JSON.parse(stdout)) };
}

describe('rimwright reading', () => {
  it('gives the published example: a square of 1 mm reads 0.15625 too little', async () => {
    // design.md, section 3: checked there against a direct quadrature of the vector Poynting flux to 1e-6.
    const folder = folderWith({ 'brief.yaml': NOMINAL, 'square.csv': SQUARE });
    const args = ['reading', 'brief.yaml', '--outline', 'square.csv', '--distance', '20 mm', '--json'];
    const { code, stdout, stderr } = await runCli(args, folder);
    expect([code, stderr]).toEqual([0, '']);
    const { readings, design } = JSON.parse(stdout);
    expect(readings).toHaveLength(1);
    const [reading] = readings;
    expect(reading).toMatchObject({
      particle: { diameter_m: 2e-6, index: [1.59, 0] },
      wavelength_m: 6.35e-7,
      distance_m: 0.02,
      position_m: [0, 0, 0],
      spread_m: 0,
    });
    expect(Math.abs(reading.correction + 0.15625)).toBeLessThan(1e-5);
    expect(reading.reading_m2 / reading.extinction_m2 - 1).toBeCloseTo(reading.correction, 12);
    expect(reading.extinction_m2).toBeCloseTo(8.5035e-12, 15);
    expect(design.scores.correction.worst).toBeCloseTo(-reading.correction, 12);
    expect(design).toMatchObject({ id: 'square', family: 'given', distance_m: 0.02, meetsTarget: false });
  });

  it('reads at one place where --position says so, beyond the brief’s offset too', async () => {
    const at = ['--distance', '20 mm', '--position'];
    const { readings, design } = await readSquare(NOMINAL, ...at, '50 um, -30 um');
    expect(readings).toHaveLength(1);
    expect(readings[0].position_m).toEqual([5e-5, -3e-5, 0]);
    expect(design).toBeNull();
    // The square has two mirror lines and a fourfold axis.
    const turned = await readSquare(NOMINAL, ...at, '-0.03 mm, -50 µm');
    expect(turned.readings[0].correction).toBeCloseTo(readings[0].correction, 9);
    const far = await readSquare(NOMINAL, ...at, '3 mm, 0 mm');
    expect(far.code).toBe(0);
  });

  it('reads at every wavelength of the drift, depth and place of the brief', async () => {
    const drift = await readSquare(nominalWith('light', 'drift: 1 nm'), '--distance', '20 mm');
    const lights = drift.readings.map(({ wavelength_m }: { wavelength_m: number }) => wavelength_m * 1e9);
    expect(lights.map((nm: number) => Number(nm.toFixed(4)))).toEqual([634, 634.5, 635, 635.5, 636]);
    const depth = await readSquare(
      nominalWith('placement', 'depth: 1 mm, offset: 1 um'),
      '--distance',
      '20 mm',
    );
    const depths = new Set(depth.readings.map(({ position_m }: { position_m: number[] }) => position_m[2]));
    expect([...depths].sort((a, b) => Number(a) - Number(b))).toEqual([-1e-3, -5e-4, 0, 5e-4, 1e-3]);
    expect(depth.readings[0].position_m).toEqual([0, 0, 0]);
    const corrections = depth.readings.map(({ correction }: { correction: number }) => Math.abs(correction));
    expect(depth.design.scores.correction.worst).toBeCloseTo(Math.max(...corrections), 12);
  });

  it('warns where the far-zone form or the distance is doubtful', async () => {
    const { warnings, stderr } = await readSquare(NOMINAL, '--distance', '2 mm');
    expect(warnings).toHaveLength(2);
    expect(warnings[0]).toContain('The far-zone form may be off by about 0.12 % of the extinction');
    expect(warnings[1]).toBe("The distance 2 mm is not the brief's 10 mm to 60 mm");
    expect(stderr).toContain('Warning: The far-zone form');
  });

  it('prints a table for people', async () => {
    const folder = folderWith({ 'brief.yaml': NOMINAL, 'square.csv': SQUARE });
    const args = ['reading', 'brief.yaml', '--outline', 'square.csv', '--distance', '20 mm'];
    const { stdout, stderr } = await runCli(args, folder, { FORCE_COLOR: '1', CI: '1' });
    expect(stdout).toContain('2 µm 1.59    635         8.5     7.17       −15.6  −15.6');
    expect(stdout).toContain('The target is not met: target.correction allows 1 %, its worst is 15.62 %');
    expect(stderr).toContain('Defaults used: light.linewidth: 0 nm');
    // No colours where there is no terminal.
    expect(stdout + stderr).not.toContain('\u001b');
    for (const line of stdout.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
  });

  it.each([
    [['--position', '50, 3 mm'], '--position: found "50", expected a length with its unit, such as 20 mm'],
    [['--position', '5 um'], '--position: found "5 um", expected two lengths, such as "50 um, -30 um"'],
    [['--position', '5 um, 1 s'], '--position: found "1 s", expected a length with its unit, such as 20 mm'],
    [['--position', '2 m, 0 m'], '--position: found "2 m, 0 m", expected a place within 1 m of the axis'],
    [['--position', '0.5 m, 0 m'], 'expected less than 113.4 mm, a half-angle of 80 deg'],
    [['--distance', '20'], '--distance: found "20", expected a length with its unit, such as 20 mm'],
    [['--distance', '-20 mm'], '--distance: found "-20 mm", expected a distance from 0.1 mm to 10 m'],
    [['--distance', '11 m'], '--distance: found "11 m", expected a distance from 0.1 mm to 10 m'],
    [['--distance', '0.1 mm'], 'found a radius of 707.1 µm, expected less than 567.1 µm'],
  ])('refuses %j', async (args, message) => {
    const { code, stderr, readings } = await readSquare(NOMINAL, '--distance', '20 mm', ...args);
    expect([code, readings]).toEqual([2, undefined]);
    expect(stderr).toContain(message);
    expect(stderr.trim().split('\n')).toHaveLength(1);
  });

  it('needs a distance for a CSV where the brief leaves a choice, and what memory can hold', async () => {
    const without = await readSquare(NOMINAL);
    expect(without.code).toBe(2);
    expect(without.stderr).toContain(
      'found no distance, and a brief that allows 10 mm to 60 mm, expected a distance',
    );
    const wide = await readSquare(nominalWith('placement', 'offset: 9 mm'), '--distance', '20 mm');
    expect(wide.code).toBe(2);
    expect(wide.stderr).toContain('takes less memory');
  });
});
