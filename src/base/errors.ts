/** What went wrong, as a stable word: `input` is the user's to mend, `target` says no design meets it, `machine` is disk, memory or a worker. */
export type ErrorCode = 'input' | 'target' | 'machine';

/** One mistake in what came from outside, with its place as far as it is known. */
export interface Problem {
  /** The file's name as the user gave it. */
  file?: string;
  /** Line in that file, counted from 1. */
  line?: number;
  /** Path of the key, such as `light.wavelength` or `particles[1].diameter`. */
  key?: string;
  /** What stood there, in the user's own words. */
  found: string;
  /** What is expected, with its unit and range. */
  expected: string;
}

/** The one error class of the program. Only `cli/` turns it into an exit code. */
export class RimwrightError extends Error {
  override readonly name = 'RimwrightError';
  readonly code: ErrorCode;
  readonly problems: readonly Problem[];

  constructor(code: ErrorCode, message: string, problems: readonly Problem[] = []) {
    super(message);
    this.code = code;
    this.problems = problems;
  }
}

/** `road.yaml:4: light.wavelength: found "635", expected a length with its unit, such as 635 nm`. */
export function describeProblem(problem: Problem): string {
  const place = [problem.file, problem.line].filter((part) => part !== undefined).join(':');
  const parts = [place, problem.key].filter((part) => part !== undefined && part !== '');
  return `${parts.map((part) => `${part}: `).join('')}found ${problem.found}, expected ${problem.expected}`;
}

/** An `input` error whose message lists every problem, one line each. */
export function inputError(problems: readonly Problem[]): RimwrightError {
  return new RimwrightError('input', problems.map(describeProblem).join('\n'), problems);
}
