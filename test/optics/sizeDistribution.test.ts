import { describe, expect, it } from 'vitest';
import { readCountsCsv } from '../../src/optics/readCountsCsv.ts';
import { countedSizes, logNormalSizes } from '../../src/optics/sizeDistribution.ts';

describe('logNormalSizes', () => {
  // Hatch & Choate (1929): the mean of d^p is median^p exp(p² ln² gsd / 2).
  it.each([
    [1.2, 5],
    [1.6, 9],
    [2, 15],
  ])('has the moments of a log-normal distribution: gsd %f, %i diameters', (gsd, count) => {
    const sizes = logNormalSizes(2e-6, gsd, count);
    expect(sizes).toHaveLength(count);
    for (const power of [0, 1, 2, 3, 4]) {
      const mean = sizes.reduce((sum, { diameterM, share }) => sum + share * (diameterM / 2e-6) ** power, 0);
      expect(mean / Math.exp((power * Math.log(gsd)) ** 2 / 2)).toBeCloseTo(1, 3);
    }
  });

  it('ascends about the median', () => {
    const diameters = logNormalSizes(2e-6, 1.6, 9).map(({ diameterM }) => diameterM);
    expect(diameters).toEqual(diameters.toSorted((a, b) => a - b));
    expect(diameters[4]).toBeCloseTo(2e-6, 15);
    expect((diameters[0] * diameters[8]) / 4e-12).toBeCloseTo(1, 12);
  });
});

describe('counted sizes', () => {
  it('become shares, without diameters that none has', () => {
    expect(countedSizes([1e-6, 2e-6, 3e-6], [30, 0, 10])).toEqual([
      { diameterM: 1e-6, share: 0.75 },
      { diameterM: 3e-6, share: 0.25 },
    ]);
  });

  it('come from a table, also one that a spreadsheet wrote', () => {
    const plain = readCountsCsv('diameter_um,count\n0.5,120\n2.5,3.6e2\n', 'c.csv');
    expect(plain).toEqual([
      { diameterM: 5e-7, share: 0.25 },
      { diameterM: 2.5e-6, share: 0.75 },
    ]);
    expect(readCountsCsv('\uFEFFdiameter_um, count\r\n0.5, 120\r\n2.5,360\r\n\r\n', 'c.csv')).toEqual(plain);
  });

  it.each([
    ['', 'c.csv:1: found "", expected the header diameter_um,count'],
    ['size,count\n1,2\n', 'c.csv:1: found "size,count", expected the header diameter_um,count'],
    ['diameter_um,count\n', 'c.csv: found 0 rows, expected 1 to 50 rows'],
    ['diameter_um,count\n1,2,3\n', 'c.csv:2: found "1,2,3", expected two numbers such as 2.5,130'],
    ['diameter_um,count\n1,2\n\n2,3\n', 'c.csv:3: found "", expected two numbers'],
    ['diameter_um,count\n1,x\n-2,3\n', 'c.csv:2: found "1,x", expected two numbers'],
    ['diameter_um,count\n1,x\n-2,3\n', 'c.csv:3: found "-2,3", expected two numbers'],
    ['diameter_um,count\n0,2\n', 'c.csv:2: found 0 um, expected a diameter from 0.00001 to 1000000 um'],
    ['diameter_um,count\n1,2\n1,3\n', 'c.csv:3: found 1 um after 1 um, expected diameters that ascend'],
    ['diameter_um,count\n1,1e40\n', 'c.csv:2: found "1,1e40", expected two numbers'],
    ['diameter_um,count\n1,0\n', 'c.csv: found no count above 0, expected at least one particle'],
  ])('refuses %j', (text, message) => {
    expect(() => readCountsCsv(text, 'c.csv')).toThrow(message);
  });
});
