import { ascending } from './ascending.ts';
import { checkHypervolumeInput, firstAtLeast } from './hypervolume.ts';
import { compareRows } from './pareto.ts';

/**
 * What each point of a front adds to its hypervolume: the measure that would be lost without it.
 *
 * Three objectives are swept along the third; every step of the stairs keeps the part of the plane that it
 * alone dominates as a row of boxes, and gives volume whenever a newcomer takes some of it: n log n in all.
 * Source: Emmerich & Fonseca (2011), Computing hypervolume contributions in low dimensions, EMO 2011, LNCS 6576, 121.
 *
 * @param front rows of two or three objectives, none of which dominates another; equal rows are worth 0 each
 * @param reference finite; a point that does not beat it in every objective is worth 0
 * @returns one number ≥ 0 a point, in the order given
 * @throws RimwrightError `input` at another number of objectives, NaN or −Infinity
 */
export function hypervolumeContributions(
  front: readonly (readonly number[])[],
  reference: readonly number[],
): Float64Array {
  checkHypervolumeInput(front, reference);
  const result = new Float64Array(front.length);
  const order = [...front.keys()]
    .filter((k) => front[k].every((x, j) => x < reference[j]))
    .sort(
      (a, b) =>
        ascending(front[a].at(-1) as number, front[b].at(-1) as number) || compareRows(front[a], front[b]),
    );
  // Of equal points only one takes part, and its worth is struck out afterwards.
  const different = order.filter((k, i) => i === 0 || compareRows(front[order[i - 1]], front[k]) !== 0);
  if (reference.length === 2) addAreas(front, reference, different, result);
  else addVolumes(front, reference, different, result);
  for (let i = 1; i < order.length; i++) {
    if (compareRows(front[order[i - 1]], front[order[i]]) === 0) result[order[i - 1]] = 0;
  }
  return result;
}

/** Each step of the stairs, the second objective rising. */
function addAreas(
  front: readonly (readonly number[])[],
  reference: readonly number[],
  order: readonly number[],
  result: Float64Array,
): void {
  for (const [i, k] of order.entries()) {
    const right = i === 0 ? reference[0] : front[order[i - 1]][0];
    const top = i + 1 === order.length ? reference[1] : front[order[i + 1]][1];
    result[k] = Math.max(0, right - front[k][0]) * (top - front[k][1]);
  }
}

/** A part of the plane that one point alone dominates, since the sweep passed `since`; its foot is at the point's y. */
interface Box {
  left: number;
  right: number;
  top: number;
  since: number;
}

/** A step of the stairs; its boxes lie side by side from its x on, their tops falling. */
interface Step {
  point: number;
  y: number;
  boxes: Box[];
}

function addVolumes(
  front: readonly (readonly number[])[],
  reference: readonly number[],
  order: readonly number[],
  result: Float64Array,
): void {
  const outermost = (y: number): Step => ({ point: -1, y, boxes: [] });
  const xs = [Number.NEGATIVE_INFINITY, reference[0]];
  const steps = [outermost(reference[1]), outermost(Number.NEGATIVE_INFINITY)];

  const close = ({ point, y }: Step, { left, right, top, since }: Box, z: number) => {
    result[point] += (right - left) * (top - y) * (z - since);
  };

  for (const k of order) {
    const [x, y, z] = front[k];
    const first = firstAtLeast(xs, x);
    if (steps[first - 1].y <= y || (xs[first] === x && steps[first].y <= y)) continue;
    const boxes: Box[] = [];
    let left = x;
    let top = steps[first - 1].y;
    let end = first;
    for (; steps[end].y >= y; end++) {
      for (const box of steps[end].boxes) close(steps[end], box, z);
      // Two points at the same x or y leave a box without width.
      if (xs[end] > left) boxes.push({ left, right: xs[end], top, since: z });
      left = xs[end];
      top = steps[end].y;
    }
    boxes.push({ left, right: xs[end], top, since: z });
    cutRight(steps[first - 1], x, z);
    cutTop(steps[end], y, z);
    xs.splice(first, end - first, x);
    steps.splice(first, end - first, { point: k, y, boxes });
  }
  for (const step of steps) for (const box of step.boxes) close(step, box, reference[2]);

  /** Takes from a step all that lies right of x. */
  function cutRight(step: Step, x: number, z: number): void {
    const { boxes } = step;
    while (boxes.length > 0 && boxes[boxes.length - 1].right > x) {
      const box = boxes[boxes.length - 1];
      close(step, { ...box, left: Math.max(box.left, x) }, z);
      if (box.left < x) box.right = x;
      else boxes.pop();
    }
  }

  /** Takes from a step all that lies above y; what is left of the boxes cut becomes one. */
  function cutTop(step: Step, y: number, z: number): void {
    const { boxes } = step;
    let cut = 0;
    for (; cut < boxes.length && boxes[cut].top > y; cut++) close(step, boxes[cut], z);
    if (cut === 0) return;
    boxes.splice(0, cut, { left: boxes[0].left, right: boxes[cut - 1].right, top: y, since: z });
  }
}
