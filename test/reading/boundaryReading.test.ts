import { describe, expect, it } from 'vitest';
import { mieCoefficients } from '../../src/optics/mieCoefficients.ts';
import { boundaryReading } from '../../src/reading/boundaryReading.ts';
import { buildRadialTable } from '../../src/reading/radialTable.ts';
import type { Region } from './poyntingQuadrature.ts';
import { extinction, poyntingReading } from './poyntingQuadrature.ts';
import { discNodes, kappaOf, polygonNodes, ratioOf, sphereScenario, square, WAVELENGTH_M } from './setup.ts';

const K = (2 * Math.PI) / WAVELENGTH_M;
/** Of the extinction: what `buildRadialTable` promises. Errors below 1e-7 have been seen in all cases. */
const TOLERANCE = 5e-7;

type Place = readonly [number, number];
interface Case {
  name: string;
  /** Size parameter, index. */
  x: number;
  m: readonly [number, number];
  /** z, metres. */
  z: number;
  /** Lengths below are in units of the radius at which η = 1: √(2z/k). */
  region: (unit: number) => Region;
  place?: Place;
  polarizationRad?: number;
}

const POLYSTYRENE = [1.59, 0] as const;
const DARK = [1.5, 0.1] as const;
const FAINT = [1.33, 0] as const;

const disc =
  (radius: number, x = 0, y = 0) =>
  (u: number): Region => ({
    disc: { radiusM: radius * u, x: x * u, y: y * u },
  });
const rings =
  (...all: number[][]) =>
  (u: number): Region => ({
    rings: all.map((ring) => ring.map((value) => value * u)),
  });
const reversed = (ring: number[]) => {
  const points = [];
  for (let i = ring.length - 2; i >= 0; i -= 2) points.push(ring[i], ring[i + 1]);
  return points;
};
/** A letter C: no point sees all of its edge. */
const LETTER = [-4, -4, 5, -4, 5, -2, -1, -2, -1, 2, 5, 2, 5, 4, -4, 4];
/** A four-pointed star, turned so that it has no mirror line along an axis. */
const STAR = [6, 1, 1, 1.6, -1, 5.5, -1.4, 0.8, -5, -1, -1.2, -1.3, 0.8, -6, 1.5, -1];

const CASES: Case[] = [
  { name: 'disc on the axis, η = 1000', x: 10, m: POLYSTYRENE, z: 0.02, region: disc(Math.sqrt(1000)) },
  {
    name: 'disc, particle aside',
    x: 10,
    m: DARK,
    z: 0.02,
    region: disc(12),
    place: [3, 2],
    polarizationRad: 0,
  },
  {
    name: 'disc beside the axis',
    x: 3,
    m: DARK,
    z: 0.05,
    region: disc(5, 3, 1),
    place: [0.5, 0],
    polarizationRad: 1,
  },
  {
    name: 'disc at 60°',
    x: 4,
    m: POLYSTYRENE,
    z: 40e-6,
    region: disc(20),
    place: [0.2, 0.1],
    polarizationRad: 0.5,
  },
  { name: 'square on the axis, η = 500 to 1000', x: 0.5, m: FAINT, z: 0.02, region: rings(square(22.36)) },
  {
    name: 'square, faint small sphere, polarised',
    x: 0.5,
    m: FAINT,
    z: 0.02,
    region: rings(square(4)),
    place: [1, 0.3],
    polarizationRad: 0.7,
  },
  {
    name: 'square, large sphere',
    x: 50,
    m: POLYSTYRENE,
    z: 0.02,
    region: rings(square(7)),
    place: [1.5, -0.5],
  },
  {
    name: 'square, large dark sphere',
    x: 50,
    m: DARK,
    z: 0.02,
    region: rings(square(6)),
    place: [0, 2],
    polarizationRad: Math.PI / 2,
  },
  {
    name: 'square 6 µm behind, half-angle 50°',
    x: 5,
    m: DARK,
    z: 6e-6,
    region: rings(square(5)),
    place: [0.4, 1],
    polarizationRad: 2,
  },
  {
    name: 'square ring, particle in the hole',
    x: 10,
    m: POLYSTYRENE,
    z: 0.02,
    region: rings(square(6), reversed(square(3))),
    place: [1, 1],
  },
  {
    name: 'square ring, particle on its frame',
    x: 10,
    m: DARK,
    z: 0.02,
    region: rings(square(6), reversed(square(3))),
    place: [4.5, 0],
    polarizationRad: 0.3,
  },
  {
    name: 'two pieces',
    x: 10,
    m: POLYSTYRENE,
    z: 0.02,
    region: rings(square(3, -4, 0), [1, -2, 7, -1, 3, 4]),
    place: [0.5, 0],
    polarizationRad: 1.2,
  },
  {
    name: 'a letter C',
    x: 6,
    m: POLYSTYRENE,
    z: 0.02,
    region: rings(LETTER),
    place: [2, 0.5],
    polarizationRad: -0.4,
  },
  { name: 'a star', x: 20, m: DARK, z: 0.02, region: rings(STAR), place: [0.3, -0.2] },
  {
    name: 'particle outside',
    x: 10,
    m: DARK,
    z: 0.02,
    region: rings(square(3)),
    place: [8, 2],
    polarizationRad: 0.9,
  },
  { name: 'particle on an edge', x: 10, m: POLYSTYRENE, z: 0.02, region: rings(square(5)), place: [5, 1] },
  {
    name: 'particle on a corner',
    x: 10,
    m: POLYSTYRENE,
    z: 0.02,
    region: rings(square(5)),
    place: [5, 5],
    polarizationRad: 0.1,
  },
];

describe('boundaryReading', () => {
  // The independent quadrature of the vector fields over the area: poyntingQuadrature.ts.
  it.each(CASES)('agrees with the Poynting flux through the area: $name', (one) => {
    const { x, m, z, region, place = [0, 0], polarizationRad = null } = one;
    const unit = Math.sqrt((2 * z) / K);
    const [px, py] = [place[0] * unit, place[1] * unit];
    const sphere = { coefficients: mieCoefficients(x, m), wavenumber: K };
    const area = region(unit);
    const slow = poyntingReading(sphere, z, polarizationRad, [px, py], area) / extinction(sphere);
    const scenario = sphereScenario((2 * x) / K, m, { polarizationRad }, { halfAngle: 1.4 });
    const kappa = kappaOf(scenario, z);
    const offset = Math.hypot(px, py);
    const nodes =
      'disc' in area
        ? discNodes(area.disc.radiusM, kappa, area.disc.x, area.disc.y, offset)
        : polygonNodes(area.rings, kappa, offset);
    const fast = ratioOf(scenario, z, nodes, [px, py]);
    expect(Math.abs(fast - slow)).toBeLessThan(TOLERANCE);
  });

  it('is NaN, not a number of any kind, where a node lies beyond the table', () => {
    for (const polarizationRad of [null, 0.3]) {
      const table = buildRadialTable(sphereScenario(2e-6, [1.59, 0], { polarizationRad }), 0.02, 2e-4, 0);
      const node = (x: number) => Float64Array.of(x, 0, 0, 1e-6);
      expect(boundaryReading(table, node(1.99e-4), 0, 0)).not.toBeNaN();
      expect(boundaryReading(table, node(1.5e-4), 4e-4, 0)).toBeNaN();
      for (const far of [2.2e-4, 1e-3, 0.1, 10, 1e3, 1e9, Number.POSITIVE_INFINITY, Number.NaN]) {
        expect(boundaryReading(table, node(far), 0, 0)).toBeNaN();
      }
      // From 2^30 cells on, integer arithmetic wraps round to places within the table.
      for (const turns of [2 ** 30, 2 ** 31, 2 ** 32]) {
        expect(boundaryReading(table, node(Math.sqrt((turns + 40) / table.cellsPerM2)), 0, 0)).toBeNaN();
      }
    }
  });

  it('is 0 for no outline, and adds up over outlines', () => {
    const table = buildRadialTable(sphereScenario(2e-6), 0.02, 4e-4, 0);
    const kappa = kappaOf(sphereScenario(2e-6), 0.02);
    const [one, two] = [polygonNodes([square(1e-4, -1e-4)], kappa), discNodes(1e-4, kappa, 2e-4)];
    const both = Float64Array.from([...one, ...two]);
    expect(boundaryReading(table, new Float64Array(0), 0, 0)).toBe(0);
    const sum = boundaryReading(table, one, 2e-5, 0) + boundaryReading(table, two, 2e-5, 0);
    expect(boundaryReading(table, both, 2e-5, 0) / sum).toBeCloseTo(1, 12);
  });
});
