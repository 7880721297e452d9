import { spawn } from 'node:child_process';
import {
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import type { RandomSource } from '../../src/base/random.ts';
import { randomStream } from '../../src/base/random.ts';
import { folderWith, MAIN, QUICK_BRIEF, runCli, runHere } from './runCli.ts';

/** Long enough to have all kinds of jobs in it, and a repair. */
const BRIEF = QUICK_BRIEF.replace('candidates: 200', 'candidates: 1000');
const BEGIN = ['search', 'quick.yaml', '--workers', '1', '--quiet'];
const RESUME = ['search', '--resume', 'results/quick-look', '--workers', '1', '--quiet'];

/** Runs the program and kills it after so many milliseconds, unless it has ended by then. Says whether it was killed. */
function killedAfter(args: readonly string[], cwd: string, milliseconds: number): Promise<boolean> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, [MAIN, ...args], { cwd, stdio: 'ignore' });
    const timer = setTimeout(() => child.kill('SIGKILL'), milliseconds);
    child.on('error', reject);
    child.on('close', (_, signal) => {
      clearTimeout(timer);
      resolve(signal === 'SIGKILL');
    });
  });
}

/** Runs the program and sends it SIGINT when its standard error says that the search begins; what that said in all. */
function interruptedAtStart(args: readonly string[], cwd: string): Promise<string> {
  let stderr = '';
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, [MAIN, ...args], { cwd, stdio: ['ignore', 'ignore', 'pipe'] });
    child.stderr.on('data', (piece) => {
      const isBefore = !stderr.includes('candidates, seed');
      stderr += piece;
      if (isBefore && stderr.includes('candidates, seed')) child.kill('SIGINT');
    });
    child.on('error', reject);
    child.on('close', () => resolve(stderr));
  });
}

/** Every file of a results folder but run.json, which is of the machine; front.json without its seconds. */
function resultsIn(folder: string): Record<string, string> {
  const files = readdirSync(folder, { recursive: true, withFileTypes: true }).filter((one) => one.isFile());
  const paths = files.map(({ parentPath, name }) => join(parentPath, name)).sort();
  return Object.fromEntries(
    paths
      .filter((path) => !path.endsWith('/run.json'))
      .map((path) => [
        path.slice(folder.length + 1),
        readFileSync(path, 'utf8').replace(/"seconds": [\d.e-]+/, ''),
      ]),
  );
}

/** Runs a search whose files may hold so many kilobytes each, as on a disk that fills up. */
async function fullDisk(
  cwd: string,
  kilobytes: number,
): Promise<{ code: number | null; stdout: string; stderr: string; checkpoint: string }> {
  // `ulimit -f` counts blocks of 512 bytes in sh.
  const limited = `ulimit -f ${2 * kilobytes} && exec "$@"`;
  const outcome = await runCli(BEGIN, cwd, {}, ['sh', '-c', limited, 'sh']);
  const path = join(cwd, 'results/quick-look/unfinished/checkpoint');
  return { ...outcome, checkpoint: existsSync(path) ? readFileSync(path, 'utf8') : '' };
}

/** The longest time to a kill, over a whole life: starting anew takes a good part of that. */
const SITTING = 0.75;

const isBegun = (folder: string) => existsSync(join(folder, 'results/quick-look/unfinished'));

/** Lives of a search, one after the other, with `kills` at random moments of them; the results of each life. */
async function lives(kills: number, random: RandomSource, lifeMs: number): Promise<Record<string, string>[]> {
  const ends: Record<string, string>[] = [];
  let left = kills;
  while (left > 0) {
    const folder = folderWith({ 'quick.yaml': BRIEF });
    for (let isOver = false; !isOver; ) {
      const args = isBegun(folder) ? RESUME : BEGIN;
      const isKilled = await killedAfter(args, folder, left > 0 ? random.uniform() * SITTING * lifeMs : 1e6);
      if (isKilled) left--;
      // Killed after its last act, it has nothing left to go on with.
      else isOver = true;
      if (isKilled && !isBegun(folder) && existsSync(join(folder, 'results/quick-look/run.json')))
        isOver = true;
    }
    ends.push(resultsIn(join(folder, 'results/quick-look')));
  }
  return ends;
}

/** The results of the brief where nothing interrupts it, and how long it takes. */
async function withoutInterruption(): Promise<{ results: Record<string, string>; lifeMs: number }> {
  const folder = mkdtempSync(join(tmpdir(), 'rimwright-test-'));
  try {
    writeFileSync(join(folder, 'quick.yaml'), BRIEF);
    const started = performance.now();
    await runCli(BEGIN, folder);
    const lifeMs = performance.now() - started;
    return { results: resultsIn(join(folder, 'results/quick-look')), lifeMs };
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

describe('rimwright search --resume', () => {
  const uninterrupted = withoutInterruption();

  it('ends with the same bytes after twenty kills at random moments', async () => {
    const { lifeMs, results: whole } = await uninterrupted;
    expect(Object.keys(whole).length).toBeGreaterThan(10);
    const ends = await Promise.all([1, 2].map((seed) => lives(10, randomStream(seed), lifeMs)));
    for (const end of ends.flat()) expect(end).toEqual(whole);
  }, 300_000);

  it('does again what a torn or damaged line of the checkpoint held', async () => {
    const folder = folderWith({ 'quick.yaml': BRIEF });
    const results = join(folder, 'results/quick-look');
    const { code, checkpoint } = await fullDisk(folder, 90);
    expect(code).toBe(3);
    const lines = checkpoint.split('\n');
    expect(lines.length).toBeGreaterThan(8);
    // Within the result of the third line, and the end of the last.
    const damaged = lines.map((line, i) => (i === 2 ? line.replace(/\d(?=[^\d]*$)/, 'x') : line)).join('\n');
    writeFileSync(join(results, 'unfinished/checkpoint'), damaged.slice(0, -20));
    const { stdout } = await runCli(['search', '--resume', 'results/quick-look', '--json'], folder);
    expect(resultsIn(results)).toEqual((await uninterrupted).results);
    expect(JSON.parse(stdout).ending.reason).toBe('spent');
  });

  it('goes on where the disk was full', async () => {
    const folder = folderWith({ 'quick.yaml': BRIEF });
    const { code, stdout, stderr } = await fullDisk(folder, 60);
    expect([code, stdout]).toEqual([3, '']);
    expect(stderr).toContain(
      'cannot write results/quick-look/unfinished/checkpoint: a file may not grow any further',
    );
    expect(stderr.replaceAll('\n', ' ')).toContain(
      'Its checkpoint is kept: rimwright search --resume results/quick-look goes on with it.',
    );
    expect(readdirSync(join(folder, 'results/quick-look'))).toEqual(['unfinished']);
    expect((await runCli(RESUME, folder)).code).toBe(0);
    expect(readdirSync(join(folder, 'results/quick-look'))).not.toContain('unfinished');
  });

  it('does not start where nothing can be written, and leaves nothing behind', async () => {
    for (const [kilobytes, place] of [
      [0, 'results'],
      [1, 'results'],
    ] as const) {
      const folder = folderWith({ 'quick.yaml': BRIEF });
      const { code, stdout, stderr } = await fullDisk(folder, kilobytes);
      expect([code, stdout]).toEqual([3, '']);
      expect(stderr).toBe(`rimwright: cannot write ${place}: a file may not grow any further\n`);
      expect(readdirSync(join(folder, 'results'))).toEqual([]);
    }
  });

  it('says where there is nothing to go on with', async () => {
    const folder = folderWith();
    for (const name of ['empty', 'ended', 'damaged/unfinished'])
      mkdirSync(join(folder, name), { recursive: true });
    writeFileSync(join(folder, 'ended/run.json'), '{}');
    writeFileSync(join(folder, 'damaged/unfinished/checkpoint'), 'no checkpoint\n');
    const cases: [args: string[], message: string][] = [
      [['nowhere'], 'nowhere: found no such folder'],
      [['empty'], 'empty: found no checkpoint in it'],
      [['damaged'], 'damaged: found a damaged checkpoint'],
      [['ended'], 'ended: found one that has ended'],
      [['nowhere', '--seed', '4'], '--seed: found 4, expected none'],
      [['nowhere', '--out', 'x'], '--out: found x, expected none'],
    ];
    for (const [[name, ...args], message] of cases) {
      const { code, stdout, stderr } = await runHere(['search', '--resume', join(folder, name), ...args]);
      expect([name, code, stdout]).toEqual([name, 2, '']);
      expect(stderr).toContain(message);
    }
  });

  it('goes on after Ctrl-C, in place of the results so far; a new search says that it could', async () => {
    const folder = folderWith({ 'quick.yaml': BRIEF });
    const results = join(folder, 'results/quick-look');
    await interruptedAtStart(['search', 'quick.yaml', '--workers', '1'], folder);
    expect(JSON.parse(readFileSync(join(results, 'front.json'), 'utf8'))).toMatchObject({
      stopped: true,
      ending: { reason: 'interrupted' },
    });
    expect(readdirSync(results)).toContain('unfinished');
    const anew = await interruptedAtStart(['search', 'quick.yaml'], folder);
    expect(anew.replaceAll('\n', ' ')).toContain(
      'results/quick-look holds a search of this brief that has not ended: rimwright search --resume results/quick-look goes on with it.',
    );
    const other = await interruptedAtStart(['search', 'quick.yaml', '--seed', '7'], folder);
    expect(other).not.toContain('has not ended');
    expect((await runCli(RESUME, folder)).code).toBe(0);
    expect(readdirSync(results)).not.toContain('unfinished');
    expect(resultsIn(results)).toEqual((await uninterrupted).results);
  });
});
