import { RimwrightError } from '../base/errors.ts';
import type { Scenario } from '../reading/scenario.ts';
import { correctionOf } from './correction.ts';
import { areaOverFloor, lobeRatio, measurementTime, requiredSnr } from './cost.ts';
import type { ElementNodes } from './elementNodes.ts';
import { litElements } from './litElements.ts';
import type { Population } from './population.ts';
import { populationCorrection, populationsOf } from './population.ts';
import type { Scores } from './scores.ts';
import type { Task } from './task.ts';

/** Scores, and the ratios reading/extinction that they come from: one for each scenario, depth and position. */
export interface Judgement {
  scores: Scores;
  ratios: Float64Array;
}

/** A design as it is read over all samples. */
export interface SampledReadings {
  elements: readonly ElementNodes[];
  radiusM: number;
  distanceM: number;
  /** Ratios reading/extinction, a row for each scenario: position by position, the nominal depth first. */
  rows: readonly Float64Array[];
}

/** Turns readings of one task's scenarios into scores. */
export class Scorer {
  readonly #task: Task;
  readonly #wavelengthM: number;
  readonly #leastExtinctionM2: number;
  readonly #largestDiameterM: number;
  readonly #populations: readonly Population[];

  /** @param wavelengthM in the medium, metres */
  constructor(task: Task, scenarios: readonly Scenario[], wavelengthM: number) {
    this.#task = task;
    this.#wavelengthM = wavelengthM;
    this.#leastExtinctionM2 = Math.min(...scenarios.map(({ extinctionM2 }) => extinctionM2));
    this.#largestDiameterM = Math.max(...task.particles.map(({ diameterM }) => diameterM));
    this.#populations = populationsOf(scenarios);
  }

  /**
   * @param found further ratios reading/extinction that a free gain takes in: of cases worse than the samples
   * @throws RimwrightError `machine` for a score that is not finite
   */
  score({ elements, radiusM, distanceM, rows }: SampledReadings, found: readonly number[] = []): Judgement {
    const { target, detector, light } = this.#task;
    const ratios = flatten(rows);
    const { gain, worst, rms } = correctionOf(ratios, target.gain, found);
    if (!Number.isFinite(worst)) {
      throw new RimwrightError(
        'machine',
        `a score is not finite: outline of radius ${radiusM} m at ${distanceM} m`,
      );
    }
    const population = populationCorrection(this.#populations, rows, gain);
    const electronics = { ...detector, ...light };
    const extinctionM2 = this.#leastExtinctionM2;
    const lit = litElements(this.#task, elements, distanceM);
    const scores: Scores = {
      gain,
      correction: { worst, rms, ...(population !== null && { population }) },
      lobe: { ratio: lobeRatio(radiusM, distanceM, this.#wavelengthM, this.#largestDiameterM) },
      snr: {
        required: requiredSnr(lit, target.correction, gain, extinctionM2),
        time_s: measurementTime(lit, target.correction, gain, extinctionM2, electronics),
      },
      area_m2: elements.reduce((sum, { areaM2 }) => sum + areaM2, 0),
      radius_m: radiusM,
      areaOverFloor: areaOverFloor(elements, gain, this.#wavelengthM, distanceM),
    };
    return { scores, ratios };
  }
}

function flatten(rows: readonly Float64Array[]): Float64Array {
  const out = new Float64Array(rows.reduce((sum, { length }) => sum + length, 0));
  let at = 0;
  for (const row of rows) {
    out.set(row, at);
    at += row.length;
  }
  return out;
}
