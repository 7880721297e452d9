import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { folderWith, runCli, runHere } from './runCli.ts';

const COMMANDS = [
  'search',
  'smallest',
  'trade',
  'reading',
  'response',
  'budget',
  'evaluate',
  'bound',
  'compare',
  'yield',
  'draw',
  'mend',
  'presets',
  'help',
  'new',
  'completion',
];

/** Scripts that a run of the program loaded, after the coverage that V8 writes. */
function scriptsIn(folder: string): string[] {
  return readdirSync(folder).flatMap((file) =>
    JSON.parse(readFileSync(join(folder, file), 'utf8')).result.map(({ url }: { url: string }) => url),
  );
}

describe('help', () => {
  it('is there without loading what only commands need', async () => {
    const folder = folderWith();
    const { code, stdout } = await runCli(['--help'], folder, { NODE_V8_COVERAGE: folder });
    expect(code).toBe(0);
    expect(stdout).toContain('Usage: rimwright');
    const scripts = scriptsIn(folder);
    const own = scripts.filter((url) => url.includes('/dist/')).map((url) => url.split('/dist/')[1]);
    expect(own.sort()).toEqual([
      'base/errors.js',
      'base/nearestName.js',
      'base/version.js',
      'cli/commander.js',
      'cli/declareFiles.js',
      'cli/declareHelping.js',
      'cli/declareMeasuring.js',
      'cli/declareReading.js',
      'cli/declareSearching.js',
      'cli/exit.js',
      'cli/main.js',
      'cli/optionRules.js',
      'cli/optionTexts.js',
      'cli/program.js',
      'outline/files/lengthUnit.js',
      'score/aim.js',
      'score/scores.js',
    ]);
    const packages = scripts.flatMap((url) => url.split('/node_modules/')[1]?.split('/')[0] ?? []);
    expect([...new Set(packages)]).toEqual(['commander']);
  });

  it('tells every command, with an example, within 80 columns', async () => {
    const { stdout } = await runHere(['--help']);
    for (const command of COMMANDS) {
      expect(stdout).toContain(`  ${command} `);
      const help = await runHere([command, '--help']);
      expect(help.code).toBe(0);
      expect(help.stdout).toContain(`$ rimwright ${command} `);
      for (const line of help.stdout.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
    }
  });

  it('exits 2 and prints nothing on standard output for what it cannot use', async () => {
    const folder = folderWith();
    const lines = [
      [],
      ['serach', 'x'],
      ['search'],
      ['search', 'x', '--colour'],
      ['reading', 'x'],
      ['compare', 'x'],
    ];
    for (const args of lines) {
      const { code, stdout, stderr } = await runHere(args);
      expect([args, code, stdout]).toEqual([args, 2, '']);
      expect(stderr).not.toBe('');
    }
    const { code, stderr } = await runCli(['serach', 'x'], folder);
    expect(code).toBe(2);
    expect(stderr).toContain('Did you mean search?');
  });

  it('says the version of package.json', async () => {
    const { version } = JSON.parse(readFileSync(new URL('../../package.json', import.meta.url), 'utf8'));
    expect((await runHere(['--version'])).stdout).toBe(`${version}\n`);
  });
});

describe('options with numbers', () => {
  // The limits of these options are those of the brief's keys (briefSchema.ts), whose messages say them.
  it.each([
    ['--candidates', 'candidates', 99],
    ['--candidates', 'candidates', 100_000_001],
    ['--seed', 'seed', -1],
    ['--seed', 'seed', 2 ** 31],
  ])('%s refuses as search.%s does: %d', async (option, key, value) => {
    const brief = `search: { ${key}: ${value} }\n`;
    const folder = folderWith({ 'brief.yaml': brief });
    const asOption = await runHere(['search', join(folder, 'brief.yaml'), `${option}=${value}`]);
    const asKey = await runHere(['search', join(folder, 'brief.yaml')]);
    const expected = /a whole number from \d+ to \d+/;
    expect(asOption.code).toBe(2);
    expect(expected.exec(asOption.stderr)?.[0]).toBe(expected.exec(asKey.stderr)?.[0]);
    expect(asOption.stderr).toContain(`${option}: found "${value}"`);
  });

  it('takes workers from 1 to 64', async () => {
    for (const value of ['0', '65', '1.5', 'two']) {
      const { code, stderr } = await runHere(['search', 'road-dust', '--workers', value]);
      expect(code).toBe(2);
      expect(stderr).toBe(`--workers: found "${value}", expected a whole number from 1 to 64\n`);
    }
  });
});
