import type { Command } from './commander.ts';
import { wholeNumber } from './optionRules.ts';
import type { Done } from './optionTexts.ts';
import { AS_JSON, BRIEF, EXACT, ID, OUTLINE, SEEDS } from './optionTexts.ts';

/** Commands for the instrument that is built. */
export function declareMeasuring(program: Command, done: Done): void {
  program
    .command('budget')
    .summary('what the uncertainty of a measured extinction is made of')
    .description(
      "Shows what each input adds to the uncertainty of one measured extinction, after the GUM (JCGM 100:2008), and checks the sum by a Monte Carlo run (JCGM 101:2008). What is known of the inputs stands in the brief's section uncertainties.",
    )
    .argument('<brief>', BRIEF)
    .option('--outline <file>', OUTLINE)
    .option('--design <id>', ID)
    .option('--distance <length>', 'distance from particle to detector')
    .option('--diameter <length>', "of the particle; the brief's faintest if left out")
    .option('--material <name>', "its material on the shelf; the brief's first if left out")
    .option('--coverage <probability>', 'of the expanded uncertainty', '95 %')
    .option('--seed <n>', 'for the Monte Carlo run', wholeNumber('--seed', ...SEEDS), 1)
    .option('--digits <n>', 'of the uncertainty that must agree', wholeNumber('--digits', 1, 2), 1)
    .option('--exact', EXACT)
    .option('--csv <file>', 'write the budget as CSV')
    .option('--force', 'replace that file if it is there')
    .option('--json', AS_JSON)
    .addHelpText(
      'after',
      `
Example:
  $ rimwright budget my.yaml --design rings-1 --diameter "2 um" --csv budget.csv`,
    )
    .action(async (brief, options) => done(await (await import('./budgetCommand.ts')).run(brief, options)));
}
