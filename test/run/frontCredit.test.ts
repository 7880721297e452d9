import { describe, expect, it } from 'vitest';
import type { Candidate } from '../../src/crew/candidate.ts';
import { FrontCredit } from '../../src/run/frontCredit.ts';

const VARIANTS = [
  { id: 'disc', family: 'disc' },
  { id: 'rings-2', family: 'rings' },
  { id: 'rings-4', family: 'rings' },
  { id: 'fourier-5', family: 'fourier' },
] as const;

const at = (variant: string, correction: number, timeS: number, radiusM: number) =>
  ({
    variant,
    scores: { correction: { worst: correction }, snr: { time_s: timeS }, radius_m: radiusM },
  }) as Candidate;

const countOf = (turns: readonly string[], id: string) => turns.filter((turn) => turn === id).length;

describe('FrontCredit', () => {
  const old = at('disc', 0.02, 1e-3, 1e-4);

  it('deals more turns to who added more, and one in four to a family that had fewest', () => {
    const credit = new FrontCredit(VARIANTS);
    credit.note([old], [at('rings-2', 0.004, 1e-3, 1e-4), at('rings-4', 0.02, 0.5e-3, 1e-4)]);
    const turns = credit.deal(16, []);
    expect(countOf(turns, 'rings-2')).toBeGreaterThan(countOf(turns, 'rings-4'));
    expect(countOf(turns, 'rings-4')).toBeGreaterThan(0);
    // Nothing of these is new, yet neither family starves.
    expect(countOf(turns, 'disc')).toBe(2);
    expect(countOf(turns, 'fourier-5')).toBe(2);
  });

  it('forgets what was long ago', () => {
    const credit = new FrontCredit(VARIANTS);
    const front = [at('rings-2', 0.004, 1e-3, 1e-4)];
    credit.note([old], front);
    for (let round = 0; round < 8; round++) credit.note(front, front);
    credit.note(front, [...front, at('fourier-5', 0.02, 0.5e-3, 1e-4)]);
    expect(credit.deal(3, [])).toEqual(['fourier-5', 'fourier-5', 'fourier-5']);
  });

  it('goes by rank where nobody has added anything', () => {
    const credit = new FrontCredit(VARIANTS);
    credit.note([], []);
    expect(credit.deal(2, ['rings-4', 'disc'])).toEqual(['rings-4', 'rings-4']);
    expect(credit.deal(0, ['rings-4'])).toEqual([]);
  });
});
