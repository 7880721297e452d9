import { describeProblem, RimwrightError } from '../base/errors.ts';

/** Exit codes: done; no design meets the target; bad input; a fault of the machine. */
export const EXIT = { done: 0, target: 1, input: 2, machine: 3 } as const;

/**
 * Says on standard error what went wrong, one line for each problem, and gives the exit code. Anything but a
 * RimwrightError is a fault of the program: one line, and its stack where RIMWRIGHT_DEBUG=1 asks for it.
 */
export function reportError(error: unknown): number {
  for (const line of linesOf(error)) process.stderr.write(`${oneLine(line)}\n`);
  if (process.env.RIMWRIGHT_DEBUG === '1') process.stderr.write(`${(error as Error)?.stack ?? ''}\n`);
  return error instanceof RimwrightError ? EXIT[error.code] : EXIT.machine;
}

function linesOf(error: unknown): string[] {
  if (!(error instanceof RimwrightError)) {
    const message = error instanceof Error ? error.message : String(error);
    return [`rimwright: an unexpected fault: ${message.split('\n')[0]} (RIMWRIGHT_DEBUG=1 shows where)`];
  }
  return error.problems.length > 0 ? error.problems.map(describeProblem) : [`rimwright: ${error.message}`];
}

/** File names and titles may hold anything; a terminal must not obey it. */
function oneLine(text: string): string {
  return text.replace(/[\p{Cc}\u2028\u2029\u202A-\u202E\u2066-\u2069]+/gu, ' ');
}
