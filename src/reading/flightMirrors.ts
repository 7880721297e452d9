import type { Symmetry } from './positions.ts';

/**
 * Which images of a place have the same mean reading over a flight through them: a flight is the same from either end, so
 * an outline's symmetry counts where it leaves the heading's line as it is.
 */
export interface FlightMirrors {
  /** In the line through the axis across the heading. */
  ends: boolean;
  /** In the line through the axis along the heading. */
  sides: boolean;
  /** In the axis itself: half a turn. */
  centre: boolean;
}

/** How far, in turns of the outline's mirror lines, a heading may be off one of them: rounding. */
const ALIGNED = 1e-9;

/**
 * @param symmetry of the outline
 * @param headingRad of the flight, from the x axis
 * @param isPolarised whether the field has a direction: it survives half a turn, and here no mirror
 */
export function flightMirrors(
  { folds, mirror }: Symmetry,
  headingRad: number,
  isPolarised: boolean,
): FlightMirrors {
  if (isPolarised) return { ends: false, sides: false, centre: folds % 2 === 0 };
  if (!Number.isFinite(folds)) return { ends: true, sides: true, centre: true };
  // The mirror lines of an n-fold outline are π/n apart, the x axis one of them.
  const isMirror = (angle: number) => {
    const lines = (angle * folds) / Math.PI;
    return mirror && Math.abs(lines - Math.round(lines)) < ALIGNED * folds;
  };
  const [ends, sides] = [isMirror(headingRad + Math.PI / 2), isMirror(headingRad)];
  return { ends, sides, centre: folds % 2 === 0 };
}

/** The places that stand for all middles of flights, as `samplePositions` takes them; `axisRad` is where their wedge begins. */
export function flightSymmetry({ ends, sides, centre }: FlightMirrors, headingRad: number): Symmetry {
  const axisRad = ends && !sides ? headingRad + Math.PI / 2 : headingRad;
  return { folds: centre ? 2 : 1, mirror: ends || sides, axisRad };
}
