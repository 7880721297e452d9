import { spawn } from 'node:child_process';
import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { describe, expect, it } from 'vitest';
import { folderWith, MAIN, QUICK_BRIEF } from './runCli.ts';

/** Starts a process and sends it SIGINT each time its standard error says one of `cues`, in their order. */
function interrupted(args: string[], cwd: string, cues: string[]) {
  return new Promise<{ code: number | null; signal: string | null; stderr: string }>((resolve) => {
    const child = spawn(process.execPath, args, { cwd, stdio: ['ignore', 'ignore', 'pipe'] });
    let stderr = '';
    child.stderr.on('data', (piece) => {
      stderr += piece;
      if (cues.length > 0 && stderr.includes(cues[0])) {
        cues.shift();
        child.kill('SIGINT');
      }
    });
    child.on('close', (code, signal) => resolve({ code, signal, stderr }));
  });
}

describe('Ctrl-C', () => {
  it('ends a search early and still writes what was found', async () => {
    const folder = folderWith({ 'long.yaml': QUICK_BRIEF.replace('200', '50000000') });
    const { code, stderr } = await interrupted([MAIN, 'search', 'long.yaml'], folder, ['candidates, seed']);
    expect(stderr).toContain('Stopping: finishing what was found');
    expect([0, 1]).toContain(code);
    expect(readdirSync(join(folder, 'results'))).toEqual(['quick-look']);
    expect(readdirSync(join(folder, 'results/quick-look'))).toContain('run.json');
  });

  it('given twice ends the process at once, even while it is busy finishing', async () => {
    const interrupt = pathToFileURL(join(MAIN, '../interrupt.js')).href;
    // Once aborted this work keeps the thread to itself for a minute.
    const program = `
      const { interruptible } = await import(${JSON.stringify(interrupt)});
      await interruptible((signal) => new Promise((done) => {
        const wait = setInterval(() => {}, 1000);
        signal.addEventListener('abort', () => {
          process.stderr.write('busy');
          for (const start = Date.now(); Date.now() - start < 60000; );
          clearInterval(wait);
          done();
        });
        process.stderr.write('ready');
      }));`;
    const { signal } = await interrupted(['--input-type=module', '-e', program], folderWith(), [
      'ready',
      'busy',
    ]);
    expect(signal).toBe('SIGINT');
  }, 20_000);
});
