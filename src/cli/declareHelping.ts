import type { Command } from './commander.ts';
import type { Done } from './optionTexts.ts';

/** Commands that explain the program and its briefs. */
export function declareHelping(program: Command, done: Done): void {
  program
    .command('help')
    .summary('explain a command, or a key of a brief')
    .description(
      'Explains a command, or a key of a brief: what it means, what it may hold, and what stands for it.',
    )
    .argument('[topic...]', 'a command, a key such as light.linewidth, or brief for all keys')
    .addHelpText(
      'after',
      `
Example:
  $ rimwright help light.linewidth
  $ rimwright help placement
  $ rimwright help brief`,
    )
    .action(async (topic) => done(await (await import('./helpCommand.ts')).run(program, topic)));
}
