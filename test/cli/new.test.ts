import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { readBrief } from '../../src/run/readBrief.ts';
import { folderWith, runHere } from './runCli.ts';

const NEEDED = [
  ...['--particles', '1 um to 4 um polystyrene; 2 um 1.5 + 0.1i'],
  ...['--wavelength', '532 nm', '--distance', '10 mm to 60 mm', '--radius', '50 um to 2 mm'],
  ...['--target', '2 %'],
];

/** The same brief as somebody would write it. */
const SHORT = `
light: { wavelength: 532 nm }
particles: [{ diameter: 1 um to 4 um, material: polystyrene }, { diameter: 2 um, index: 1.5 + 0.1i }]
detector: { distance: 10 mm to 60 mm, radius: 50 um to 2 mm }
target: { correction: 2 % }
`;

describe('rimwright new', () => {
  it('writes what the options say, and leaves the rest to its defaults', async () => {
    const file = join(folderWith(), 'bench.yaml');
    const { code, stdout, stderr } = await runHere(['new', file, ...NEEDED]);
    expect([code, stdout]).toEqual([0, '']);
    expect(stderr.replace(/\s+/g, ' ')).toContain(`Next: rimwright search ${file}`);
    expect(await readBrief(readFileSync(file, 'utf8'), file)).toEqual(await readBrief(SHORT, file));
  });

  it('takes a medium, a shop and a title that YAML would misread', async () => {
    const file = join(folderWith(), 'bench.yaml');
    const more = ['--medium', '1.332', '--shop', 'photomask', '--title', 'Bench: no. 3 # "two"'];
    expect((await runHere(['new', file, ...NEEDED, ...more])).code).toBe(0);
    const brief = await readBrief(readFileSync(file, 'utf8'), file);
    expect([brief.title, brief.mediumName, brief.shopName]).toEqual([
      'Bench: no. 3 # "two"',
      '1.332',
      'photomask',
    ]);
  });

  it('shows every key that it leaves out with the default that the program takes', async () => {
    const file = join(folderWith(), 'bench.yaml');
    await runHere(['new', file, ...NEEDED]);
    const text = readFileSync(file, 'utf8');
    const brief = await readBrief(text, file);
    const lines = text.split('\n').map((line) => line.replace(/^[ #-]*/, ''));
    const defaults = [...brief.defaults, ...brief.toleranceDefaults, ...brief.uncertaintyDefaults];
    expect(defaults.length).toBeGreaterThan(40);
    for (const line of defaults.filter((one) => !/^(title|particles)/.test(one))) {
      const [, name, value] = /^(?:.*\.)?(\w+): (.*)$/.exec(line) ?? [];
      expect(lines).toContainEqual(expect.stringMatching(new RegExp(`^${name}: +${escaped(value)} +# \\w`)));
    }
  });

  it('gives a brief that still reads with a left-out section taken in', async () => {
    const file = join(folderWith(), 'bench.yaml');
    await runHere(['new', file, ...NEEDED]);
    const text = readFileSync(file, 'utf8');
    const taken = text.replace(/^# (uncertainties|search|tolerances):.*(\n# .*)*/gm, (part) =>
      part.replace(/^# /gm, ''),
    );
    expect(taken).toContain('\nsearch:');
    expect((await readBrief(taken, file)).toleranceDefaults).toEqual([]);
  });

  it('never replaces a file without --force', async () => {
    const file = join(folderWith(), 'bench.yaml');
    writeFileSync(file, 'mine');
    const { code, stderr } = await runHere(['new', file, ...NEEDED]);
    expect([code, readFileSync(file, 'utf8')]).toEqual([2, 'mine']);
    expect(stderr).toContain('--force');
    expect((await runHere(['new', file, ...NEEDED, '--force'])).code).toBe(0);
  });

  it('names what is missing where nobody can be asked', async () => {
    const file = join(folderWith(), 'bench.yaml');
    const { code, stderr } = await runHere(['new', file, '--wavelength', '532 nm']);
    expect([code, existsSync(file)]).toEqual([2, false]);
    expect(stderr.match(/^--\w+/gm)).toEqual(['--particles', '--distance', '--radius', '--target']);
  });

  it.each([
    ['--wavelength', '532', 'a length with its unit'],
    ['--particles', 'polystyrene', 'diameters with a material or an index'],
    ['--particles', '2 um polystyrne', 'did you mean polystyrene?'],
    ['--shop', 'photomsk', 'did you mean photomask?'],
    // These are found by the checks of the whole brief.
    ['--radius', '50 um to 1 m', '80 deg'],
    ['--medium', '1.5', ''],
  ])('refuses %s %s', async (option, value, expected) => {
    const file = join(folderWith(), 'bench.yaml');
    const others = option === '--medium' ? ['--particles', '2 um 1.5'] : [];
    const { code, stderr } = await runHere(['new', file, ...NEEDED, ...others, option, value]);
    expect([code, existsSync(file)]).toEqual([2, false]);
    expect(stderr).toMatch(/^--/);
    expect(stderr).toContain(expected);
  });
});

function escaped(text: string): string {
  return text.replace(/[\\^$.*+?()[\]{}|]/g, '\\$&');
}
