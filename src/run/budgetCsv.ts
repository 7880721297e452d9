import { INPUT_UNITS } from '../metrology/extinctionModel.ts';
import { csvText } from './csvText.ts';
import type { ExtinctionBudget } from './extinctionBudget.ts';

/** A budget as CSV, one row an input and the result last; in SI units. */
export function budgetCsv({ budget }: ExtinctionBudget): string {
  const header = [
    'input',
    'unit',
    'value',
    'standard_uncertainty',
    'degrees_of_freedom',
    'distribution',
    'sensitivity_m2_per_unit',
    'contribution_m2',
    'share',
  ];
  const digits = (value: number) => (Number.isFinite(value) ? Number(value.toPrecision(10)) : 'infinite');
  const rows = budget.lines.map((line, i) => [
    line.name,
    INPUT_UNITS[i],
    digits(line.value),
    digits(line.standardUncertainty),
    digits(line.degreesOfFreedom),
    line.distribution,
    digits(line.sensitivity),
    digits(line.contribution),
    digits(line.share),
  ]);
  const { value, standardUncertainty, degreesOfFreedom } = budget;
  const result = ['extinction', 'm²', digits(value), digits(standardUncertainty), digits(degreesOfFreedom)];
  return csvText([header, ...rows, [...result, '', '', digits(standardUncertainty), 1]]);
}
