import { describe, expect, it } from 'vitest';
import type { RandomSource } from '../../src/base/random.ts';
import { randomStream } from '../../src/base/random.ts';
import type { Complex } from '../../src/numeric/complex.ts';
import { gaussLegendre, LegendreRules } from '../../src/numeric/gaussLegendre.ts';
import { constantIndex } from '../../src/optics/indexModel.ts';
import { forwardAmplitude } from '../../src/optics/mieAmplitudes.ts';
import { mieCoefficients } from '../../src/optics/mieCoefficients.ts';
import { ringNodes } from '../../src/outline/ringNodes.ts';
import { boundaryReading } from '../../src/reading/boundaryReading.ts';
import {
  closedFormCorrection,
  closedFormDensity,
  polygonClosedForm,
  spreadCoefficient,
} from '../../src/reading/polygonClosedForm.ts';
import { buildRadialTable } from '../../src/reading/radialTable.ts';
import { buildScenarios } from '../../src/reading/scenario.ts';
import reference from '../reference/square-detector.json' with { type: 'json' };

/** 20 mm behind the particle in red light. */
const KAPPA = Math.PI / (635e-9 * 0.02);
const UNIT_M = 1 / Math.sqrt(KAPPA);
const rule = gaussLegendre(40);

const square = (half: number) => Float64Array.of(half, -half, half, half, -half, half, -half, -half);
const gap = (a: Complex, b: Complex) => Math.hypot(a[0] - b[0], a[1] - b[1]);

/** A ring that is star-shaped about a place near the origin; vertices at phases η of some 1 to 400. */
function randomRing(random: RandomSource): Float64Array {
  const count = 3 + Math.floor(7 * random.uniform());
  const ring = new Float64Array(2 * count);
  for (let i = 0; i < count; i++) {
    const phi = (2 * Math.PI * (i + 0.7 * random.uniform())) / count;
    const radius = UNIT_M * (1 + 19 * random.uniform());
    ring[2 * i] = radius * Math.cos(phi);
    ring[2 * i + 1] = radius * Math.sin(phi);
  }
  return ring;
}

/** (1/2π) ∮ e^(−αρ²) dφ and (1/2π) ∮ dφ by quadrature, every edge in pieces far shorter than its distance or a turn of phase. */
function byQuadrature(rings: readonly Float64Array[], alpha: Complex, px: number, py: number) {
  let [re, im, winding] = [0, 0, 0];
  for (const ring of rings) {
    for (let i = 0; i < ring.length; i += 2) {
      const j = (i + 2) % ring.length;
      const [dx, dy] = [ring[j] - ring[i], ring[j + 1] - ring[i + 1]];
      const pieces = 200;
      for (let piece = 0; piece < pieces; piece++) {
        for (let k = 0; k < rule.nodes.length; k++) {
          const t = (piece + (1 + rule.nodes[k]) / 2) / pieces;
          const [x, y] = [ring[i] + t * dx - px, ring[i + 1] + t * dy - py];
          const squared = x * x + y * y;
          const turn = ((x * dy - y * dx) / squared) * (rule.weights[k] / (4 * Math.PI * pieces));
          const modulus = turn * Math.exp(-alpha[0] * squared);
          re += modulus * Math.cos(alpha[1] * squared);
          im -= modulus * Math.sin(alpha[1] * squared);
          winding += turn;
        }
      }
    }
  }
  return { f: [re, im] as Complex, winding };
}

/** Whether some edge passes so near the place that the quadrature above would not resolve it. */
function isNearEdge(ring: Float64Array, px: number, py: number): boolean {
  for (let i = 0; i < ring.length; i += 2) {
    const j = (i + 2) % ring.length;
    const [dx, dy] = [ring[j] - ring[i], ring[j + 1] - ring[i + 1]];
    const t = ((px - ring[i]) * dx + (py - ring[i + 1]) * dy) / (dx * dx + dy * dy);
    const nearest = Math.max(0, Math.min(1, t));
    if (Math.hypot(ring[i] + nearest * dx - px, ring[i + 1] + nearest * dy - py) < UNIT_M / 5) return true;
  }
  return false;
}

describe('polygonClosedForm', () => {
  // K = −2 Re{i S F(u)²}/Re S with Fresnel's F = C + iS: the source stands beside each value.
  it.each(reference.squares)('square on the axis by Fresnel integrals: $id, $sphere, u = $u', (record) => {
    const half = UNIT_M * Number(record.u) * Math.sqrt(Math.PI / 2);
    const { f, winding } = polygonClosedForm([square(half)], spreadCoefficient(KAPPA, 0), 0, 0);
    expect(winding).toBeCloseTo(1, 14);
    expect(closedFormCorrection(forwardOf(record.sphere), f) + 1).toBeCloseTo(Number(record.K), 12);
  });

  it.each(reference.squareRims)('mean of e^{iη} around a square: $id', ({ u, oneMinusMean }) => {
    const half = UNIT_M * Number(u) * Math.sqrt(Math.PI / 2);
    const { f } = polygonClosedForm([square(half)], spreadCoefficient(KAPPA, 0), 0, 0);
    expect(gap([1 - f[0], -f[1]], [Number(oneMinusMean[0]), Number(oneMinusMean[1])])).toBeLessThan(1e-13);
  });

  it('keeps to quadrature of the boundary integral for random polygons, places and spreads', () => {
    const random = randomStream(5);
    let compared = 0;
    let outside = 0;
    while (compared < 30) {
      const ring = randomRing(random);
      const alpha = spreadCoefficient(KAPPA, compared % 3 === 0 ? 0 : UNIT_M * random.uniform());
      const [px, py] = [5 * UNIT_M * random.normal(), 5 * UNIT_M * random.normal()];
      if (isNearEdge(ring, px, py)) continue;
      const expected = byQuadrature([ring], alpha, px, py);
      const found = polygonClosedForm([ring], alpha, px, py);
      expect(gap(found.f, expected.f)).toBeLessThan(1e-12);
      expect(Math.abs(found.winding - expected.winding)).toBeLessThan(1e-12);
      if (Math.abs(expected.winding) < 0.5) outside++;
      compared++;
    }
    // Both cases must have come up.
    expect(outside).toBeGreaterThan(4);
    expect(outside).toBeLessThan(26);
  });

  it('tends to a centred circle: |f| = exp(−2κ²σ²R²/(1 + 4κ²σ⁴)) (design, section 3)', () => {
    const sides = 20_000;
    const radius = 3 * UNIT_M;
    const ring = Float64Array.from({ length: 2 * sides }, (_, i) => {
      const phi = (2 * Math.PI * (i >> 1)) / sides;
      return radius * (i % 2 === 0 ? Math.cos(phi) : Math.sin(phi));
    });
    const spread = 0.4 * UNIT_M;
    const { f } = polygonClosedForm([ring], spreadCoefficient(KAPPA, spread), 0, 0);
    const chirp = 2 * KAPPA * spread * spread;
    const expected = Math.exp((-2 * (KAPPA * spread * radius) ** 2) / (1 + chirp * chirp));
    // A polygon's mean of ρ² is 2π²/3 · (1/sides)² smaller, at a slope of 9.
    expect(Math.hypot(...f)).toBeCloseTo(expected, 6);
  });

  it('is the same for a polygon turned, moved, mirrored, begun elsewhere, cut in two, or with points on its edges', () => {
    const random = randomStream(6);
    const ring = randomRing(random);
    const alpha = spreadCoefficient(KAPPA, 0.2 * UNIT_M);
    const [px, py] = [0.9 * UNIT_M, -0.4 * UNIT_M];
    const { f } = polygonClosedForm([ring], alpha, px, py);
    const same = (rings: Float64Array[], x: number, y: number) =>
      expect(gap(polygonClosedForm(rings, alpha, x, y).f, f)).toBeLessThan(1e-13);
    const [cos, sin] = [Math.cos(1), Math.sin(1)];
    const map = (move: (x: number, y: number) => [number, number]) =>
      Float64Array.from({ length: ring.length }, (_, i) => move(ring[i & ~1], ring[i | 1])[i & 1]);
    same([map((x, y) => [cos * x - sin * y, sin * x + cos * y])], cos * px - sin * py, sin * px + cos * py);
    same([map((x, y) => [x + 2e-4, y - 1e-4])], px + 2e-4, py - 1e-4);
    const mirrored = map((x, y) => [x, -y]);
    const reversed = Float64Array.from(
      mirrored,
      (_, i) => mirrored[mirrored.length - 2 - (i & ~1) + (i & 1)],
    );
    same([reversed], px, -py);
    same([Float64Array.of(...ring.subarray(4), ...ring.subarray(0, 4))], px, py);
    const split = [...ring].flatMap((value, i) =>
      i % 2 === 0
        ? [
            value,
            ring[i + 1],
            (value + ring[(i + 2) % ring.length]) / 2,
            (ring[i + 1] + ring[(i + 3) % ring.length]) / 2,
          ]
        : [],
    );
    same([Float64Array.from(split)], px, py);
    // A repeated point is no edge.
    same([Float64Array.of(...ring, ring[0], ring[1])], px, py);
    const half = (ring.length >> 2) << 1;
    same([ring.slice(0, half + 2), Float64Array.of(...ring.subarray(half), ring[0], ring[1])], px, py);
  });

  it('counts a hole with the opposite sign', () => {
    const alpha = spreadCoefficient(KAPPA, 0);
    const outer = square(5 * UNIT_M);
    const hole = Float64Array.from(square(2 * UNIT_M), (_, i) => square(2 * UNIT_M)[6 - (i & ~1) + (i & 1)]);
    const both = polygonClosedForm([outer, hole], alpha, 1e-5, 2e-5);
    const apart = [square(5 * UNIT_M), square(2 * UNIT_M)].map((ring) =>
      polygonClosedForm([ring], alpha, 1e-5, 2e-5),
    );
    expect(gap(both.f, [apart[0].f[0] - apart[1].f[0], apart[0].f[1] - apart[1].f[1]])).toBeLessThan(1e-14);
    expect(both.winding).toBeCloseTo(0, 14);
  });

  it('passes over edges and vertices without a jump in the correction', () => {
    const alpha = spreadCoefficient(KAPPA, 0.1 * UNIT_M);
    const half = 2.5 * UNIT_M;
    const correction = (px: number, py: number) => {
      const { f, winding } = polygonClosedForm([square(half)], alpha, px, py);
      return closedFormCorrection([1, 0.3], f, winding);
    };
    for (const y of [0, 0.3 * half, half]) {
      const at = correction(half, y);
      for (const step of [1e-6, 1e-9, 1e-12, 1e-15, 1e-19]) {
        for (const sign of [-1, 1]) {
          // Moving by δ changes the reading by the flux density times the edge's length, no more.
          expect(Math.abs(correction(half + sign * step, y) - at)).toBeLessThan(
            3 * KAPPA * half * step + 1e-14,
          );
          expect(Math.abs(correction(half, y + sign * step) - at)).toBeLessThan(
            3 * KAPPA * half * step + 1e-14,
          );
        }
      }
    }
    // The principal value: half the plane on an edge, a quarter on a vertex.
    expect(polygonClosedForm([square(half)], alpha, half, 0.3 * half).winding).toBeCloseTo(0.5, 14);
    expect(polygonClosedForm([square(half)], alpha, half, half).winding).toBeCloseTo(0.25, 14);
  });

  it('keeps its digits up to η = 1e6: a square by 1 − erf(√α b)², here −2i F² with the asymptotic Fresnel integral', () => {
    // DLMF 7.5.3–4 and 7.12.2–3: F = (1 + i)/2 − (f_F i + g_F) e^{iπu²/2}, f_F and g_F to five terms.
    const eta = 1e6;
    const u = Math.sqrt((2 * eta) / Math.PI);
    const z = Math.PI * u * u;
    const fF = (1 - 3 / z ** 2) / (Math.PI * u);
    const gF = (1 - 15 / z ** 2) / (Math.PI * u * z);
    const [cos, sin] = [Math.cos(eta), Math.sin(eta)];
    const C = 0.5 + fF * sin - gF * cos;
    const S = 0.5 - fF * cos - gF * sin;
    const { f } = polygonClosedForm([square(Math.sqrt(eta / KAPPA))], spreadCoefficient(KAPPA, 0), 0, 0);
    expect(gap(f, [1 - 4 * C * S, 2 * (C * C - S * S)])).toBeLessThan(1e-12);
  });

  it('is what the full form tends to at small angles, with offset and spread', () => {
    const particle = { diameterM: 2e-6, index: constantIndex(1.5, 0.1), material: 'test' };
    const light = {
      wavelengthM: 635e-9,
      linewidthM: 0,
      driftM: 0,
      polarizationRad: null,
      irradianceWm2: 1,
      intensityNoisePerHz: 0,
    };
    // The scattered light that is accepted is (xθ)²/8 of the extinction: 100 m away it is 1e-6.
    const distanceM = 100;
    const kappa = Math.PI / (light.wavelengthM * distanceM);
    const unit = 1 / Math.sqrt(kappa);
    const [scenario] = buildScenarios(light, constantIndex(1), [particle], [light.wavelengthM], 0.01, 100);
    const ring = Float64Array.of(2.1, -1.9, 2.5, 1.8, 0.3, 3, -2.4, 1.6, -2.2, -2.3).map(
      (value) => value * unit,
    );
    for (const spread of [0, 0.15 * unit]) {
      const table = buildRadialTable(scenario, distanceM, 8 * unit, spread);
      const nodes = ringNodes(
        [ring],
        { kappa, offsetM: unit, perRadian: 1.5, least: 8 },
        new LegendreRules(),
      );
      for (const [px, py] of [
        [0, 0],
        [0.8 * unit, -0.3 * unit],
        [3 * unit, unit],
      ]) {
        const { f, winding } = polygonClosedForm([ring], spreadCoefficient(kappa, spread), px, py);
        const full = boundaryReading(table, nodes, px, py) / scenario.extinctionM2 - 1;
        const { forward } = scenario.colours[0].sphere;
        expect(Math.abs(closedFormCorrection(forward, f, winding) - full)).toBeLessThan(1e-6);
      }
    }
  });
});

describe('closedFormDensity', () => {
  it('is the reading of a small square over its area, and has its own derivatives', () => {
    const alpha = spreadCoefficient(KAPPA, 0.3 * UNIT_M);
    const forward: Complex = [2, 0.7];
    const [px, py] = [0.3 * UNIT_M, -0.2 * UNIT_M];
    const density = closedFormDensity(forward, alpha, px, py);
    const out = new Float64Array(3);
    const half = 1e-3 * UNIT_M;
    const at = (x: number, y: number) => {
      const ring = square(half).map((value, i) => value + (i % 2 === 0 ? x : y));
      const { f, winding } = polygonClosedForm([ring], alpha, px, py);
      return (closedFormCorrection(forward, f, winding) + 1) / (4 * half * half);
    };
    const [x, y] = [1.1 * UNIT_M, 0.6 * UNIT_M];
    density(x, y, out);
    expect(Math.abs(at(x, y) / out[0] - 1)).toBeLessThan(1e-5);
    const step = 1e-2 * UNIT_M;
    expect(Math.abs((at(x + step, y) - at(x - step, y)) / (2 * step * out[1]) - 1)).toBeLessThan(1e-3);
    expect(Math.abs((at(x, y + step) - at(x, y - step)) / (2 * step * out[2]) - 1)).toBeLessThan(1e-3);
  });
});

function forwardOf(sphere: string): Complex {
  if (sphere === 'real S') return [1, 0];
  const [, n, k = '0'] = /m=([\d.]+)(?:\+([\d.]+)i)?/.exec(sphere) ?? [];
  return forwardAmplitude(mieCoefficients(Number(sphere.split('x=')[1]), [Number(n), Number(k)]));
}
