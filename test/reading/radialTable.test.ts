import { describe, expect, it } from 'vitest';
import { gaussLegendre } from '../../src/numeric/gaussLegendre.ts';
import { fluxDensity } from '../../src/reading/fluxDensity.ts';
import type { RadialTable } from '../../src/reading/radialTable.ts';
import { buildRadialTable } from '../../src/reading/radialTable.ts';
import type { Scenario } from '../../src/reading/scenario.ts';
import { TableShelf } from '../../src/reading/tableShelf.ts';
import { constantScenario, kappaOf, sphereScenario } from './setup.ts';

/** G(ρ) and its twofold part as the table holds them. */
function tabled({ mean, twofold, cellsPerM2 }: RadialTable, s: number): [number, number] {
  const cell = Math.floor(s * cellsPerM2);
  const t = s * cellsPerM2 - cell;
  const piece = (pieces: Float64Array) => {
    const [a, b, c, d] = pieces.subarray(4 * cell, 4 * cell + 4);
    return a + t * (b + t * (c + t * d));
  };
  return [piece(mean) * s, twofold === null ? 0 : piece(twofold) * s * s];
}

/** ∫ w ρ' dρ' up to each radius, by Gauss–Legendre in s, straight from the flux density. */
function direct(scenario: Scenario, distanceM: number, ends: readonly number[]): [number, number][] {
  const { nodes, weights } = gaussLegendre(24);
  const kappa = kappaOf(scenario, distanceM);
  const out = new Float64Array(4);
  const work = new Float64Array(4);
  let [mean, twofold, from] = [0, 0, 0];
  return ends.map((end) => {
    const pieces = Math.ceil((kappa * (end - from)) / 4);
    const half = (end - from) / pieces / 2;
    for (let p = 0; p < pieces; p++) {
      for (let i = 0; i < nodes.length; i++) {
        const s = from + (2 * p + 1 + nodes[i]) * half;
        for (const { weight, sphere } of scenario.colours) {
          fluxDensity(sphere, distanceM, s, out, work);
          mean += weight * weights[i] * half * 0.5 * (out[0] + out[2]);
          twofold += weight * weights[i] * half * 0.5 * (out[1] + out[3]);
        }
      }
    }
    from = end;
    return [mean, twofold];
  });
}

describe('buildRadialTable', () => {
  // Bounds over the extinction, of what a disc would read: 2π ΔG, and π ΔG for the twofold part.
  it.each([
    { name: '1 µm', d: 1e-6, m: [1.59, 0], z: 0.02, eta: 300, bound: 1e-6 },
    { name: '4 µm', d: 4e-6, m: [1.59, 0], z: 0.02, eta: 1000, bound: 1e-6 },
    { name: '10 µm, dark', d: 1e-5, m: [1.5, 0.1], z: 0.05, eta: 300, bound: 1e-6 },
    // |S|/Re S = 63 (design.md, section 3) and 500: the steps are finer.
    { name: 'x = 0.5, index 1.33', d: 1.0106e-7, m: [1.33, 0], z: 0.02, eta: 300, bound: 2e-6 },
    { name: 'x = 0.25, index 1.33', d: 5.05e-8, m: [1.33, 0], z: 0.02, eta: 100, bound: 4e-6 },
    { name: 'out to 70°', d: 2e-6, m: [1.59, 0], z: 1e-3, eta: 4e4, bound: 1e-6 },
    { name: '50 µm at 20 mm', d: 5e-5, m: [1.59, 0], z: 0.02, eta: 300, bound: 2e-6 },
  ])('agrees with direct integration: $name', ({ d, m, z, eta, bound }) => {
    const scenario = sphereScenario(d, [m[0], m[1]], { polarizationRad: 0 }, { halfAngle: 1.3 });
    const largest = eta / kappaOf(scenario, z);
    const table = buildRadialTable(scenario, z, Math.sqrt(largest), 0);
    // Places within cells, dense near the axis.
    const ends = Array.from({ length: 60 }, (_, i) => largest * ((i + 0.63) / 60) ** 3);
    const exact = direct(scenario, z, ends);
    ends.forEach((s, i) => {
      const [mean, twofold] = tabled(table, s);
      expect((2 * Math.PI * Math.abs(mean - exact[i][0])) / scenario.extinctionM2).toBeLessThan(bound);
      expect((Math.PI * Math.abs(twofold - exact[i][1])) / scenario.extinctionM2).toBeLessThan(bound);
    });
  });

  it('errs like the fourth power of its step', () => {
    const scenario = constantScenario(1e7, [1, 0.5]);
    // Steps follow |S|/Re S: S with 16 times that ratio has half the step.
    const errors = [1, 16].map((ratio) => {
      const own = constantScenario(1e7, [1, Math.sqrt(ratio ** 2 - 1)]);
      const table = buildRadialTable(own, 1e6, Math.sqrt(40 / 5), 0);
      const ends = Array.from({ length: 40 }, (_, i) => 1 + 0.1234 * i);
      const exact = direct(own, 1e6, ends);
      const worst = Math.max(...ends.map((s, i) => Math.abs(tabled(table, s)[0] - exact[i][0])));
      return { worst: worst / own.extinctionM2, cells: table.cellsPerM2 };
    });
    expect(errors[1].cells / errors[0].cells).toBeCloseTo(2, 2);
    // Sixteen times the amplitude over sixteen times the accuracy: the same share of the extinction.
    expect(errors[1].worst / errors[0].worst).toBeGreaterThan(0.3);
    expect(errors[1].worst / errors[0].worst).toBeLessThan(3);
    expect(scenario.colours).toHaveLength(1);
  });

  it('reaches a little past the radius asked for', () => {
    const scenario = sphereScenario(2e-6);
    for (const radiusM of [1e-9, 1e-5, 1e-4, 1.234e-3]) {
      const { cells, cellsPerM2, mean } = buildRadialTable(scenario, 0.02, radiusM, 0);
      expect(cells / cellsPerM2).toBeGreaterThan(radiusM ** 2);
      expect(mean).toHaveLength(4 * cells);
      expect(mean.every(Number.isFinite)).toBe(true);
    }
  });

  it('has no twofold part without polarisation, and one of 0 for an amplitude that is the same all round', () => {
    expect(buildRadialTable(sphereScenario(2e-6), 0.02, 1e-4, 0).twofold).toBeNull();
    const { twofold } = buildRadialTable(constantScenario(1e7, [1, 0], 0.4), 0.02, 1e-4, 0);
    expect(twofold?.every((value) => value === 0)).toBe(true);
  });

  it('refuses to reach outside the cone that the sphere is solved for', () => {
    const scenario = sphereScenario(2e-6, [1.59, 0], {}, { halfAngle: 0.1 });
    const edge = 0.02 * Math.tan(0.1);
    expect(() => buildRadialTable(scenario, 0.02, edge, 0)).not.toThrow();
    expect(() => buildRadialTable(scenario, 0.02, edge * 1.01, 0)).toThrow('half-angle of 5.786 deg');
    expect(() => buildRadialTable(scenario, 0.02, edge * 0.9, edge * 0.01)).not.toThrow();
    expect(() => buildRadialTable(scenario, 0.02, edge * 0.9, edge * 0.02)).toThrow('random motion together');
  });
});

describe('TableShelf', () => {
  it('gives the same tables again, and larger ones when a larger radius is asked for', () => {
    const shelf = new TableShelf([sphereScenario(1e-6), sphereScenario(2e-6)], [0, 0]);
    const first = shelf.tables(0.02, 1e-4);
    expect(first).toHaveLength(2);
    // Reaches come in steps of 1.3, whatever was asked for before.
    expect(shelf.tables(0.02, 1.01e-4)).toBe(first);
    expect(shelf.tables(0.03, 1e-4)).not.toBe(first);
    const larger = shelf.tables(0.02, 3e-4);
    expect(larger[0].cells / larger[0].cellsPerM2).toBeGreaterThan(9e-8);
    expect(shelf.tables(0.02, 1e-4)).toBe(first);
  });

  it('hands what it has built to a shelf in another thread, in memory that both share', () => {
    const scenarios = [sphereScenario(1e-6), sphereScenario(2e-6)];
    const [builder, other] = [new TableShelf(scenarios, [0, 0]), new TableShelf(scenarios, [0, 0])];
    const plain = builder.tables(0.02, 1e-4);
    expect(builder.fresh()).toEqual([]);
    const built = builder.tables(0.03, 1e-4);
    const fresh = builder.fresh();
    expect(fresh).toHaveLength(1);
    expect(builder.fresh()).toEqual([]);
    // As a message between threads does.
    for (const tables of fresh) other.take(structuredClone(tables));
    const taken = other.tables(0.03, 1e-4);
    expect(taken).toEqual(new TableShelf(scenarios, [0, 0]).tables(0.03, 1e-4));
    expect(taken[0].mean.buffer).toBeInstanceOf(SharedArrayBuffer);
    taken[0].mean[0] += 1;
    expect(built[0].mean[0]).toBe(taken[0].mean[0]);
    expect(plain[0].mean.buffer).toBeInstanceOf(ArrayBuffer);
    expect(other.fresh()).toEqual([]);
  });
});
