import { describe, expect, it } from 'vitest';
import type { MieCoefficients } from '../../src/optics/mieCoefficients.ts';
import { discNodes, ratioOf, sphereScenario, WAVELENGTH_M } from './setup.ts';
import { tiltedReading } from './tiltedWaves.ts';

const DISTANCE_M = 0.02;
const KAPPA = Math.PI / (WAVELENGTH_M * DISTANCE_M);

describe('a source with an angular size, against the sum of exactly tilted vector waves', () => {
  it.each([
    { d: 2e-6, m: [1.59, 0] as const, eta: 30, a: 1e-3 },
    { d: 2e-6, m: [1.5, 0.1] as const, eta: 30, a: 1e-2 },
    // Small and clear: the crossed flux is many times what counts.
    { d: 3e-7, m: [1.33, 0] as const, eta: 3, a: 3e-3 },
    { d: 2e-6, m: [1.59, 0] as const, eta: 3, a: 3e-2 },
  ])('reads within 1e-5 of the extinction: $d m, η = $eta, $a rad', ({ d, m, eta, a }) => {
    const scenario = { ...sphereScenario(d, m), sourceAngleRad: a };
    const { coefficients, wavenumber } = scenario.colours[0].sphere;
    const radiusM = Math.sqrt(eta / KAPPA);
    const slow = tiltedReading(coefficients as MieCoefficients, wavenumber, DISTANCE_M, radiusM, a);
    const fast = ratioOf(scenario, DISTANCE_M, discNodes(radiusM, 2 * KAPPA));
    expect(Math.abs(fast - slow / scenario.extinctionM2)).toBeLessThan(1e-5);
    // The source must have made a difference.
    const point = ratioOf(sphereScenario(d, m), DISTANCE_M, discNodes(radiusM, 2 * KAPPA));
    expect(Math.abs(fast - point)).toBeGreaterThan(0.05);
  });
});
