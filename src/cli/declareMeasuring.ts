import type { Command } from './commander.ts';
import { lengthUnit, wholeNumber } from './optionRules.ts';
import type { Done } from './optionTexts.ts';
import { AS_JSON, BRIEF, EXACT, ID, OUTLINE, SEEDS, UNIT } from './optionTexts.ts';

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
    .option('--unit <unit>', UNIT, lengthUnit)
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

  program
    .command('evaluate')
    .summary('measured powers to extinctions and diameters')
    .description(
      'Turns measured powers, without and with a particle, into extinction cross-sections and equivalent diameters with their uncertainties. Rows that cannot be right are marked with the reason; rows of reference spheres calibrate the gain. The data are never changed.',
    )
    .argument('<brief>', BRIEF)
    .requiredOption('--data <file>', 'CSV such as power_without_uW,power_with_uW,time_ms,label')
    .option('--outline <file>', OUTLINE)
    .option('--design <id>', ID)
    .option('--unit <unit>', UNIT, lengthUnit)
    .option('--distance <length>', 'distance from particle to detector')
    .option('--without <column>', 'readings without a particle, where the header is of its own')
    .option('--with <column>', 'readings with one')
    .option('--column-unit <unit>', 'of both: W, mW, uW, nW, pW, or A, mA, uA, nA, pA')
    .option('--material <name>', "of the spheres, on the shelf; the brief's first if left out")
    .option('--saturation <power>', 'power or current from which the detector is blind')
    .option('--coverage <probability>', 'of the expanded uncertainties', '95 %')
    .option('--outlier <n>', 'normalised residual beyond which', wholeNumber('--outlier', 2, 100), 3)
    .option('--omit <lines>', 'from the fit of the gain: outliers, or lines such as "12, 17"')
    .option('--keep-gain', "evaluate with the design's gain all the same")
    .option('--exact', EXACT)
    .option('--csv <file>', 'write all rows as CSV')
    .option('--force', 'replace that file if it is there')
    .option('--json', AS_JSON)
    .addHelpText(
      'after',
      `
Example:
  $ rimwright evaluate my.yaml --design rings-1 --data monday.csv --csv out.csv
  reads power_without_uW and power_with_uW (or W, mW, nW, or current_... in A,
  mA, uA, nA), and if they are there time_ms, label, reference_diameter_um and
  reference_uncertainty_um.
  $ rimwright evaluate my.yaml --design rings-1 --data log.csv \\
      --without ch1 --with ch2 --column-unit nA`,
    )
    .action(async (brief, options) => done(await (await import('./evaluateCommand.ts')).run(brief, options)));
}
