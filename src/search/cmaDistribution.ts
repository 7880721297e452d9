import type { RandomSource } from '../base/random.ts';
import { symmetricEigen } from '../numeric/symmetricEigen.ts';
import type { CmaParameters } from './cmaParameters.ts';
import type { CmaStop } from './cmaStop.ts';

/**
 * The normal distribution of CMA-ES, N(m, σ²C), and how it learns from one generation's order.
 * Source: Hansen (2016), The CMA Evolution Strategy: A Tutorial, arXiv:1604.00772; equation numbers below
 * are those of the tutorial.
 */
export class CmaDistribution {
  private readonly parameters: CmaParameters;
  private readonly firstSigma: number;
  private readonly mean: Float64Array;
  private sigma: number;
  /** C, n × n, and its eigen decomposition: columns of B, and standard deviations D. */
  private readonly covariance: Float64Array;
  private axes: Float64Array;
  private lengths: Float64Array;
  /** p_σ and p_c. */
  private readonly sigmaPath: Float64Array;
  private readonly path: Float64Array;
  /** Of the last generation, λ rows of n: z ~ N(0, I) and y = BDz ~ N(0, C). */
  private readonly z: Float64Array;
  private readonly y: Float64Array;
  private generation = 0;
  private generationOfAxes = 0;

  /** Starts round: C = I. */
  constructor(parameters: CmaParameters, mean: Float64Array, sigma: number) {
    const { dimension: n, population } = parameters;
    this.parameters = parameters;
    this.firstSigma = sigma;
    this.mean = mean.slice();
    this.sigma = sigma;
    this.covariance = identity(n);
    this.axes = identity(n);
    this.lengths = new Float64Array(n).fill(1);
    this.sigmaPath = new Float64Array(n);
    this.path = new Float64Array(n);
    this.z = new Float64Array(n * population);
    this.y = new Float64Array(n * population);
  }

  /** Standard deviation along coordinate i: σ √C_ii. */
  deviation(i: number): number {
    return this.sigma * Math.sqrt(this.covariance[i * this.mean.length + i]);
  }

  /** (38) to (40): λ points x = m + σy. */
  drawGeneration(random: RandomSource): Float64Array[] {
    this.refreshAxes();
    const { axes, lengths, mean, sigma } = this;
    const { dimension: n, population } = this.parameters;
    return Array.from({ length: population }, (_, k) => {
      const z = this.z.subarray(k * n, (k + 1) * n);
      for (let i = 0; i < n; i++) z[i] = random.normal();
      const stretched = z.map((value, j) => lengths[j] * value);
      const y = product(axes, stretched);
      this.y.set(y, k * n);
      return mean.map((m, i) => m + sigma * y[i]);
    });
  }

  /** @param order indices of the last generation, best first */
  learn(order: readonly number[]): void {
    const { parameters: p, sigmaPath, path } = this;
    const n = p.dimension;
    this.generation++;
    // (41), (42): the mean moves to the weighted mean of the parents.
    const step = this.weightedParents(this.y, order);
    for (let i = 0; i < n; i++) this.mean[i] += this.sigma * step[i];

    // (43): C^(−1/2) y = Bz, since the points were drawn with the same B and D.
    const whiteStep = product(this.axes, this.weightedParents(this.z, order));
    const sigmaGain = Math.sqrt(p.cSigma * (2 - p.cSigma) * p.muEff);
    for (let i = 0; i < n; i++) sigmaPath[i] = (1 - p.cSigma) * sigmaPath[i] + sigmaGain * whiteStep[i];
    const length = Math.hypot(...sigmaPath);

    // (45): h_σ stalls p_c while σ is growing fast.
    const settled = length / Math.sqrt(1 - (1 - p.cSigma) ** (2 * this.generation));
    const hSigma = settled < (1.4 + 2 / (n + 1)) * p.chiN ? 1 : 0;
    const pathGain = hSigma * Math.sqrt(p.cC * (2 - p.cC) * p.muEff);
    for (let i = 0; i < n; i++) path[i] = (1 - p.cC) * path[i] + pathGain * step[i];

    this.learnCovariance(order, hSigma);
    // (44)
    this.sigma *= Math.exp((p.cSigma / p.dSigma) * (length / p.chiN - 1));
  }

  /** Equal values say nothing of the way to go: wider steps may find a difference. */
  widen(): void {
    this.sigma *= Math.exp(0.2 + this.parameters.cSigma / this.parameters.dSigma);
  }

  /** Why points drawn from here on would teach nothing; undefined while they may. */
  stopReason(tolX: number): CmaStop | undefined {
    const { axes, lengths, mean, path, sigma } = this;
    const n = mean.length;
    const all = [...mean.keys()];
    if (all.every((i) => Math.max(this.deviation(i), sigma * Math.abs(path[i])) < tolX)) return 'tolX';
    const longest = Math.max(...lengths);
    if (sigma * longest > 1e4 * this.firstSigma) return 'tolXUp';
    if (Math.min(...lengths) * 1e7 <= longest) return 'conditionCov';
    if (all.some((i) => mean[i] === mean[i] + 0.2 * this.deviation(i))) return 'noEffectCoord';
    const axis = this.generation % n;
    const step = 0.1 * sigma * lengths[axis];
    return all.every((i) => mean[i] === mean[i] + step * axes[i * n + axis]) ? 'noEffectAxis' : undefined;
  }

  /** (46), (47): rank-one update along p_c, rank-μ update with positive and negative weights. */
  private learnCovariance(order: readonly number[], hSigma: number): void {
    const { parameters: p, covariance, path, y } = this;
    const n = p.dimension;
    const weights = order.map((k, rank) => {
      const w = p.weights[rank];
      if (w >= 0) return w;
      // Scaled to the length of C^(−1/2) y, so that C stays positive definite however long the step was.
      let squared = 0;
      for (let i = 0; i < n; i++) squared += this.z[k * n + i] ** 2;
      return (w * n) / squared;
    });
    const weightSum = p.weights.reduce((total, w) => total + w, 0);
    const stalled = p.c1 * (1 - hSigma) * p.cC * (2 - p.cC);
    const keep = 1 + stalled - p.c1 - p.cMu * weightSum;
    for (let i = 0; i < n; i++) {
      for (let j = 0; j <= i; j++) {
        let rankMu = 0;
        for (let rank = 0; rank < order.length; rank++) {
          const k = order[rank] * n;
          rankMu += weights[rank] * y[k + i] * y[k + j];
        }
        const entry = keep * covariance[i * n + j] + p.c1 * path[i] * path[j] + p.cMu * rankMu;
        covariance[i * n + j] = entry;
        covariance[j * n + i] = entry;
      }
    }
  }

  /** Decomposes C lazily: every 1/(10 n (c_1 + c_μ)) generations cost little accuracy (tutorial, B.2). */
  private refreshAxes(): void {
    const { dimension: n, c1, cMu } = this.parameters;
    const wait = Math.max(1, Math.floor(1 / (10 * n * (c1 + cMu))));
    if (this.generation - this.generationOfAxes < wait) return;
    this.generationOfAxes = this.generation;
    const { values, vectors } = symmetricEigen(this.covariance, n);
    this.axes = vectors;
    // Asking on after `conditionCov` must not make NaN of a value that rounding pushed below 0.
    this.lengths = values.map((value) => Math.sqrt(Math.max(value, 0)));
  }

  /** Σ w_i v_(i:λ) over the parents. */
  private weightedParents(vectors: Float64Array, order: readonly number[]): Float64Array {
    const { dimension: n, parents, weights } = this.parameters;
    const sum = new Float64Array(n);
    for (let rank = 0; rank < parents; rank++) {
      for (let i = 0; i < n; i++) sum[i] += weights[rank] * vectors[order[rank] * n + i];
    }
    return sum;
  }
}

/** Square matrix, row by row, times vector. */
function product(matrix: Float64Array, vector: Float64Array): Float64Array {
  const n = vector.length;
  const result = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    let sum = 0;
    for (let j = 0; j < n; j++) sum += matrix[i * n + j] * vector[j];
    result[i] = sum;
  }
  return result;
}

function identity(n: number): Float64Array {
  return Float64Array.from({ length: n * n }, (_, k) => (k % (n + 1) === 0 ? 1 : 0));
}
