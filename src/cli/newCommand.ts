import { inputError } from '../base/errors.ts';
import { loadUnits } from '../base/quantity.ts';
import { loadBriefKeys } from '../run/briefKeys.ts';
import type { Answers, Asked, Question } from '../run/newBrief.ts';
import { expectedFor, newBrief, questionsFor } from '../run/newBrief.ts';
import { refuseExisting, writeWhole } from '../run/writeWhole.ts';
import { openQuestions } from './askAtTerminal.ts';
import { EXIT } from './exit.ts';
import { uninterrupted } from './interrupt.ts';
import { note } from './notes.ts';

/** Runs `rimwright new` and gives its exit code. */
export async function run(file: string, { force, ...given }: Answers & { force?: true }): Promise<number> {
  // Before anything is asked: nobody likes to answer in vain.
  if (!force) refuseExisting([file]);
  const keys = await loadBriefKeys();
  const units = await loadUnits();
  const open = questionsFor(keys, file).filter(({ name }) => given[name] === undefined);
  const needed = open.filter(({ isNeeded }) => isNeeded);
  // Who gives all that is needed as options wants no questions.
  const answers =
    needed.length === 0
      ? given
      : { ...given, ...(await askAll(open, (name, answer) => expectedFor(name, answer, keys, units))) };
  const text = await newBrief(answers, file, keys, units);
  uninterrupted(() => writeWhole([{ path: file, text }], force ?? false));
  const name = /^[\w./-]+$/.test(file) ? file : JSON.stringify(file);
  note(`Written to ${file}. Next: rimwright search ${name}`);
  return EXIT.done;
}

/** Asks each question until its answer is good. */
async function askAll(
  questions: readonly Question[],
  expectedOf: (name: Asked, answer: string) => string | null,
): Promise<Answers> {
  const terminal = openQuestions();
  if (terminal === null) {
    const missing = questions.filter(({ isNeeded }) => isNeeded);
    throw inputError(
      missing.map(({ name, about, offered }) => ({
        key: `--${name}`,
        found: 'nothing, and no terminal to ask at',
        expected: `an answer such as "${offered}": ${about}`,
      })),
    );
  }
  note('An empty answer takes what stands in brackets. Ctrl-C leaves, and writes nothing.');
  try {
    const answers: { [Name in Asked]?: string } = {};
    for (const { name, about, isNeeded, offered } of questions) {
      for (;;) {
        const typed = (await terminal.ask(`${name}, ${about}\n  [${offered}] `)).trim();
        // An empty answer to what a brief can do without leaves the key to its default.
        if (typed === '' && !isNeeded) break;
        const answer = typed === '' ? offered : typed;
        const expected = expectedOf(name, answer);
        if (expected === null) {
          answers[name] = answer;
          break;
        }
        note(`  Found ${JSON.stringify(answer.slice(0, 60))}, expected ${expected}.`);
      }
    }
    return answers;
  } finally {
    terminal.close();
  }
}
