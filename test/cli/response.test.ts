import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { folderWith, runHere, SQUARE } from './runCli.ts';

const BRIEF = `light: { wavelength: 635 nm }
medium: water
particles: [{ diameter: 1 um to 2 um, count: 2, material: polystyrene }]
placement: { offset: 2 um }
detector: { distance: 20 mm, radius: 20 um to 2 mm }
target: { correction: 3 %, gain: free }
`;

async function response(...args: string[]) {
  const folder = folderWith({ 'brief.yaml': BRIEF, 'square.csv': SQUARE });
  const at = (arg: string) => (/\.csv$/.test(arg) ? join(folder, arg) : arg);
  const files = [join(folder, 'brief.yaml'), '--outline', join(folder, 'square.csv')];
  const outcome = await runHere(['response', ...files, ...args.map(at)]);
  return { ...outcome, folder, files };
}

describe('rimwright response', () => {
  it('reads the brief’s own particles as reading does, with the gain of the scores', async () => {
    const args = ['--from', '1 um', '--to', '2 um', '--count', '2', '--json'];
    const { stdout, files } = await response(...args);
    const { gain, points, holds, target, material } = JSON.parse(stdout);
    const read = JSON.parse((await runHere(['reading', ...files, '--json'])).stdout);
    expect([material, target]).toEqual(['polystyrene', 0.03]);
    expect(gain).toBe(read.design.scores.gain);
    for (const point of points) {
      const own = read.readings.filter(
        (one: { particle: { diameter_m: number } }) => one.particle.diameter_m === point.diameter_m,
      );
      const ratios = own.map((one: { correction: number }) => (1 + one.correction) / gain - 1);
      expect(point.extinction_m2 / own[0].extinction_m2).toBeCloseTo(1, 9);
      // Amplitude series of one sphere and of two may differ in length.
      expect(point.correction.least).toBeCloseTo(Math.min(...ratios), 7);
      expect(point.correction.most).toBeCloseTo(Math.max(...ratios), 7);
      expect(point.calibrated_m2).toBeCloseTo(point.reading_m2 / gain, 18);
    }
    const worst = Math.max(
      ...points.flatMap((p: { correction: object }) => Object.values(p.correction).map(Math.abs)),
    );
    expect(worst).toBeCloseTo(read.design.scores.correction.worst, 7);
    expect(holds).toEqual(worst <= 0.03 ? [[1e-6, 2e-6]] : []);
  });

  it('prints a table and the ranges, and writes the same as CSV', async () => {
    const args = ['--from', '0.5 um', '--to', '8 um', '--count', '9', '--csv', 'curve.csv'];
    const { code, stdout, folder } = await response(...args);
    expect(code).toBe(0);
    expect(stdout).toMatch(/The target of 3 % holds .*\(of\s+the\s+9\s+diameters\s+tried\)\./s);
    for (const line of stdout.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
    const [header, ...rows] = readFileSync(join(folder, 'curve.csv'), 'utf8').trimEnd().split('\r\n');
    expect(header).toBe(
      'diameter_um,extinction_um2,reading_um2,calibrated_um2,correction_least,correction_most,holds',
    );
    const diameters = rows.map((row) => Number(row.split(',')[0]));
    expect(diameters).toHaveLength(9);
    expect(diameters[4]).toBeCloseTo(2, 9);
    expect(rows.filter((row) => row.endsWith('true')).length).toBe((stdout.match(/\bheld\b/g) ?? []).length);
  });

  it.each([
    [['--material', 'polystirene'], 'did you mean polystyrene'],
    [['--material', 'water'], '--material: found water, expected another material than the medium'],
    [['--from', '10 um'], '--to: found "10 um", expected a diameter above that of --from, 10 um'],
    [['--from', '0.02 nm'], '--from: found 0.02 nm to 10 µm, expected diameters from'],
    [['--count', '1'], '--count: found "1", expected a whole number from 2 to 2000'],
  ])('refuses %j', async (args, message) => {
    const { code, stdout, stderr } = await response(...args);
    expect([code, stdout]).toEqual([2, '']);
    expect(stderr).toContain(message);
  });
});
