import { dirname } from 'node:path';
import { formatQuantity } from '../base/quantity.ts';
import { areaText, countText, percentText, quantityText } from '../draw/quantityText.ts';
import { INPUT_UNITS } from '../metrology/extinctionModel.ts';
import type { BudgetLine } from '../metrology/uncertaintyBudget.ts';
import type { LengthUnit } from '../outline/files/lengthUnit.ts';
import { budgetCsv } from '../run/budgetCsv.ts';
import { chooseDesign } from '../run/chooseDesign.ts';
import type { ExtinctionBudget } from '../run/extinctionBudget.ts';
import { extinctionBudget } from '../run/extinctionBudget.ts';
import { jsonText } from '../run/jsonText.ts';
import { openBrief } from '../run/openBrief.ts';
import { prepareFolder } from '../run/resultsFolder.ts';
import { sphereLike } from '../run/sphereLike.ts';
import { readingWarnings } from '../run/warnings.ts';
import { refuseExisting, writeWhole } from '../run/writeWhole.ts';
import { areaWithUncertainty } from './areaWithUncertainty.ts';
import { shortCount } from './designColumns.ts';
import { EXIT } from './exit.ts';
import { uninterrupted } from './interrupt.ts';
import { note, noteDefaults, print, printWrapped, warn } from './notes.ts';
import { readCoverage, readDiameter, readDistance } from './quantityOptions.ts';
import type { Column } from './table.ts';
import { table } from './table.ts';

interface Options {
  outline?: string;
  design?: string;
  unit?: LengthUnit;
  distance?: string;
  diameter?: string;
  material?: string;
  coverage: string;
  seed: number;
  digits: number;
  exact?: true;
  csv?: string;
  force?: true;
  json?: true;
}

/** Runs `rimwright budget` and gives its exit code. */
export async function run(place: string, options: Options): Promise<number> {
  const { csv, seed, digits } = options;
  const distance = await readDistance(options.distance);
  const diameterM = await readDiameter(options.diameter);
  const coverage = await readCoverage(options.coverage);
  if (csv !== undefined) {
    prepareFolder(dirname(csv));
    if (!options.force) refuseExisting([csv]);
  }
  const opened = await openBrief(place);
  const { brief } = opened;
  const { given, warnings: ofResults } = chooseDesign(opened, options);
  const particle = sphereLike(brief.task, diameterM, options.material);
  const fields = options.exact ? 'exact' : 'far';
  const result = extinctionBudget(brief, given, distance, particle, { coverage, seed, digits, fields });
  const { built } = result;
  const warnings = [...ofResults, ...readingWarnings(brief.task, fields, [built])];
  if (csv !== undefined) {
    const file = { path: csv, text: budgetCsv(result) };
    uninterrupted(() => writeWhole([file], options.force ?? false));
    note(`Written to ${csv}`);
  }
  if (!options.json) noteDefaults([...brief.defaults, ...brief.uncertaintyDefaults]);
  warn(warnings);
  if (options.json) print(jsonText({ ...budgetJson(result), brief, warnings }));
  else printBudget(result);
  return EXIT.done;
}

function budgetJson({ built, particle, extinctionM2, shownM2, budget, check }: ExtinctionBudget) {
  // JSON has no infinity: null stands for it.
  return {
    design: built.given.id,
    fields: built.fields,
    particle: { diameter_m: particle.diameterM, material: particle.material },
    distance_m: built.distanceM,
    extinction_m2: extinctionM2,
    shown_m2: shownM2,
    inputs: budget.lines.map((line, i) => ({
      name: line.name,
      unit: INPUT_UNITS[i],
      value: line.value,
      standardUncertainty: line.standardUncertainty,
      degreesOfFreedom: line.degreesOfFreedom,
      distribution: line.distribution,
      sensitivity: line.sensitivity,
      contribution_m2: line.contribution,
      share: line.share,
    })),
    value_m2: budget.value,
    standardUncertainty_m2: budget.standardUncertainty,
    degreesOfFreedom: budget.degreesOfFreedom,
    coverage: budget.coverage,
    coverageFactor: budget.coverageFactor,
    expandedUncertainty_m2: budget.expandedUncertainty,
    monteCarlo: {
      trials: check.monteCarlo.trials,
      isStable: check.monteCarlo.isStable,
      mean_m2: check.monteCarlo.mean,
      standardUncertainty_m2: check.monteCarlo.standardUncertainty,
      symmetric_m2: check.monteCarlo.symmetric,
      shortest_m2: check.monteCarlo.shortest,
      tolerance_m2: check.tolerance,
      apart_m2: [check.low, check.high],
      holds: check.holds,
    },
  };
}

function printBudget(result: ExtinctionBudget): void {
  const { built, particle, extinctionM2, shownM2, budget, check } = result;
  const { given, distanceM, instrument } = built;
  printWrapped(
    `${given.file}, ${formatQuantity(distanceM, 'length')} behind one particle, ` +
      `${formatQuantity(particle.diameterM, 'length')} ${particle.material}. Its extinction is ${areaText(extinctionM2)}; ` +
      `the instrument is expected to show ${areaText(shownM2)}, with gain ${countText(instrument.gain.value)}.`,
  );
  print('');
  print(table(COLUMNS, linesOf(result)));
  print('');
  const { coverage, coverageFactor, degreesOfFreedom, standardUncertainty, expandedUncertainty } = budget;
  const freedom = Number.isFinite(degreesOfFreedom)
    ? `${countText(degreesOfFreedom)} effective degrees of freedom`
    : 'infinite degrees of freedom';
  printWrapped(
    `Measured extinction ${areaWithUncertainty(budget.value, expandedUncertainty)} ` +
      `(${percentText(coverage)} coverage, k = ${coverageFactor.toFixed(2)}, ${freedom}); ` +
      `standard uncertainty ${areaText(standardUncertainty)}, ${percentText(standardUncertainty / budget.value)}.`,
  );
  const run = check.monteCarlo;
  const verdict = check.holds
    ? 'Both ends agree within the tolerance: the budget holds.'
    : "They do not agree within the tolerance: take the Monte Carlo run's interval.";
  const stable = run.isStable ? '' : ' (not yet still within a fifth of the tolerance)';
  printWrapped(
    `Monte Carlo check, ${run.trials} trials${stable}: mean ${areaText(run.mean)}, standard uncertainty ` +
      `${areaText(run.standardUncertainty)}, interval ${intervalText(run.symmetric)}, shortest ` +
      `${intervalText(run.shortest)}. The budget's ends are ${areaText(check.low)} and ${areaText(check.high)} off, ` +
      `tolerance ${areaText(check.tolerance)}. ${verdict}`,
  );
}

const intervalText = ([least, most]: readonly [number, number]) => `${areaText(least)} to ${areaText(most)}`;

interface Row extends BudgetLine {
  unit: string;
}

/** What is exact has nothing to say in a table. */
function linesOf({ budget }: ExtinctionBudget): Row[] {
  return budget.lines
    .map((line, i) => ({ ...line, unit: INPUT_UNITS[i] }))
    .filter(({ standardUncertainty }) => standardUncertainty > 0);
}

function inUnit(value: number, unit: string): string {
  if (unit === '') return value === 0 ? '0' : `${shortCount(100 * value)} %`;
  if (unit === 'm') return formatQuantity(value, 'length');
  if (unit === 'W/m²') return `${countText(value / 1e4)} W/cm²`;
  if (unit === 'A/W') return `${countText(value)} A/W`;
  return quantityText(value, unit);
}

/** Six digits: the signal is the difference of two powers that are nearly alike. */
function powerText(powerW: number): string {
  const [unit, perUnit] = powerW >= 1e-3 ? ['mW', 1e3] : powerW >= 1e-6 ? ['µW', 1e6] : ['nW', 1e9];
  return `${Number((powerW * perUnit).toPrecision(6))} ${unit}`;
}

const COLUMNS: readonly Column<Row>[] = [
  { title: ['input'], cell: ({ name }) => name, align: 'left' },
  {
    title: ['value'],
    cell: ({ value, unit }) =>
      unit === 'W' ? powerText(value) : unit === '' && value > 0.1 ? countText(value) : inUnit(value, unit),
  },
  { title: ['standard', 'unc.'], cell: ({ standardUncertainty, unit }) => inUnit(standardUncertainty, unit) },
  { title: ['distribution'], cell: ({ distribution }) => distribution, align: 'left' },
  { title: ['sensit.', 'm²/unit'], cell: ({ sensitivity }) => sensitivity.toExponential(1) },
  { title: ['part', 'µm²'], cell: ({ contribution }) => shortCount(contribution * 1e12) },
  { title: ['share', '%'], cell: ({ share }) => (100 * share).toFixed(1) },
];
