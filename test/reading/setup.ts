import { LegendreRules } from '../../src/numeric/gaussLegendre.ts';
import { constantIndex } from '../../src/optics/indexModel.ts';
import type { Light } from '../../src/optics/light.ts';
import { boundaryNodes } from '../../src/outline/boundaryNodes.ts';
import { ringNodes } from '../../src/outline/ringNodes.ts';
import { boundaryReading } from '../../src/reading/boundaryReading.ts';
import { buildRadialTable } from '../../src/reading/radialTable.ts';
import type { Scenario } from '../../src/reading/scenario.ts';
import { buildScenarios } from '../../src/reading/scenario.ts';

export const WAVELENGTH_M = 635e-9;
const RULES = new LegendreRules();

/** A sphere in vacuum, in light that differs from an unpolarised single colour only in what is given. */
export function sphereScenario(
  diameterM: number,
  index: readonly [n: number, k: number] = [1.59, 0],
  light: Partial<Light> = {},
  { halfAngle = 0.3, largestPhase = 1000 } = {},
): Scenario {
  const whole: Light = {
    wavelengthM: WAVELENGTH_M,
    linewidthM: 0,
    driftM: 0,
    polarizationRad: null,
    irradianceWm2: 1,
    intensityNoisePerHz: 0,
    ...light,
  };
  const particle = { diameterM, index: constantIndex(...index), material: 'test' };
  const wavelengths = [whole.wavelengthM];
  return buildScenarios(whole, constantIndex(1), [particle], wavelengths, halfAngle, largestPhase)[0];
}

/**
 * A scatterer with the same amplitude in every direction. It is made a million times fainter than a sphere, so that only the
 * crossed flux counts: ratios to the extinction do not depend on that.
 */
export function constantScenario(
  wavenumber: number,
  [re, im]: readonly [number, number],
  polarizationRad: number | null = null,
): Scenario {
  const forward = [re * 1e-6, im * 1e-6] as const;
  const extinctionM2 = (4 * Math.PI * forward[0]) / wavenumber ** 2;
  const sphere = {
    wavenumber,
    sizeParameter: 1e-6,
    index: [1, 0] as const,
    forward,
    extinctionM2,
    cosLimit: 0,
    series: Float64Array.of(...forward, ...forward),
    terms: 1,
  };
  return {
    particle: { diameterM: (2 * 1e-6) / wavenumber, index: constantIndex(1), material: 'constant' },
    wavelengthM: (2 * Math.PI) / wavenumber,
    colours: [{ weight: 1, sphere }],
    extinctionM2,
    polarizationRad,
  };
}

/** κ = k/(2z) of the scenario's (shortest) colour. */
export function kappaOf(scenario: Scenario, distanceM: number): number {
  return scenario.colours[0].sphere.wavenumber / (2 * distanceM);
}

/** Fine nodes of a disc. */
export function discNodes(radiusM: number, kappa: number, x = 0, y = 0, offsetM = 0): Float64Array {
  const loop = [{ kind: 'arc', centre: [x, y], radius: radiusM, from: 0, to: 2 * Math.PI } as const];
  return boundaryNodes([loop], { kappa, offsetM, perRadian: 0.9, least: 16 }, RULES);
}

/** Fine nodes of polygons. */
export function polygonNodes(
  rings: readonly (readonly number[])[],
  kappa: number,
  offsetM = 0,
): Float64Array {
  return ringNodes(
    rings.map((ring) => Float64Array.from(ring)),
    { kappa, offsetM, perRadian: 0.9, least: 16 },
    RULES,
  );
}

/** reading/extinction. */
export function ratioOf(
  scenario: Scenario,
  distanceM: number,
  nodes: Float64Array,
  [px, py]: readonly [number, number] = [0, 0],
  spreadM = 0,
): number {
  let squared = 0;
  for (let i = 0; i < nodes.length; i += 4)
    squared = Math.max(squared, (nodes[i] - px) ** 2 + (nodes[i + 1] - py) ** 2);
  const table = buildRadialTable(scenario, distanceM, Math.sqrt(squared), spreadM);
  return boundaryReading(table, nodes, px, py) / scenario.extinctionM2;
}

/** A square about (x, y). */
export function square(half: number, x = 0, y = 0): number[] {
  return [x - half, y - half, x + half, y - half, x + half, y + half, x - half, y + half];
}
