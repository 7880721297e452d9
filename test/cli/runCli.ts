import { spawn } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { onTestFinished, vi } from 'vitest';
import { runProgram } from '../../src/cli/program.ts';

/** The compiled program: `npm test` builds it first. */
export const MAIN = fileURLToPath(new URL('../../dist/cli/main.js', import.meta.url));

export interface Outcome {
  code: number | null;
  stdout: string;
  stderr: string;
}

/** Runs the compiled program as a user would, in the folder `cwd`; `under` is a command that runs it in turn. */
export function runCli(
  args: readonly string[],
  cwd: string,
  env: Record<string, string> = {},
  under: readonly string[] = [],
): Promise<Outcome> {
  const [command, ...rest] = [...under, process.execPath, MAIN, ...args];
  return new Promise((resolve, reject) => {
    const child = spawn(command, rest, {
      cwd,
      env: { ...process.env, ...env },
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    let stdout = '';
    let stderr = '';
    child.stdout.on('data', (piece) => {
      stdout += piece;
    });
    child.stderr.on('data', (piece) => {
      stderr += piece;
    });
    child.on('error', reject);
    child.on('close', (code) => resolve({ code, stdout, stderr }));
  });
}

/** The same in this process: quicker where there are many cases. Paths are relative to the test's own folder. */
export async function runHere(args: readonly string[]): Promise<Outcome> {
  const outcome = { stdout: '', stderr: '' };
  const spies = (['stdout', 'stderr'] as const).map((name) =>
    vi.spyOn(process[name], 'write').mockImplementation((piece) => {
      outcome[name] += String(piece);
      return true;
    }),
  );
  try {
    return { code: await runProgram(args), ...outcome };
  } finally {
    for (const spy of spies) spy.mockRestore();
  }
}

/** A folder of the test's own with the given files in it; it goes when the test ends. */
export function folderWith(files: Record<string, string> = {}): string {
  const folder = mkdtempSync(join(tmpdir(), 'rimwright-test-'));
  onTestFinished(() => rmSync(folder, { recursive: true, force: true }));
  for (const [name, text] of Object.entries(files)) writeFileSync(join(folder, name), text);
  return folder;
}

/** A square of 1 mm about the axis. */
export const SQUARE = 'x_mm,y_mm\n-0.5,-0.5\n0.5,-0.5\n0.5,0.5\n-0.5,0.5\n';

/** A brief that is searched in a second; `target` is its last line but one. */
export const QUICK_BRIEF = `title: Quick look
light: { wavelength: 635 nm }
medium: 1.0
particles: [{ diameter: 2 um, index: 1.59 }]
detector: { distance: 20 mm, radius: 20 um to 0.4 mm }
families: [disc, rings]
search: { candidates: 200, seed: 3 }
target: { correction: 1 % }
`;
