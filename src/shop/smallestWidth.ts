import type { Width } from './narrowest.ts';
import type { Rings } from './offset.ts';
import type { Side } from './rolling.ts';
import { isParted, narrowPlaces, rolled } from './rolling.ts';

/** How far a first guess may be off to be right, and how finely widths are sought where it is not. */
const CLOSE = 0.03;
const FINE = 0.01;

/** A width beyond so many times what a shop cuts need not be known finely. */
const WIDE = 2;

/** Below this share of the least width that a shop cuts nobody asks how narrow it is. */
const NOTHING = 0.02;

/**
 * The narrowest opening (side 1) or web (side −1): the width of the smallest disc that cannot pass everywhere, corners left aside. A
 * blunt end of a taper counts by the disc that fits there, which is wider than the line across.
 *
 * @param guess the measured width between edges (`narrowest`), which in most outlines is the same: then it is the answer, to the digit
 * @param leastM width that matters to the shop, metres
 * @returns null where there is nothing narrow
 */
export function smallestWidth(rings: Rings, side: Side, guess: Width | null, leastM: number): Width | null {
  if (rings.length === 0) return null;
  const placeAt = (widthM: number) => {
    const result = rolled(rings, widthM / 2, side);
    const [cutOff] = narrowPlaces(rings, result, side);
    return cutOff ?? (isParted(rings, result, widthM / 2) ? (guess?.at ?? [0, 0]) : null);
  };
  const boundM = WIDE * leastM;
  const guessM = Math.min(guess?.widthM ?? boundM, boundM);
  let low = Math.max(guessM * (1 - CLOSE), NOTHING * leastM);
  let at = placeAt(low);
  if (at === null) {
    if (guessM === boundM || placeAt(guessM * (1 + CLOSE)) !== null) return guess;
    // Somewhere between the guess and what no longer matters.
    const wide = placeAt(boundM);
    if (wide === null) return guess === null ? null : { ...guess, widthM: boundM };
    return bisected(placeAt, guessM * (1 + CLOSE), boundM, wide);
  }
  let high = low;
  while (low > NOTHING * leastM) {
    high = low;
    low = Math.max(low * 0.7, NOTHING * leastM);
    const narrower = placeAt(low);
    if (narrower === null) return bisected(placeAt, low, high, at);
    at = narrower;
  }
  return { widthM: 0, at };
}

/** @param at where a disc of width `highM` cannot pass, as one of `lowM` can */
function bisected(
  placeAt: (widthM: number) => [number, number] | null,
  lowM: number,
  highM: number,
  at: [number, number],
): Width {
  if (highM <= lowM * (1 + FINE)) return { widthM: Math.sqrt(lowM * highM), at };
  const middleM = Math.sqrt(lowM * highM);
  const found = placeAt(middleM);
  return found === null ? bisected(placeAt, middleM, highM, at) : bisected(placeAt, lowM, middleM, found);
}
