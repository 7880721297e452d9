import type { RandomSource } from '../base/random.ts';
import { defaultPopulation } from './cmaParameters.ts';

/** What kind of run comes next. */
export interface Regime {
  kind: 'first' | 'large' | 'small';
  population: number;
  /** Factor on the step size that the run's start asks for. */
  sigmaFactor: number;
  maxEvaluations: number;
}

/** Fewer generations than this teach a population nothing. */
const LEAST_GENERATIONS = 20;

/**
 * Runs with a population that doubles each time (they see the wide valleys) take turns with runs of small
 * populations and short steps (they are cheap), whichever kind has used less so far.
 * Source: Hansen (2009), Benchmarking a BI-population CMA-ES on the BBOB-2009 function testbed, section 2.
 */
export class RestartSchedule {
  private readonly usual: number;
  private readonly used = { first: 0, large: 0, small: 0 };
  /** The last run that was not small, and what it used. */
  private widest = { population: 0, used: 0 };
  private current: Regime | undefined;

  /** @param dimension number of coordinates */
  constructor(dimension: number) {
    this.usual = defaultPopulation(dimension);
  }

  /** @param left evaluations that remain, at least 1 */
  next(left: number, random: RandomSource): Regime {
    this.current = this.choose(left, random);
    return this.current;
  }

  /** Notes what the last run used. */
  record(evaluations: number): void {
    if (!this.current) return;
    const { kind, population } = this.current;
    this.used[kind] += evaluations;
    if (kind !== 'small') this.widest = { population, used: evaluations };
  }

  private choose(left: number, random: RandomSource): Regime {
    const { usual, used, widest } = this;
    if (widest.population === 0) {
      return { kind: 'first', population: usual, sigmaFactor: 1, maxEvaluations: left };
    }
    const doubled = 2 * widest.population;
    if (used.small >= used.large && doubled * LEAST_GENERATIONS <= left) {
      return { kind: 'large', population: doubled, sigmaFactor: 1, maxEvaluations: left };
    }
    const ratio = Math.max(1, widest.population / usual / 2);
    return {
      kind: 'small',
      population: Math.floor(usual * ratio ** (random.uniform() ** 2)),
      sigmaFactor: 10 ** (-2 * random.uniform()),
      maxEvaluations: Math.max(1, Math.floor(widest.used / 2)),
    };
  }
}
