import { MEASURES } from '../score/aim.ts';
import type { Command } from './commander.ts';
import { oneOf, wholeNumber } from './optionRules.ts';
import type { Done } from './optionTexts.ts';
import { AS_JSON, BRIEF, SEEDS } from './optionTexts.ts';

/** Limits of a brief's key `search.candidates`. */
const CANDIDATES = [100, 100_000_000] as const;
const WORKERS = [1, 64] as const;
const STEPS = [2, 12] as const;

/** Commands that search, or prove what a search can find. */
export function declareSearching(program: Command, done: Done): void {
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
