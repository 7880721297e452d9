/** Standard normal quantile of 97.5 %. */
const TWO_SIDED_95 = 1.959963984540054;

/**
 * The 95 % confidence interval of a proportion (Wilson, 1927; Brown, Cai & DasGupta, 2001, eq. 4, who recommend it for
 * proportions near 0 and 1 too).
 *
 * @param hits 0 to `trials`, not necessarily whole
 * @param trials 1 or more
 */
export function wilsonInterval(hits: number, trials: number): [low: number, high: number] {
  const z2 = TWO_SIDED_95 ** 2;
  const share = hits / trials;
  const middle = (share + z2 / (2 * trials)) / (1 + z2 / trials);
  const half =
    (TWO_SIDED_95 * Math.sqrt((share * (1 - share)) / trials + z2 / (4 * trials * trials))) /
    (1 + z2 / trials);
  return [hits === 0 ? 0 : middle - half, hits === trials ? 1 : middle + half];
}
