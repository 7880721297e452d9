import type { Command } from './commander.ts';
import { completedCommands, SHELLS } from './completionFacts.ts';
import { completionScript } from './completionScript.ts';
import { EXIT } from './exit.ts';
import { print } from './notes.ts';
import { oneOf } from './optionRules.ts';

/** Runs `rimwright completion` and gives its exit code. */
export async function run(program: Command, shellName: string): Promise<number> {
  const shell = oneOf('completion', SHELLS)(shellName);
  print(completionScript(shell, await completedCommands(program)));
  return EXIT.done;
}
