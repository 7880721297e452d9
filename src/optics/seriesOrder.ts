/**
 * How many orders the series of a sphere needs for full double precision, sphere and medium alike.
 *
 * Beyond n = x the coefficients fall like ψ_n/χ_n, with a scale of x^{1/3}. Wiscombe (1980), Appl. Opt. 19, 1505,
 * takes 4 of these for 1e-7 in a_n; 8 take it to 1e-18.
 */
export function seriesOrder(x: number): number {
  return Math.ceil(x + 8 * Math.cbrt(x) + 4);
}
