import { describe, expect, it } from 'vitest';
import { durationText } from '../../src/cli/durationText.ts';
import { lineText } from '../../src/cli/progress.ts';
import type { Progress } from '../../src/run/progress.ts';

const BEST: NonNullable<Progress['best']> = {
  variant: 'rings-2',
  vector: [1],
  misfit: 0,
  scores: {
    gain: 1,
    correction: { worst: 0.0099, rms: 0.005 },
    lobe: { ratio: 0.05 },
    snr: { required: 1e5, time_s: 3.25e-4 },
    area_m2: 1e-8,
    radius_m: 8.22e-5,
    areaOverFloor: 1.2,
  },
};

describe('durationText', () => {
  it.each([
    [0.4, '0 s'],
    [59.4, '59 s'],
    [59.6, '1 min 0 s'],
    [200, '3 min 20 s'],
    [7500, '2 h 5 min'],
  ])('%d s is %s', (seconds, expected) => expect(durationText(seconds)).toBe(expected));
});

describe('lineText', () => {
  it('tells evaluations, times, and the best of every family that has one', () => {
    const progress: Progress = {
      evaluations: 1200,
      candidates: 20000,
      best: BEST,
      families: [
        { family: 'disc', best: null },
        { family: 'rings', best: BEST },
      ],
      variant: 'disc',
      phase: 'searching',
      elapsedS: 9,
      remainingS: 141,
    };
    expect(lineText(progress)).toBe(
      '1200 of 20000 candidates, 9 s, about 2 min 21 s to go; best rings-2; rings 0.99 % 325 µs 82.2 µm',
    );
    expect(lineText({ ...progress, best: null, families: [], remainingS: null })).toBe(
      '1200 of 20000 candidates, 9 s; nothing drawn yet',
    );
    expect(lineText({ ...progress, phase: 'judging' })).toMatch(
      /^1200 .*, 9 s, judging the best finely; best/,
    );
  });
});
