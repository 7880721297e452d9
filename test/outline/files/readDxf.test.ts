import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../../src/base/errors.ts';
import { arcLoopArea, circleOf } from '../../../src/outline/arcLoop.ts';
import { ringArea } from '../../../src/outline/area.ts';
import { readDxf } from '../../../src/outline/files/readDxf.ts';
import { arc, circle, dxfText, type Groups, line } from './dxfText.ts';

function read(...entities: Groups[]) {
  return readDxf(dxfText(entities), 'a.dxf', null).elements;
}

/** In mm². */
function areaOf(...entities: Groups[]): number {
  const [{ rings }] = read(...entities);
  return 1e6 * rings.reduce((sum, ring) => sum + ringArea(ring), 0);
}

const HALF = Math.SQRT1_2;

/** Areas in closed form. */
const SHAPES: [name: string, area: number, entities: Groups[]][] = [
  ['a circle', Math.PI * 0.25, [circle(0.1, -0.2, 0.5)]],
  ['a small circle far from the axis', Math.PI * 1e-4, [circle(10, 3, 0.01)]],
  ['a ring of two circles', Math.PI * 0.75, [circle(0, 0, 0.5), circle(0, 0, 1)]],
  [
    'half a disc of an arc and a line, either way round',
    Math.PI / 2,
    [arc(0, 0, 1, 0, 180), line(1, 0, -1, 0)],
  ],
  ['an arc over 0°', Math.PI / 2, [arc(0, 0, 1, 270, 90), line(0, 1, 0, -1)]],
  ['a triangle of lines in any order', 0.5, [line(0, 1, 1, 0), line(0, 0, 0, 1), line(1, 0, 0, 0)]],
  ['lines that miss each other by 5 nm', 0.5, [line(0, 0, 1, 0), line(1, 5e-6, 0, 1), line(0, 1, 0, 0)]],
  [
    'two bulges of 1, a circle',
    Math.PI / 4,
    [[0, 'LWPOLYLINE', 90, 2, 70, 1, 10, 0, 20, 0, 42, 1, 10, 1, 20, 0, 42, 1]],
  ],
  [
    'a polyline with vertex numbers, as newer files have them',
    1 + Math.PI / 8,
    [
      [
        0,
        'LWPOLYLINE',
        90,
        4,
        70,
        1,
        10,
        0,
        20,
        0,
        91,
        1,
        10,
        1,
        20,
        0,
        42,
        1,
        91,
        2,
        10,
        1,
        20,
        1,
        91,
        3,
        10,
        0,
        20,
        1,
        91,
        4,
      ],
    ],
  ],
  [
    'an old polyline, its last point the first again',
    1,
    [
      [
        0,
        'POLYLINE',
        8,
        '0',
        66,
        1,
        10,
        0,
        20,
        0,
        70,
        0,
        ...[0, 0, 1, 0, 1, 1, 0, 1, 0, 0].flatMap((value, i) =>
          i % 2 === 0 ? [0, 'VERTEX', 8, '0', 10, value] : [20, value],
        ),
        0,
        'SEQEND',
      ],
    ],
  ],
  ['an ellipse', Math.PI * 0.25 * 0.2, [[0, 'ELLIPSE', 10, 0.1, 20, 0.2, 11, 0.3, 21, 0.4, 40, 0.2]]],
  [
    'half an ellipse, seen from behind',
    (Math.PI * 0.5) / 2,
    [
      [0, 'ELLIPSE', 10, 0, 20, 0, 11, 1, 21, 0, 40, 0.5, 41, 0, 42, Math.PI, 210, 0, 220, 0, 230, -1],
      line(-1, 0, 1, 0),
    ],
  ],
  // A parabola with the control points (−1, 1), (0, −1), (1, 1) is y = x²; its share of the square below y = 1 is 4/3 (Archimedes).
  [
    'a spline of degree 2',
    4 / 3,
    [
      [
        0,
        'SPLINE',
        70,
        8,
        71,
        2,
        ...[0, 0, 0, 1, 1, 1].flatMap((knot) => [40, knot]),
        10,
        -1,
        20,
        1,
        10,
        0,
        20,
        -1,
        10,
        1,
        20,
        1,
      ],
      line(1, 1, -1, 1),
    ],
  ],
  // Weights 1, 1/√2, 1 make it a quarter of a circle (Piegl & Tiller 1997, section 7.3).
  [
    'a spline with weights',
    Math.PI / 4,
    [
      [
        0,
        'SPLINE',
        70,
        12,
        71,
        2,
        ...[0, 0, 0, 1, 1, 1].flatMap((knot) => [40, knot]),
        41,
        1,
        41,
        HALF,
        41,
        1,
        10,
        1,
        20,
        0,
        10,
        1,
        20,
        1,
        10,
        0,
        20,
        1,
      ],
      line(0, 1, 0, 0),
      line(0, 0, 1, 0),
    ],
  ],
  [
    'an arc seen from behind, its x turned over',
    Math.PI / 4,
    [[...arc(0, 0, 1, 0, 90), 210, 0, 220, 0, 230, -1], line(0, 1, 0, 0), line(0, 0, -1, 0)],
  ],
];

describe('readDxf', () => {
  it.each(SHAPES)('keeps the area of %s', (_, area, entities) => {
    expect(Math.abs(areaOf(...entities) / area - 1)).toBeLessThan(1e-7);
  });

  it('keeps arcs and lines exactly beside the points', () => {
    const [{ rings, curves = [] }] = read(circle(0, 0, 1), circle(0.1, 0, 0.5));
    const whole = circleOf(curves[0]);
    expect(Math.hypot(...(whole?.centre ?? [1]))).toBeLessThan(1e-18);
    expect(whole?.radius).toBe(1e-3);
    expect(curves.map(arcLoopArea)[1]).toBeCloseTo(-Math.PI * 0.25e-6, 15);
    expect(rings.map(ringArea)[1]).toBeLessThan(0);
    expect(read(line(0, 0, 1, 0), line(1, 0, 0, 1), line(0, 1, 0, 0))[0].curves).toBeUndefined();
  });

  it('takes pieces inside holes as openings again', () => {
    expect(areaOf(circle(0, 0, 3), circle(0, 0, 2), circle(0, 0, 1)) / Math.PI).toBeCloseTo(9 - 4 + 1, 6);
  });

  it.each([
    [1, 25.4],
    [5, 10],
    [6, 1000],
    [9, 0.0254],
    [13, 1e-3],
  ])('honours $INSUNITS %i', (units, mm) => {
    const { elements } = readDxf(dxfText([circle(0, 0, 0.5)], units), 'a.dxf', 'cm');
    expect((ringArea(elements[0].rings[0]) * 1e6) / (Math.PI * (0.5 * mm) ** 2)).toBeCloseTo(1, 6);
  });

  it('takes a unit from outside where the file has none', () => {
    const text = dxfText([circle(0, 0, 0.5)], null);
    const [ring] = readDxf(text, 'a.dxf', 'in').elements[0].rings;
    expect(ringArea(ring) / (Math.PI * 0.0127 ** 2)).toBeCloseTo(1, 6);
    expect(() => readDxf(text, 'a.dxf', null)).toThrow('--unit mm');
  });

  it('passes over remarks, the centre mark, and what stands on paper', () => {
    const onPaper = [...circle(5, 5, 1), 67, 1];
    const mark = [0, 'LINE', 8, 'CENTRE', 10, -1, 20, 0, 11, 1, 21, 0];
    const elements = read(
      mark,
      [0, 'MTEXT', 8, 'x', 1, 'hi'],
      [0, 'DIMENSION', 8, '0'],
      onPaper,
      circle(0, 0, 1),
    );
    expect(elements).toHaveLength(1);
    expect(elements[0].rings).toHaveLength(1);
  });

  it('never throws anything but its own errors, whatever is changed in a file', () => {
    const lines = dxfText([
      ...SHAPES.slice(0, 4).flatMap(([, , entities]) => entities),
      ...SHAPES[13][2],
    ]).split('\n');
    const places = fc.array(
      fc.tuple(
        fc.nat(lines.length - 1),
        fc.constantFrom('0', '-1', '10', '1e300', 'ARC', 'EOF', '', 'ENDSEC', '40', 'x'),
      ),
      { minLength: 1, maxLength: 4 },
    );
    fc.assert(
      fc.property(places, (changes) => {
        const changed = [...lines];
        for (const [at, word] of changes) changed[at] = word;
        expectOwnErrors(changed.join('\n'));
      }),
      { numRuns: 300 },
    );
    fc.assert(fc.property(fc.string({ unit: 'binary' }), expectOwnErrors));
    fc.assert(
      fc.property(fc.array(fc.nat(300)), (codes) =>
        expectOwnErrors(dxfText([codes.flatMap((code) => [code, 1])])),
      ),
    );
  });
});

function expectOwnErrors(text: string): void {
  try {
    readDxf(text, 'a.dxf', 'mm');
  } catch (error) {
    expect(error).toBeInstanceOf(RimwrightError);
    expect((error as RimwrightError).code).toBe('input');
  }
}
