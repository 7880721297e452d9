import { Command, CommanderError } from 'commander';
import { packageVersion } from '../base/version.ts';
import { MEASURES } from '../score/aim.ts';
import { EXIT, reportError } from './exit.ts';
import { oneOf, wholeNumber } from './optionRules.ts';

/** Limits of a brief's keys `search.candidates` and `search.seed`. */
const CANDIDATES = [100, 100_000_000] as const;
const SEEDS = [0, 2 ** 31 - 1] as const;
const WORKERS = [1, 64] as const;
const DIAMETERS = [2, 2000] as const;
const STEPS = [2, 12] as const;
const ROUGH_OUTLINES = [2, 10_000] as const;

const BRIEF = "a brief's path, or a brief's name on the shelf";
const OUTLINE = "CSV (x_mm,y_mm), a design's JSON, or front.json#ID";
const ID = "a design of that file, or without it of the brief's own results";
const EXACT = "the sphere's exact fields, for large particles near the detector";
const AS_JSON = 'print one JSON document';

// Only the command that runs loads what it works with, so that --help is there at once.

/** Runs one command line and gives its exit code; nothing is thrown. */
export async function runProgram(args: readonly string[]): Promise<number> {
  let code: number = EXIT.done;
  try {
    const program = buildProgram((result) => {
      code = result;
    });
    await program.parseAsync(args, { from: 'user' });
    return code;
  } catch (error) {
    // Commander has already said on standard error what it could not use.
    if (error instanceof CommanderError) return error.exitCode === 0 ? EXIT.done : EXIT.input;
    return reportError(error);
  }
}

function buildProgram(done: (code: number) => void): Command {
  const program = new Command('rimwright')
    .description(
      'Searches detector outlines that read the true extinction cross-section of a single particle, and hands the chosen one to the shop.',
    )
    .version(packageVersion())
    .exitOverride()
    .configureHelp({ helpWidth: 80 })
    .configureOutput({ outputError: (text, write) => write(text) })
    .showHelpAfterError('(--help shows how)')
    .addHelpText(
      'after',
      `
A first run:
  $ rimwright presets briefs                       briefs on the shelf
  $ rimwright presets briefs road-dust > my.yaml   one of them, to be changed
  $ rimwright search my.yaml                       writes results/...

Exit codes: 0 done, 1 no design meets the target, 2 bad input, 3 a fault of the
machine. Results go to standard output, progress and notes to standard error.`,
    );

  withSearchOptions(
    program
      .command('search')
      .summary('search outlines and write a results folder')
      .description(
        'Searches outlines and distances, ranks what is worth having, and writes a results folder with the front, drawings and a report.',
      )
      .argument('[brief]', BRIEF),
  )
    .option('--out <dir>', 'folder that results folders go into (default: results)')
    .option('--resume <folder>', 'go on with a search that did not end, in its results folder')
    .addHelpText(
      'after',
      `
Example:
  $ rimwright search road-dust --candidates 5000
  writes results/road-dust-monitor-extinction-channel/ with report.html,
  front.json, front.csv, run.json and drawings/. A second run gets a folder of
  its own, whose name ends in -2. A search that was interrupted, or whose
  process or disk failed, goes on where it was:
  $ rimwright search --resume results/road-dust-monitor-extinction-channel`,
    )
    .action(async (brief, options) => done(await (await import('./searchCommand.ts')).run(brief, options)));

  withSearchOptions(
    program
      .command('smallest')
      .summary('find the smallest detector that meets the target')
      .description(
        'Finds the smallest detector that meets the target, or says why none does and how near one comes.',
      )
      .argument('<brief>', BRIEF),
  )
    .option('--by <measure>', 'radius, area, cost (area over gain) or time', oneOf('--by', MEASURES), 'area')
    .option('--out <file>', "write the design's JSON to this file")
    .option('--force', 'replace that file if it is there')
    .addHelpText(
      'after',
      `
Example:
  $ rimwright smallest size-range --by radius --out disc.json
  $ rimwright draw disc.json`,
    )
    .action(async (brief, options) => done(await (await import('./smallestCommand.ts')).run(brief, options)));

  withSearchOptions(
    program
      .command('trade')
      .summary('what two keys of the brief cost each other')
      .description(
        'Finds the smallest detector for each pair of values of two keys of the brief, and writes a table and a map of them.',
      )
      .argument('[brief]', BRIEF),
  )
    .option('--over <keys>', 'two keys, each with a range if not that of the brief')
    .option('--steps <n>', 'values of each key (default: 4)', wholeNumber('--steps', ...STEPS))
    .option('--by <measure>', 'radius, area, cost or time (default: time)', oneOf('--by', MEASURES))
    .option('--out <dir>', 'folder that results folders go into (default: results)')
    .option('--resume <folder>', 'go on with a trade that did not end, in its results folder')
    .addHelpText(
      'after',
      `
Every pair takes a search of its own, with all the candidates of the brief or
of --candidates. A key without a range goes over that of the brief, or from half
to twice its value; steps are geometric, and even from 0.

Examples:
  $ rimwright trade my.yaml --over distance,offset --candidates 5000
  $ rimwright trade my.yaml --over "distance=10 mm..60 mm, offset=0 um..20 um"
  writes results/my-trade/ with trade.csv, trade.json and trade.svg.`,
    )
    .action(async (brief, options) => done(await (await import('./tradeCommand.ts')).run(brief, options)));

  program
    .command('reading')
    .summary('what a given outline reads')
    .description('Shows what a given outline reads for each particle and position of a brief.')
    .argument('<brief>', BRIEF)
    .option('--outline <file>', OUTLINE)
    .option('--design <id>', ID)
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
    .command('bound')
    .summary('how small a detector could be at best')
    .description(
      'Proves how little area over gain any mask can have that meets the target, whatever its outline: what a search can at best find.',
    )
    .argument('<brief>', BRIEF)
    .option(
      '--distance <length>',
      'distance from particle to detector (default: the ends of its range and between)',
    )
    .option('--gain <list>', 'gains to try, such as "0.5, 1, 2" (default: those of the brief)')
    .option('--json', AS_JSON)
    .addHelpText(
      'after',
      `
Example:
  $ rimwright bound offset-range
  $ rimwright bound my.yaml --distance "20 mm" --gain 1`,
    )
    .action(async (brief, options) => done(await (await import('./boundCommand.ts')).run(brief, options)));

  program
    .command('compare')
    .summary('outlines side by side')
    .description(
      'Scores outlines against one brief, side by side: those that meet the target first, then the fastest.',
    )
    .argument('<brief>', BRIEF)
    .argument('[files...]', OUTLINE)
    .option('--design <id>', "a design of the brief's own results; may be given again", repeated, [])
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

  program
    .command('draw')
    .summary('drawings for the shop')
    .description('Draws a design for the shop: DXF at true size, and an SVG sheet to read.')
    .argument('<design>', "a design's JSON, front.json#ID, a CSV with --distance, or a brief with --design")
    .option('--design <id>', "a design of that front.json, or of the brief's own results")
    .option('--distance <length>', 'distance from particle to mask, for the notes on the sheet')
    .option('--out <dir>', 'folder to draw into', '.')
    .option('--formats <list>', 'dxf, svg, or both', 'dxf,svg')
    .option('--force', 'replace drawings that are there')
    .addHelpText(
      'after',
      `
Example:
  $ rimwright draw results/my/front.json#rings-1 --out shop --formats dxf
  $ rimwright draw my.yaml --design rings-1 --out shop`,
    )
    .action(async (design, options) => done(await (await import('./drawCommand.ts')).run(design, options)));

  program
    .command('presets')
    .summary('what is on the shelf')
    .description('Lists media, materials, shops and briefs that briefs can name, or prints one of them.')
    .argument('[shelf]', 'media, materials, shops or briefs')
    .argument('[name]', 'print this one')
    .option('--json', AS_JSON)
    .addHelpText(
      'after',
      `
Example:
  $ rimwright presets media
  $ rimwright presets briefs road-dust > my.yaml`,
    )
    .action(async (shelf, name, options) =>
      done(await (await import('./presetsCommand.ts')).run(shelf, name, options)),
    );
  return program;
}

/** Collects an option that may be given more than once. */
function repeated(value: string, before: readonly string[]): string[] {
  return [...before, value];
}

/** Options of the commands that search. */
function withSearchOptions<C extends Command>(command: C): C {
  return command
    .option('--json', AS_JSON)
    .option(
      '--workers <n>',
      'worker threads (default: one a core, at most 8)',
      wholeNumber('--workers', ...WORKERS),
    )
    .option(
      '--candidates <n>',
      "in place of the brief's search.candidates",
      wholeNumber('--candidates', ...CANDIDATES),
    )
    .option('--seed <n>', "in place of the brief's search.seed", wholeNumber('--seed', ...SEEDS))
    .option('--quiet', 'no progress and no notes; warnings and errors are still said');
}
