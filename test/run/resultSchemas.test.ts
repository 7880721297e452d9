import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { folderWith, QUICK_BRIEF, runCli, runHere, SQUARE } from '../cli/runCli.ts';
import type { Schema } from '../jsonSchema.ts';
import { misfits } from '../jsonSchema.ts';

async function schemaOf(document: string): Promise<Schema> {
  const { code, stdout } = await runHere(['presets', '--schema', document]);
  expect(code).toBe(0);
  return JSON.parse(stdout);
}

describe('JSON that commands print keeps its published schema', () => {
  it('search --json, and front.json', async () => {
    const folder = folderWith({ 'brief.yaml': QUICK_BRIEF });
    const out = join(folder, 'results');
    const brief = join(folder, 'brief.yaml');
    const { stdout } = await runCli(
      ['search', brief, '--json', '--quiet', '--workers', '1', '--out', out],
      folder,
    );
    const schema = await schemaOf('search');
    const result = JSON.parse(stdout);
    expect(result.designs.length).toBeGreaterThan(0);
    expect(misfits(result, schema)).toEqual([]);
    const front = readFileSync(join(out, 'quick-look', 'front.json'), 'utf8');
    expect(misfits(JSON.parse(front), schema)).toEqual([]);
    // The schema can fail.
    const { evaluations: _, ...without } = result;
    expect(misfits({ ...without, more: 1 }, schema)).toEqual(['/evaluations: required', '/more: unknown']);
    result.designs[0].scores.gain = 'one';
    expect(misfits(result, schema)).toEqual(['/designs/0/scores/gain: type number']);
  });

  it('smallest --json, with a design and without', async () => {
    const schema = await schemaOf('smallest');
    for (const correction of ['1 %', '0.00001 %']) {
      const text = QUICK_BRIEF.replace('correction: 1 %', `correction: ${correction}`).replace(', rings', '');
      const folder = folderWith({ 'brief.yaml': text });
      const { stdout } = await runCli(
        ['smallest', 'brief.yaml', '--json', '--quiet', '--workers', '1'],
        folder,
      );
      expect(misfits(JSON.parse(stdout), schema)).toEqual([]);
    }
  });

  it('reading --json, of an outline and at one place', async () => {
    const schema = await schemaOf('reading');
    const square = join(folderWith({ 'square.csv': SQUARE }), 'square.csv');
    for (const more of [[], ['--position', '50 um, -30 um']]) {
      const { stdout } = await runHere(['reading', 'nominal-sphere', '--outline', square, '--json', ...more]);
      expect(misfits(JSON.parse(stdout), schema)).toEqual([]);
    }
  });

  it('response --json', async () => {
    const square = join(folderWith({ 'square.csv': SQUARE }), 'square.csv');
    const args = [
      'response',
      'nominal-sphere',
      '--outline',
      square,
      '--to',
      '2 um',
      '--count',
      '3',
      '--json',
    ];
    const { stdout } = await runHere(args);
    expect(misfits(JSON.parse(stdout), await schemaOf('response'))).toEqual([]);
  });

  it('the example kept in the repository', async () => {
    const file = fileURLToPath(new URL('../../results/example/front.json', import.meta.url));
    expect(misfits(JSON.parse(readFileSync(file, 'utf8')), await schemaOf('search'))).toEqual([]);
  });

  it('and there is none of other documents', async () => {
    const { code, stderr } = await runHere(['presets', '--schema', 'serach']);
    expect([code, stderr]).toEqual([
      2,
      '--schema: found "serach", expected one of brief, search, smallest, reading, response (did you mean search?)\n',
    ]);
  });
});
