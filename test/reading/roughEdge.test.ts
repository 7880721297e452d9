import { describe, expect, it } from 'vitest';
import type { RandomSource } from '../../src/base/random.ts';
import { randomStream } from '../../src/base/random.ts';
import type { Complex } from '../../src/numeric/complex.ts';
import {
  closedFormCorrection,
  closedFormDensity,
  polygonClosedForm,
  spreadCoefficient,
} from '../../src/reading/polygonClosedForm.ts';
import { roughEdgeEstimate, roughen } from '../../src/reading/roughEdge.ts';

const square = (half: number) => Float64Array.of(half, -half, half, half, -half, half, -half, -half);
const signedArea = (ring: Float64Array) => {
  let twice = 0;
  for (let i = 0; i < ring.length; i += 2) {
    const j = (i + 2) % ring.length;
    twice += ring[i] * ring[j + 1] - ring[i + 1] * ring[j];
  }
  return twice / 2;
};
/** The same draws with the opposite sign: every height turns round. */
const mirrored = (random: RandomSource): RandomSource => ({
  uniform: () => random.uniform(),
  normal: () => -random.normal(),
});

describe('roughen', () => {
  const RMS_M = 20e-9;
  // A power of two: eight pieces to each then come out even.
  const CORRELATION_M = 2 ** -20;

  it('gives heights of the wanted rms and autocorrelation rms² e^(−s²/ξ²), all round the ring', () => {
    const half = 50 * CORRELATION_M;
    const perSide = 800;
    const lags = [0, 4, 8, 12, 24];
    const sums = lags.map(() => 0);
    const runs = 20;
    let mean = 0;
    for (let run = 0; run < runs; run++) {
      const rough = roughen(square(half), RMS_M, CORRELATION_M, randomStream(3, run));
      expect(rough.length).toBe(2 * 4 * perSide);
      // Away from corners a height is what the point has moved across its side, outwards.
      const height = (i: number) => {
        const at = i % (4 * perSide);
        const side = Math.floor(at / perSide);
        const [x, y] = [rough[2 * at], rough[2 * at + 1]];
        if (at % perSide === 0) return ([x, y, -x, -y][side] + [-y, x, y, -x][side]) / 2 - half;
        return [x, y, -x, -y][side] - half;
      };
      for (let i = 0; i < 4 * perSide; i++) {
        mean += height(i);
        for (const [k, lag] of lags.entries()) sums[k] += height(i) * height(i + lag);
      }
    }
    const count = runs * 4 * perSide;
    // A mean of N heights with ∫C ds = √π ξ rms² has the variance √π ξ rms²/L; that of products is at most √(2π) ξ rms⁴/L.
    const lengths = count / 8;
    expect(Math.abs(mean / count)).toBeLessThan(3 * RMS_M * Math.sqrt(Math.sqrt(Math.PI) / lengths));
    for (const [k, lag] of lags.entries()) {
      const found = sums[k] / count / RMS_M ** 2;
      expect(Math.abs(found - Math.exp(-((lag / 8) ** 2)))).toBeLessThan(3 * Math.sqrt(2.51 / lengths));
    }
  });

  it('widens the opening where the height is positive: outer rings and holes alike', () => {
    const one: RandomSource = { uniform: () => 0.5, normal: () => Math.SQRT1_2 };
    // A correlation far longer than the ring moves the whole of it by one height, to which two draws add up.
    const rough = roughen(square(1e-5), 1e-7, 1, one);
    expect(rough.length).toBe(8);
    for (const value of rough) expect(Math.abs(value)).toBeCloseTo(1e-5 + 1e-7, 15);
    const outer = roughen(square(1e-5), 1e-8, 2e-6, one);
    expect(signedArea(outer)).toBeGreaterThan(4e-10);
    const clockwise = Float64Array.of(1e-5, -1e-5, -1e-5, -1e-5, -1e-5, 1e-5, 1e-5, 1e-5);
    const hole = roughen(clockwise, 1e-8, 2e-6, one);
    expect(signedArea(hole)).toBeLessThan(0);
    expect(signedArea(hole)).toBeGreaterThan(-4e-10);
  });

  it('leaves an edge without roughness where it is, and says the same for the same seed', () => {
    const ring = square(1e-5);
    const still = roughen(ring, 0, 4e-6, randomStream(1));
    expect(still.length).toBeGreaterThan(ring.length);
    expect(signedArea(still)).toBeCloseTo(4e-10, 20);
    const again = () => roughen(ring, 1e-8, 4e-6, randomStream(1));
    expect(again()).toEqual(again());
    expect(roughen(new Float64Array(), 1e-8, 1e-6, randomStream(1)).length).toBe(0);
  });

  it('refuses lengths out of range and rings too long for their texture', () => {
    const random = randomStream(1);
    expect(() => roughen(square(1e-5), -1e-9, 1e-6, random)).toThrow('rmsM: found -1e-9');
    expect(() => roughen(square(1e-5), Number.NaN, 1e-6, random)).toThrow('rmsM');
    expect(() => roughen(square(1e-5), 1e-9, 0, random)).toThrow('correlationM: found 0');
    expect(() => roughen(square(1), 1e-9, 1e-7, random)).toThrow('4000000 points');
  });
});

describe('roughEdgeEstimate', () => {
  /** 20 mm behind the particle in red light. */
  const KAPPA = Math.PI / (635e-9 * 0.02);
  const UNIT_M = 1 / Math.sqrt(KAPPA);
  const FORWARD: Complex = [1, 0.4];
  const ALPHA = spreadCoefficient(KAPPA, 0.1 * UNIT_M);
  const [PX, PY] = [0.2 * UNIT_M, -0.1 * UNIT_M];
  const DENSITY = closedFormDensity(FORWARD, ALPHA, PX, PY);
  const PAIRS = 200;

  const correction = (rings: readonly Float64Array[]) => {
    const { f, winding } = polygonClosedForm(rings, ALPHA, PX, PY);
    return closedFormCorrection(FORWARD, f, winding);
  };

  /** Mean change of 400 rough outlines, with its standard error, and their standard deviation. */
  function ensemble(rings: readonly Float64Array[], rmsM: number, correlationM: number) {
    const exact = correction(rings);
    const changes: number[] = [];
    const pairs: number[] = [];
    for (let i = 0; i < PAIRS; i++) {
      const source = () => randomStream(11, i);
      const rough = (random: RandomSource) => rings.map((ring) => roughen(ring, rmsM, correlationM, random));
      const [one, other] = [rough(source()), rough(mirrored(source()))].map(
        (rough) => correction(rough) - exact,
      );
      changes.push(one, other);
      // In the mean of an edge and its mirror image the first order is gone: the second shows at once.
      pairs.push((one + other) / 2);
    }
    const mean = pairs.reduce((sum, value) => sum + value, 0) / PAIRS;
    const variance = pairs.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (PAIRS - 1);
    const spread = Math.sqrt(changes.reduce((sum, value) => sum + value * value, 0) / changes.length);
    return { mean, error: Math.sqrt(variance / PAIRS), spread };
  }

  const pentagon = Float64Array.of(1.6, -0.9, 1.3, 1.1, -0.4, 1.7, -1.5, 0.3, -0.8, -1.2).map(
    (v) => v * UNIT_M,
  );
  const round = Float64Array.from({ length: 96 }, (_, i) => {
    const phi = (2 * Math.PI * (i >> 1)) / 48;
    return 1.5 * UNIT_M * (i % 2 === 0 ? Math.cos(phi) : Math.sin(phi));
  });
  const framed = [
    square(1.5 * UNIT_M),
    square(0.6 * UNIT_M).map((_, i, ring) => ring[6 - (i & ~1) + (i & 1)]),
  ];

  it.each([
    ['a pentagon, short correlation', [pentagon], 0.01, 0.2],
    ['a pentagon, long correlation', [pentagon], 0.01, 2],
    ['a round outline of 48 corners', [round], 0.01, 0.5],
    ['a square with a square hole', framed, 0.01, 0.4],
  ] as const)('holds the mean and the spread of 400 outlines: %s', (_, rings, rms, correlation) => {
    const [rmsM, correlationM] = [rms * UNIT_M, correlation * UNIT_M];
    const found = ensemble(rings, rmsM, correlationM);
    const estimate = roughEdgeEstimate(rings, DENSITY, rmsM, correlationM, 0.02 * UNIT_M);
    // 200 independent pairs: the variance is uncertain by √(2/200), the spread by half of that.
    expect(Math.abs(found.spread / estimate.spread - 1)).toBeLessThan(3 / Math.sqrt(2 * PAIRS));
    // And the straight pieces between points leave 0.5 % of the mean square out.
    expect(Math.abs(found.mean - estimate.mean)).toBeLessThan(
      3 * found.error + 0.01 * Math.abs(estimate.mean),
    );
    // The error is small enough for this to mean something.
    expect(found.error).toBeLessThan(0.15 * Math.abs(estimate.mean));
  });

  it('has the closed values of a circle: mean ½ rms² d²/dR² and spread for short and long correlation', () => {
    const radius = 1.5 * UNIT_M;
    const sides = 2000;
    const ring = Float64Array.from({ length: 2 * sides }, (_, i) => {
      const phi = (2 * Math.PI * (i >> 1)) / sides;
      return radius * (i % 2 === 0 ? Math.cos(phi) : Math.sin(phi));
    });
    // A centred disc and real S read 1 − cos κR² of the extinction: its slope is 2κR sin κR², its bend 2κ sin + 4κ²R² cos.
    const density = closedFormDensity([1, 0], spreadCoefficient(KAPPA, 0), 0, 0);
    const eta = KAPPA * radius * radius;
    const slope = 2 * KAPPA * radius * Math.sin(eta);
    const bend = 2 * KAPPA * Math.sin(eta) + 4 * KAPPA * eta * Math.cos(eta);
    const rmsM = 1e-3 * UNIT_M;
    const short = roughEdgeEstimate([ring], density, rmsM, 0.01 * UNIT_M, 0.01 * UNIT_M);
    expect(short.mean / ((rmsM * rmsM * bend) / 2)).toBeCloseTo(1, 4);
    const share = (Math.sqrt(Math.PI) * 0.01 * UNIT_M) / (2 * Math.PI * radius);
    expect(short.spread / (rmsM * Math.abs(slope) * Math.sqrt(share))).toBeCloseTo(1, 4);
    // Far longer than the circle: it only grows and shrinks.
    const long = roughEdgeEstimate([ring], density, rmsM, 1e3 * UNIT_M, 0.01 * UNIT_M);
    expect(long.spread / (rmsM * Math.abs(slope))).toBeCloseTo(1, 4);
    expect(long.mean / short.mean).toBeCloseTo(1, 4);
  });
});
