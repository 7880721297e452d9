import { readFileSync } from 'node:fs';
import { parseGDS, RecordType } from 'gdsii';
import { describe, expect, it } from 'vitest';
import { drawGds } from '../../src/draw/gds.ts';
import { type Points, signedArea } from './measurePoints.ts';
import { regularRing, SAMPLES } from './sampleDrawings.ts';

interface Boundary {
  layer: number;
  points: Points;
  property: string | null;
}

/** Reads a stream by an independent parser. Points in nanometres. */
function readBoundaries(bytes: Uint8Array) {
  const records = [...parseGDS(Uint8Array.from(bytes))];
  const boundaries: Boundary[] = [];
  for (const { tag, data } of records) {
    const last = boundaries[boundaries.length - 1];
    if (tag === RecordType.BOUNDARY) boundaries.push({ layer: -1, points: [], property: null });
    if (tag === RecordType.LAYER) last.layer = data as number;
    if (tag === RecordType.PROPVALUE) last.property = data as string;
    if (tag === RecordType.XY) {
      last.points = (data as [number, number][] | { x: number; y: number }[]).map((point) =>
        Array.isArray(point) ? { x: point[0], y: point[1] } : point,
      );
    }
  }
  return { records, boundaries };
}

const disc = (count: number) => [{ weight: 1, rings: [regularRing(1e-3, count)] }];

describe('GDSII, read back by gdsii', () => {
  it.each(Object.entries(SAMPLES))('keeps the area of every element of the %s', (_, drawing) => {
    const { boundaries } = readBoundaries(drawGds(drawing));
    drawing.elements.forEach((element, e) => {
      const given = element.rings.reduce((sum, ring) => {
        const inNm = Array.from({ length: ring.length / 2 }, (_, k) => ({
          x: Math.round(1e9 * ring[2 * k]),
          y: Math.round(1e9 * ring[2 * k + 1]),
        }));
        return sum + signedArea(inNm);
      }, 0);
      const own = boundaries.filter(({ layer }) => layer === e + 1);
      const read = own.reduce((sum, { points }) => sum + signedArea(points.slice(0, -1)), 0);
      expect(Math.abs(read / given - 1)).toBeLessThan(1e-12);
      const weight = drawing.elements.length > 1 ? `weight ${element.weight}` : null;
      for (const { property } of own) expect(property?.replace(/\0/g, '') ?? null).toBe(weight);
    });
  });

  it('has units of a nanometre and a micrometre, and one cell named after the hash', () => {
    const { records } = readBoundaries(drawGds({ ...SAMPLES.zones, hash: '"><a b' }));
    const dataOf = (tag: RecordType) => records.filter((one) => one.tag === tag).map(({ data }) => data);
    // That reader is off by 1e-14; the bytes are those that every stream of these units has.
    const [{ userUnit, metersPerUnit }] = dataOf(RecordType.UNITS) as Record<string, number>[];
    expect([userUnit / 1e-3, metersPerUnit / 1e-9].map((ratio) => ratio.toFixed(12))).toEqual(
      Array(2).fill('1.000000000000'),
    );
    expect(Buffer.from(drawGds(SAMPLES.zones)).toString('hex')).toContain('3e4189374bc6a7f03944b82fa09b5a54');
    expect(dataOf(RecordType.STRNAME)).toEqual(['OUTLINE____a_b']);
    expect(records.map(({ tag }) => RecordType[tag]).slice(0, 6)).toEqual([
      'HEADER',
      'BGNLIB',
      'LIBNAME',
      'UNITS',
      'BGNSTR',
      'STRNAME',
    ]);
    expect(records[records.length - 1].tag).toBe(RecordType.ENDLIB);
  });

  it.each([
    [4093, 1],
    [4094, 2],
    [20_000, 5],
  ])('cuts a ring of %i vertices into parts of at most 4094 points', (count, parts) => {
    const elements = disc(count);
    const { boundaries } = readBoundaries(drawGds({ ...SAMPLES.disc, elements }));
    expect(boundaries.length).toBeGreaterThanOrEqual(parts);
    for (const { points } of boundaries) {
      expect(points.length).toBeLessThanOrEqual(4094);
      expect(points[points.length - 1]).toEqual(points[0]);
    }
    const area = boundaries.reduce((sum, { points }) => sum + signedArea(points.slice(0, -1)), 0);
    const [ring] = elements[0].rings;
    const given = Array.from({ length: count }, (_, k) => ({
      x: Math.round(1e9 * ring[2 * k]),
      y: Math.round(1e9 * ring[2 * k + 1]),
    }));
    expect(Math.abs(area / signedArea(given) - 1)).toBeLessThan(1e-12);
  });

  it('gives the same bytes each time, and those of the golden file', () => {
    const bytes = drawGds(SAMPLES.zones);
    expect(Buffer.compare(bytes, drawGds(SAMPLES.zones))).toBe(0);
    const golden = readFileSync(new URL('golden/zones.gds', import.meta.url));
    expect(Buffer.compare(bytes, golden)).toBe(0);
  });

  it('refuses what no shop could cut', () => {
    expect(() => drawGds({ ...SAMPLES.disc, elements: [] })).toThrow('elements: found none');
  });
});
