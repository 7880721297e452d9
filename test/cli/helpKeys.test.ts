import { describe, expect, it } from 'vitest';
import { runHere } from './runCli.ts';

describe('rimwright help', () => {
  it('explains a key of a brief', async () => {
    const { code, stdout } = await runHere(['help', 'light.linewidth']);
    expect(code).toBe(0);
    expect(stdout).toBe(`light.linewidth  (0 nm if left out)
  full width of the line at half maximum

  value: a length with its unit, from 0 nm to 4 um

  example:
    light:
      linewidth: 1 nm
`);
  });

  it('takes names alone, entries as errors name them, and keys of two words', async () => {
    const all = await runHere(['help', 'distance']);
    expect(all.stdout).toMatch(/^detector\.distance.*^uncertainties\.distance.*^tolerances\.distance/ms);
    const entry = await runHere(['help', 'particles[1].core.share']);
    expect(entry.stdout).toContain('particles:\n      - core:\n          share: 60 %');
    const words = await runHere(['help', 'placement.spread.diffusing', 'for']);
    expect(words.stdout).toContain('from 1 ns to 1e6 s');
  });

  it('lists every key within 80 columns', async () => {
    const { stdout } = await runHere(['help', 'brief']);
    for (const key of ['title', 'sourceAngle', 'commonModeRejection', 'lightDrift', 'averaging', 'seed']) {
      expect(stdout).toContain(key);
    }
    for (const line of stdout.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
  });

  it('explains commands as --help does', async () => {
    const [asTopic, asOption] = [await runHere(['help', 'draw']), await runHere(['draw', '--help'])];
    expect([asTopic.code, asTopic.stdout]).toEqual([0, asOption.stdout]);
    expect((await runHere(['help'])).stdout).toContain('Usage: rimwright');
    const search = await runHere(['help', 'search']);
    expect(search.stdout).toContain('Usage: rimwright search');
    expect(search.stdout).toContain('rimwright help brief.search');
    expect((await runHere(['help', 'brief.search'])).stdout).toContain('20000 if left out');
  });

  it('exits 2 for an unknown topic, with the nearest', async () => {
    for (const [topic, nearest] of [
      ['linewidht', 'linewidth'],
      ['light.linewith', 'light.linewidth'],
      ['serach', 'search'],
    ]) {
      const { code, stdout, stderr } = await runHere(['help', topic]);
      expect([code, stdout]).toEqual([2, '']);
      expect(stderr).toContain(`help: found "${topic}", expected a command`);
      expect(stderr).toContain(`(did you mean ${nearest}?)`);
    }
  });
});

describe('rimwright presets --schema', () => {
  it('prints a JSON Schema of draft 2020-12', async () => {
    const { code, stdout } = await runHere(['presets', '--schema']);
    expect(code).toBe(0);
    const schema = JSON.parse(stdout);
    expect(schema.$schema).toBe('https://json-schema.org/draft/2020-12/schema');
    expect(schema.additionalProperties).toBe(false);
  });
});
