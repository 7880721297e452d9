import { describe, expect, it } from 'vitest';
import { constantIndex } from '../../src/optics/indexModel.ts';
import type { Light } from '../../src/optics/light.ts';
import type { Scenario } from '../../src/reading/scenario.ts';
import { buildScenarios, coherence, driftedWavelengths } from '../../src/reading/scenario.ts';
import { discNodes, kappaOf, polygonNodes, ratioOf, sphereScenario, square, WAVELENGTH_M } from './setup.ts';

const DISTANCE_M = 0.02;
const SIGMA_PER_FWHM = 1 / Math.sqrt(8 * Math.LN2);

/** Reading over extinction of a Gaussian line by brute force: one scenario a wavelength, evenly out to two full widths. */
function bruteLine(
  [diameterM, ...index]: Sphere,
  linewidthM: number,
  nodes: Float64Array,
  place: readonly [number, number],
  count: number,
  spread = 0,
): number {
  let [reading, extinction] = [0, 0];
  for (let i = 0; i < count; i++) {
    const off = 2 * linewidthM * ((2 * i) / (count - 1) - 1);
    const weight = Math.exp(-((off / (linewidthM * SIGMA_PER_FWHM)) ** 2) / 2);
    const scenario = sphereScenario(diameterM, index, { wavelengthM: WAVELENGTH_M + off });
    reading += weight * scenario.extinctionM2 * ratioOf(scenario, DISTANCE_M, nodes, place, spread);
    extinction += weight * scenario.extinctionM2;
  }
  return reading / extinction;
}

/** Diameter and index. */
type Sphere = [diameterM: number, n: number, k: number];
const CLEAR: Sphere = [2e-6, 1.59, 0];
/** Without resonances: the phase at the rim alone decides. */
const DARK: Sphere = [2e-6, 1.5, 0.1];

describe('the colours of a line', () => {
  it.each([
    { linewidthNm: 0.5, eta: 200, sphere: CLEAR, count: 40, bound: 2e-6 },
    { linewidthNm: 1, eta: 1000, sphere: CLEAR, count: 40, bound: 2e-6 },
    { linewidthNm: 3, eta: 700, sphere: CLEAR, count: 40, bound: 2e-6 },
    { linewidthNm: 10, eta: 300, sphere: DARK, count: 40, bound: 5e-6 },
    // Sixty Gauss–Hermite nodes come back into step where σ η/λ nears 15.5.
    { linewidthNm: 50, eta: 464, sphere: DARK, count: 60, bound: 1e-5 },
    { linewidthNm: 10, eta: 30, sphere: CLEAR, count: 100, bound: 2e-5 },
  ])('read as the mean over its wavelengths: $linewidthNm nm at η = $eta, sphere $sphere', (one) => {
    const { eta, sphere, count, bound } = one;
    const linewidthM = one.linewidthNm * 1e-9;
    const [diameterM, ...index] = sphere;
    const scenario = sphereScenario(diameterM, index, { linewidthM }, { largestPhase: eta });
    const kappa = kappaOf(scenario, DISTANCE_M);
    const radiusM = Math.sqrt(eta / kappa);
    const place = [1e-5, 0] as const;
    for (const nodes of [
      discNodes(radiusM, kappa, 0, 0, 1e-5),
      polygonNodes([square(radiusM * 0.7)], kappa, 1e-5),
    ]) {
      const slow = bruteLine(sphere, linewidthM, nodes, place, count);
      expect(Math.abs(ratioOf(scenario, DISTANCE_M, nodes, place) - slow)).toBeLessThan(bound);
    }
  });

  it('go with random motion: a spread below and above a Fresnel zone, a wide line', () => {
    const linewidthM = 50e-9;
    const [diameterM, ...index] = DARK;
    const scenario = sphereScenario(diameterM, index, { linewidthM }, { largestPhase: 200 });
    const kappa = kappaOf(scenario, DISTANCE_M);
    const nodes = discNodes(Math.sqrt(200 / kappa), kappa);
    for (const spread of [2e-6, 2e-4]) {
      const slow = bruteLine(DARK, linewidthM, nodes, [0, 0], 40, spread);

      expect(Math.abs(ratioOf(scenario, DISTANCE_M, nodes, [0, 0], spread) - slow)).toBeLessThan(1e-5);
    }
  });

  it('are a single one for a single colour, and for any line at most 21, or 96 where a large sphere may resonate', () => {
    expect(sphereScenario(2e-6).colours).toHaveLength(1);
    expect(coherence(sphereScenario(2e-6)).pathM).toBe(Number.POSITIVE_INFINITY);
    for (const linewidthM of [1e-12, 1e-9, 1e-8, 1e-7]) {
      for (const largestPhase of [1, 100, 1e4]) {
        const [small, large] = [1e-7, 1e-5].map(
          (diameterM) => sphereScenario(diameterM, [1.59, 0], { linewidthM }, { largestPhase }).colours,
        );
        expect(small.length).toBeLessThanOrEqual(21);
        expect(large.length).toBeLessThanOrEqual(96);
        expect(large.reduce((sum, { weight }) => sum + weight, 0)).toBeCloseTo(1, 14);
      }
    }
  });
});

describe('buildScenarios', () => {
  const light: Light = {
    wavelengthM: WAVELENGTH_M,
    linewidthM: 0,
    driftM: 2e-9,
    polarizationRad: 0.3,
    irradianceWm2: 1,
    intensityNoisePerHz: 0,
  };

  it('pairs every particle with every wavelength, particles first', () => {
    const particles = [1e-6, 2e-6].map((diameterM) => ({
      diameterM,
      index: constantIndex(1.59),
      material: 'test',
    }));
    const wavelengths = driftedWavelengths(light);
    const scenarios = buildScenarios(light, constantIndex(1), particles, wavelengths, 0.2, 100);
    const pairs = scenarios.map(({ particle, wavelengthM }: Scenario) => [particle.diameterM, wavelengthM]);
    expect(pairs).toEqual(
      particles.flatMap(({ diameterM }) => wavelengths.map((wavelength) => [diameterM, wavelength])),
    );
    expect(scenarios.every(({ polarizationRad }) => polarizationRad === 0.3)).toBe(true);
  });

  it('knows the drift by its ends and its middle', () => {
    const found = driftedWavelengths(light);
    [633e-9, 635e-9, 637e-9].forEach((wavelength, i) => {
      expect(found[i]).toBeCloseTo(wavelength, 18);
    });
    expect(driftedWavelengths({ ...light, driftM: 0 })).toEqual([WAVELENGTH_M]);
    expect(driftedWavelengths(light, 5)).toHaveLength(5);
  });
});
