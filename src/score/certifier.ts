import type { OutlineElement } from '../outline/shape.ts';
import type { Symmetry } from '../reading/positions.ts';
import type { Fields } from '../reading/tableShelf.ts';
import type { Judge } from './judge.ts';
import { NO_SYMMETRY } from './sampling.ts';
import type { Judgement, SampledReadings } from './scorer.ts';
import type { Certificate } from './scores.ts';
import { worstOf } from './scores.ts';
import { weigh } from './weigher.ts';
import type { WorstCase } from './worstCases.ts';
import { WorstCases } from './worstCases.ts';

/** Times that weights are solved, and the share by which a certificate may miss what they were solved for. */
const WEIGHINGS = 5;
const HELD = 1e-6;

/** Scores outlines as a judge does, and certifies them: the worst case that climbing finds stands beside the sampled one. */
export class Certifier {
  readonly #judge: Judge;
  readonly #worst: WorstCases;

  /** @param fields those of the judge */
  constructor(judge: Judge, fields: Fields) {
    this.#judge = judge;
    this.#worst = new WorstCases(judge.task, fields);
  }

  /** Scores an outline given by its points. A free gain is the middle of the worst cases, not only of the samples. */
  scoreOutline(
    elements: readonly OutlineElement[],
    distanceM: number,
    symmetry: Symmetry = NO_SYMMETRY,
  ): Judgement {
    return this.#certify(this.#judge.readOutline(elements, distanceM, symmetry), symmetry).judgement;
  }

  /**
   * Gives an outline's elements their weights (see `weigh`) and scores it with them. Worst cases that climbing finds beyond the
   * allowed correction come to the samples, and the weights are solved again.
   *
   * @param correction that the weights are to hold
   */
  weighOutline(
    outline: readonly OutlineElement[],
    distanceM: number,
    symmetry: Symmetry,
    correction: number,
  ): { elements: OutlineElement[]; judgement: Judgement } {
    const apart = this.#judge.readApart(outline, distanceM, symmetry);
    const cases: number[][] = [];
    let best: { elements: OutlineElement[]; judgement: Judgement } | null = null;
    for (let round = 0; round < WEIGHINGS; round++) {
      const weighed = weigh(this.#judge.task, apart, correction, cases);
      const { judgement, found } = this.#certify(weighed, symmetry);
      const certified = worstOf(judgement.scores);
      if (best === null || certified < worstOf(best.judgement.scores)) {
        const elements = outline.map((one, j) => ({ ...one, weight: weighed.elements[j].weight }));
        best = { elements, judgement };
      }
      if (certified <= correction * (1 + HELD)) break;
      cases.push(...found.map((one) => this.#worst.ratiosAt(apart.elements, apart.radiusM, distanceM, one)));
    }
    return best as { elements: OutlineElement[]; judgement: Judgement };
  }

  #certify(read: SampledReadings, symmetry: Symmetry): { judgement: Judgement; found: WorstCase[] } {
    const sampled = this.#judge.judge(read).scores;
    const found = this.#worst.find(read.elements, read.radiusM, read.distanceM, sampled.gain, symmetry);
    const { scores, ratios } = this.#judge.judge(
      read,
      found.map(({ ratio }) => ratio),
    );
    const correction = { ...scores.correction, ...certificate(found, scores.gain, scores.correction.worst) };
    return { judgement: { scores: { ...scores, correction }, ratios }, found };
  }
}

function certificate(cases: readonly WorstCase[], gain: number, sampled: number): Certificate {
  const strays = (one: WorstCase) => Math.abs(one.ratio / gain - 1);
  const worst = cases.reduce((p, q) => (strays(q) > strays(p) ? q : p));
  const { particle, wavelengthM, depthM, positionM } = worst;
  return {
    certified: Math.max(strays(worst), sampled),
    certifiedAt: {
      diameter_m: particle.diameterM,
      material: particle.material,
      wavelength_m: wavelengthM,
      depth_m: depthM,
      position_m: positionM,
    },
  };
}
