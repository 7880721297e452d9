import type { RandomSource } from '../../base/random.ts';
import type { Shape } from '../shape.ts';

/** The families, in the order in which tables name them. */
export const FAMILY_NAMES = [
  'disc',
  'rings',
  'ramp',
  'fourier',
  'polygon',
  'sectors',
  'grid',
  'splitter',
] as const;
export type FamilyName = (typeof FAMILY_NAMES)[number];

/** The span of phases η = κρ² that a search may use: from the brief's radii and distances. */
export interface PhaseLimits {
  low: number;
  high: number;
  /** Least gap between elements in one plane, metres; as small as can be drawn if left out. */
  gapM?: number;
  /** Farthest over nearest distance that a detector may have; 1 if left out. */
  distanceSpan?: number;
}

/** One number that a family varies, with the range to which every method of the search keeps it. */
interface Parameter {
  name: string;
  low: number;
  high: number;
}

/** Parameters that draw no valid outline; `by` grows with the distance from validity, to lead a search back. */
export interface Misdrawn {
  misdrawnBy: number;
}

/**
 * One way for a family to draw: fixed whole numbers (fold, number of rings), some real parameters.
 * Lengths are phases: a boundary at η lies at the radius √η · unitM, with unitM = 1/√κ of the design's distance.
 */
export interface Variant {
  family: FamilyName;
  /** Name of its own within all variants: `rings-3-open`. */
  id: string;
  parameters: readonly Parameter[];
  /** Draws several elements whose weights are to be solved for. */
  weighted?: true;
  /** Draws the outline; `values` run in the order of `parameters`, each within its range. */
  draw(values: ArrayLike<number>, unitM: number): Shape | Misdrawn;
  /** Numbers that must all be 0 or above for the outline to be drawn, smooth in the values; none where any values do. */
  margins?(values: ArrayLike<number>): Float64Array;
  /**
   * Values that come near a star about the axis whose ρ², as a phase, is `profile(u)` at the share u of half a fold's azimuth, from
   * its tip (0) to the valley (1), falling all the way; none where the variant draws nothing of the kind.
   */
  fromProfile?(profile: (share: number) => number): number[];
  /** A promising place to start from, and how far around it to look, both in the parameters' own units. */
  start(random: RandomSource): { values: number[]; spreads: number[] };
}

/** Whether the drawing came out. */
export function isDrawn(drawn: Shape | Misdrawn): drawn is Shape {
  return 'elements' in drawn;
}
