import { describe, expect, it } from 'vitest';
import { arcLoopArea } from '../../src/outline/arcLoop.ts';
import { ringLoop } from '../../src/outline/ring.ts';
import { shapePoints } from '../../src/outline/shapePoints.ts';
import { outlineToJson } from '../../src/run/designJson.ts';
import { readDesignJson } from '../../src/run/readDesignJson.ts';

const LOOPS = [ringLoop(1e-4, 1), ringLoop(4e-5, -1)];
const ELEMENTS = shapePoints({ elements: [{ weight: 1, loops: LOOPS }], folds: Infinity, mirror: true }, 360);
const GIVEN = { id: 'a', family: 'rings', distanceM: 0.02, elements: ELEMENTS, file: 'a.json' } as const;
const PLAIN = outlineToJson(GIVEN, 0.02);
const [ELEMENT] = PLAIN.elements;
const CURVES = ELEMENT.curves_mm as [number, number, number][][];

const withCurves = (curves_mm: unknown) => ({ ...PLAIN, elements: [{ ...ELEMENT, curves_mm }] });

describe('exact curves in a design’s file', () => {
  it('come back as they went, with the area of the points', () => {
    const [read] = readDesignJson(JSON.parse(JSON.stringify(PLAIN)), 'a.json').elements;
    const [own] = ELEMENTS;
    expect(read.curves).toHaveLength(2);
    read.curves?.forEach((loop, r) => {
      loop.forEach((value, i) => {
        expect(Math.abs(value - (own.curves?.[r][i] ?? 0))).toBeLessThan(1e-12);
      });
    });
    expect(read.curves?.map((loop) => Math.sign(arcLoopArea(loop)))).toEqual([1, -1]);
    expect(outlineToJson({ ...GIVEN, elements: [read] }, 0.02)).toEqual(PLAIN);
  });

  it('turn with their rings where a file has them the other way round', () => {
    const { rings_mm } = ELEMENT;
    const back = (ring: [number, number][]) => [ring[0], ...ring.slice(1).reverse()];
    const turned = CURVES.map(([a, b]) => [
      [a[0], a[1], -a[2]],
      [b[0], b[1], -b[2]],
    ]);
    const elements = [{ ...ELEMENT, rings_mm: rings_mm.map(back), curves_mm: turned }];
    const [read] = readDesignJson({ ...PLAIN, elements }, 'a.json').elements;
    expect(read.curves?.map((loop) => Math.sign(arcLoopArea(loop)))).toEqual([1, -1]);
  });

  it.each([
    ['no list', 5, 'elements[0].curves_mm: found 5, expected a list with a curve for each of the 2 rings'],
    ['too few', [CURVES[0]], 'elements[0].curves_mm: found'],
    [
      'one vertex',
      [CURVES[0], [[0, 0, 1]]],
      'elements[0].curves_mm[1]: found [[0,0,1]], expected a list of at least two vertices',
    ],
    [
      'two numbers',
      [
        CURVES[0],
        [
          [0, 0],
          [1, 1],
        ],
      ],
      'elements[0].curves_mm[1][0]: found [0,0], expected [x, y, bulge]',
    ],
    [
      'a bulge too large',
      [
        CURVES[0],
        [
          [0, 0, 11],
          [1, 1, 0],
        ],
      ],
      'bulge from -10 to 10',
    ],
    [
      'another outline',
      [CURVES[0], CURVES[0]],
      'elements[0].curves_mm[1]: found a curve beside its points, expected the curve of which rings_mm are the points',
    ],
    [
      'an outline moved aside',
      [CURVES[0].map(([x, y, bulge]) => [x + 0.001, y, bulge]), CURVES[1]],
      'elements[0].curves_mm[0]: found a curve beside its points',
    ],
  ])('are refused: %s', (_, curves, message) => {
    expect(() => readDesignJson(withCurves(curves), 'a.json')).toThrow(message);
  });
});
