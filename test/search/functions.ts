/** Test functions of the literature, in the form of test/reference/optimisation.json; minimum 0. */
type Point = ArrayLike<number>;

export function sum(n: number, term: (i: number) => number): number {
  let total = 0;
  for (let i = 0; i < n; i++) total += term(i);
  return total;
}

export const sphere = (x: Point) => sum(x.length, (i) => x[i] ** 2);

/** Axes from 1 to 1000: condition 1e6. */
export const ellipsoid = (x: Point) => sum(x.length, (i) => 10 ** ((6 * i) / (x.length - 1)) * x[i] ** 2);

export const rosenbrock = (x: Point) =>
  sum(x.length - 1, (i) => 100 * (x[i] ** 2 - x[i + 1]) ** 2 + (x[i] - 1) ** 2);

/** A bowl with a grid of dents: a local minimum near each whole point. */
export const rastrigin = (x: Point) =>
  sum(x.length, (i) => 10 + x[i] ** 2 - 10 * Math.cos(2 * Math.PI * x[i]));
