import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { RestartSchedule } from '../../src/search/restartSchedule.ts';

describe('RestartSchedule', () => {
  it('doubles the large population, and gives the small one its turn while it has used less', () => {
    const schedule = new RestartSchedule(5);
    const random = randomStream(1);
    const next = (cost: number, left = 1e6) => {
      const regime = schedule.next(left, random);
      schedule.record(cost);
      return regime;
    };
    expect(next(800)).toMatchObject({ kind: 'first', population: 8, sigmaFactor: 1 });
    expect(next(2000)).toMatchObject({ kind: 'large', population: 16, sigmaFactor: 1 });
    for (const cost of [500, 500, 1000]) {
      const small = next(cost);
      expect(small).toMatchObject({ kind: 'small', population: 8, maxEvaluations: 1000 });
      expect(small.sigmaFactor).toBeGreaterThan(0.01);
      expect(small.sigmaFactor).toBeLessThanOrEqual(1);
    }
    expect(next(8000)).toMatchObject({ kind: 'large', population: 32 });
    // Between the usual population and half of the large one (Hansen 2009).
    for (let k = 0; k < 10; k++) {
      const { kind, population } = next(100);
      expect(kind).toBe('small');
      expect(population).toBeGreaterThanOrEqual(8);
      expect(population).toBeLessThanOrEqual(16);
    }
  });

  it('begins no large run that the rest of the budget cannot carry', () => {
    const schedule = new RestartSchedule(5);
    schedule.next(1000, randomStream(1));
    schedule.record(700);
    // 16 points for 20 generations are 320.
    expect(schedule.next(319, randomStream(1)).kind).toBe('small');
    expect(schedule.next(320, randomStream(1)).kind).toBe('large');
  });
});
