import { describe, expect, it } from 'vitest';
import { FrontHistory } from '../../src/run/frontHistory.ts';

describe('FrontHistory', () => {
  it('is 0 for a front that rests, and what a single new point adds where it moves', () => {
    const history = new FrontHistory(100);
    history.note(10, () => [[0, 0, 0]]);
    expect(history.movedInLastQuarter(100, [[0, 0, 0]])).toBe(0);
    // The corner is (1, 1, 1): a cube of 1 becomes one of 2 × 1 × 1.
    expect(history.movedInLastQuarter(100, [[-1, 0, 0]])).toBeCloseTo(0.5, 12);
  });

  it('looks back to three quarters of what was evaluated', () => {
    const history = new FrontHistory(1000);
    for (let k = 100; k <= 1000; k += 100) history.note(k, () => [[-k / 1000, 0, 0]]);
    // From −0.7, the last snapshot within 750, to −1: the corner is at 0.3.
    expect(history.movedInLastQuarter(1000, [[-1, 0, 0]])).toBeCloseTo(1 - 1 / 1.3, 12);
  });

  it('says where there is nothing to compare', () => {
    const history = new FrontHistory(100);
    expect(history.movedInLastQuarter(0, [])).toBeNull();
    history.note(90, () => [[0, 0, 0]]);
    expect(history.movedInLastQuarter(100, [[0, 0, 0]])).toBe(1);
  });

  it('takes a note no more often than every hundredth of the budget', () => {
    const history = new FrontHistory(10_000);
    let taken = 0;
    for (let k = 1; k <= 10_000; k++) {
      history.note(k, () => {
        taken++;
        return [];
      });
    }
    expect(taken).toBe(100);
  });
});
