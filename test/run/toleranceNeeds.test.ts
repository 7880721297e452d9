import { describe, expect, it } from 'vitest';
import { toleranceNeeds } from '../../src/run/toleranceNeeds.ts';
import type { Tolerances } from '../../src/score/tolerances.ts';
import { NO_TOLERANCE, TOLERANCE_NAMES } from '../../src/score/tolerances.ts';

const none = Object.fromEntries(TOLERANCE_NAMES.map((name) => [name, NO_TOLERANCE])) as Tolerances;
const limits = (size: number) => ({ law: 'limits' as const, size });

/** Yields that fall with the square of every size, the closed form of which gives what is needed. */
const yieldAt = ({ edge, place }: Tolerances) => 1 - 0.1 * edge.size ** 2 - 0.02 * place.size ** 2;

describe('toleranceNeeds', () => {
  it('tightens each alone, and all together', () => {
    const tolerances = { ...none, edge: limits(1), place: limits(1) };
    const { rows, together } = toleranceNeeds(tolerances, ['edge', 'place'], 0.95, yieldAt);
    // 0.1 e² = 0.03; with the edge as it is even no error of the place leaves 0.9; 0.12 f² = 0.05.
    expect(rows[0].without).toBeCloseTo(0.98, 12);
    expect(rows[0].needed).toBeCloseTo(Math.sqrt(0.3), 2);
    expect(rows[1]).toEqual({ without: 0.9, needed: null });
    expect(together).toBeCloseTo(Math.sqrt(0.05 / 0.12), 2);
  });

  it('never says a size that misses the wanted yield', () => {
    const tolerances = { ...none, edge: limits(1.3), place: limits(0.7) };
    const { rows } = toleranceNeeds(tolerances, ['edge'], 0.95, yieldAt);
    expect(yieldAt({ ...tolerances, edge: limits(rows[0].needed ?? 9) })).toBeGreaterThanOrEqual(0.95);
  });

  it('leaves tolerances as they are where nothing is wanting', () => {
    const tolerances = { ...none, edge: limits(0.1), place: limits(0.1) };
    const { rows, together } = toleranceNeeds(tolerances, ['edge', 'place'], 0.95, yieldAt);
    expect([rows[0].needed, rows[1].needed, together]).toEqual([0.1, 0.1, 1]);
  });
});
