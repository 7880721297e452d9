import { describe, expect, it } from 'vitest';
import { ringArea } from '../../src/outline/area.ts';
import { isDrawn } from '../../src/outline/families/family.ts';
import { ringLoop } from '../../src/outline/ring.ts';
import type { OutlineElement, Shape, ShapeElement } from '../../src/outline/shape.ts';
import {
  closedFormCorrection,
  polygonClosedForm,
  spreadCoefficient,
} from '../../src/reading/polygonClosedForm.ts';
import { Certifier } from '../../src/score/certifier.ts';
import { REPORT_FINENESS, SEARCH_FINENESS } from '../../src/score/fineness.ts';
import { Judge } from '../../src/score/judge.ts';
import type { Task } from '../../src/score/task.ts';
import { weigh } from '../../src/score/weigher.ts';
import { drawn, ringsOf, UNIT_M, variantNamed } from '../outline/drawings.ts';
import { presetTask } from './presetTasks.ts';

const Z = 0.02;
const SIZES = await presetTask('size-range');
const OFFSET = await presetTask('offset-range');
const radius = (eta: number) => Math.sqrt(eta) * UNIT_M;

/** Zones of half a wave about the axis, with weights +1, −1, +1 … */
function zones(count: number): ShapeElement[] {
  return Array.from({ length: count }, (_, k) => ({
    weight: k % 2 === 0 ? 1 : -1,
    loops: [ringLoop(radius(Math.PI * (k + 1)), 1), ...(k === 0 ? [] : [ringLoop(radius(Math.PI * k), -1)])],
  }));
}

const round = (elements: ShapeElement[]): Shape => ({
  elements,
  folds: Number.POSITIVE_INFINITY,
  mirror: true,
});

const outlineOf = (shape: Shape, vertices = 360): OutlineElement[] =>
  shape.elements.map((element) => ({
    weight: element.weight,
    rings: ringsOf({ ...shape, elements: [element] }, vertices),
  }));

/** As the brief, in light of so many dB/Hz, weights balanced or not. */
const noisy = (task: Task, decibels: number, balanced: boolean): Task => ({
  ...task,
  light: { ...task.light, intensityNoisePerHz: 10 ** (decibels / 10) },
  detector: { ...task.detector, balanced },
});

describe('Fresnel zones with weights +1 and −1', () => {
  it('read two extinctions each: 5.998, 5.996 and 5.984 of three for spheres of 1, 2 and 4 µm (design, section 3, by independent code)', () => {
    const judge = new Judge(SIZES, REPORT_FINENESS);
    const { ratios } = judge.scoreShape(round(zones(3)), Z);
    expect(Array.from(ratios, (ratio) => ratio.toFixed(3))).toEqual(['5.998', '5.996', '5.984']);
  });

  it('have these weights as those of least time, with a gain of two a zone', () => {
    const task: Task = { ...SIZES, target: { ...SIZES.target, gain: 'free' } };
    const judge = new Judge(task, REPORT_FINENESS);
    const apart = judge.readApart(outlineOf(round(zones(4)), 1440), Z);
    const { elements } = weigh(task, apart, 0.01);
    elements.forEach(({ weight }, k) => {
      expect(Math.abs(weight - (k % 2 === 0 ? 1 : -1))).toBeLessThan(0.03);
    });
    const { gain } = judge.scoreShape({ ...round(zones(4)), freeWeights: true }, Z).scores;
    expect(Math.abs(gain / 8 - 1)).toBeLessThan(0.02);
  });
});

describe('weigh', () => {
  const shape = drawn(variantNamed('rings-weighted-4'), [3.1, 6.2, 9.3, 12.6]);

  it('finds weights that hold a correction, none above 1, and scores them as the same outline with these weights', () => {
    const task: Task = { ...OFFSET, target: { ...OFFSET.target, gain: 'free' } };
    const judge = new Judge(task, SEARCH_FINENESS);
    const points = outlineOf(shape);
    const weighed = weigh(task, judge.readApart(points, Z, shape), 0.05);
    const weights = weighed.elements.map(({ weight }) => weight);
    expect(Math.max(...weights.map(Math.abs))).toBe(1);
    const { scores } = judge.judge(weighed);
    const again = judge.scoreOutline(
      points.map((one, j) => ({ ...one, weight: weights[j] })),
      Z,
      shape,
    ).scores;
    expect(again.correction.worst).toBeCloseTo(scores.correction.worst, 10);
    expect(again.snr.time_s / scores.snr.time_s).toBeCloseTo(1, 10);
    expect(scores.correction.worst).toBeLessThan(0.05 * (1 + 1e-9));
    // With a gain of one they are as they are solved.
    const one = weigh(OFFSET, judge.readApart(points, Z, shape), 0.05);
    expect(Math.max(...one.elements.map(({ weight }) => Math.abs(weight)))).toBeLessThan(1);
    expect(new Judge(OFFSET, SEARCH_FINENESS).judge(one).scores.gain).toBe(1);
  });

  it('balances the areas to 1e-12, which leaves none of the intensity noise in the time', () => {
    const task = noisy(OFFSET, -130, true);
    const judge = new Judge(task, SEARCH_FINENESS);
    const weighed = weigh(task, judge.readApart(outlineOf(shape), Z, shape), 0.1);
    const parts = weighed.elements.map(({ weight, areaM2 }) => weight * areaM2);
    const sum = parts.reduce((total, part) => total + part, 0);
    expect(Math.abs(sum)).toBeLessThan(1e-12 * parts.reduce((total, part) => total + Math.abs(part), 0));
    const { time_s } = judge.judge(weighed).scores.snr;
    const quiet = new Judge(noisy(OFFSET, -300, true), SEARCH_FINENESS).judge(weighed).scores.snr.time_s;
    expect(time_s / quiet).toBeCloseTo(1, 12);
    // Without the balance weights weigh one noise against the other, and are no worse for it.
    const free = weigh(noisy(OFFSET, -130, false), judge.readApart(outlineOf(shape), Z, shape), 0.1);
    expect(judge.judge(free).scores.snr.time_s).toBeLessThan(time_s * (1 + 1e-9));
  });

  it('has the certified worst within what was asked for where worst cases come to the samples', () => {
    const task: Task = { ...OFFSET, target: { ...OFFSET.target, gain: 'free' } };
    const judge = new Judge(task, SEARCH_FINENESS);
    const { elements, judgement } = new Certifier(judge, 'far').weighOutline(
      outlineOf(shape),
      Z,
      shape,
      0.06,
    );
    const { worst, certified = 1 } = judgement.scores.correction;
    expect(certified).toBeGreaterThanOrEqual(worst);
    expect(certified).toBeLessThan(0.06 * (1 + 2e-6));
    expect(elements.some(({ weight }) => weight < 0)).toBe(true);
  });
});

describe('a grid of photodiodes', () => {
  it('reads the weighted sum of its rectangles in closed form, for a small particle of constant amplitude', async () => {
    // Rayleigh's amplitude does not depend on small angles: x = 0.05. Light scattered onto the grid is below 1e-6 of it.
    const task = await presetTask('nominal-sphere');
    const [sphere] = task.particles;
    const small: Task = {
      ...task,
      particles: [{ ...sphere, diameterM: 1e-8, index: { ...OFFSET.particles[0].index } } as never],
      detector: { ...task.detector, distanceM: [2, 2], radiusM: [1e-4, 4e-3] },
    };
    const judge = new Judge(small, REPORT_FINENESS);
    const kappa = judge.kappa(2);
    const shape = variantNamed('grid-3-by-5').draw([2, 3, 0.8], 1 / Math.sqrt(kappa));
    if (!isDrawn(shape)) throw new Error('a grid is drawn');
    expect(shape.elements.length).toBe(6);
    const weights = [0.3, -1, 0.7, 0.5, -0.2, 1];
    const elements = outlineOf(shape).map((one, j) => ({ ...one, weight: weights[j] }));
    const place = [2e-4, -1e-4] as const;
    const { ratios } = judge.outlineRatios(elements, 2, Float64Array.from(place));
    const { forward } = judge.scenarios[0].colours[0].sphere as unknown as { forward: [number, number] };
    const expected = elements.reduce((sum, { weight, rings }) => {
      return rings.reduce((total, ring) => {
        const { f, winding } = polygonClosedForm([ring], spreadCoefficient(kappa, 0), ...place);
        return total + weight * (1 + closedFormCorrection(forward, f, winding));
      }, sum);
    }, 0);
    expect(ratios[0][0] / expected).toBeCloseTo(1, 4);
  });

  it('has one element for photodiodes that mirror each other, with the gap of the brief at the least', () => {
    const shape = drawn(variantNamed('grid-4-by-4'), [2, 1]);
    expect(shape.elements.map(({ loops }) => loops.length).sort()).toEqual([4, 4, 8]);
    const pitch = Math.sqrt(2) * UNIT_M;
    for (const { rings } of outlineOf(shape)) {
      for (const ring of rings) expect(Math.sqrt(ringArea(ring)) / (pitch - 1e-6)).toBeCloseTo(1, 4);
    }
  });
});

describe('two detectors behind a beam splitter', () => {
  const near: OutlineElement = outlineOf(round([{ weight: 1, loops: [ringLoop(radius(4), 1)] }]))[0];
  const far: OutlineElement = outlineOf(
    round([{ weight: 1, loops: [ringLoop(radius(7), 1), ringLoop(radius(1), -1)] }]),
  )[0];
  const task: Task = { ...OFFSET, detector: { ...OFFSET.detector, distanceM: [0.02, 0.04] } };
  const judge = new Judge(task, SEARCH_FINENESS);
  const pair = [
    { ...near, weight: 1.2, share: 0.5 },
    { ...far, weight: -0.7, share: 0.5, distanceM: 0.03 },
  ];

  it('read as the weighted sum of two single designs', () => {
    const places = Float64Array.of(0, 0, 6e-6, -3e-6);
    const both = judge.outlineRatios(pair, 0.02, places).ratios;
    const one = judge.outlineRatios([near], 0.02, places).ratios;
    const other = judge.outlineRatios([far], 0.03, places).ratios;
    both.forEach((row, s) => {
      row.forEach((ratio, p) => {
        expect(ratio).toBeCloseTo(0.6 * one[s][p] - 0.35 * other[s][p], 9);
      });
    });
  });

  it('have the noise of half the light each, and the larger lobe of the two', () => {
    const light = { ...task.light, intensityNoisePerHz: 1e-13 };
    const { scores } = new Judge({ ...task, light }, SEARCH_FINENESS).scoreOutline(pair, 0.02);
    const [a, b] = [near, far].map(({ rings }) => rings.reduce((sum, ring) => sum + ringArea(ring), 0) / 2);
    const [e, perArea, noise] = [1.602176634e-19, 0.42 * 5e4, 2e-12];
    const own = 1.44 * (2 * e * perArea * a + noise ** 2) + 0.49 * (2 * e * perArea * b + noise ** 2);
    const common = 1e-13 * (perArea * (1.2 * a - 0.7 * b)) ** 2;
    const least = Math.min(...judge.scenarios.map(({ extinctionM2 }) => extinctionM2));
    const signal = 0.01 * perArea * least;
    expect(scores.snr.time_s / ((own + common) / signal ** 2)).toBeCloseTo(1, 9);
    expect(scores.area_m2 / (2 * (a + b))).toBeCloseTo(1, 12);
    const alone = judge.scoreOutline([near], 0.02).scores.lobe.ratio;
    const farther = judge.scoreOutline([far], 0.03).scores.lobe.ratio;
    expect(scores.lobe.ratio / Math.max(alone, farther)).toBeCloseTo(1, 4);
  });

  it('are certified by a case that a judge of that case alone reads as well', () => {
    const {
      worst,
      certified = 0,
      certifiedAt,
    } = new Certifier(judge, 'far').scoreOutline(pair, 0.02).scores.correction;
    expect(certified).toBeGreaterThanOrEqual(worst);
    if (certifiedAt === undefined) throw new Error('no case');
    const { diameter_m, wavelength_m, position_m } = certifiedAt;
    const [particle] = task.particles;
    const alone = new Judge(
      {
        ...task,
        light: { ...task.light, wavelengthM: wavelength_m, driftM: 0 },
        particles: [{ ...particle, diameterM: diameter_m }],
      },
      SEARCH_FINENESS,
    );
    const [[ratio]] = alone.outlineRatios(pair, 0.02, Float64Array.from(position_m)).ratios;
    expect(Math.abs(ratio - 1)).toBeCloseTo(certified, 5);
  });
});
