/** Strategy parameters of CMA-ES, all fixed by the dimension and the population. */
export interface CmaParameters {
  dimension: number;
  /** λ, points per generation. */
  population: number;
  /** μ, points with a positive weight. */
  parents: number;
  /** Variance-effective number of parents, and the same of the negative weights. */
  muEff: number;
  muEffNegative: number;
  /** Recombination weights by rank, λ of them: the positive ones add up to 1, the others are ≤ 0. */
  weights: Float64Array;
  /** Learning rate and damping of the step size. */
  cSigma: number;
  dSigma: number;
  /** Learning rates of the evolution path, of the rank-one and of the rank-μ update. */
  cC: number;
  c1: number;
  cMu: number;
  /** Expected length of a standard normal vector, by its usual approximation. */
  chiN: number;
}

/** 4 + ⌊3 ln n⌋ points a generation: Hansen (2016), equation (48). */
export function defaultPopulation(dimension: number): number {
  return 4 + Math.floor(3 * Math.log(dimension));
}

/**
 * Default strategy parameters with negative weights ("active" update).
 * Source: Hansen (2016), The CMA Evolution Strategy: A Tutorial, arXiv:1604.00772, Table 1 and equations (49) to (58).
 *
 * @param dimension n, at least 1
 * @param population λ, at least 4
 */
export function cmaParameters(dimension: number, population = defaultPopulation(dimension)): CmaParameters {
  const n = dimension;
  const parents = Math.floor(population / 2);
  const raw = Float64Array.from({ length: population }, (_, i) => Math.log((population + 1) / 2 / (i + 1)));
  const positive = raw.subarray(0, parents);
  const negative = raw.subarray(parents);
  const muEff = effectiveNumber(positive);
  const muEffNegative = effectiveNumber(negative);

  const cSigma = (muEff + 2) / (n + muEff + 5);
  const dSigma = 1 + 2 * Math.max(0, Math.sqrt((muEff - 1) / (n + 1)) - 1) + cSigma;
  const cC = (4 + muEff / n) / (n + 4 + (2 * muEff) / n);
  const c1 = 2 / ((n + 1.3) ** 2 + muEff);
  const cMu = Math.min(1 - c1, (2 * (0.25 + muEff + 1 / muEff - 2)) / ((n + 2) ** 2 + muEff));

  // Negative weights add up to −α, the least of three: balance, effective number, positive definiteness.
  const alpha = Math.min(1 + c1 / cMu, 1 + (2 * muEffNegative) / (muEff + 2), (1 - c1 - cMu) / (n * cMu));
  const positiveSum = sum(positive);
  const negativeSum = -sum(negative);
  const weights = raw.map((w, i) => (i < parents ? w / positiveSum : (alpha * w) / negativeSum));
  const chiN = Math.sqrt(n) * (1 - 1 / (4 * n) + 1 / (21 * n * n));
  return { dimension, population, parents, muEff, muEffNegative, weights, cSigma, dSigma, cC, c1, cMu, chiN };
}

const sum = (numbers: Float64Array) => numbers.reduce((total, x) => total + x, 0);

/** (Σw)²/Σw². */
function effectiveNumber(weights: Float64Array): number {
  return sum(weights) ** 2 / sum(weights.map((w) => w * w));
}
