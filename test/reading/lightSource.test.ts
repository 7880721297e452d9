import { describe, expect, it } from 'vitest';
import { gaussLegendre } from '../../src/numeric/gaussLegendre.ts';
import { constantIndex } from '../../src/optics/indexModel.ts';
import type { FurtherLine, Light } from '../../src/optics/light.ts';
import type { Sphere } from '../../src/optics/particle.ts';
import { sphereAmplitudes } from '../../src/optics/sphereAmplitudes.ts';
import { boundaryReading } from '../../src/reading/boundaryReading.ts';
import { buildRadialTable } from '../../src/reading/radialTable.ts';
import { discMeans } from '../../src/reading/sourceDisc.ts';
import {
  constantScenario,
  discNodes,
  polygonNodes,
  ratioOf,
  sphereScenario,
  square,
  WAVELENGTH_M,
} from './setup.ts';

const DISTANCE_M = 0.02;
const KAPPA = Math.PI / (WAVELENGTH_M * DISTANCE_M);

type Ball = { d: number; m: readonly [number, number] };
const CLEAR: Ball = { d: 2e-6, m: [1.59, 0] };
const DARK: Ball = { d: 2e-6, m: [1.5, 0.1] };
const SMALL: Ball = { d: 5e-7, m: [1.45, 0] };

/** Reading and extinction of one colour, m². */
function oneColour({ d, m }: Ball, wavelengthM: number, nodes: Float64Array): [number, number] {
  const scenario = sphereScenario(d, m, { wavelengthM });
  return [scenario.extinctionM2 * ratioOf(scenario, DISTANCE_M, nodes, [1e-5, 0]), scenario.extinctionM2];
}

/** By brute force: one scenario a wavelength, evenly (midpoints) out to `reach` full widths. */
function bruteLine(
  sphere: Ball,
  { wavelengthM, linewidthM }: Omit<FurtherLine, 'share'>,
  profile: (fwhms: number) => number,
  reach: number,
  nodes: Float64Array,
  count: number,
): [number, number] {
  let [reading, extinction, total] = [0, 0, 0];
  for (let i = 0; i < count; i++) {
    const off = reach * ((2 * i + 1) / count - 1);
    const weight = profile(off);
    const [one, its] = oneColour(sphere, wavelengthM + off * linewidthM, nodes);
    reading += weight * one;
    extinction += weight * its;
    total += weight;
  }
  return [reading / total, extinction / total];
}

const gaussian = (fwhms: number) => 2 ** -((2 * fwhms) ** 2);
/** As `lorentzianRule` documents it: fading from five to ten full widths. */
const lorentzian = (fwhms: number) =>
  Math.cos((Math.PI / 2) * Math.max(0, Math.abs(fwhms) / 5 - 1)) ** 2 / (1 + (2 * fwhms) ** 2);

describe('an LED of tens of nanometres', () => {
  it.each([
    { nm: 30, sphere: CLEAR },
    { nm: 30, sphere: DARK },
    { nm: 60, sphere: SMALL },
  ])('reads as the mean over its wavelengths up to η = 100: $nm nm, $sphere', ({ nm, sphere }) => {
    const linewidthM = nm * 1e-9;
    const scenario = sphereScenario(sphere.d, sphere.m, { linewidthM }, { largestPhase: 100 });
    for (const eta of [3, 10, 30, 100]) {
      const nodes = discNodes(Math.sqrt(eta / KAPPA), 2 * KAPPA, 0, 0, 1e-5);
      const line = { wavelengthM: WAVELENGTH_M, linewidthM };
      const [reading, extinction] = bruteLine(sphere, line, gaussian, 2, nodes, 300);
      const fast = ratioOf(scenario, DISTANCE_M, nodes, [1e-5, 0]);
      expect(Math.abs(fast - reading / extinction)).toBeLessThan(1e-5);
    }
  });
});

describe('the narrow resonances of a clear sphere within a band', () => {
  it.each([
    { d: 4e-6, shape: 'gaussian' as const, nm: 30, profile: gaussian, reach: 2 },
    { d: 4e-6, shape: 'lorentzian' as const, nm: 10, profile: lorentzian, reach: 10 },
  ])('read and extinguish as the mean over 12000 colours: $shape', ({ d, shape, nm, profile, reach }) => {
    const linewidthM = nm * 1e-9;
    const scenario = sphereScenario(d, [1.59, 0], { linewidthM, shape }, { largestPhase: 100 });
    const one = sphereScenario(d);
    const count = 12_000;
    const shares = Array.from({ length: count }, (_, i) => reach * ((2 * i + 1) / count - 1));
    const total = shares.reduce((sum, off) => sum + profile(off), 0);
    const colours = shares.map((off) => ({
      weight: profile(off) / total,
      sphere: sphereAmplitudes(
        one.particle as Sphere,
        constantIndex(1),
        WAVELENGTH_M + off * linewidthM,
        0.05,
      ),
    }));
    const extinctionM2 = colours.reduce((sum, { weight, sphere }) => sum + weight * sphere.extinctionM2, 0);
    expect(Math.abs(scenario.extinctionM2 / extinctionM2 - 1)).toBeLessThan(2e-5);
    const brute = { ...one, colours, extinctionM2 };
    const radii = [3, 10, 30].map((eta) => Math.sqrt(eta / KAPPA));
    const tables = [scenario, brute].map((each) => buildRadialTable(each, DISTANCE_M, radii[2] + 2e-5, 0));
    for (const radiusM of radii) {
      const nodes = discNodes(radiusM, 2 * KAPPA, 0, 0, 1e-5);
      const [fast, slow] = [scenario, brute].map(
        (each, i) => boundaryReading(tables[i], nodes, 1e-5, 0) / each.extinctionM2,
      );
      expect(Math.abs(fast - slow)).toBeLessThan(8e-6);
    }
    expect(scenario.colours.length).toBeLessThan(90);
  });
});

describe('a Lorentzian line', () => {
  it.each([
    { nm: 0.1, eta: 100, sphere: CLEAR },
    { nm: 1, eta: 40, sphere: CLEAR },
    { nm: 1, eta: 1000, sphere: DARK },
    { nm: 10, eta: 30, sphere: DARK },
    { nm: 20, eta: 300, sphere: SMALL },
  ])('reads as the mean over its wavelengths: $nm nm at η = $eta, $sphere', ({ nm, eta, sphere }) => {
    const light: Partial<Light> = { linewidthM: nm * 1e-9, shape: 'lorentzian' };
    const scenario = sphereScenario(sphere.d, sphere.m, light, { largestPhase: eta });
    const nodes = discNodes(Math.sqrt(eta / KAPPA), 2 * KAPPA, 0, 0, 1e-5);
    const line = { wavelengthM: WAVELENGTH_M, linewidthM: nm * 1e-9 };
    const [reading, extinction] = bruteLine(sphere, line, lorentzian, 10, nodes, 500);
    expect(Math.abs(ratioOf(scenario, DISTANCE_M, nodes, [1e-5, 0]) - reading / extinction)).toBeLessThan(
      1e-5,
    );
  });

  it('fades as e^−(phase over a half width), where a Gaussian of that width has long gone', () => {
    const linewidthM = 4e-9;
    const swings = (eta: number, shape: 'gaussian' | 'lorentzian') => {
      const scenario = sphereScenario(1e-6, [1.5, 0.1], { linewidthM, shape }, { largestPhase: 2000 });
      const ratios = [0, 0.25, 0.5, 0.75].map((turn) =>
        ratioOf(scenario, DISTANCE_M, discNodes(Math.sqrt((eta + 2 * Math.PI * turn) / KAPPA), KAPPA)),
      );
      return Math.hypot(ratios[0] - ratios[2], ratios[1] - ratios[3]);
    };
    // From η to 2η the swing falls by η · Δλ/(2λ) in its logarithm.
    const fall = Math.log(swings(400, 'lorentzian') / swings(800, 'lorentzian'));
    expect(fall).toBeCloseTo((400 * linewidthM) / (2 * WAVELENGTH_M), 1);
    expect(swings(1600, 'gaussian')).toBeLessThan(0.05 * swings(1600, 'lorentzian'));
  });

  it('has at most 161 colours, or a few dozen where the phase is small', () => {
    const count = (linewidthM: number, largestPhase: number) =>
      sphereScenario(1e-6, [1.5, 0.1], { linewidthM, shape: 'lorentzian' }, { largestPhase }).colours.length;
    expect(count(1e-9, 1e6)).toBeLessThanOrEqual(161);
    expect(count(1e-11, 100)).toBeLessThanOrEqual(32);
  });
});

describe('several lines', () => {
  it('read and extinguish as the sum of their shares, each with its own width', () => {
    const also = [{ wavelengthM: 488e-9, linewidthM: 5e-9, share: 0.4 }];
    const light = { linewidthM: 1e-9, also };
    const scenario = sphereScenario(CLEAR.d, CLEAR.m, light, { largestPhase: 200 });
    const nodes = polygonNodes([square(4e-4)], 2 * KAPPA, 1e-5);
    const main = bruteLine(CLEAR, { wavelengthM: WAVELENGTH_M, linewidthM: 1e-9 }, gaussian, 2, nodes, 60);
    const second = bruteLine(CLEAR, also[0], gaussian, 2, nodes, 120);
    const extinction = 0.6 * main[1] + 0.4 * second[1];
    expect(Math.abs(scenario.extinctionM2 / extinction - 1)).toBeLessThan(1e-5);
    const slow = (0.6 * main[0] + 0.4 * second[0]) / extinction;
    expect(Math.abs(ratioOf(scenario, DISTANCE_M, nodes, [1e-5, 0]) - slow)).toBeLessThan(1e-5);
  });

  it('of one colour each are that many colours, and never fade', () => {
    const also = [{ wavelengthM: 488e-9, linewidthM: 0, share: 0.25 }];
    const { colours } = sphereScenario(2e-6, [1.59, 0], { also });
    expect(colours.map(({ weight, fading }) => [weight, fading?.pathM])).toEqual([
      [0.75, Infinity],
      [0.25, Infinity],
    ]);
  });
});

describe('a source with an angular size', () => {
  const LETTER = [-4, -4, 5, -4, 5, -2, -1, -2, -1, 2, 5, 2, 5, 4, -4, 4].map((value) => value * 5e-5);
  it.each([
    { name: 'small', a: 1e-4, spread: 0, angle: null, linewidthM: 0 },
    { name: 'of 2 mrad', a: 2e-3, spread: 0, angle: null, linewidthM: 0 },
    { name: 'in polarised light', a: 5e-3, spread: 0, angle: 0.4, linewidthM: 0 },
    { name: 'wide', a: 0.02, spread: 0, angle: 0.4, linewidthM: 0 },
    { name: 'with random motion', a: 2e-3, spread: 2e-5, angle: 1, linewidthM: 0 },
    { name: 'an LED', a: 2e-3, spread: 0, angle: null, linewidthM: 30e-9 },
  ])('reads as the mean over a disc of places: $name', ({ a, spread, angle, linewidthM }) => {
    const light = { polarizationRad: angle, linewidthM };
    const point = sphereScenario(4e-6, [1.5, 0.1], light, { largestPhase: 300 });
    const wide = { ...point, sourceAngleRad: a };
    const discM = DISTANCE_M * Math.tan(a);
    const nodes = polygonNodes([LETTER], 1.1 * KAPPA, 2e-5 + discM);
    const table = buildRadialTable(point, DISTANCE_M, 4e-4 + discM, spread);
    const radial = gaussLegendre(a > 0.01 ? 40 : 20);
    const around = a > 0.01 ? 160 : 40;
    let slow = 0;
    radial.nodes.forEach((node, i) => {
      const share = (node + 1) / 2;
      for (let j = 0; j < around; j++) {
        const phi = (2 * Math.PI * (j + 0.3)) / around;
        const [x, y] = [Math.cos(phi), Math.sin(phi)].map((value) => discM * Math.sqrt(share) * value);
        slow += ((radial.weights[i] / 2) * boundaryReading(table, nodes, x + 1.5e-5, y - 5e-6)) / around;
      }
    });
    const fast = ratioOf(wide, DISTANCE_M, nodes, [1.5e-5, -5e-6], spread);
    // Places are the paraxial form of directions: see the tests against tilted waves for the exact one.
    expect(Math.abs(fast - slow / point.extinctionM2)).toBeLessThan(a > 0.01 ? 1e-3 : 2e-4);
    const still = ratioOf(point, DISTANCE_M, nodes, [1.5e-5, -5e-6], spread);
    // It must have made a difference for this to mean anything.
    expect(Math.abs(fast - still)).toBeGreaterThan(a > 1e-3 ? 1e-3 : 1e-5);
  });

  /** Samples of `discMeans` for a constant amplitude, at some distances from the axis. */
  function constantMeans(a: number, radiusM: number, every: number) {
    const scenario = constantScenario((2 * Math.PI) / WAVELENGTH_M, [1, 0]);
    const discM = DISTANCE_M * Math.tan(a);
    const stepM2 = 1 / (8 * KAPPA);
    const count = Math.floor(radiusM ** 2 / stepM2);
    const table = buildRadialTable(scenario, DISTANCE_M, radiusM + discM + 1e-6, 0);
    const { mean } = discMeans(table, discM, KAPPA, stepM2, count);
    // Over the flux 2|S|/(kz) on the axis.
    const unit = (2e-6 * WAVELENGTH_M) / (2 * Math.PI * DISTANCE_M);
    const places = Array.from({ length: Math.floor(count / every) }, (_, i) => i * every);
    return places.map((i) => ({ rho: Math.sqrt(i * stepM2), flux: mean[i] / unit }));
  }

  it('fades as 2J₁(u)/u, u = 2κρ z a (van Cittert and Zernike), where κ(za)² is small', () => {
    const a = 4e-4;
    for (const { rho, flux } of constantMeans(a, 1.2e-3, 97)) {
      const u = 2 * KAPPA * rho * DISTANCE_M * a;
      const phase = ((2 * Math.PI) / WAVELENGTH_M) * (Math.hypot(rho, DISTANCE_M) - DISTANCE_M);
      expect(Math.abs(flux - jinc(u) * Math.sin(phase))).toBeLessThan(0.01);
    }
  });

  it('reads as the sum over exactly tilted waves, to 2e-4 of the flux on the axis at 2 mrad', () => {
    const a = 2e-3;
    const k = (2 * Math.PI) / WAVELENGTH_M;
    const { nodes, weights } = gaussLegendre(24);
    const around = 96;
    for (const { rho, flux } of constantMeans(a, 3e-4, 23)) {
      let sum = 0;
      const r = Math.hypot(rho, DISTANCE_M);
      nodes.forEach((node, i) => {
        const sine = Math.sin(a) * Math.sqrt((node + 1) / 2);
        const cosine = Math.sqrt(1 - sine * sine);
        for (let j = 0; j < around; j++) {
          const along = sine * Math.cos((2 * Math.PI * (j + 0.5)) / around);
          const path = r - rho * along - DISTANCE_M * cosine;
          // Normal flux of the crossed Poynting vectors of two nearly parallel waves.
          const normal = (cosine + DISTANCE_M / r) / 2;
          sum += ((weights[i] / 2 / around) * normal * Math.sin(k * path) * DISTANCE_M) / r;
        }
      });
      expect(Math.abs(flux - sum)).toBeLessThan(2e-4);
    }
  });
});

/** 2J₁(u)/u by Bessel's integral (Abramowitz & Stegun 9.1.20 with ν = 1). */
function jinc(u: number): number {
  const count = 400;
  let sum = 0;
  for (let i = 0; i < count; i++) {
    const t = (Math.PI * (i + 0.5)) / count;
    sum += Math.cos(u * Math.cos(t)) * Math.sin(t) ** 2;
  }
  return (2 * sum) / count;
}
