import type { OutlineElement } from '../outline/shape.ts';
import type { Symmetry } from '../reading/positions.ts';
import type { Fields } from '../reading/tableShelf.ts';
import type { Judge } from './judge.ts';
import { NO_SYMMETRY } from './sampling.ts';
import type { Judgement } from './scorer.ts';
import type { Certificate } from './scores.ts';
import type { WorstCase } from './worstCases.ts';
import { WorstCases } from './worstCases.ts';

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
    const read = this.#judge.readOutline(elements, distanceM, symmetry);
    const sampled = this.#judge.judge(read).scores;
    const cases = this.#worst.find(read.elements, read.radiusM, distanceM, sampled.gain, symmetry);
    const { scores, ratios } = this.#judge.judge(
      read,
      cases.map(({ ratio }) => ratio),
    );
    const correction = { ...scores.correction, ...certificate(cases, scores.gain, scores.correction.worst) };
    return { scores: { ...scores, correction }, ratios };
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
