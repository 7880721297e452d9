import { RimwrightError } from '../base/errors.ts';
import type { Scenario } from '../reading/scenario.ts';
import { correctionOf } from './correction.ts';
import { areaOverFloor, lobeRatio, measurementTime, requiredSnr } from './cost.ts';
import type { ElementNodes } from './elementNodes.ts';
import { factorOf } from './elementNodes.ts';
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
      lobe: { ratio: this.#lobe(elements, radiusM, distanceM) },
      snr: {
        required: requiredSnr(lit, target.correction, gain, extinctionM2),
        time_s: measurementTime(lit, target.correction, gain, extinctionM2, electronics),
      },
      area_m2: elements.reduce((sum, { areaM2 }) => sum + areaM2, 0),
      radius_m: radiusM,
      areaOverFloor: areaOverFloor(floored(elements, distanceM), gain, this.#wavelengthM, distanceM),
      ...weightedArea(elements),
    };
    return { scores, ratios };
  }

  /** Of several planes, the largest of their ratios. */
  #lobe(elements: readonly ElementNodes[], radiusM: number, distanceM: number): number {
    const at = (radius: number, distance: number) =>
      lobeRatio(radius, distance, this.#wavelengthM, this.#largestDiameterM);
    if (elements.every((one) => one.distanceM === undefined)) return at(radiusM, distanceM);
    return Math.max(
      ...elements.map(({ nodes, distanceM: own = distanceM }) => {
        let squared = 0;
        for (let i = 0; i < nodes.length; i += 4)
          squared = Math.max(squared, nodes[i] ** 2 + nodes[i + 1] ** 2);
        return at(Math.sqrt(squared), own);
      }),
    );
  }
}

/** Elements as the floor counts them: λz is that of their own plane, and what a splitter takes is as good as not there. */
function floored(elements: readonly ElementNodes[], distanceM: number) {
  return elements.map((element) => ({
    weight: factorOf(element) * (distanceM / (element.distanceM ?? distanceM)),
    areaM2: element.areaM2,
  }));
}

/** Σ |weight| · share · area, where that is not simply the area. */
function weightedArea(elements: readonly ElementNodes[]): Pick<Scores, 'weightedArea_m2'> {
  if (elements.every((element) => factorOf(element) === 1)) return {};
  const total = elements.reduce((sum, element) => sum + Math.abs(factorOf(element)) * element.areaM2, 0);
  return { weightedArea_m2: total };
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

/** Readings with something added to each ratio, row by row; as they are where there is not one for each. */
export function shiftRows(read: SampledReadings, shift: Float64Array): SampledReadings {
  if (shift.length !== read.rows.reduce((sum, { length }) => sum + length, 0)) return read;
  let at = 0;
  return { ...read, rows: read.rows.map((row) => row.map((ratio) => ratio + shift[at++])) };
}
