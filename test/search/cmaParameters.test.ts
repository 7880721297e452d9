import { describe, expect, it } from 'vitest';
import { cmaParameters, defaultPopulation } from '../../src/search/cmaParameters.ts';
import { published } from './reference.ts';

const close = (found: number, wanted: string | number) =>
  // The file gives 12 to 14 digits, rounded.
  expect(Math.abs(found / Number(wanted) - 1)).toBeLessThan(5e-12);

describe('cmaParameters', () => {
  // Hansen (2016), arXiv:1604.00772, Table 1.
  it.each(published('cma_default_n'))('has the default values of the tutorial: $id', ({ value }) => {
    const p = cmaParameters(value.n);
    expect([p.population, p.parents, p.dimension]).toEqual([value.lam, value.mu, value.n]);
    close(p.muEff, value.mueff);
    close(p.muEffNegative, value.mueff_minus);
    close(p.cSigma, value.c_sigma);
    close(p.dSigma, value.d_sigma);
    close(p.cC, value.c_c);
    close(p.c1, value.c_1);
    close(p.cMu, value.c_mu_tutorial_v2);
    close(p.chiN, value.chiN_approx);
    const weights = [...value.w_pos, ...value.w_neg].map(Number);
    expect(p.weights).toHaveLength(weights.length);
    for (const [i, w] of weights.entries()) {
      if (w === 0) expect(p.weights[i]).toBeCloseTo(0, 12);
      else close(p.weights[i], w);
    }
    const negativeSum = p.weights.subarray(p.parents).reduce((a, b) => a + b, 0);
    close(-negativeSum, value.alpha_neg);
  });

  it('has rates that leave no more than all of the old covariance, for any population', () => {
    for (const n of [1, 2, 7, 50]) {
      for (const population of [4, defaultPopulation(n), 40, 4000]) {
        const p = cmaParameters(n, population);
        expect(p.c1 + p.cMu).toBeLessThanOrEqual(1);
        expect(p.weights.every(Number.isFinite)).toBe(true);
      }
    }
  });
});
