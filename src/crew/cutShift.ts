import type { Shape } from '../outline/shape.ts';
import { shapePoints } from '../outline/shapePoints.ts';
import type { Judge } from '../score/judge.ts';
import { asCut } from '../shop/asCut.ts';

/** Vertices a turn: both outlines have the same, so that what these leave out is gone in the difference. */
const VERTICES = 180;

/**
 * What a shop's cutting adds to each ratio reading/extinction of a shape, in the order of a judgement's ratios. It changes so little
 * from one candidate to the next that a refinement computes it once: an outline as cut takes some ten milliseconds, thirty
 * times a score.
 *
 * @returns null without a shop, or where nothing would be left of an element
 */
export function cutShift(judge: Judge, shape: Shape, distanceM: number): Float64Array | null {
  const { shop } = judge.task;
  if (shop === null || shape.freeWeights) return null;
  const drawn = shapePoints(shape, VERTICES);
  const cut = asCut(drawn, shop);
  if (cut.some(({ rings }) => rings.length === 0)) return null;
  const before = judge.scoreOutline(drawn, distanceM, shape).ratios;
  const after = judge.scoreOutline(cut, distanceM, shape).ratios;
  return after.length === before.length ? after.map((ratio, i) => ratio - before[i]) : null;
}
