import type { ToleranceName, Tolerances } from '../score/tolerances.ts';

/** What one tolerance would have to be. */
export interface Need {
  /** Yield if it were nothing. */
  without: number;
  /** In its unit; null where even nothing is not enough. */
  needed: number | null;
}

/** Halvings of what a tolerance is multiplied by. */
const HALVINGS = 9;

/**
 * How far tolerances must be tightened for a wanted yield: each alone with the others as they are, and all by one factor. One that need
 * not be tightened keeps its size.
 *
 * @param yieldAt of the very same builds with other sizes: a steady function, so that halving finds where it passes `wanted`
 */
export function toleranceNeeds(
  tolerances: Tolerances,
  names: readonly ToleranceName[],
  wanted: number,
  yieldAt: (sizes: Tolerances) => number,
): { rows: Need[]; together: number | null } {
  const scaled = (those: readonly ToleranceName[], factor: number): Tolerances => {
    const changed = those.map((name) => [
      name,
      { ...tolerances[name], size: tolerances[name].size * factor },
    ]);
    return { ...tolerances, ...Object.fromEntries(changed) };
  };
  const now = yieldAt(tolerances);
  const factorFor = (those: readonly ToleranceName[], without: number): number | null => {
    if (now >= wanted) return 1;
    if (without < wanted) return null;
    let [low, high] = [0, 1];
    for (let i = 0; i < HALVINGS; i++) {
      const middle = (low + high) / 2;
      if (yieldAt(scaled(those, middle)) >= wanted) low = middle;
      else high = middle;
    }
    return low;
  };
  const rows = names.map((name) => {
    const without = yieldAt(scaled([name], 0));
    const factor = factorFor([name], without);
    return { without, needed: factor === null ? null : factor * tolerances[name].size };
  });
  return { rows, together: factorFor(names, yieldAt(scaled(names, 0))) };
}
