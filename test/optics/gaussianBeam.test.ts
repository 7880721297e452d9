import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { gaussLegendre } from '../../src/numeric/gaussLegendre.ts';
import {
  beamField,
  beamPower,
  beamRadius,
  checkBeam,
  gouyPhase,
  rayleighRange,
  wavefrontCurvature,
} from '../../src/optics/gaussianBeam.ts';

const WAVELENGTH_M = 635e-9;
const K = (2 * Math.PI) / WAVELENGTH_M;

/**
 * u at a place off the axis as the sum of the plane waves that a Gaussian waist sends out (Goodman 2005, section 3.10):
 * (w0²/2) ∫ e^{−q²w0²/4} J0(qρ) e^{i(√(k² − q²) − k) z} q dq, with J0 as the mean of cos(qρ cosφ).
 */
function fromPlaneWaves(waistM: number, z: number, rho: number): [re: number, im: number] {
  const reach = 8 / waistM;
  const { nodes, weights } = gaussLegendre(1200);
  let [re, im] = [0, 0];
  for (let i = 0; i < nodes.length; i++) {
    const q = (reach * (1 + nodes[i])) / 2;
    let bessel = 0;
    for (let j = 0; j < 600; j++) bessel += Math.cos(q * rho * Math.cos((Math.PI * (j + 0.5)) / 600)) / 600;
    const phase = (-q * q * z) / (K + Math.sqrt(K * K - q * q));
    const weight = (weights[i] * reach * bessel * q * waistM ** 2 * Math.exp(-((q * waistM) ** 2) / 4)) / 4;
    re += weight * Math.cos(phase);
    im += weight * Math.sin(phase);
  }
  return [re, im];
}

describe('Gaussian beam', () => {
  const beam = { waistM: 20e-6, focusM: 1e-3 };
  const rayleighM = rayleighRange(beam, K);

  it('has the radius, curvature and phase of Kogelnik & Li (1966), eq. 20 to 22', () => {
    expect(rayleighM).toBeCloseTo((Math.PI * 20e-6 ** 2) / WAVELENGTH_M, 12);
    expect(beamRadius(beam, K, 1e-3)).toBe(20e-6);
    expect(beamRadius(beam, K, 1e-3 - rayleighM) / 20e-6).toBeCloseTo(Math.SQRT2, 12);
    expect(wavefrontCurvature(beam, K, 1e-3)).toBe(0);
    expect(wavefrontCurvature(beam, K, 1e-3 + rayleighM) * 2 * rayleighM).toBeCloseTo(1, 12);
    expect(wavefrontCurvature(beam, K, 1e-3 - rayleighM) * 2 * rayleighM).toBeCloseTo(-1, 12);
    expect(gouyPhase(beam, K, 1e-3 + rayleighM)).toBeCloseTo(Math.PI / 4, 12);
  });

  it('is the paraxial Gaussian near its waist (Kogelnik & Li 1966, eq. 27)', () => {
    for (const zeta of [-1.5, -0.4, 0, 0.7, 2]) {
      for (const times of [0, 0.5, 1, 1.5]) {
        const z = 1e-3 + zeta * rayleighM;
        const w = beamRadius(beam, K, z);
        const s = (times * w) ** 2;
        const size = (20e-6 / w) * Math.exp(-s / w ** 2);
        const phase = (K * s * wavefrontCurvature(beam, K, z)) / 2 - gouyPhase(beam, K, z);
        const [re, im] = beamField(beam, K, z, s);
        expect(Math.hypot(re - size * Math.cos(phase), im - size * Math.sin(phase))).toBeLessThan(1e-4);
      }
    }
  });

  it('is the sum of its plane waves far behind a waist of eight wavelengths, where the paraxial phase is wrong', () => {
    const waistM = 8 * WAVELENGTH_M;
    const narrow = { waistM, focusM: 0 };
    const z = 10e-3;
    const w = beamRadius(narrow, K, z);
    for (const times of [0, 0.5, 1, 1.5]) {
      const rho = times * w;
      const [re, im] = beamField(narrow, K, z, rho * rho);
      const [sumRe, sumIm] = fromPlaneWaves(waistM, z, rho);
      const size = waistM / w;
      // (kw0)^−2 is 4e-4.
      expect(Math.hypot(re - sumRe, im - sumIm) / size).toBeLessThan(1e-3);
      const phase = (K * rho * rho * wavefrontCurvature(narrow, K, z)) / 2 - gouyPhase(narrow, K, z);
      const paraxial = size * Math.exp(-times * times);
      const gap = Math.hypot(re - paraxial * Math.cos(phase), im - paraxial * Math.sin(phase)) / size;
      if (times === 1.5) expect(gap).toBeGreaterThan(0.01);
    }
  });

  it('carries the same power through every plane', () => {
    const { nodes, weights } = gaussLegendre(60);
    for (const z of [-4e-3, 1e-3, 9e-3]) {
      const reach = 5 * beamRadius(beam, K, z);
      let power = 0;
      for (let i = 0; i < nodes.length; i++) {
        const rho = (reach * (1 + nodes[i])) / 2;
        const [re, im] = beamField(beam, K, z, rho * rho);
        power += weights[i] * (re * re + im * im) * Math.PI * rho * reach;
      }
      expect(power / ((Math.PI / 2) * 20e-6 ** 2)).toBeCloseTo(1, 3);
      const [re, im] = beamField(beam, K, z, 0);
      expect(beamPower(beam, K, z, re * re + im * im) / power).toBeCloseTo(1, 3);
    }
  });

  it('refuses a waist below five wavelengths or five radii, and says which', () => {
    expect(() => checkBeam({ waistM: 3.2e-6, focusM: 0 }, WAVELENGTH_M, 0.6e-6)).not.toThrow();
    expect(() => checkBeam({ waistM: 3e-6, focusM: 0 }, WAVELENGTH_M, 0.6e-6)).toThrow(RimwrightError);
    expect(() => checkBeam({ waistM: 3e-6, focusM: 0 }, WAVELENGTH_M, 0.6e-6)).toThrow(
      'light.beam.waist: found 3 um, expected at least 3.175 um, five wavelengths in the medium',
    );
    expect(() => checkBeam({ waistM: 20e-6, focusM: 0 }, WAVELENGTH_M, 5e-6)).toThrow(
      'light.beam.waist: found 20 um, expected at least 25 um, five radii of the largest particle',
    );
    expect(() => checkBeam({ waistM: Number.NaN, focusM: 0 }, WAVELENGTH_M, 1e-6)).toThrow(RimwrightError);
    expect(() => checkBeam({ waistM: 1e-3, focusM: Number.NaN }, WAVELENGTH_M, 1e-6)).toThrow(
      'light.beam.focus',
    );
  });
});
