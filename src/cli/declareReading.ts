import type { Command } from './commander.ts';
import { lengthUnit, oneOf, wholeNumber } from './optionRules.ts';
import type { Done } from './optionTexts.ts';
import { AS_JSON, BRIEF, EXACT, ID, OUTLINE, SEEDS, UNIT } from './optionTexts.ts';

const DIAMETERS = [2, 2000] as const;
const BUILDS = [100, 10_000_000] as const;
const BUILD_GAINS = ['nominal', 'recalibrated'] as const;
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
      'Scores outlines against one brief, side by side: those that meet the target first, then the fastest; and recommends one.',
    )
    .argument('<brief>', BRIEF)
    .argument('[files...]', OUTLINE)
    .option('--design <id>', "a design of the brief's own results; may be given again", repeated, [])
    .option('--unit <unit>', UNIT, lengthUnit)
    .option('--distance <length>', 'distance from particle to detector, for all of them')
    .option(
      '--builds <n>',
      'for the yield of those that meet the target; 0: none',
      wholeNumber('--builds', 0, BUILDS[1]),
      2000,
    )
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

  declareYield(program, done);
}

/** The command that builds given outlines over and over. */
function declareYield(program: Command, done: Done): void {
  program
    .command('yield')
    .summary('how many builds of a design meet the target')
    .description(
      "Draws builds of a design within the brief's tolerances, judges each over the whole brief, and shows the share that meets the target, which tolerance spoils most, and what each would have to be.",
    )
    .argument('<brief>', BRIEF)
    .option('--outline <file>', OUTLINE)
    .option('--design <id>', ID)
    .option('--distance <length>', 'distance from particle to detector')
    .option('--tolerance <key = value>', "in place of the brief's; may be given again", repeated, [])
    .option('--gain <is>', 'nominal, or recalibrated for each build', oneOf('--gain', BUILD_GAINS))
    .option('--builds <n>', 'how many', wholeNumber('--builds', ...BUILDS), 100_000)
    .option('--seed <n>', 'for their errors', wholeNumber('--seed', ...SEEDS), 1)
    .option('--in-full', 'read every build in full, which may take an hour')
    .option(
      '--at-least <share>',
      'exit 1 for a smaller yield; tolerances are tightened for it (default: 95 %)',
    )
    .option('--exact', EXACT)
    .option('--workers <n>', 'worker threads (default: one a core)', wholeNumber('--workers', 1, 64))
    .option('--csv <file>', 'write the worst correction of each build as CSV')
    .option('--force', 'replace that file if it is there')
    .option('--quiet', 'no progress and no notes')
    .option('--json', AS_JSON)
    .addHelpText(
      'after',
      `
Example:
  $ rimwright yield my.yaml --design rings-1
  $ rimwright yield my.yaml --design rings-1 --tolerance "place = 1 um rms" \\
      --tolerance "edge = 0.5 um" --at-least "90 %"
  A size stands for limits either way, with rms for a standard deviation. Keys:
  edge, kerf, place, distance, tilt, wavelength, index, size, averaging.`,
    )
    .action(async (brief, options) => done(await (await import('./yieldCommand.ts')).run(brief, options)));
}

/** Collects an option that may be given more than once. */
function repeated(value: string, before: readonly string[]): string[] {
  return [...before, value];
}
