import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { folderWith, runHere, SQUARE } from './runCli.ts';

const FLYING = `light: { wavelength: 635 nm }
particles: [{ diameter: 2 um, index: 1.59 }, { diameter: 3 um, index: 1.59 }]
placement: { offset: 0.1 um, crossing: { span: 120 um, heading: 30 deg } }
detector: { distance: 20 mm, radius: 20 um to 2 mm }
target: { correction: 1 % }
`;
const STILL = FLYING.replace(/placement: .*\n/, '');

async function reading(brief: string, ...args: string[]) {
  const folder = folderWith({ 'brief.yaml': brief, 'square.csv': SQUARE });
  const at = (arg: string) => (/\.csv$/.test(arg) ? join(folder, arg) : arg);
  const files = [join(folder, 'brief.yaml'), '--outline', join(folder, 'square.csv')];
  const again = () => runHere(['reading', ...files, ...args.map(at)]);
  return { ...(await again()), again, folder };
}

/** Rows of a CSV by their header. */
function rowsOf(file: string): Record<string, string>[] {
  const [header, ...lines] = readFileSync(file, 'utf8').trimEnd().split('\r\n');
  const keys = header.split(',');
  return lines.map((line) => Object.fromEntries(line.split(',').map((cell, i) => [keys[i], cell])));
}

const mean = (values: number[]) => values.reduce((sum, value) => sum + value, 0) / values.length;

describe('reading --trace', () => {
  it('writes one trace a flight, whose mean is what the flight reads', async () => {
    const { code, stdout, folder } = await reading(FLYING, '--trace', 'trace.csv', '--json');
    expect(code).toBe(0);
    const rows = rowsOf(join(folder, 'trace.csv'));
    const { readings } = JSON.parse(stdout);
    const points = rows.length / readings.length;
    expect(Number.isInteger(points)).toBe(true);
    readings.forEach((reading: { correction: number; reading_m2: number }, i: number) => {
      const flight = rows.slice(i * points, (i + 1) * points);
      // The bound of the task: 1e-5 of the extinction.
      expect(Math.abs(mean(flight.map((row) => Number(row.correction))) - reading.correction)).toBeLessThan(
        1e-5,
      );
      const readMean = mean(flight.map((row) => Number(row.reading_um2)));
      expect(Math.abs(readMean / (1e12 * reading.reading_m2) - 1)).toBeLessThan(1e-5);
    });
    // Along the heading of 30 degrees, in equal steps within the span.
    const [first, second] = rows;
    const step = Number(second.along_um) - Number(first.along_um);
    expect(Number(first.along_um) - step / 2).toBeCloseTo(-60, 3);
    expect(Number(first.y_um) / Number(first.x_um)).toBeCloseTo(Math.tan(Math.PI / 6), 5);
  });

  it('writes the one flight through --position, and never over a file without --force', async () => {
    const { folder, again } = await reading(FLYING, '--position', '5 um, 0 um', '--trace', 'trace.csv');
    const file = join(folder, 'trace.csv');
    const offsets = new Set(rowsOf(file).map((row) => `${row.offset_x_um},${row.offset_y_um}`));
    expect([...offsets]).toEqual(['5,0']);
    writeFileSync(file, 'mine');
    const refused = await again();
    expect([refused.code, refused.stdout]).toEqual([2, '']);
    expect(refused.stderr).toContain('--force to replace it');
    expect(readFileSync(file, 'utf8')).toBe('mine');
  });

  it('is refused where particles do not fly, and leaves no file', async () => {
    const { code, stderr, folder } = await reading(STILL, '--trace', 'trace.csv');
    expect(code).toBe(2);
    expect(stderr).toBe(
      '--trace: found a brief whose particles do not fly, expected a brief with placement.crossing, or a reading without --trace\n',
    );
    expect(existsSync(join(folder, 'trace.csv'))).toBe(false);
  });
});

describe('reading --rough', () => {
  it('gives mean and spread near the closed estimate, the same for the same seed', async () => {
    const args = ['--rough', '0.5 um, 30 um', '--outlines', '48', '--json'];
    const { stdout, again } = await reading(STILL, ...args);
    const { rough } = JSON.parse(stdout);
    expect(Object.keys(rough)).toEqual([
      ...['rms_m', 'correlation_m', 'outlines', 'seed', 'redrawn', 'places', 'readings', 'worst'],
    ]);
    expect(JSON.parse((await again()).stdout).rough).toEqual(rough);
    for (const { first, worst } of rough.readings) {
      expect(worst).toEqual(first);
      // A standard deviation of 48 is itself good to 10 %, and a mean to a seventh of it: three times that.
      expect(Math.abs(first.spread / first.estimate.spread - 1)).toBeLessThan(0.31);
      expect(Math.abs(first.mean - first.estimate.mean)).toBeLessThan((3 * first.estimate.spread) / 7);
      expect(first.spread).toBeGreaterThan(1e-3);
    }
    expect(rough.worst.largest).toBeGreaterThan(rough.worst.mean);
  });

  it('says it in words, and refuses edges that keep meeting', async () => {
    const { stdout } = await reading(STILL, '--rough', '1 um, 50 um', '--outlines', '4');
    expect(stdout).toContain('Edges of 1 µm rms, correlated over 50 µm, in 4 outlines');
    for (const line of stdout.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
    const wild = await reading(STILL, '--rough', '300 um, 20 um', '--outlines', '2');
    expect(wild.code).toBe(2);
    expect(wild.stderr).toContain('--rough: found edges that meet in each of 20 drawings');
  });

  it.each([
    ['2 um', 'expected an rms height and a correlation length, such as "2 um, 50 um"'],
    ['2 um, 5', '--rough: found "5", expected a length with its unit'],
    ['-1 um, 50 um', 'expected lengths from 1 nm to 10 mm'],
  ])('refuses %s', async (text, message) => {
    const { code, stderr } = await reading(STILL, `--rough=${text}`);
    expect(code).toBe(2);
    expect(stderr).toContain(message);
  });
});
