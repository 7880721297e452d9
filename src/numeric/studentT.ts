import { complexErfc } from './complexError.ts';
import { regularisedBeta } from './incompleteBeta.ts';

/** From here on Student's t is normal to 1e-6 of itself. */
const NORMAL_FROM = 1e6;

/**
 * The value that Student's t stays below with probability p.
 *
 * @param p above 0 and below 1; 1e-12 from either end still holds to three digits
 * @param degreesOfFreedom 1 or more, whole or not; infinite for the normal distribution
 */
export function studentQuantile(p: number, degreesOfFreedom: number): number {
  if (p < 0.5) return -studentQuantile(1 - p, degreesOfFreedom);
  const liesAbove = (t: number) => studentTail(t, degreesOfFreedom) > 1 - p;
  let [low, high] = [0, 2];
  while (liesAbove(high)) [low, high] = [high, 2 * high];
  // The tail falls steadily, so halving is safe everywhere, and quick enough for the few quantiles that are asked for.
  for (let i = 0; i < 60; i++) {
    const middle = (low + high) / 2;
    if (liesAbove(middle)) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/** Probability that Student's t exceeds t ≥ 0: I_x(ν/2, 1/2)/2 with x = ν/(ν + t²) (Abramowitz & Stegun 1964, 26.7.1). */
export function studentTail(t: number, degreesOfFreedom: number): number {
  if (degreesOfFreedom >= NORMAL_FROM) return normalTail(t);
  const sum = degreesOfFreedom + t * t;
  return regularisedBeta(degreesOfFreedom / sum, (t * t) / sum, degreesOfFreedom / 2, 0.5) / 2;
}

function normalTail(t: number): number {
  const out = new Float64Array(2);
  complexErfc(t / Math.SQRT2, 0, out);
  return out[0] / 2;
}
