import { createHash } from 'node:crypto';
import type { OutlineElement } from '../outline/shape.ts';

/**
 * Twelve hexadecimal digits that stand for a design's distance, weights and points: a drawing with the same ones shows the
 * same design.
 */
export function designHash(distanceM: number, elements: readonly OutlineElement[]): string {
  const hash = createHash('sha256').update(`${distanceM}`);
  for (const { weight, rings, distanceM: own, share } of elements) {
    hash.update(`\nelement ${weight}`);
    if (own !== undefined) hash.update(` at ${own}`);
    if (share !== undefined) hash.update(` of ${share}`);
    for (const ring of rings) hash.update(`\nring ${Array.from(ring, nanometres).join(' ')}`);
  }
  return hash.digest('hex').slice(0, 12);
}

/** Files hold coordinates to a nanometre, and a design read from one is still the same design. */
function nanometres(metres: number): number {
  return Math.round(metres * 1e9) + 0;
}
