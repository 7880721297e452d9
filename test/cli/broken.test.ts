import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { presetNames } from '../../src/base/presetFiles.ts';
import { presetsFolder } from '../../src/base/presetsFolder.ts';
import { readDesignFile } from '../../src/run/readDesignFile.ts';
import { folderWith, runCli, runHere, SQUARE } from './runCli.ts';

const BROKEN = fileURLToPath(new URL('../broken/', import.meta.url));
const expectedIn = (kind: string): [file: string, messages: string[]][] =>
  Object.entries(JSON.parse(readFileSync(join(BROKEN, kind, 'expected.json'), 'utf8')));
const BRIEFS = expectedIn('briefs');
const OUTLINES = expectedIn('outlines');
const DRAWINGS = expectedIn('drawings');

/** Messages with the names on the shelf in place of `{media}` and the like. */
const withShelf = (messages: string[]) =>
  messages.map((message) =>
    message.replace(/\{(media|materials|shops)\}/, (_, shelf) =>
      presetNames(shelf, presetsFolder()).join(', '),
    ),
  );

/** Every n-th of them. */
const some = <T>(all: T[], n: number) => all.filter((_, i) => i % n === 0);

function messageOf(read: () => unknown): string {
  try {
    read();
  } catch (error) {
    if (error instanceof RimwrightError && error.code === 'input') return error.message;
    throw error;
  }
  return 'no mistake found';
}

describe('broken files', () => {
  // The fixtures' messages are named by file alone; here they come with the path that was given.
  const withPath = (kind: string, messages: string[]) =>
    withShelf(messages)
      .map((message) => `${join(BROKEN, kind)}/${message}\n`)
      .join('');

  it.each(BRIEFS)('brief %s', async (file, messages) => {
    const { code, stdout, stderr } = await runHere(['search', join(BROKEN, 'briefs', file)]);
    expect([code, stdout]).toEqual([2, '']);
    expect(stderr).toBe(withPath('briefs', messages));
  });

  it.each(OUTLINES)('outline %s', async (file, messages) => {
    const path = join(BROKEN, 'outlines', file);
    const { code, stdout, stderr } = await runHere(['reading', 'nominal-sphere', '--outline', path]);
    expect([code, stdout]).toEqual([2, '']);
    expect(stderr).toBe(withPath('outlines', messages));
  });

  it.each(DRAWINGS)('drawing %s', (file, messages) => {
    const path = join(BROKEN, 'drawings', file);
    expect(`${messageOf(() => readDesignFile(path))}\n`).toBe(withPath('drawings', messages));
  });

  it('are refused by the real program too', async () => {
    const briefs = some(BRIEFS, 30);
    const outlines = some(OUTLINES, 8);
    const drawings = some(DRAWINGS, 40);
    expect(briefs.length + outlines.length).toBeGreaterThanOrEqual(8);
    // At once: starting takes longest.
    await Promise.all([
      ...briefs.map(async ([file, messages]) => {
        const { code, stderr } = await runCli(['smallest', file], join(BROKEN, 'briefs'));
        expect([code, stderr]).toEqual([2, `${withShelf(messages).join('\n')}\n`]);
      }),
      ...outlines.map(async ([file, messages]) => {
        const args = ['draw', file, '--distance', '20 mm'];
        const { code, stderr } = await runCli(args, join(BROKEN, 'outlines'));
        expect([code, stderr]).toEqual([2, `${withShelf(messages).join('\n')}\n`]);
      }),
      ...drawings.map(async ([file, messages]) => {
        const args = ['compare', 'nominal-sphere', file];
        const { code, stderr } = await runCli(args, join(BROKEN, 'drawings'));
        expect([code, stderr]).toEqual([2, `${messages.join('\n')}\n`]);
      }),
    ]);
  });
});

describe('the program', () => {
  it('does not mind a reader that closes early', async () => {
    const shell = folderWith({ 'square.csv': SQUARE });
    const { spawnSync } = await import('node:child_process');
    const { MAIN } = await import('./runCli.ts');
    const script = `"${process.execPath}" "${MAIN}" presets --json | head -c 10; echo "\${PIPESTATUS[0]}"`;
    const { stdout, stderr } = spawnSync('bash', ['-c', script], { cwd: shell, encoding: 'utf8' });
    expect(stdout).toBe('{\n  "media0\n');
    expect(stderr).toBe('');
  });

  it('exits 3 with one line for a fault of its own', async () => {
    const folder = folderWith({ 'square.csv': SQUARE });
    // A setting that breaks a library's loading stands for any fault that nobody foresaw.
    const preload = `data:text/javascript,import{Buffer}from'node:buffer';JSON.parse=()=>{throw%20new%20TypeError('no%20JSON%20today')}`;
    const { code, stderr } = await runCli(['presets'], folder, { NODE_OPTIONS: `--import=${preload}` });
    expect(code).toBe(3);
    expect(stderr).toContain('no JSON today');
    expect(stderr.trim().split('\n')).toHaveLength(1);
  });

  it('says nothing that a terminal would obey', async () => {
    const { code, stderr } = await runHere(['search', 'no\u001b[31msuch\nfile.yaml']);
    expect(code).toBe(2);
    expect(stderr).toContain('no [31msuch file.yaml: found no such file');
    expect(stderr.trim().split('\n')).toHaveLength(1);
  });
});
