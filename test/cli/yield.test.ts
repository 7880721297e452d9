import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { folderWith, runCli, runHere } from './runCli.ts';

const BRIEF = `light: { wavelength: 635 nm }
medium: 1.0
particles: [{ diameter: 2 um, index: 1.59 }]
placement: { offset: 2 um }
detector: { distance: 20 mm, radius: 20 um to 0.4 mm }
target: { correction: 0.5 %, gain: free }
tolerances: { edge: 3 um, kerf: none, distance: 50 um, tilt: none, wavelength: none, index: none, size: none }
`;

/** A disc of the first zone. */
const DISC = `x_mm,y_mm\n${Array.from({ length: 180 }, (_, i) => {
  const angle = (2 * Math.PI * i) / 180;
  return `${0.1125 * Math.cos(angle)},${0.1125 * Math.sin(angle)}`;
}).join('\n')}\n`;

function files() {
  const folder = folderWith({ 'brief.yaml': BRIEF, 'disc.csv': DISC });
  return { folder, args: ['yield', join(folder, 'brief.yaml'), '--outline', join(folder, 'disc.csv')] };
}

describe('rimwright yield', () => {
  it('prints the yield and a row for each tolerance, within 80 columns', async () => {
    const { folder, args } = files();
    const { code, stdout, stderr } = await runCli([...args, '--builds', '400'], folder);
    expect(code).toBe(0);
    expect(stderr.replace(/\s+/g, ' ')).toContain('tolerances.place: 2 um rms; tolerances.averaging: 1 s');
    expect(stdout).toMatch(/of\s+400 builds,\s+calibrated each, [\d.]+ %\s+read within 0.5 %/);
    for (const name of ['edge +± 3 µm', 'place +2 µm rms', 'distance +± 50 µm', 'noise +0.0']) {
      expect(stdout).toMatch(new RegExp(`^${name}`, 'm'));
    }
    expect(stdout).not.toMatch(/^tilt/m);
    for (const line of stdout.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
  });

  it('gives the same for any number of workers, and the exit code that --at-least asks for', async () => {
    const { folder, args } = files();
    const csv = join(folder, 'builds.csv');
    const few = [...args, '--builds', '400', '--quiet', '--json', '--tolerance', 'edge = 1 um rms'];
    const one = await runCli([...few, '--workers', '1', '--at-least', '1 %'], folder);
    const two = await runCli([...few, '--workers', '2', '--at-least', '1 %', '--csv', csv], folder);
    expect([one.code, two.code]).toEqual([0, 0]);
    expect(two.stdout).toBe(one.stdout);
    const found = JSON.parse(one.stdout);
    expect(found.tolerances[0]).toMatchObject({ name: 'edge', law: 'rms', size: 1e-6 });
    expect(found.yield).toBeGreaterThanOrEqual(found.interval[0]);
    const rows = readFileSync(csv, 'utf8').trim().split('\r\n').slice(1);
    expect(rows).toHaveLength(400);
    expect(rows.filter((row) => row.endsWith('true')).length / 400).toBeCloseTo(found.yield, 10);
    // Any build out of tolerance is too many for this one.
    const strict = await runCli([...few, '--tolerance', 'edge = 9 um', '--at-least', '99.9 %'], folder);
    expect(strict.code).toBe(1);
  });

  it.each([
    [['--tolerance', 'edge'], /--tolerance: found "edge", expected a key and its tolerance, such as/],
    [
      ['--tolerance', 'plaze = 1 um'],
      /--tolerance: found "plaze", expected one of edge, kerf.* \(did you mean place\?\)/,
    ],
    [
      ['--tolerance', 'place = 1'],
      /--tolerance: found "1", expected for place none, or a length with its unit/,
    ],
    [
      ['--tolerance', 'size = 70 %'],
      /--tolerance: found "70 %", expected for size none, or a value up to 50 %/,
    ],
    [['--at-least', '120 %'], /--at-least: found "120 %", expected a share above 0 and below 100 %/],
    [['--builds', '20'], /--builds: found "20", expected a whole number from 100 to 10000000/],
    [
      ['--gain', 'nominel'],
      /--gain: found "nominel", expected one of nominal, recalibrated \(did you mean nominal\?\)/,
    ],
  ])('refuses %j', async (more, message) => {
    const { args } = files();
    const { code, stdout, stderr } = await runHere([...args, '--quiet', ...more]);
    expect([code, stdout]).toEqual([2, '']);
    expect(stderr).toMatch(message);
  });

  it('refuses a tolerance of a brief with its line', async () => {
    const text = BRIEF.replace('edge: 3 um', 'edge: 3');
    const folder = folderWith({ 'brief.yaml': text, 'disc.csv': DISC });
    const { code, stderr } = await runHere(['yield', join(folder, 'brief.yaml'), '--design', 'x']);
    expect(code).toBe(2);
    expect(stderr).toMatch(
      /brief.yaml:7: tolerances.edge: found 3, expected shop, none, or a length with its unit/,
    );
  });
});
