import type { RandomSource } from '../base/random.ts';

/**
 * What is known of a quantity, as a probability distribution (JCGM 101:2008, 6.4). Lengths of any unit; `half` is half of the
 * width of the base.
 */
export type Distribution =
  | { kind: 'normal'; mean: number; deviation: number }
  | { kind: 'rectangular' | 'triangular' | 'arcsine'; mean: number; half: number }
  /** `top` is the width of the top over that of the base, 0 to 1. */
  | { kind: 'trapezoidal'; mean: number; half: number; top: number }
  /** Rectangular, with ends that are known to ± `blur` (at most `half`). */
  | { kind: 'curvilinear'; mean: number; half: number; blur: number }
  /** The mean of ν + 1 readings, whose experimental standard deviation of the mean is `scale`. */
  | { kind: 'student'; mean: number; scale: number; degreesOfFreedom: number };

/**
 * Standard uncertainty as the GUM counts it (JCGM 100:2008, 4.2.3, 4.3.7, 4.3.9; JCGM 101:2008, 6.4.3.4 for curvilinear ends). Of
 * Student's t it is the scale: its few degrees of freedom are counted beside it, and only a Monte Carlo run sees its wide tails.
 */
export function standardUncertainty(distribution: Distribution): number {
  switch (distribution.kind) {
    case 'normal':
      return distribution.deviation;
    case 'student':
      return distribution.scale;
    case 'rectangular':
      return distribution.half / Math.sqrt(3);
    case 'triangular':
      return distribution.half / Math.sqrt(6);
    case 'arcsine':
      return distribution.half / Math.SQRT2;
    case 'trapezoidal':
      return distribution.half * Math.sqrt((1 + distribution.top ** 2) / 6);
    case 'curvilinear':
      return Math.sqrt(distribution.half ** 2 / 3 + distribution.blur ** 2 / 9);
  }
}

/** One draw (JCGM 101:2008, 6.4.2 to 6.4.9; Student's t after Bailey 1994, which takes any degrees of freedom). */
export function draw(distribution: Distribution, random: RandomSource): number {
  const { mean } = distribution;
  const even = () => 2 * random.uniform() - 1;
  switch (distribution.kind) {
    case 'normal':
      return mean + distribution.deviation * random.normal();
    case 'rectangular':
      return mean + distribution.half * even();
    case 'triangular':
      return mean + (distribution.half * (even() + even())) / 2;
    case 'arcsine':
      return mean + distribution.half * Math.sin(2 * Math.PI * random.uniform());
    case 'trapezoidal': {
      const { half, top } = distribution;
      return mean + (half * ((1 + top) * even() + (1 - top) * even())) / 2;
    }
    case 'curvilinear': {
      const half = distribution.half + distribution.blur * even();
      return mean + half * even();
    }
    case 'student': {
      const { scale, degreesOfFreedom } = distribution;
      const radius = Math.sqrt(degreesOfFreedom * ((1 - random.uniform()) ** (-2 / degreesOfFreedom) - 1));
      return mean + scale * radius * Math.cos(2 * Math.PI * random.uniform());
    }
  }
}
