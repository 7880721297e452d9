import { ringArea } from '../area.ts';
import { isWithin } from '../nesting.ts';
import type { Curve } from './curve.ts';
import { JOINT_M } from './joinPaths.ts';

/** Points of a curve that tell one part's inside from its outside. */
const PROBES = 32;

/**
 * Those parts of a shape at which its filling ends, by SVG's rule `nonzero`: a part within another that runs the same way is no hole. Open
 * parts stay, for what they may join.
 */
export function filledParts(parts: readonly Curve[][]): Curve[][] {
  if (parts.length < 2) return [...parts];
  const rings = parts.map((part) => Float64Array.from(part.flatMap(pointsOf)));
  const senses = rings.map((ring) => Math.sign(ringArea(ring)));
  return parts.filter((part, k) => {
    if (isOpen(part)) return true;
    const [x, y] = rings[k];
    const around = rings.reduce((sum, ring, j) => sum + (j !== k && isWithin(ring, x, y) ? senses[j] : 0), 0);
    return (around === 0) !== (around + senses[k] === 0);
  });
}

function isOpen(part: readonly Curve[]): boolean {
  const [x0, y0] = part[0].from;
  const [x1, y1] = part[part.length - 1].to;
  return Math.hypot(x1 - x0, y1 - y0) > JOINT_M;
}

function pointsOf({ from, at }: Curve): number[] {
  if (at === undefined) return [...from];
  return Array.from({ length: PROBES }, (_, k) => [...at(k / PROBES)]).flat();
}
