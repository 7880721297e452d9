import { readFileSync } from 'node:fs';
import { expect, it } from 'vitest';
import { wilsonInterval } from '../../src/numeric/wilsonInterval.ts';

const { wilson } = JSON.parse(readFileSync(new URL('../reference/shares.json', import.meta.url), 'utf8'));

it('wilsonInterval gives the published intervals, and mirrors', () => {
  for (const { hits, trials, interval } of wilson.rows) {
    const found = wilsonInterval(hits, trials);
    expect(found.map((end) => Number(end.toFixed(4)))).toEqual(interval);
    const [low, high] = wilsonInterval(trials - hits, trials);
    expect(1 - high).toBeCloseTo(found[0], 12);
    expect(1 - low).toBeCloseTo(found[1], 12);
  }
});
