import type { Loop } from './shape.ts';

/** Thinnest ring and gap that are drawn, metres: on the files' grid of 1 nm the rims of a thinner one could touch. */
export const THINNEST_M = 1e-8;

/** A circle about the axis: sense +1 for an outer rim, −1 for a hole. */
export function ringLoop(radiusM: number, sense: 1 | -1): Loop {
  return [{ kind: 'arc', centre: [0, 0], radius: radiusM, from: 0, to: sense * 2 * Math.PI }];
}
