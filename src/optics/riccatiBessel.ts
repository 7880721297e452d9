/** ψ_n(x) = x j_n(x) and χ_n(x) = −x y_n(x) at index n. */
export interface RiccatiBessel {
  psi: Float64Array;
  chi: Float64Array;
}

/**
 * Riccati–Bessel functions of a real argument, n = 0 … order (signs of Bohren & Huffman 1983, p. 101 and App. A).
 *
 * Each is taken in its stable direction: χ upwards, ψ upwards as far as n = x and beyond it as a product of the
 * ratios ψ_n/ψ_{n−1}, which come from the recurrence run downwards. So ψ keeps its relative precision while it
 * falls away.
 *
 * @param x above 0
 * @param order whole, at least 1; χ passes the range of doubles when it is far above x
 */
export function riccatiBessel(x: number, order: number): RiccatiBessel {
  const psi = new Float64Array(order + 1);
  const chi = new Float64Array(order + 1);
  psi[0] = Math.sin(x);
  chi[0] = Math.cos(x);
  chi[1] = chi[0] / x + psi[0];
  for (let n = 2; n <= order; n++) chi[n] = ((2 * n - 1) / x) * chi[n - 1] - chi[n - 2];

  const last = Math.min(Math.floor(x), order);
  if (last >= 1) psi[1] = psi[0] / x - chi[0];
  for (let n = 2; n <= last; n++) psi[n] = ((2 * n - 1) / x) * psi[n - 1] - psi[n - 2];

  // From so far above, the error of starting with 0 dies out before `order`.
  let ratio = 0;
  for (let n = order + 20; n > last; n--) {
    ratio = 1 / ((2 * n + 1) / x - ratio);
    if (n <= order) psi[n] = ratio;
  }
  for (let n = last + 1; n <= order; n++) psi[n] *= psi[n - 1];
  return { psi, chi };
}
