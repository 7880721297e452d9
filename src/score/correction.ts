/** How far readings stray from gain · extinction. */
export interface Correction {
  gain: number;
  /** Largest |reading/(gain · extinction) − 1|. */
  worst: number;
  rms: number;
}

/** Least gain that a calibration may take out. */
export const LEAST_GAIN = 0.5;

/**
 * Gain and correction from the ratios reading/extinction.
 *
 * A free gain is the value of at least 0.5 that makes the worst correction smallest: the middle of the extremes. (Where a
 * reading is below nothing, every gain leaves the worst above 1, and the middle is as good as any.)
 *
 * @param ratios at least one finite number
 * @param found further ratios that a free gain takes in, and that do not count otherwise
 */
export function correctionOf(
  ratios: ArrayLike<number>,
  gainIs: 'one' | 'free',
  found: readonly number[] = [],
): Correction {
  let least = Number.POSITIVE_INFINITY;
  let most = Number.NEGATIVE_INFINITY;
  let sum = 0;
  let squares = 0;
  for (let i = 0; i < ratios.length; i++) {
    const ratio = ratios[i];
    least = Math.min(least, ratio);
    most = Math.max(most, ratio);
    sum += ratio;
    squares += ratio * ratio;
  }
  const gain =
    gainIs === 'one' ? 1 : Math.max(LEAST_GAIN, (Math.min(least, ...found) + Math.max(most, ...found)) / 2);
  const worst = Math.max(Math.abs(most / gain - 1), Math.abs(least / gain - 1));
  const meanSquare = (squares / (gain * gain) - (2 * sum) / gain) / ratios.length + 1;
  return { gain, worst, rms: Math.sqrt(Math.max(0, meanSquare)) };
}
