import type { MonteCarlo, Trials } from './monteCarlo.ts';
import { monteCarlo } from './monteCarlo.ts';
import type { Budget, BudgetInput, Correlation, Model } from './uncertaintyBudget.ts';

/** A budget's interval beside that of a Monte Carlo run. */
export interface BudgetCheck {
  monteCarlo: MonteCarlo;
  /** How far the ends of the interval may be apart. */
  tolerance: number;
  /** How far they are apart. */
  low: number;
  high: number;
  /** Whether both keep the tolerance: then the budget's interval may be used. */
  holds: boolean;
}

/** The run's own noise stays below this part of the tolerance (JCGM 101:2008, 8.2). */
const FINER = 5;

/**
 * Checks a budget by a Monte Carlo run (JCGM 101:2008, clause 8): the ends of its interval, value ± expanded uncertainty, against
 * those of the probabilistically symmetric one.
 *
 * @param digits of the standard uncertainty that count, 1 or 2
 */
export function checkBudget(
  model: Model,
  inputs: readonly BudgetInput[],
  budget: Budget,
  { seed, most, digits }: Pick<Trials, 'seed' | 'most'> & { digits: number },
  correlations: readonly Correlation[] = [],
): BudgetCheck {
  const { value, expandedUncertainty, coverage } = budget;
  const tolerance = numericalTolerance(budget.standardUncertainty, digits);
  const trials = { coverage, seed, most, tolerance: tolerance / FINER };
  const run = monteCarlo(model, inputs, trials, correlations);
  const [low, high] = run.symmetric;
  const apart = {
    low: Math.abs(value - expandedUncertainty - low),
    high: Math.abs(value + expandedUncertainty - high),
  };
  return {
    monteCarlo: run,
    tolerance,
    ...apart,
    holds: apart.low <= tolerance && apart.high <= tolerance,
  };
}

/**
 * Half a unit of the last digit that counts: u = c · 10^l with c a whole number of that many digits, and the tolerance 10^l/2
 * (JCGM 101:2008, 7.9.2).
 *
 * @param uncertainty above 0
 */
export function numericalTolerance(uncertainty: number, digits: number): number {
  if (uncertainty === 0) return 0;
  // Written out, so that 0.0996 counts as 0.10 with two digits.
  const exponent = Number(uncertainty.toExponential(digits - 1).split('e')[1]);
  return 0.5 * 10 ** (exponent - (digits - 1));
}
