import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../../src/base/errors.ts';
import { drawGds } from '../../../src/draw/gds.ts';
import { ringArea } from '../../../src/outline/area.ts';
import { readGds } from '../../../src/outline/files/readGds.ts';
import { SAMPLES } from '../../draw/sampleDrawings.ts';
import { aref, boundary, cell, library, sref, text } from './gdsStream.ts';

const read = (...cells: Uint8Array[]) => readGds(library(cells), 'a.gds').elements;
const areaOf = (...cells: Uint8Array[]) =>
  1e12 * read(...cells)[0].rings.reduce((sum, ring) => sum + ringArea(ring), 0);

/** A right triangle of 2 µm by 1 µm, in nanometres. */
const TRIANGLE = [0, 0, 2000, 0, 0, 1000];
const A = cell('A', boundary(1, TRIANGLE));
const cornersOf = (...cells: Uint8Array[]) =>
  read(...cells)[0].rings.map((ring) =>
    Array.from(
      { length: ring.length / 2 },
      (_, k) => `${Math.round(ring[2 * k] * 1e9)} ${Math.round(ring[2 * k + 1] * 1e9)}`,
    ).sort(),
  );

describe('readGds', () => {
  it('honours the units', () => {
    const bytes = library([A], 1e-8);
    expect(ringArea(readGds(bytes, 'a.gds').elements[0].rings[0])).toBeCloseTo(1e-10, 18);
    expect(areaOf(A)).toBeCloseTo(1, 9);
  });

  it.each([
    ['moved', sref('A', 100, 200), ['100 1200', '100 200', '2100 200']],
    ['turned', sref('A', 0, 0, { turn: 90 }), ['-1000 0', '0 0', '0 2000']],
    ['mirrored', sref('A', 0, 0, { mirror: true }), ['0 -1000', '0 0', '2000 0']],
    [
      'mirrored, then turned, scaled and moved',
      sref('A', 7, 0, { mirror: true, turn: 90, scale: 2 }),
      ['2007 0', '7 0', '7 4000'],
    ],
  ])('takes a cell within the top cell, %s', (_, reference, corners) => {
    expect(cornersOf(cell('TOP', reference), A)).toEqual([corners.sort()]);
  });

  it('takes columns and rows of a cell', () => {
    const top = cell('TOP', aref('A', 3, 2, [0, 0, 9000, 0, 0, 4000]));
    expect(areaOf(top, A)).toBeCloseTo(6, 9);
    expect(cornersOf(top, A).flat()).toContain('6000 2000');
  });

  it('joins polygons that share edges, and undoes keyholes', () => {
    const left = boundary(1, [0, 0, 1000, 0, 1000, 1000, 0, 1000]);
    const right = boundary(1, [1000, 0, 1000, 1000, 2000, 1000, 2000, 0]);
    const [{ rings }] = read(cell('TOP', left, right));
    expect(rings).toHaveLength(1);
    const slit = boundary(
      1,
      [0, 0, 3000, 0, 3000, 3000, 1000, 1000, 1000, 2000, 2000, 2000, 1000, 1000, 3000, 3000, 0, 3000],
    );
    expect(read(cell('TOP', slit))[0].rings).toHaveLength(2);
  });

  it('passes over texts, and takes a layer as an element with its weight', () => {
    const elements = read(
      cell('TOP', text(), boundary(3, TRIANGLE, 'weight -0.5'), boundary(1, TRIANGLE, 'weight 1')),
    );
    expect(elements.map(({ weight }) => weight)).toEqual([1, -0.5]);
  });

  it('refuses arrays that would never end', () => {
    const cells = Array.from({ length: 6 }, (_, k) =>
      cell(`C${k}`, aref(`C${k + 1}`, 1000, 1000, [0, 0, 1, 0, 0, 1])),
    );
    const last = cell('C6', boundary(1, TRIANGLE));
    expect(() => read(...cells, last)).toThrow('found more than 200000 points');
    expect(() =>
      read(cell('TOP', boundary(1, TRIANGLE), aref('C0', 1, 1, [0, 0, 1, 0, 0, 1])), ...cells, cell('C6')),
    ).toThrow('found more than 100000 cells');
  });

  it('refuses cells within cells without end', () => {
    const cells = Array.from({ length: 3000 }, (_, k) => cell(`C${k}`, sref(`C${k + 1}`, 0, 0)));
    expect(() => read(...cells, cell('C3000', boundary(1, TRIANGLE)))).toThrow('more than 100 deep');
  });

  it('never throws anything but its own errors, whatever is changed in a file', () => {
    const bytes = [
      library([
        cell('TOP', sref('A', 0, 0, { turn: 30 }), aref('A', 3, 2, [9000, 0, 29000, 0, 9000, 4000])),
        A,
      ]),
      drawGds(SAMPLES.zones),
    ];
    const change = fc.tuple(
      fc.nat(1),
      fc.array(fc.tuple(fc.nat(600), fc.nat(255)), { minLength: 1, maxLength: 4 }),
      fc.nat(700),
    );
    fc.assert(
      fc.property(change, ([which, changes, length]) => {
        const changed = Uint8Array.from(bytes[which]);
        for (const [at, value] of changes) changed[at % changed.length] = value;
        expectOwnErrors(length < 350 ? changed.slice(0, length) : changed);
      }),
      { numRuns: 500 },
    );
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 200 }), (tail) =>
        expectOwnErrors(Uint8Array.from([0, 6, 0, 2, 2, 88, ...tail])),
      ),
    );
  });
});

function expectOwnErrors(bytes: Uint8Array): void {
  try {
    readGds(bytes, 'a.gds');
  } catch (error) {
    expect(error).toBeInstanceOf(RimwrightError);
    expect((error as RimwrightError).code).toBe('input');
  }
}
