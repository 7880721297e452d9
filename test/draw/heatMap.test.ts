import { describe, expect, it } from 'vitest';
import { drawHeatMap } from '../../src/draw/heatMap.ts';

const draw = (numbers: (number | null)[][]) =>
  drawHeatMap({
    title: 'A <trade>',
    quantity: 'Least time',
    across: { title: 'detector.distance', values: ['10 mm', '20 mm'] },
    up: { title: 'placement.offset', values: ['1 um', '2 um'] },
    numbers,
    textOf: (value) => `${value} s`,
  });

/** Fill of each cell, in the order of the numbers. */
const fillsOf = (svg: string) => [...svg.matchAll(/height="48" fill="([^"]+)"/g)].map(([, fill]) => fill);

describe('drawHeatMap', () => {
  it('colours by the logarithm, and hatches what has no number', () => {
    const svg = draw([
      [1, 10],
      [100, null],
    ]);
    const [low, middle, high, none] = fillsOf(svg).map((fill) => fill.match(/\d+/g)?.map(Number));
    expect([low, high]).toEqual([
      [222, 241, 247],
      [247, 196, 140],
    ]);
    middle?.forEach((part, i) => {
      expect(Math.abs(part - ((low?.[i] ?? 0) + (high?.[i] ?? 0)) / 2)).toBeLessThanOrEqual(0.5);
    });
    expect(none).toBeUndefined();
    expect(fillsOf(svg)[3]).toBe('url(#none)');
    expect(svg.match(/>\d+ s</g)).toEqual(['>1 s<', '>10 s<', '>100 s<']);
  });

  it('stands alone as XML, whatever its title, and with no number at all', () => {
    const svg = draw([
      [null, null],
      [null, null],
    ]);
    expect(svg).toContain('A &#60;trade&#62;');
    expect(svg).not.toMatch(/NaN|Infinity/);
    expect(
      fillsOf(
        draw([
          [5, 5],
          [5, 5],
        ]),
      )[0],
    ).toBe('rgb(222,241,247)');
  });

  it('puts the second values upwards', () => {
    const y = (text: string, svg: string) => Number(new RegExp(`y="([\\d.]+)"[^>]*>${text}<`).exec(svg)?.[1]);
    const svg = draw([
      [1, 10],
      [100, 1000],
    ]);
    expect(y('10 s', svg)).toBeLessThan(y('1 s', svg));
    expect(y('2 um', svg)).toBeLessThan(y('1 um', svg));
  });
});
