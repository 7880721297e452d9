import type { Command } from './commander.ts';
import type { Done } from './optionTexts.ts';

/** Commands that help to write briefs, and explain them and the program. */
export function declareHelping(program: Command, done: Done): void {
  program
    .command('new')
    .summary('write a brief, with every key explained')
    .description(
      'Writes a brief in which every key is explained. What the options leave open is asked at the terminal; with --particles, --wavelength, --distance, --radius and --target nothing is.',
    )
    .argument('[file]', 'the brief to write', 'brief.yaml')
    .option('--particles <list>', 'diameters and material or index; further kinds after ;')
    .option('--wavelength <length>', 'in vacuum')
    .option('--distance <range>', 'from the particle to the mask')
    .option('--radius <range>', 'of the circle around the outline')
    .option('--target <ratio>', 'how far the reading may be from the extinction')
    .option('--medium <name>', 'a name on the shelf, or an index')
    .option('--shop <name>', 'a name on the shelf, or none')
    .option('--title <text>', 'what results are called')
    .option('--force', 'replace that file if it is there')
    .addHelpText(
      'after',
      `
Example:
  $ rimwright new my.yaml
  $ rimwright new my.yaml --particles "1 um to 4 um polystyrene" \\
      --wavelength "635 nm" --distance "10 mm to 60 mm" \\
      --radius "50 um to 2 mm" --target "1 %" --shop photomask`,
    )
    .action(async (file, options) => done(await (await import('./newCommand.ts')).run(file, options)));

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

  program
    .command('completion')
    .summary('a script by which a shell completes commands')
    .description('Prints a script by which a shell completes commands, options, presets and keys of briefs.')
    .argument('<shell>', 'bash, zsh or fish')
    .addHelpText(
      'after',
      `
Example, for the shell's own start file:
  $ eval "$(rimwright completion bash)"
  $ rimwright completion fish | source`,
    )
    .action(async (shell) => done(await (await import('./completionCommand.ts')).run(program, shell)));
}
