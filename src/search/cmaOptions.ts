import { inputError, type Problem } from '../base/errors.ts';
import type { RandomSource } from '../base/random.ts';
import { type Box, checkCount, checkedBox, checkPositive, checkStart } from './box.ts';
import { defaultPopulation } from './cmaParameters.ts';

/** How to start CMA-ES. Only the first three are needed. */
export interface CmaOptions {
  /** First mean, inside the bounds. */
  start: Float64Array;
  /** First step size, above 0: the search's first standard deviation along i is sigma · scale[i]. */
  sigma: number;
  random: RandomSource;
  /** Bounds of each coordinate, themselves allowed; ±Infinity for none. */
  lower?: Float64Array;
  upper?: Float64Array;
  /** Points a generation, at least 4; 4 + ⌊3 ln n⌋ if left out. */
  population?: number;
  /** Natural length of each coordinate, above 0; all 1 if left out. */
  scale?: Float64Array;
  /** Stop after the generation that reaches this number; no limit if left out. */
  maxEvaluations?: number;
  /** Stop when every standard deviation over its scale is below this; 1e-12 · sigma if left out. */
  tolX?: number;
  /** Stop when the values of the last generations differ by less; 1e-12 if left out. */
  tolFun?: number;
}

/** Options with every gap filled. */
export interface CheckedCmaOptions extends Required<Omit<CmaOptions, 'lower' | 'upper'>> {
  box: Box;
}

/**
 * Checks all options in one place and fills the gaps.
 *
 * @throws RimwrightError `input` that lists every mistake
 */
export function checkedCmaOptions(options: CmaOptions): CheckedCmaOptions {
  const { start, sigma, random } = options;
  const dimension = start.length;
  const problems: Problem[] = [];
  const box = checkedBox(options, dimension, problems);
  checkStart(start, box, problems);
  checkPositive('sigma', sigma, problems);

  const scale = options.scale ?? new Float64Array(dimension).fill(1);
  if (scale.length !== dimension) {
    problems.push({ key: 'scale', found: `${scale.length} numbers`, expected: `${dimension}` });
  }
  for (const [i, length] of scale.entries()) checkPositive(`scale[${i}]`, length, problems);

  const population = options.population ?? defaultPopulation(Math.max(1, dimension));
  checkCount('population', Number.isFinite(population) ? population : Number.NaN, 4, problems);
  const maxEvaluations = options.maxEvaluations ?? Number.POSITIVE_INFINITY;
  checkCount('maxEvaluations', maxEvaluations, 1, problems);

  const { tolX = 1e-12 * sigma, tolFun = 1e-12 } = options;
  for (const [key, value] of Object.entries({ tolX, tolFun })) {
    // A tolX made of a wrong sigma has been reported as sigma's mistake.
    if (key === 'tolX' && options.tolX === undefined) continue;
    if (!(value >= 0)) problems.push({ key, found: `${value}`, expected: 'a number, at least 0' });
  }
  if (problems.length > 0) throw inputError(problems);
  return { start, sigma, random, box, population, scale, maxEvaluations, tolX, tolFun };
}
