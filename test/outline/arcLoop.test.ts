import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import {
  arcLoopArea,
  arcLoopOf,
  arcPieces,
  circleOf,
  isCurved,
  reversedArcLoop,
} from '../../src/outline/arcLoop.ts';
import { nodesArea, ringArea } from '../../src/outline/area.ts';
import { isDrawn } from '../../src/outline/families/family.ts';
import { bulged } from '../../src/outline/files/curve.ts';
import { flattenCurve } from '../../src/outline/files/flatten.ts';
import { polygonise } from '../../src/outline/polygonise.ts';
import { loopsOf, nodesOf, someValues, UNIT_M, VARIANTS } from './drawings.ts';

const OTHER_CURVES = ['ramp', 'fourier'];

describe('arc loops', () => {
  it('hold the outlines of all families but ramps and Fourier curves, with their area', () => {
    const random = randomStream(5);
    for (const variant of VARIANTS) {
      for (let turn = 0; turn < 6; turn++) {
        const shape = variant.draw(someValues(variant, random, turn), UNIT_M);
        if (!isDrawn(shape)) continue;
        for (const loop of loopsOf(shape)) {
          const exact = arcLoopOf(loop);
          if (OTHER_CURVES.includes(variant.family)) {
            expect(exact, variant.id).toBeNull();
            continue;
          }
          // The area by quadrature along the loop is another way to the same number.
          const area = nodesArea(nodesOf({ loops: [loop] }));
          expect(Math.abs(arcLoopArea(exact as Float64Array) / area - 1), variant.id).toBeLessThan(1e-7);
        }
      }
    }
  });

  it('go back to the points that a search draws, within their grid', () => {
    const sectors = VARIANTS.find(({ id }) => id === 'sectors-hub-3-fold-2');
    const shape = sectors?.draw(someValues(sectors, randomStream(3), 0), UNIT_M);
    if (!shape || !isDrawn(shape)) throw new Error('not drawn');
    const [loop] = loopsOf(shape);
    const exact = arcLoopOf(loop) as Float64Array;
    const points = arcPieces(exact).flatMap((piece) => flattenCurve(bulged(piece), 1e-10, 1e5) as number[]);
    const area = ringArea(polygonise(loop, 1440));
    expect(Math.abs(ringArea(Float64Array.from(points)) / area - 1)).toBeLessThan(2e-6);
    expect(isCurved(exact)).toBe(true);
  });

  it('run either way with the same area, and twice turned are the same', () => {
    const loop = Float64Array.of(0, 0, 0, 1, 0, 0.5, 1, 1, -0.2, 0, 1, 0);
    const back = reversedArcLoop(loop);
    expect(arcLoopArea(back)).toBeCloseTo(-arcLoopArea(loop), 15);
    expect(reversedArcLoop(back)).toEqual(loop);
  });

  it('know a circle from other loops', () => {
    expect(circleOf(Float64Array.of(2, 1, 1, 0, 1, 1))).toEqual({ centre: [1, 1], radius: 1 });
    expect(circleOf(Float64Array.of(2, 1, 1, 0, 1, 0.5))).toBeNull();
    expect(circleOf(Float64Array.of(2, 1, 1, 0, 1, -1))).toBeNull();
  });
});
