import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { randomStream } from '../../src/base/random.ts';
import { constantIndex } from '../../src/optics/indexModel.ts';
import { ringsRadius } from '../../src/outline/area.ts';
import { isDrawn } from '../../src/outline/families/family.ts';
import { ringLoop } from '../../src/outline/ring.ts';
import type { Loop, OutlineElement, Shape } from '../../src/outline/shape.ts';
import { samplePositions } from '../../src/reading/positions.ts';
import { REPORT_FINENESS, SEARCH_FINENESS } from '../../src/score/fineness.ts';
import { Judge } from '../../src/score/judge.ts';
import { drawn, mirrored, ringsOf, turned, UNIT_M, VARIANTS, variantNamed } from '../outline/drawings.ts';
import { presetTask } from './presetTasks.ts';

const Z = 0.02;
const NOMINAL = await presetTask('nominal-sphere');
const OFFSET = await presetTask('offset-range');
const SIZES = await presetTask('size-range');

const circle = (eta: number, sense: 1 | -1 = 1) => ringLoop(Math.sqrt(eta) * UNIT_M, sense);
const ring = (innerM: number, outerM: number): Loop[] => [ringLoop(outerM, 1), ringLoop(innerM, -1)];
const round = (...elements: { weight: number; loops: Loop[] }[]): Shape => ({
  elements,
  folds: Number.POSITIVE_INFINITY,
  mirror: true,
});
const outlineOf = (shape: Shape, vertices = 360): OutlineElement[] =>
  shape.elements.map(({ weight, loops }) => ({
    weight,
    rings: ringsOf({ ...shape, elements: [{ weight, loops }] }, vertices),
  }));

/** The numbers of design.md, sections 3 and 4: spheres of index 1.59 at 635 nm, 20 mm before the detector. */
describe('Judge: nominal numbers', () => {
  it('reads twice the extinction within the first Fresnel zone: 2.000, 1.999 and 1.996 for 1, 2 and 4 µm', () => {
    const judge = new Judge(SIZES, REPORT_FINENESS);
    const { scores, ratios } = judge.scoreShape(round({ weight: 1, loops: [circle(Math.PI)] }), Z);
    expect(Array.from(ratios, (ratio) => ratio.toFixed(3))).toEqual(['2.000', '1.999', '1.996']);
    expect(scores.gain).toBeCloseTo(1.998, 3);
    expect(scores.areaOverFloor).toBeCloseTo(Math.PI / scores.gain, 10);
    expect(scores.radius_m).toBeCloseTo(Math.sqrt(635e-9 * Z), 12);
  });

  it('reads twice for each of three zones weighted +1, −1, +1: 5.998 for the smallest sphere', () => {
    const judge = new Judge(SIZES, REPORT_FINENESS);
    const zones = [0, 1, 2].map((n) => ({
      weight: n % 2 === 0 ? 1 : -1,
      loops: [circle((n + 1) * Math.PI), ...(n > 0 ? [circle(n * Math.PI, -1)] : [])],
    }));
    const { scores, ratios } = judge.scoreShape(round(...zones), Z);
    expect(ratios[0].toFixed(3)).toBe('5.998');
    expect(scores.area_m2).toBeCloseTo(3 * Math.PI * 635e-9 * Z, 15);
    // Three zones at three times the gain: the noise of three, the signal of nine.
    const one = judge.scoreShape(round({ weight: 1, loops: [circle(Math.PI)] }), Z);
    expect(one.scores.snr.time_s / scores.snr.time_s).toBeCloseTo(3, 1);
  });

  it('reads a little low with twelve ramps at mean η = 6.3, for a detector 9400 times the extinction', () => {
    const judge = new Judge(NOMINAL, REPORT_FINENESS);
    const saw = drawn(variantNamed('ramp-saw-12-fold'), [6.3 - Math.PI, 6.3 + Math.PI]);
    const { scores, ratios } = judge.scoreShape(saw, Z);
    // design.md says 0.15 % low, in round numbers.
    expect(1 - ratios[0]).toBeGreaterThan(0.001);
    expect(1 - ratios[0]).toBeLessThan(0.002);
    const { extinctionM2 } = judge.scenarios[0];
    expect(scores.area_m2 / extinctionM2).toBeGreaterThan(9350);
    expect(scores.area_m2 / extinctionM2).toBeLessThan(9450);
    expect(scores.snr.required).toBeCloseTo(scores.area_m2 / (0.01 * extinctionM2), 4);
  });

  it('holds 0.9 % on the offset brief with a ring from 60.6 to 92.0 µm and one from 204.3 to 205.6 µm', () => {
    const judge = new Judge(OFFSET, REPORT_FINENESS);
    const score = (...rims: number[]) =>
      judge.scoreShape(
        round({
          weight: 1,
          loops: [...ring(rims[2] * 1e-6, rims[3] * 1e-6), ...ring(rims[0] * 1e-6, rims[1] * 1e-6)],
        }),
        Z,
      ).scores;
    // Rims were published to 0.1 µm, and the thin ring is 1.3 µm wide: within that rounding lie 0.88 % and 1.05 %.
    expect(score(60.6, 92.0, 204.3, 205.6).correction.worst).toBeLessThan(0.011);
    const close = score(60.6, 92.049, 204.251, 205.551);
    expect(close.correction.worst).toBeLessThan(0.009);
    expect(close.areaOverFloor).toBeCloseTo(1.31, 1);
  });
});

describe('Judge: invariances', () => {
  const shape = drawn(variantNamed('ramp-knots-5-fold'), [2, 8, 1, 6, 0.4, 0.6, 0.3, 0.5]);
  const elements = outlineOf(shape);
  const judge = new Judge(OFFSET, SEARCH_FINENESS);
  const scored = judge.scoreOutline(elements, Z).scores;
  const changed = (change: (one: Float64Array) => Float64Array) =>
    judge.scoreOutline([{ weight: 1, rings: elements[0].rings.map(change) }], Z).scores;

  it('is the same for a mirrored outline, and for one turned by one of its folds', () => {
    for (const other of [changed(mirrored), changed((one) => turned(one, (2 * Math.PI) / 5))]) {
      expect(other.area_m2 / scored.area_m2).toBeCloseTo(1, 9);
      expect(other.correction.worst).toBeCloseTo(scored.correction.worst, 5);
      expect(other.correction.rms).toBeCloseTo(scored.correction.rms, 5);
    }
  });

  it('is nearly the same for an outline turned at will: only the places tried are others', () => {
    const other = changed((one) => turned(one, 0.3));
    expect(other.area_m2 / scored.area_m2).toBeCloseTo(1, 9);
    expect(Math.abs(other.correction.worst - scored.correction.worst)).toBeLessThan(
      0.05 * OFFSET.target.correction,
    );
  });

  it('does not hang on which point comes first', () => {
    const shifted = changed((one) => Float64Array.of(...one.subarray(34), ...one.subarray(0, 34)));
    expect(shifted.correction.worst).toBeCloseTo(scored.correction.worst, 9);
    expect(shifted.area_m2 / scored.area_m2).toBeCloseTo(1, 12);
  });

  it('reads the same from an outline cut in two along a line', () => {
    const disc = ringsOf(round({ weight: 1, loops: [circle(5)] }), 64)[0];
    const upper = disc.slice(0, 66);
    const lower = Float64Array.of(...disc.slice(64), disc[0], disc[1]);
    const whole = judge.scoreOutline([{ weight: 1, rings: [disc] }], Z);
    const halves = judge.scoreOutline([{ weight: 1, rings: [upper, lower] }], Z);
    const pair = judge.scoreOutline(
      [upper, lower].map((one) => ({ weight: 1, rings: [one] })),
      Z,
    );
    for (const cut of [halves, pair]) {
      expect(cut.scores.area_m2 / whole.scores.area_m2).toBeCloseTo(1, 12);
      expect(cut.scores.correction.worst).toBeCloseTo(whole.scores.correction.worst, 4);
    }
  });

  it('scales: all lengths three times as large, the readings nine times', () => {
    const scaledTask = {
      ...OFFSET,
      light: { ...OFFSET.light, wavelengthM: 3 * 635e-9, driftM: 3e-9 },
      particles: OFFSET.particles.map((particle) => ({ ...particle, diameterM: 3 * particle.diameterM })),
      placement: { ...OFFSET.placement, offsetM: 30e-6 },
      detector: {
        ...OFFSET.detector,
        distanceM: [0.06, 0.06] as [number, number],
        radiusM: [60e-6, 1.2e-3] as [number, number],
      },
    };
    const scaled = new Judge(scaledTask, SEARCH_FINENESS).scoreOutline(
      [{ weight: 1, rings: elements[0].rings.map((one) => one.map((value) => 3 * value)) }],
      0.06,
    ).scores;
    expect(scaled.correction.worst).toBeCloseTo(scored.correction.worst, 6);
    expect(scaled.area_m2 / scored.area_m2).toBeCloseTo(9, 9);
    expect(scaled.areaOverFloor).toBeCloseTo(scored.areaOverFloor, 9);
    expect(scaled.lobe.ratio).toBeCloseTo(scored.lobe.ratio, 9);
    expect(scaled.snr.required / scored.snr.required).toBeCloseTo(1, 6);
  });

  it('takes the wavelength in the medium', () => {
    const inWater = new Judge({ ...NOMINAL, medium: constantIndex(1.33) }, SEARCH_FINENESS);
    expect(inWater.wavelengthM).toBeCloseTo(635e-9 / 1.33, 15);
    expect(inWater.kappa(Z) / new Judge(NOMINAL, SEARCH_FINENESS).kappa(Z)).toBeCloseTo(1.33, 12);
  });
});

describe('Judge: fineness', () => {
  it.each(VARIANTS.map((variant) => [variant.id, variant] as const))(
    '%s: the nodes of a search read starts to 2e-4 of the extinction',
    (_, variant) => {
      const coarse = new Judge(OFFSET, SEARCH_FINENESS);
      const fine = new Judge(OFFSET, { ...SEARCH_FINENESS, perRadian: 2 });
      const random = randomStream(61);
      const errors: number[] = [];
      for (let turn = 0; turn < 10; turn++) {
        const shape = variant.draw(variant.start(random).values, UNIT_M);
        if (!isDrawn(shape)) continue;
        const ratios = coarse.scoreShape(shape, Z).ratios;
        const exact = fine.scoreShape(shape, Z).ratios;
        errors.push(Math.max(...ratios.map((ratio, i) => Math.abs(ratio - exact[i]))));
      }
      expect(errors.length).toBeGreaterThan(5);
      // A free boundary that dips close to the axis, where the particle may be, may take more now and then.
      errors.sort((a, b) => a - b);
      expect(errors[errors.length - 2]).toBeLessThan(2e-4);
      expect(errors[errors.length - 1]).toBeLessThan(
        variant.id === 'fourier-square-1-fold-6-sines' ? 2e-3 : 3e-4,
      );
    },
  );
});

describe('Judge: places tried', () => {
  const judge = new Judge(OFFSET, SEARCH_FINENESS);

  it.each(VARIANTS.map((variant) => [variant.id, variant] as const))(
    '%s: the wedge of its symmetry stands for the whole disc',
    (_, variant) => {
      const shape = firstDrawn(variant);
      const elements = outlineOf(shape, 720);
      const radiusM = ringsRadius(elements[0].rings);
      const wedge = samplePositions(OFFSET.placement.offsetM, 2 * judge.kappa(Z) * radiusM, 0.5, shape);
      const ratiosAt = (positions: Float64Array) => judge.outlineRatios(elements, Z, positions).ratios;
      const here = ratiosAt(wedge);
      const fold = Number.isFinite(shape.folds) ? (2 * Math.PI) / shape.folds : 1;
      const images = [turned(wedge, fold)];
      if (shape.mirror) images.push(wedge.map((value, i) => (i % 2 === 1 ? -value : value)));
      for (const image of images) {
        const there = ratiosAt(image);
        const apart = here.map((row, s) => Math.max(...row.map((ratio, i) => Math.abs(ratio - there[s][i]))));
        expect(Math.max(...apart)).toBeLessThan(5e-5);
      }
      // What the wedge leaves out is no worse than what it holds.
      const inWedge = judge.scoreOutline(elements, Z, shape).scores.correction.worst;
      const everywhere = judge.scoreOutline(elements, Z).scores.correction.worst;
      expect(Math.abs(everywhere - inWedge)).toBeLessThan(0.05 * Math.max(OFFSET.target.correction, inWedge));
    },
  );

  it('are all around for polarised light, and a quarter of that for flights, whatever the symmetry', () => {
    const disc = round({ weight: 1, loops: [circle(3)] });
    const count = (changes: Partial<typeof OFFSET>) =>
      new Judge({ ...OFFSET, ...changes }, SEARCH_FINENESS).scoreShape(disc, Z).ratios.length;
    const still = count({});
    expect(count({ light: { ...OFFSET.light, polarizationRad: 0 } })).toBeGreaterThan(5 * still);
    expect(
      count({ placement: { ...OFFSET.placement, crossing: { spanM: 20e-6, headingRad: 0.5 } } }),
    ).toBeGreaterThan(3 * still);
  });

  it('are the axis alone, at every depth, where there is no offset', () => {
    const task = { ...NOMINAL, placement: { ...NOMINAL.placement, depthM: 1e-3 } };
    const deep = new Judge(task, SEARCH_FINENESS);
    const outline = outlineOf(round({ weight: 1, loops: [circle(3)] }));
    const { positions, depths, ratios } = deep.outlineRatios(outline, Z);
    expect(Array.from(positions)).toEqual([0, 0]);
    expect(depths).toEqual([0, -1e-3, 1e-3]);
    // A particle nearer by a depth sees the detector from a shorter distance.
    const nearer = new Judge(NOMINAL, SEARCH_FINENESS).outlineRatios(outline, Z - 1e-3).ratios[0][0];
    expect(ratios[0][2]).toBeCloseTo(nearer, 4);
  });
});

describe('Judge: refusals', () => {
  it('stops loudly at a score that is not finite', () => {
    const judge = new Judge(NOMINAL, SEARCH_FINENESS);
    const broken = { weight: 1, rings: [Float64Array.of(1e-4, 0, 0, Number.NaN, -1e-4, 0)] };
    expect(() => judge.scoreOutline([broken], Z)).toThrow(RimwrightError);
  });
});

function firstDrawn(variant: (typeof VARIANTS)[number]): Shape {
  const random = randomStream(62);
  for (;;) {
    const shape = variant.draw(variant.start(random).values, UNIT_M);
    if (isDrawn(shape)) return shape;
  }
}
