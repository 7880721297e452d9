import { describe, expect, it } from 'vitest';
import { wilsonInterval } from '../../src/numeric/wilsonInterval.ts';
import { nearCounts, shareMeeting, zonesOf } from '../../src/run/nearTarget.ts';

const WORSTS = Float64Array.of(0.5, 0.94, 1.01, 1.2, 0.99, 1.06, 0.7, 1);

describe('builds near the target', () => {
  it('go into the first zone that they are within', () => {
    const zones = zonesOf(WORSTS, 1, [0.02, 0.1], 2);
    expect(zones).toEqual([
      { builds: 3, read: [2, 4], changes: [] },
      { builds: 2, read: [1, 5], changes: [] },
    ]);
  });

  it('count as they are read, and stand for those that are not', () => {
    const zones = [{ builds: 400, read: [], changes: [1, 0, 0, 0] }];
    const { share, interval } = shareMeeting(500, zones, 1000);
    expect(share).toBe(0.6);
    // Four of four hundred leave much open.
    const [low, high] = wilsonInterval(600, 1000);
    expect(interval[0]).toBeLessThan(low - 0.05);
    expect(interval[1]).toBeGreaterThan(high + 0.05);
    expect(nearCounts(zones)).toEqual({ builds: 400, read: 4, changed: 1 });
  });

  it('leave the plain interval where all of them are read, or there are none', () => {
    const all = { builds: 3, read: [], changes: [-1, 0, 0] };
    expect(shareMeeting(500, [all], 1000)).toEqual({ share: 0.499, interval: wilsonInterval(499, 1000) });
    expect(shareMeeting(1000, [], 1000)).toEqual({ share: 1, interval: wilsonInterval(1000, 1000) });
  });
});
