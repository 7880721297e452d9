import { RimwrightError } from '../base/errors.ts';
import type { Variant } from '../outline/families/family.ts';
import { isDrawn } from '../outline/families/family.ts';
import { polygonise } from '../outline/polygonise.ts';
import type { Shape } from '../outline/shape.ts';
import { shapeRadius } from '../outline/shapeRadius.ts';
import type { Aim } from '../score/aim.ts';
import { aimValue, sizePenalty } from '../score/aim.ts';
import { lobeRatio } from '../score/cost.ts';
import type { Judge } from '../score/judge.ts';
import type { Scores } from '../score/scores.ts';
import type { SearchSpace } from '../score/searchSpace.ts';
import { BEYOND_RADIUS } from '../score/taskScenarios.ts';
import { bridgedShape } from '../shop/bridgedShape.ts';
import { widthMisfit } from '../shop/widthMisfit.ts';

/** A point of the search, with its scores. */
export interface Candidate {
  variant: string;
  /** Parameters in the variant's own units, then the distance's place where the brief leaves a choice. */
  vector: number[];
  scores: Scores;
  /** How badly the shop's rules are missed, 0 to 1. */
  misfit: number;
  /** The correction that its elements' weights were solved for, where they were. */
  weighedFor?: number;
}

/** What came of trying a point: `value` is what the search makes small; the rest is null where nothing was drawn, or it is hopeless. */
export type Trial =
  | { value: number; candidate: Candidate; ratios: Float64Array }
  | { value: number; candidate: null; ratios: null };

/** Value of a candidate that draws nothing: above all that a drawn one can have, and falling towards the valid. */
const MISDRAWN = 1e3;

/**
 * A radius that alone costs more than this, a factor of 400 in the measure or 3 in the lobe limit, is hopeless: nothing is read, since the
 * tables of such outlines take longer than a hundred good candidates. The value is below that of what draws nothing.
 */
const HOPELESS = 6;
const UNREAD = 0.8 * MISDRAWN;

/** Vertices a turn for asking the shop in a search. */
const SHOP_VERTICES = 96;

/**
 * Beyond so many times the allowed correction a candidate has other troubles than the shop's rules, and is taken to fit: measuring
 * openings and webs costs as much as a score. Nearer by they come to count more and more, all from the second number on; a step
 * would hold descents at its edge.
 */
const SHOP_FROM = 5;
const SHOP_ALL = 1.5;

/** The distance that a place from 0 to 1 on the grid stands for. */
function distanceAt(space: SearchSpace, place: number): number {
  const last = space.distances.length - 1;
  return space.distances[Math.min(last, Math.max(0, Math.round(place * last)))];
}

/**
 * Draws a candidate's outline at its distance, unless its parameters draw none. Where the shop's islands fall out, rings hang on bridges.
 *
 * @throws RimwrightError `machine` for a vector that is not finite: the search is at fault then, not the brief
 */
export function drawCandidate(
  judge: Judge,
  space: SearchSpace,
  variant: Variant,
  vector: ArrayLike<number>,
): { shape: Shape; distanceM: number } | { misdrawnBy: number } {
  if (!Array.from(vector).every(Number.isFinite)) throw notFinite('a candidate', variant, vector);
  const count = variant.parameters.length;
  const distanceM = distanceAt(space, vector[count] ?? 0);
  const values = Array.from(vector).slice(0, count);
  const drawn = variant.draw(values, 1 / Math.sqrt(judge.kappa(distanceM)));
  if (!isDrawn(drawn)) return drawn;
  const shape = bridgedShape(drawn, judge.task.shop);
  return placed(shape, distanceM, space, judge.task.detector.balanced);
}

/** Puts the elements into planes of the grid, as far as it reaches, and leaves no single one where a balance is asked for. */
function placed(
  shape: Shape,
  distanceM: number,
  { distances }: SearchSpace,
  balanced = false,
): { shape: Shape; distanceM: number } | { misdrawnBy: number } {
  if (balanced && shape.elements.length < 2) return { misdrawnBy: 1 };
  if (shape.elements.every(({ distanceRatio }) => distanceRatio === undefined)) return { shape, distanceM };
  const farthest = distances[distances.length - 1];
  const beyond =
    Math.max(...shape.elements.map(({ distanceRatio = 1 }) => distanceRatio * distanceM)) / farthest;
  if (beyond > 1 + 1e-9) return { misdrawnBy: beyond - 1 };
  // Tables are made for the distances of the grid.
  const nearest = (wanted: number) =>
    distances.reduce((best, one) => (Math.abs(one - wanted) < Math.abs(best - wanted) ? one : best));
  const elements = shape.elements.map((element) =>
    element.distanceRatio === undefined
      ? element
      : { ...element, distanceM: nearest(element.distanceRatio * distanceM) },
  );
  return { shape: { ...shape, elements }, distanceM };
}

function notFinite(what: string, { id }: Variant, vector: ArrayLike<number>): RimwrightError {
  return new RimwrightError('machine', `${what} is not finite: ${id} at [${Array.from(vector).join(', ')}]`);
}

/**
 * Scores one point of the search.
 *
 * @param shift what is added to its ratios (see `cutShift`)
 * @throws RimwrightError `machine` as `drawCandidate`, or for an outline or a value that is no number
 */
export function tryCandidate(
  judge: Judge,
  space: SearchSpace,
  variant: Variant,
  vector: Float64Array,
  aim: Aim,
  shift: Float64Array | null = null,
): Trial {
  const drawn = drawCandidate(judge, space, variant, vector);
  const misdrawnBy = 'misdrawnBy' in drawn ? drawn.misdrawnBy : tooLargeBy(judge, drawn.shape);
  if (Number.isNaN(misdrawnBy)) throw notFinite('an outline', variant, vector);
  if ('misdrawnBy' in drawn || misdrawnBy > 0) {
    return { value: MISDRAWN + misdrawnBy, candidate: null, ratios: null };
  }
  const sizeCosts = costOfSize(judge, drawn.shape, drawn.distanceM);
  if (sizeCosts > HOPELESS) return { value: UNREAD + sizeCosts, candidate: null, ratios: null };
  const { scores, ratios } = judge.scoreShape(drawn.shape, drawn.distanceM, aim.correction, shift);
  const misfit = shopMisfit(judge, drawn.shape, scores, aim);
  const value = aimValue(scores, misfit, aim, judge.task);
  if (Number.isNaN(value)) throw notFinite('a value', variant, vector);
  const candidate = {
    variant: variant.id,
    vector: Array.from(vector),
    scores,
    misfit,
    ...(drawn.shape.freeWeights && { weighedFor: aim.correction }),
  };
  return { value, candidate, ratios };
}

/** How far an outline is beyond what the judge's tables reach, over the largest radius; 0 or below where it is within. */
function tooLargeBy({ task }: Judge, shape: Shape): number {
  return shapeRadius(shape) / task.detector.radiusM[1] - BEYOND_RADIUS;
}

/** What a size costs beyond that of a disc as large as the first Fresnel zone, which no outline worth having is much smaller than. */
function costOfSize(judge: Judge, shape: Shape, distanceM: number): number {
  const { task, wavelengthM } = judge;
  const largestM = Math.max(...task.particles.map(({ diameterM }) => diameterM));
  const cost = (radiusM: number) =>
    sizePenalty(lobeRatio(radiusM, distanceM, wavelengthM, largestM), radiusM, task);
  const zoneM = Math.sqrt(Math.PI / judge.kappa(distanceM));
  return cost(shapeRadius(shape)) - cost(Math.max(zoneM, task.detector.radiusM[0]));
}

function shopMisfit(judge: Judge, shape: Shape, scores: Scores, aim: Aim): number {
  const { shop } = judge.task;
  if (shop === null) return 0;
  const excess = scores.correction.worst / aim.correction;
  if (excess > SHOP_FROM) return 0;
  const elements = shape.elements.map(({ loops }) => ({
    rings: loops.map((loop) => polygonise(loop, SHOP_VERTICES)),
  }));
  const share = Math.min(1, (SHOP_FROM - excess) / (SHOP_FROM - SHOP_ALL));
  return share * widthMisfit(elements, shop, shape);
}
