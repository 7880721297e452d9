import { inputError, type Problem } from '../base/errors.ts';
import type { RandomSource } from '../base/random.ts';
import { type Box, checkCount, checkedBox, checkStart } from './box.ts';

/** How to search a front. What has a question mark may be left out. */
export interface MultiObjectiveOptions {
  /** Number of objectives, 2 or 3. */
  objectives: number;
  /** Finite bounds of each coordinate, themselves allowed. */
  lower: Float64Array;
  upper: Float64Array;
  /** Evaluations granted in all; never exceeded. */
  budget: number;
  random: RandomSource;
  /** Points to score first, inside the bounds: designs already known. */
  starts?: readonly Float64Array[];
  /** Least number of points that are kept to breed from, at least 8; 50 if left out. */
  population?: number;
  /** Points a round, at least 1; 10 if left out. Larger ones keep more workers busy and learn a little more slowly. */
  batch?: number;
}

/** Options with every gap filled. */
export interface CheckedMultiObjectiveOptions
  extends Required<Omit<MultiObjectiveOptions, 'lower' | 'upper'>> {
  box: Box;
}

/**
 * Checks all options in one place and fills the gaps.
 *
 * @throws RimwrightError `input` that lists every mistake
 */
export function checkedMultiObjectiveOptions(options: MultiObjectiveOptions): CheckedMultiObjectiveOptions {
  const { objectives, budget, random, starts = [], population = 50, batch = 10 } = options;
  const problems: Problem[] = [];
  if (objectives !== 2 && objectives !== 3) {
    problems.push({ key: 'objectives', found: `${objectives}`, expected: '2 or 3' });
  }
  const dimension = options.lower.length;
  if (dimension === 0) problems.push({ key: 'lower', found: 'no coordinates', expected: 'at least one' });
  const box = checkedBox(options, dimension, problems);
  for (const side of ['lower', 'upper'] as const) {
    for (const [i, bound] of box[side].entries()) {
      if (Number.isFinite(bound)) continue;
      problems.push({ key: `${side}[${i}]`, found: `${bound}`, expected: 'a finite number' });
    }
  }
  for (const start of starts) {
    if (start.length === dimension) checkStart(start, box, problems);
    else problems.push({ key: 'starts', found: `${start.length} coordinates`, expected: `${dimension}` });
  }
  for (const [key, value, least] of [
    ['budget', budget, 1],
    ['population', population, 8],
    ['batch', batch, 1],
  ] as const) {
    checkCount(key, Number.isFinite(value) ? value : Number.NaN, least, problems);
  }
  if (problems.length > 0) throw inputError(problems);
  return { objectives, budget, random, starts, population, batch, box };
}
