import { describe, expect, it } from 'vitest';
import { evenNormal } from '../../src/numeric/evenNormal.ts';
import { boundaryReading } from '../../src/reading/boundaryReading.ts';
import { buildRadialTable } from '../../src/reading/radialTable.ts';
import { addSpreadFlux } from '../../src/reading/randomSpread.ts';
import type { Scenario } from '../../src/reading/scenario.ts';
import { plainSpread } from './plainSpread.ts';
import {
  constantScenario,
  discNodes,
  kappaOf,
  polygonNodes,
  ratioOf,
  sphereScenario,
  square,
} from './setup.ts';

describe('addSpreadFlux', () => {
  // Second method: the plane quadrature of plainSpread.ts. Bounds are shares of the forward flux 2|S(0)|/(kz).
  it.each([
    { name: 'a sphere of 2 µm, 10 µm', d: 2e-6, m: [1.59, 0], z: 0.02, spread: 1e-5, eta: 250, bound: 1e-11 },
    { name: 'a sphere of 2 µm, 30 µm', d: 2e-6, m: [1.59, 0], z: 0.02, spread: 3e-5, eta: 100, bound: 1e-11 },
    {
      name: 'a sphere of 2 µm, 100 µm',
      d: 2e-6,
      m: [1.59, 0],
      z: 0.02,
      spread: 1e-4,
      eta: 250,
      bound: 1e-11,
    },
    { name: 'a sphere of 2 µm, 1 nm', d: 2e-6, m: [1.59, 0], z: 0.02, spread: 1e-9, eta: 250, bound: 1e-11 },
    {
      name: 'a faint sphere of 0.1 µm',
      d: 1e-7,
      m: [1.33, 0],
      z: 0.02,
      spread: 1e-5,
      eta: 100,
      bound: 1e-11,
    },
    { name: 'a dark sphere of 40 µm', d: 4e-5, m: [1.5, 0.1], z: 0.02, spread: 3e-5, eta: 40, bound: 1e-9 },
    { name: 'out to 74°', d: 2e-6, m: [1.59, 0], z: 0.002, spread: 2e-7, eta: 6e4, bound: 1e-11 },
    {
      name: 'a spread of a twentieth of the distance',
      d: 2e-6,
      m: [1.59, 0],
      z: 2e-4,
      spread: 1e-5,
      eta: 120,
      bound: 1e-8,
    },
    {
      name: 'a sphere of 100 µm near its near zone',
      d: 1e-4,
      m: [1.59, 0],
      z: 0.03,
      spread: 3e-5,
      eta: 40,
      bound: 1e-7,
    },
  ])('is the plane average: $name', ({ d, m, z, spread, eta, bound }) => {
    const { sphere } = sphereScenario(d, [m[0], m[1]], {}, { halfAngle: 1.35 }).colours[0];
    const count = 8 * eta;
    const stepM2 = eta / count / (sphere.wavenumber / (2 * z));
    const mean = new Float64Array(count);
    const twofold = new Float64Array(count);
    addSpreadFlux(sphere, z, spread, 1, { stepM2, mean, twofold, crossedCount: count });
    const scale = (2 * Math.hypot(...sphere.forward)) / (sphere.wavenumber * z);
    for (const i of [0, 1, 3, 20, 101, count >> 1, count - 1]) {
      const [even, odd] = plainSpread(sphere, z, spread, Math.sqrt(i * stepM2));
      expect(Math.abs(mean[i] - even) / scale).toBeLessThan(bound);
      expect(Math.abs(twofold[i] - odd) / scale).toBeLessThan(bound);
    }
  });

  it('says so where far-zone fields cannot be averaged', () => {
    // ka²/z = 100
    const scenario = sphereScenario(1e-4);
    expect(() => buildRadialTable(scenario, 2.5e-4, 2e-5, 5e-6)).toThrow('too large for its far zone');
  });
});

describe('readings under random motion', () => {
  // design.md, section 3: f = e^{−αR²}, α = −iκ/(1 − 2iκσ²); |f| = exp(−2κ²σ²R²/(1 + 4κ²σ⁴)).
  it.each([0.01, 0.3, 0.7, 2, 30])('a disc has the closed form, 2κσ² = %d', (chirp) => {
    const [wavenumber, distanceM] = [1e7, 1e6];
    const kappa = wavenumber / (2 * distanceM);
    const spread = Math.sqrt(chirp / (2 * kappa));
    for (const eta of [0.3, Math.PI, 12, 40]) {
      const nodes = discNodes(Math.sqrt(eta / kappa), kappa);
      const ratio = (s: readonly [number, number]) =>
        ratioOf(constantScenario(wavenumber, s), distanceM, nodes, [0, 0], spread);
      // −αR² = iη/(1 − i chirp)
      const damping = (-eta * chirp) / (1 + chirp * chirp);
      const turn = eta / (1 + chirp * chirp);
      const re = 1 - ratio([1, 0]);
      const im = ratio([1, 1]) - ratio([1, 0]);
      expect(Math.abs(re - Math.exp(damping) * Math.cos(turn))).toBeLessThan(1e-6);
      expect(Math.abs(im - Math.exp(damping) * Math.sin(turn))).toBeLessThan(2e-6);
      expect(Math.exp(damping)).toBeCloseTo(
        Math.exp((-2 * kappa * eta * spread ** 2) / (1 + 4 * kappa ** 2 * spread ** 4)),
        12,
      );
    }
  });

  /** Mean of the readings of a particle that stays, over a cloud of places: no spread in the tables. */
  function cloudRatio(
    scenario: Scenario,
    distanceM: number,
    nodes: Float64Array,
    [px, py]: readonly [number, number],
    spread: number,
    points: number,
  ): number {
    const table = buildRadialTable(scenario, distanceM, 5e-4 + 10 * spread, 0);
    const cloud = evenNormal(points, 6);
    let sum = 0;
    for (let i = 0; i < points; i++) {
      for (let j = 0; j < points; j++) {
        const [x, y] = [px + spread * cloud.nodes[i], py + spread * cloud.nodes[j]];
        sum += cloud.weights[i] * cloud.weights[j] * boundaryReading(table, nodes, x, y);
      }
    }
    return sum / scenario.extinctionM2;
  }

  const LETTER = [-4, -4, 5, -4, 5, -2, -1, -2, -1, 2, 5, 2, 5, 4, -4, 4].map((value) => value * 5e-5);
  it.each([
    {
      name: 'square, 2 µm',
      d: 2e-6,
      m: [1.59, 0],
      angle: null,
      ring: square(2e-4),
      spread: 1e-5,
      points: 24,
    },
    {
      name: 'square, polarised',
      d: 2e-6,
      m: [1.5, 0.1],
      angle: 0.4,
      ring: square(2e-4, 2e-5),
      spread: 3e-5,
      points: 40,
    },
    { name: 'letter C, polarised', d: 4e-6, m: [1.59, 0], angle: 1, ring: LETTER, spread: 2e-5, points: 40 },
    {
      name: 'faint small sphere',
      d: 1e-7,
      m: [1.33, 0],
      angle: 0.2,
      ring: square(2e-4),
      spread: 2e-5,
      points: 40,
    },
    {
      name: 'cloud as large as the square',
      d: 2e-6,
      m: [1.59, 0],
      angle: null,
      ring: square(1e-4),
      spread: 1e-4,
      points: 110,
    },
  ])('are the mean over a cloud of places: $name', ({ d, m, angle, ring, spread, points }) => {
    const scenario = sphereScenario(d, [m[0], m[1]], { polarizationRad: angle });
    const distanceM = 0.02;
    const place = [1.5e-5, -0.5e-5] as const;
    const nodes = polygonNodes([ring], kappaOf(scenario, distanceM), 2e-5 + 6 * spread);
    const still = ratioOf(scenario, distanceM, nodes, place);
    const moving = ratioOf(scenario, distanceM, nodes, place, spread);
    const cloud = cloudRatio(scenario, distanceM, nodes, place, spread, points);
    expect(Math.abs(moving - cloud)).toBeLessThan(1e-6);
    // The motion must have made a difference for this to mean anything.
    expect(Math.abs(moving - still)).toBeGreaterThan(1e-3);
  });

  it('are those of a particle at rest where the spread goes to 0', () => {
    const scenario = sphereScenario(2e-6, [1.59, 0], { polarizationRad: 0.3 });
    const nodes = polygonNodes([square(4e-4)], kappaOf(scenario, 0.02));
    const still = ratioOf(scenario, 0.02, nodes, [1e-5, 0]);
    for (const spread of [1e-9, 1e-12]) {
      expect(Math.abs(ratioOf(scenario, 0.02, nodes, [1e-5, 0], spread) - still)).toBeLessThan(1e-7);
    }
  });
});
