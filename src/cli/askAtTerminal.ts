import { createInterface } from 'node:readline/promises';
import { inputError } from '../base/errors.ts';

/** Somebody at a terminal who answers questions. */
export interface Questions {
  /** @throws RimwrightError `input` where the questions are left by Ctrl-C or Ctrl-D */
  ask(question: string): Promise<string>;
  close(): void;
}

/** Opens questions on standard error with answers from standard input; null where these are no terminal. */
export function openQuestions(): Questions | null {
  const { stdin, stderr } = process;
  if (!stdin.isTTY || !stderr.isTTY) return null;
  const lines = createInterface({ input: stdin, output: stderr });
  const closed = new Promise<never>((_, reject) => {
    lines.on('close', () => {
      reject(
        inputError([
          { found: 'questions that were left', expected: 'answers to all of them: nothing was written' },
        ]),
      );
    });
  });
  // Closed in the end by ourselves, with nobody waiting.
  closed.catch(() => undefined);
  return { ask: (question) => Promise.race([lines.question(question), closed]), close: () => lines.close() };
}
