import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { gaussLegendre } from '../../src/numeric/gaussLegendre.ts';
import { constantIndex } from '../../src/optics/indexModel.ts';
import { forwardAmplitude } from '../../src/optics/mieAmplitudes.ts';
import { mieCoefficients } from '../../src/optics/mieCoefficients.ts';
import { FIELD_NUMBERS, scatteredField } from '../../src/optics/scatteredField.ts';
import { sphereAmplitudes } from '../../src/optics/sphereAmplitudes.ts';
import { exactFluxDensity, exactFluxSampler } from '../../src/reading/exactFluxDensity.ts';
import { fluxDensity } from '../../src/reading/fluxDensity.ts';
import { cartesianField } from '../optics/cartesianField.ts';

type Density = (s: number, out: Float64Array) => void;

const WAVELENGTH_M = 635e-9;
const K = (2 * Math.PI) / WAVELENGTH_M;
const RULE = gaussLegendre(24);

function setUp(diameterM: number, index: number, distanceM: number, radiusM: number) {
  const coefficients = mieCoefficients((K * diameterM) / 2, [index, 0]);
  const particle = { diameterM, index: constantIndex(index), material: '' };
  const halfAngle = Math.atan(radiusM / distanceM) * 1.001;
  const amplitudes = sphereAmplitudes(particle, constantIndex(1), WAVELENGTH_M, halfAngle);
  const work = new Float64Array(4);
  const direct: Density = (s, out) => exactFluxDensity(coefficients, K, distanceM, s, out);
  const sampled: Density = exactFluxSampler(coefficients, K, distanceM, radiusM * radiusM);
  const farZone: Density = (s, out) => fluxDensity(amplitudes, distanceM, s, out, work);
  return { coefficients, extinctionM2: amplitudes.extinctionM2, direct, sampled, farZone };
}

/** Largest difference of two densities over the disc, over the largest value of the second. */
function difference(one: Density, other: Density, radiusM: number): number {
  const a = new Float64Array(4);
  const b = new Float64Array(4);
  let apart = 0;
  let largest = 0;
  for (let i = 0; i <= 60; i++) {
    const s = (radiusM * (i / 60)) ** 2;
    one(s, a);
    other(s, b);
    for (let j = 0; j < 4; j++) {
      apart = Math.max(apart, Math.abs(a[j] - b[j]));
      largest = Math.max(largest, Math.abs(b[j]));
    }
  }
  return apart / largest;
}

/** G(ρ) = ∫₀^ρ w ρ' dρ' of the mean over the field's directions: crossed, scattered. Panels of equal s hold the fringes. */
function cumulative(density: Density, s: number, panels = 40): [crossed: number, scattered: number] {
  const out = new Float64Array(4);
  let crossed = 0;
  let scattered = 0;
  for (let panel = 0; panel < panels; panel++) {
    for (let i = 0; i < RULE.nodes.length; i++) {
      density(((panel + (1 + RULE.nodes[i]) / 2) / panels) * s, out);
      crossed += RULE.weights[i] * out[0];
      scattered += RULE.weights[i] * out[2];
    }
  }
  return [(crossed * s) / (4 * panels), (scattered * s) / (4 * panels)];
}

function discReading(density: Density, radiusM: number): number {
  const [crossed, scattered] = cumulative(density, radiusM * radiusM);
  return 2 * Math.PI * (crossed + scattered);
}

describe('exactFluxDensity', () => {
  it('is the normal flux of the Cartesian E × H* at every azimuth (½ Re E × H*, by components)', () => {
    const distanceM = 8 / K;
    const { coefficients, direct } = setUp(10 / K, 1.5, distanceM, 20 / K);
    const out = new Float64Array(4);
    for (const rho of [0.5, 7, 19]) {
      for (const phi of [0.1, 0.9, 2, 4.4]) {
        const at = [rho * Math.cos(phi), rho * Math.sin(phi), 8];
        const [exRe, exIm, eyRe, eyIm, , , hxRe, hxIm, hyRe, hyIm] = cartesianField(coefficients, at);
        // The incident wave is Ex = Hy = e^{ikz}.
        const crossed = -(exRe + hyRe) * Math.cos(8) - (exIm + hyIm) * Math.sin(8);
        const scattered = -(exRe * hyRe + exIm * hyIm - eyRe * hxRe - eyIm * hxIm);
        direct((rho / K) ** 2, out);
        expect(out[0] + out[1] * Math.cos(2 * phi)).toBeCloseTo(crossed, 13);
        expect(out[2] + out[3] * Math.cos(2 * phi)).toBeCloseTo(scattered, 13);
      }
    }
  });

  it('lets the same flux through a disc and through a cap around the particle with the same rim (Poynting)', () => {
    for (const [size, distance, radius] of [
      [10, 8, 30],
      [100, 80, 90],
      [100, 4000, 900],
    ]) {
      const { coefficients, direct } = setUp(size / K, 1.5, distance / K, radius / K);
      const found = cumulative(direct, (radius / K) ** 2).map((part) => part * K * K);
      const expected = capFlux(coefficients, distance, radius);
      const tolerance = 1e-11 * Math.hypot(...forwardAmplitude(coefficients));
      expect(Math.abs(found[0] - expected[0])).toBeLessThan(tolerance);
      expect(Math.abs(found[1] - expected[1])).toBeLessThan(tolerance);
    }
  });

  it('tends to the far zone: the difference halves with twice the distance, and is near x²/(2kr) (design, section 3)', () => {
    for (const diameterM of [4e-6, 50e-6]) {
      const x = (K * diameterM) / 2;
      const [near, far] = [4000, 8000].map((factor) => {
        const distanceM = (factor * x * x) / K;
        // As far out as the forward lobe goes.
        const radiusM = (distanceM * 4) / x;
        const { direct, farZone } = setUp(diameterM, 1.5, distanceM, radiusM);
        return difference(farZone, direct, radiusM) * factor;
      });
      expect(near / far).toBeGreaterThan(0.98);
      expect(near / far).toBeLessThan(1.02);
      // x²/(2kr) is 1/(2 factor) here; the waves of a lobe have orders up to x, on average x²/2.
      expect(near).toBeGreaterThan(0.15);
      expect(near).toBeLessThan(0.6);
    }
  });

  it('is the far zone to 1e-9 for a small sphere so far away that 1/(kr) is below that', () => {
    const { direct, farZone } = setUp(0.2e-6, 1.5, 1000, 200);
    expect(difference(direct, farZone, 200)).toBeLessThan(1e-9);
    // At 20 mm even a dipole's field has 1/(kr) = 5e-6 of its near part.
    const close = setUp(0.2e-6, 1.5, 0.02, 0.004);
    const apart = difference(close.direct, close.farZone, 0.004) * K * 0.02;
    expect(apart).toBeGreaterThan(0.3);
    expect(apart).toBeLessThan(3);
  });

  it('refuses a detector plane that cuts the sphere', () => {
    const coefficients = mieCoefficients(10, [1.5, 0]);
    const out = new Float64Array(4);
    for (const kz of [10, 3, Number.NaN]) {
      expect(() => exactFluxDensity(coefficients, K, kz / K, 0, out)).toThrow(RimwrightError);
      expect(() => exactFluxSampler(coefficients, K, kz / K, 1e-12)).toThrow(/^distanceM: found .* expected/);
    }
  });
});

describe('exactFluxSampler', () => {
  it('holds the plain formula over narrow and wide cones, near and far', () => {
    for (const [diameterM, distanceM, radiusM] of [
      [0.1e-6, 0.02, 0.02],
      [2e-6, 0.02, 5e-4],
      [50e-6, 0.005, 6e-4],
      [50e-6, 1e-4, 1e-3],
      [400e-6, 0.005, 1e-3],
    ]) {
      const { direct, sampled } = setUp(diameterM, 1.5, distanceM, radiusM);
      expect(difference(sampled, direct, radiusM)).toBeLessThan(3e-12);
    }
  });

  it('gives NaN beyond its cone, and wants one above 0', () => {
    const coefficients = mieCoefficients(10, [1.5, 0]);
    const sampler = exactFluxSampler(coefficients, K, 0.01, 1e-6);
    const out = new Float64Array(4);
    sampler(1e-6, out);
    expect([...out].every(Number.isFinite)).toBe(true);
    sampler(1.001e-6, out);
    expect([...out].every(Number.isNaN)).toBe(true);
    for (const largestS of [0, -1, Number.NaN, Infinity]) {
      expect(() => exactFluxSampler(coefficients, K, 0.01, largestS)).toThrow(/^largestS: found/);
    }
  });
});

describe('a sphere of 50 µm, 5 mm before the detector', () => {
  const distanceM = 0.005;
  const { extinctionM2, direct, sampled, farZone } = setUp(50e-6, 1.5, distanceM, 4e-4);
  /** k(d/2)²/(2z), 0.62 */
  const phase = (K * 25e-6 ** 2) / (2 * distanceM);

  it('reads a triangle around the boundary as over the plane', () => {
    const corners = [
      [280e-6, -60e-6],
      [-90e-6, 210e-6],
      [-150e-6, -220e-6],
    ];
    const { around, across } = triangleReadings(sampled, corners);
    expect(Math.abs(around - across) / extinctionM2).toBeLessThan(1e-10);
    const far = triangleReadings(farZone, corners);
    expect(Math.abs(far.around - far.across) / extinctionM2).toBeLessThan(1e-10);
    expect(Math.abs(around - far.around) / extinctionM2).toBeGreaterThan(0.01);
  });

  it('reads discs by up to half of k(d/2)²/(2z) of the extinction otherwise than the far zone does', () => {
    let largest = 0;
    for (let i = 1; i <= 40; i++) {
      const radiusM = i * 1e-5;
      const exact = discReading(sampled, radiusM) / extinctionM2;
      const far = discReading(farZone, radiusM) / extinctionM2;
      if (i % 20 === 0) expect(discReading(direct, radiusM) / extinctionM2).toBeCloseTo(exact, 11);
      largest = Math.max(largest, Math.abs(exact - far));
    }
    expect(largest / phase).toBeGreaterThan(0.3);
    expect(largest / phase).toBeLessThan(1);
  });
});

/** ∮ G dφ along the edges, and ∬ w dA over the triangles between the axis and the edges. */
function triangleReadings(density: Density, corners: number[][]) {
  const out = new Float64Array(4);
  let around = 0;
  let across = 0;
  corners.forEach(([ax, ay], edge) => {
    const [bx, by] = corners[(edge + 1) % corners.length];
    const twiceArea = ax * by - ay * bx;
    for (let panel = 0; panel < 4; panel++) {
      for (let i = 0; i < RULE.nodes.length; i++) {
        const t = (panel + (1 + RULE.nodes[i]) / 2) / 4;
        const weight = RULE.weights[i] / 8;
        const x = ax + t * (bx - ax);
        const y = ay + t * (by - ay);
        const s = x * x + y * y;
        const [crossed, scattered] = cumulative(density, s);
        around += (weight * (crossed + scattered) * twiceArea) / s;
        for (let inner = 0; inner < 12; inner++) {
          for (let j = 0; j < RULE.nodes.length; j++) {
            const u = (inner + (1 + RULE.nodes[j]) / 2) / 12;
            density(u * u * s, out);
            across += weight * (RULE.weights[j] / 24) * u * twiceArea * (out[0] + out[2]);
          }
        }
      }
    }
  });
  return { around, across };
}

/** k²/(2π) of the flux through the cap of a sphere whose rim is the disc's: crossed, scattered. From E and H along it alone. */
function capFlux(coefficients: ReturnType<typeof mieCoefficients>, kz: number, kRadius: number) {
  const kr = Math.hypot(kz, kRadius);
  const rim = kRadius ** 2 / (kr * (kr + kz));
  const field = new Float64Array(FIELD_NUMBERS);
  let crossed = 0;
  let scattered = 0;
  const panels = 40;
  for (let panel = 0; panel < panels; panel++) {
    for (let i = 0; i < RULE.nodes.length; i++) {
      const versine = ((panel + (1 + RULE.nodes[i]) / 2) / panels) * rim;
      const weight = (RULE.weights[i] * rim) / (2 * panels);
      scatteredField(coefficients, kr, versine, field);
      const [eThetaRe, eThetaIm, ePhiRe, ePhiIm, , , hThetaRe, hThetaIm, hPhiRe, hPhiIm] = field;
      const cos = 1 - versine;
      const re = eThetaRe + hThetaRe + cos * (ePhiRe + hPhiRe);
      const im = eThetaIm + hThetaIm + cos * (ePhiIm + hPhiIm);
      crossed += (weight * kr * (re * Math.sin(kr * versine) + im * Math.cos(kr * versine))) / 2;
      scattered -=
        (weight * (eThetaRe * hPhiRe + eThetaIm * hPhiIm + ePhiRe * hThetaRe + ePhiIm * hThetaIm)) / 2;
    }
  }
  return [crossed, scattered];
}
