import { RimwrightError } from '../base/errors.ts';
import type { RandomSource } from '../base/random.ts';
import { randomStream } from '../base/random.ts';
import type { Interval } from './coverageIntervals.ts';
import { shortestInterval, symmetricInterval } from './coverageIntervals.ts';
import { draw } from './distribution.ts';
import type { BudgetInput, Correlation, Model } from './uncertaintyBudget.ts';

export interface MonteCarlo {
  trials: number;
  /** Whether mean, standard uncertainty and both ends keep still within the tolerance that was asked for. */
  isStable: boolean;
  mean: number;
  standardUncertainty: number;
  symmetric: Interval;
  shortest: Interval;
}

export interface Trials {
  /** Probability that the intervals hold. */
  coverage: number;
  seed: number;
  /** Most trials; a whole number of blocks is made of them. */
  most: number;
  /** What twice the standard deviations of the results must fall below; 0 makes as many trials as are allowed. */
  tolerance: number;
}

/**
 * Propagates whole distributions through a model (JCGM 101:2008). Blocks of trials are made until what they give no longer moves
 * by more than the tolerance (7.9.4), or there are as many as are allowed. The same seed gives the same numbers.
 *
 * @throws RimwrightError `machine` for correlations of inputs that are not normal, or that no distribution can have
 */
export function monteCarlo(
  model: Model,
  inputs: readonly BudgetInput[],
  { coverage, seed, most, tolerance }: Trials,
  correlations: readonly Correlation[] = [],
): MonteCarlo {
  const sample = sampler(inputs, correlations, randomStream(seed));
  const size = Math.max(Math.ceil(100 / (1 - coverage)), 10_000);
  const blocks: Float64Array[] = [];
  // Mean, standard uncertainty and both ends of each block.
  const summaries: number[][] = [];
  const mostBlocks = Math.max(2, Math.floor(most / size));
  let isStable = false;
  const values = new Float64Array(inputs.length);
  while (blocks.length < mostBlocks && !isStable) {
    const block = Float64Array.from({ length: size }, () => {
      sample(values);
      return model(values);
    });
    blocks.push(block);
    const { mean, deviation } = moments(block);
    summaries.push([mean, deviation, ...symmetricInterval(block.toSorted(), coverage)]);
    if (blocks.length >= 2) isStable = [0, 1, 2, 3].every((which) => spreadOf(summaries, which) < tolerance);
  }
  const all = new Float64Array(size * blocks.length);
  blocks.forEach((block, b) => {
    all.set(block, b * size);
  });
  const { mean, deviation } = moments(all);
  all.sort();
  return {
    trials: all.length,
    isStable,
    mean,
    standardUncertainty: deviation,
    symmetric: symmetricInterval(all, coverage),
    shortest: shortestInterval(all, coverage),
  };
}

/** Twice the standard deviation of the mean of one figure over the blocks. */
function spreadOf(summaries: readonly number[][], which: number): number {
  const { deviation } = moments(Float64Array.from(summaries, (summary) => summary[which]));
  return (2 * deviation) / Math.sqrt(summaries.length);
}

function moments(values: Float64Array): { mean: number; deviation: number } {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  const squares = values.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  return { mean, deviation: Math.sqrt(squares / (values.length - 1)) };
}

/** Fills in one draw of all inputs; those that are correlated are jointly normal (JCGM 101:2008, 6.4.8). */
function sampler(
  inputs: readonly BudgetInput[],
  correlations: readonly Correlation[],
  random: RandomSource,
): (out: Float64Array) => void {
  const distributions = inputs.map(({ distribution }) => distribution);
  if (correlations.length === 0) {
    return (out) => {
      for (let i = 0; i < out.length; i++) out[i] = draw(distributions[i], random);
    };
  }
  const joined = [...new Set(correlations.flatMap(({ between }) => between))];
  const places = new Map(joined.map((input, place) => [input, place]));
  const matrix = joined.map((a) => joined.map((b) => Number(a === b)));
  for (const { between, coefficient } of correlations) {
    const [a, b] = between.map((input) => places.get(input) ?? 0);
    matrix[a][b] = coefficient;
    matrix[b][a] = coefficient;
  }
  const factor = choleskyFactor(matrix);
  const normals = new Float64Array(joined.length);
  return (out) => {
    for (let j = 0; j < normals.length; j++) normals[j] = random.normal();
    for (let i = 0; i < out.length; i++) {
      const distribution = distributions[i];
      const place = places.get(i);
      if (place === undefined) out[i] = draw(distribution, random);
      else if (distribution.kind !== 'normal') {
        throw new RimwrightError('machine', `${inputs[i].name} is correlated, and not normal`);
      } else {
        const along = factor[place].reduce((sum, part, j) => sum + part * normals[j], 0);
        out[i] = distribution.mean + distribution.deviation * along;
      }
    }
  };
}

/** Lower triangle L with L Lᵀ = matrix. */
function choleskyFactor(matrix: readonly (readonly number[])[]): number[][] {
  const factor: number[][] = [];
  for (let row = 0; row < matrix.length; row++) {
    factor.push([]);
    for (let column = 0; column <= row; column++) {
      let rest = matrix[row][column];
      for (let j = 0; j < column; j++) rest -= factor[row][j] * factor[column][j];
      if (row === column && rest < -1e-12) {
        throw new RimwrightError('machine', 'correlation coefficients that no distribution can have');
      }
      if (row === column) factor[row].push(Math.sqrt(Math.max(0, rest)));
      else factor[row].push(factor[column][column] === 0 ? 0 : rest / factor[column][column]);
    }
  }
  return factor;
}
