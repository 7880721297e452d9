import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { ringsRadius } from '../../src/outline/area.ts';
import { isDrawn } from '../../src/outline/families/family.ts';
import { shapeRadius } from '../../src/outline/shapeRadius.ts';
import { drawn, ringsOf, someValues, UNIT_M, VARIANTS, variantNamed } from './drawings.ts';

describe('shapeRadius', () => {
  it.each(VARIANTS.map((variant) => [variant.id, variant] as const))(
    '%s: the circle around the shape is that around its points',
    (_, variant) => {
      const random = randomStream(41);
      for (let turn = 0; turn < 6; turn++) {
        const shape = variant.draw(someValues(variant, random, turn), UNIT_M);
        if (!isDrawn(shape)) continue;
        const points = ringsRadius(ringsOf(shape, 12 * 1440));
        // The polygon of a circle stretches by 6e-9 at so many vertices; points are rounded by up to 0.7 nm.
        expect(Math.abs(shapeRadius(shape) - points)).toBeLessThan(1e-9 + 2e-5 * points);
      }
    },
  );

  it('is exact where the radius is known', () => {
    expect(shapeRadius(drawn(variantNamed('disc'), [9]))).toBeCloseTo(3 * UNIT_M, 15);
    expect(shapeRadius(drawn(variantNamed('rings-2'), [1, 25, 4, 9]))).toBeCloseTo(5 * UNIT_M, 15);
    expect(shapeRadius(drawn(variantNamed('ramp-saw-3-fold'), [9, 4]))).toBeCloseTo(3 * UNIT_M, 15);
    expect(shapeRadius(drawn(variantNamed('polygon-regular-6'), [16, 0]))).toBeCloseTo(4 * UNIT_M, 15);
    expect(shapeRadius(drawn(variantNamed('fourier-square-6-fold-6'), [5, 4, 0, 0, 0, 0]))).toBeCloseTo(
      3 * UNIT_M,
      12,
    );
  });
});
