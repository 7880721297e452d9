/** m² as [re, im]. */
export function indexSquare([n, k]: readonly [n: number, k: number]): [number, number] {
  return [(n - k) * (n + k), 2 * n * k];
}

/** m² − 1 as [re, im], exact to the last digits of m − 1 however near the medium. */
export function indexContrast([n, k]: readonly [n: number, k: number]): [number, number] {
  return [(n - 1) * (n + 1) - k * k, 2 * n * k];
}
