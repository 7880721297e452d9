import type { Variant } from '../outline/families/family.ts';
import type { OutlineElement, Shape } from '../outline/shape.ts';
import { shapePoints } from '../outline/shapePoints.ts';
import { shapeRadius } from '../outline/shapeRadius.ts';
import type { Fields } from '../reading/tableShelf.ts';
import type { Certifier } from '../score/certifier.ts';
import type { Design } from '../score/design.ts';
import type { Judge } from '../score/judge.ts';
import type { Judgement } from '../score/scorer.ts';
import { worstOf } from '../score/scores.ts';
import type { SearchSpace } from '../score/searchSpace.ts';
import { making } from '../shop/making.ts';
import { drawCandidate } from './candidate.ts';

/** Candidates to be drawn as points and scored again, finely. */
export interface FinishJob {
  kind: 'finish';
  candidates: { variant: string; vector: number[]; weighedFor?: number }[];
}

export interface FinishResult {
  /** In the order of the candidates. */
  designs: Design[];
}

/** Two judges of the same fineness: one of the fields that lead the search, one of the others where there are any. */
export interface FinishingJudges {
  judge: Judge;
  /** Of the first judge. */
  certifier: Certifier;
  otherJudge: Judge | null;
  fields: Fields;
}

/** Turns candidates into what the shop gets; judges and certifies what comes back: the points as they stand in the files, as cut. */
export function finish(
  job: FinishJob,
  { judge, certifier, otherJudge, fields }: FinishingJudges,
  space: SearchSpace,
): FinishResult {
  return {
    designs: job.candidates.map(({ variant: id, vector, weighedFor }) => {
      const variant = space.variants.find((one) => one.id === id) as Variant;
      const drawn = drawCandidate(judge, space, variant, vector) as { shape: Shape; distanceM: number };
      const { shape, distanceM } = drawn;
      const made = making(toPoints(shape, judge.kappa(distanceM)), judge.task.shop);
      const correction = weighedFor ?? judge.task.target.correction;
      const { elements: cut, judgement: judged } = shape.freeWeights
        ? certifier.weighOutline(made.cut, distanceM, shape, correction)
        : { elements: made.cut, judgement: certifier.scoreOutline(made.cut, distanceM, shape) };
      const weighed = made.drawn.map((element, k) => ({ ...element, weight: cut[k].weight }));
      // What cutting changes at the samples: to certify twice would take twice as long.
      const worstAsDrawn = (outline: readonly OutlineElement[]) =>
        worstOf(judged.scores) +
        judge.scoreOutline(outline, distanceM, shape).scores.correction.worst -
        judged.scores.correction.worst;
      const other = otherJudge?.scoreOutline(cut, distanceM, shape);
      return {
        family: variant.family,
        distanceM: drawn.distanceM,
        elements: weighed,
        scores: judged.scores,
        ...(made.cut !== made.drawn && { asDrawn: { worst: worstAsDrawn(weighed) } }),
        fields,
        ...(other && {
          otherFields: { worst: other.scores.correction.worst, difference: largestDifference(judged, other) },
        }),
        shop: made.report,
      };
    }),
  };
}

/** Largest difference of a reading between two judgements of the same places, over gain and extinction. */
function largestDifference(judged: Judgement, other: Judgement): number {
  const difference = judged.ratios.reduce(
    (most, ratio, i) => Math.max(most, Math.abs(ratio - other.ratios[i])),
    0,
  );
  return difference / judged.scores.gain;
}

/**
 * A side of a polygon of n on a rim of phase η falls short of the circle by η(π/n)²/2 in phase; n is chosen to keep
 * that below 0.01, where what is left of it after the equal-area stretch no longer counts.
 */
function toPoints(shape: Shape, kappa: number): OutlineElement[] {
  const phase = kappa * shapeRadius(shape) ** 2;
  const vertices = 4 * Math.ceil(Math.min(1440, Math.max(180, Math.PI * Math.sqrt(50 * phase))) / 4);
  return shapePoints(shape, vertices);
}
