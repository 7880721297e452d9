import { describe, expect, it } from 'vitest';
import type { MaskStep } from '../../src/score/maskSteps.ts';
import { ringsOf, starProfile, stepsOf } from '../../src/score/maskSteps.ts';

/** Cells of one radian of phase each. */
const steps = (...shares: number[]): MaskStep[] => stepsOf(Float64Array.from(shares), shares.length);

describe('stepsOf', () => {
  it('joins neighbours of one share', () => {
    expect(steps(0, 0, 1, 1, 0.5)).toEqual([
      { end: 2, share: 0 },
      { end: 4, share: 1 },
      { end: 5, share: 0.5 },
    ]);
  });
});

describe('ringsOf', () => {
  it('takes open runs as rings, and moves a rim by what its cell is open', () => {
    expect(ringsOf(steps(0, 1, 1, 1, 0), 4)).toEqual([1, 4]);
    expect(ringsOf(steps(0, 0.25, 1, 0.5, 0), 4)).toEqual([1.75, 3.5]);
    expect(ringsOf(steps(1, 0.5, 0), 4)).toEqual([0, 1.5]);
  });

  it('makes a thin ring in the middle of a cell that is open alone', () => {
    expect(ringsOf(steps(0, 0.5, 0), 4)).toEqual([1.25, 1.75]);
  });

  it('keeps the widest of more rings than are wanted, in ascending order', () => {
    expect(ringsOf(steps(1, 0, 1, 1, 1, 0, 1, 1, 0), 2)).toEqual([2, 5, 6, 8]);
    expect(ringsOf(steps(1, 0, 1, 1, 1, 0, 1, 1, 0), 9)).toEqual([0, 1, 2, 5, 6, 8]);
  });

  it('passes over cells that are as good as closed', () => {
    expect(ringsOf(steps(0, 0.01, 0, 1, 0.015), 4)).toEqual([3, 4]);
    expect(ringsOf(steps(0, 0), 4)).toEqual([]);
  });
});

describe('starProfile', () => {
  it('reaches at every share of azimuth as far as the mask is that open', () => {
    const profile = starProfile(steps(0.7, 0.7, 0.2));
    expect([0.1, 0.3, 0.6, 0.8].map(profile)).toEqual([3, 2, 2, 0]);
  });
});
