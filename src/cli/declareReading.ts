import type { Command } from './commander.ts';
import { lengthUnit, wholeNumber } from './optionRules.ts';
import type { Done } from './optionTexts.ts';
import { AS_JSON, BRIEF, EXACT, ID, OUTLINE, SEEDS, UNIT } from './optionTexts.ts';

const DIAMETERS = [2, 2000] as const;
const ROUGH_OUTLINES = [2, 10_000] as const;

/** Commands that read given outlines. */
export function declareReading(program: Command, done: Done): void {
  program
    .command('reading')
    .summary('what a given outline reads')
    .description('Shows what a given outline reads for each particle and position of a brief.')
    .argument('<brief>', BRIEF)
    .option('--outline <file>', OUTLINE)
    .option('--design <id>', ID)
    .option('--unit <unit>', UNIT, lengthUnit)
    .option('--distance <length>', 'distance from particle to detector')
    .option('--position <x, y>', 'read at this place of the particle alone')
    .option('--exact', EXACT)
    .option('--trace <file>', 'write the reading along the flight as CSV')
    .option('--force', 'replace that file if it is there')
    .option('--rough <rms, length>', 'read outlines with rough edges as well')
    .option('--outlines <n>', 'how many of them', wholeNumber('--outlines', ...ROUGH_OUTLINES), 64)
    .option('--seed <n>', 'for their edges', wholeNumber('--seed', ...SEEDS), 1)
    .option('--json', AS_JSON)
    .addHelpText(
      'after',
      `
Example:
  $ rimwright reading nominal-sphere --outline square.csv
  $ rimwright reading my.yaml --outline square.csv --distance "20 mm" \\
      --position "50 um, -30 um" --json
  $ rimwright reading spray-droplets --outline disc.json --trace flight.csv
  $ rimwright reading my.yaml --outline disc.json --rough "2 um, 50 um"
  tries edges of 2 um rms height that forget themselves within 50 um.`,
    )
    .action(async (brief, options) => done(await (await import('./readingCommand.ts')).run(brief, options)));

  program
    .command('response')
    .summary('what a design reads of spheres of every size')
    .description(
      "Shows what a design is expected to read of reference spheres against their diameter, with the gain calibrated over the brief's particles, and where that holds the target.",
    )
    .argument('<brief>', BRIEF)
    .option('--outline <file>', OUTLINE)
    .option('--design <id>', ID)
    .option('--unit <unit>', UNIT, lengthUnit)
    .option('--distance <length>', 'distance from particle to detector')
    .option('--from <diameter>', 'smallest sphere', '0.2 um')
    .option('--to <diameter>', 'largest sphere', '10 um')
    .option('--count <n>', 'how many diameters', wholeNumber('--count', ...DIAMETERS), 60)
    .option('--material <name>', 'their material on the shelf', 'polystyrene')
    .option('--exact', EXACT)
    .option('--csv <file>', 'write the curve as CSV')
    .option('--force', 'replace that file if it is there')
    .option('--json', AS_JSON)
    .addHelpText(
      'after',
      `
Example:
  $ rimwright response my.yaml --design rings-1 --to "4 um" --csv curve.csv
  takes the design from results/my/front.json, where rimwright search my.yaml
  has put it: the folder is named after the brief's title.`,
    )
    .action(async (brief, options) => done(await (await import('./responseCommand.ts')).run(brief, options)));

  program
    .command('compare')
    .summary('outlines side by side')
    .description(
      'Scores outlines against one brief, side by side: those that meet the target first, then the fastest.',
    )
    .argument('<brief>', BRIEF)
    .argument('[files...]', OUTLINE)
    .option('--design <id>', "a design of the brief's own results; may be given again", repeated, [])
    .option('--unit <unit>', UNIT, lengthUnit)
    .option('--distance <length>', 'distance from particle to detector, for all of them')
    .option('--exact', EXACT)
    .option('--json', AS_JSON)
    .addHelpText(
      'after',
      `
Example:
  $ rimwright compare my.yaml square.csv results/my/front.json#rings-1 \\
      --distance "20 mm"
  $ rimwright compare my.yaml --design rings-1 --design disc-1`,
    )
    .action(async (brief, files, options) =>
      done(await (await import('./compareCommand.ts')).run(brief, files, options)),
    );
}

/** Collects an option that may be given more than once. */
function repeated(value: string, before: readonly string[]): string[] {
  return [...before, value];
}
