import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { gaussHermite } from '../../src/numeric/gaussHermite.ts';
import { gaussLegendre, LegendreRules } from '../../src/numeric/gaussLegendre.ts';
import { constantIndex } from '../../src/optics/indexModel.ts';
import { scatteringAmplitudes } from '../../src/optics/mieAmplitudes.ts';
import { mieCoefficients } from '../../src/optics/mieCoefficients.ts';
import { ringNodes } from '../../src/outline/ringNodes.ts';
import { beamFringes } from '../../src/reading/beamPath.ts';
import { beamReading, localIrradiance } from '../../src/reading/beamReading.ts';
import type { BeamPlacement, BeamTable } from '../../src/reading/beamTable.ts';
import { buildBeamTable } from '../../src/reading/beamTable.ts';
import { boundaryReading } from '../../src/reading/boundaryReading.ts';
import { buildRadialTable } from '../../src/reading/radialTable.ts';
import type { Scenario } from '../../src/reading/scenario.ts';
import { buildScenarios } from '../../src/reading/scenario.ts';
import type { PlaneRule } from './beamQuadrature.ts';
import { annulusRule, polygonRule, quadratureReading } from './beamQuadrature.ts';

const WAVELENGTH_M = 635e-9;
const K = (2 * Math.PI) / WAVELENGTH_M;
const RULES = new LegendreRules();
const UM = 1e-6;
const MM = 1e-3;

interface Sphere {
  diameterM: number;
  index: readonly [number, number];
}

const BEAD: Sphere = { diameterM: 2 * UM, index: [1.59, 0] };

function scenarioOf(sphere: Sphere, halfAngle: number, light = {}, largestPhase = 300): Scenario {
  const { diameterM, index } = sphere;
  const particle = { diameterM, index: constantIndex(...index), material: '' };
  const still = { wavelengthM: WAVELENGTH_M, linewidthM: 0, driftM: 0, polarizationRad: null };
  const full = { ...still, irradianceWm2: 1, intensityNoisePerHz: 0, ...light };
  return buildScenarios(full, constantIndex(1), [particle], [WAVELENGTH_M], halfAngle, largestPhase)[0];
}

/** An outline as rings of points, or as circles about the axis (negative for a hole). */
type Outline = { rings: number[][] } | { circles: number[] };

function star(radius: number, points: number, inner: number, turn = 0.2): number[] {
  return Array.from({ length: 4 * points }, (_, i) => {
    const angle = turn + (Math.PI * (i >> 1)) / points;
    const rho = (i >> 1) % 2 === 0 ? radius : radius * inner;
    return rho * (i % 2 === 0 ? Math.cos(angle) : Math.sin(angle));
  });
}

function square(half: number, x = 0, y = 0): number[] {
  return [x - half, y - half, x + half, y - half, x + half, y + half, x - half, y + half];
}

function nodesOf(outline: Outline, table: BeamTable, offsetM: number): Float64Array {
  const { kappa, magnification } = beamFringes(table.path);
  const density = { kappa, offsetM: magnification * offsetM, perRadian: 0.9, least: 8 };
  if ('rings' in outline)
    return ringNodes(
      outline.rings.map((ring) => Float64Array.from(ring)),
      density,
      RULES,
    );
  return Float64Array.from(
    outline.circles.flatMap((circle) => {
      const count = Math.ceil(40 + 4 * kappa * Math.abs(circle) * density.offsetM);
      const step = (2 * Math.PI) / count;
      return Array.from({ length: count }, (_, i) => {
        const [x, y] = [Math.abs(circle) * Math.cos(i * step), Math.abs(circle) * Math.sin(i * step)];
        return [x, y, -y * step * Math.sign(circle), x * step * Math.sign(circle)];
      }).flat();
    }),
  );
}

function ruleOf(outline: Outline, radius: number, table: BeamTable, offsetM: number): PlaneRule {
  const { kappa, magnification } = beamFringes(table.path);
  const along = Math.ceil(16 + 0.6 * kappa * radius * (radius + 2 * magnification * offsetM));
  if ('rings' in outline) return outline.rings.flatMap((ring) => polygonRule(ring, along, along));
  const around = Math.ceil(30 + 5 * kappa * radius * magnification * offsetM);
  const [outer, inner = 0] = outline.circles;
  return annulusRule(-inner, outer, along, around);
}

function placement(distanceM: number, radiusM: number, more: Partial<BeamPlacement> = {}): BeamPlacement {
  return { placeM: 0, distanceM, spreadM: 0, offsetM: 0, radiusM: radiusM * (1 + 1e-9), ...more };
}

function discNodes(radius: number, count = 400): Float64Array {
  const step = (2 * Math.PI) / count;
  const nodes = Array.from({ length: count }, (_, i) => {
    const [x, y] = [radius * Math.cos(i * step), radius * Math.sin(i * step)];
    return [x, y, -y * step, x * step];
  });
  return Float64Array.from(nodes.flat());
}

describe('beamReading, against direct quadrature over the plane with every plane wave of the beam scattered for itself', () => {
  const large = { diameterM: 4 * UM, index: [1.59, 0] } as const;
  const dark = { diameterM: 1 * UM, index: [1.5, 0.5] } as const;
  const small = { diameterM: 0.2 * UM, index: [1.33, 0] } as const;
  const limit = { diameterM: 1.27 * UM, index: [1.59, 0] } as const;
  const giant = { diameterM: 20 * UM, index: [1.5, 0.01] } as const;
  const disc = (r: number): Outline => ({ circles: [r] });
  const annulus = (r: number): Outline => ({ circles: [r, -r / 2] });
  const aside = (r: number): Outline => ({ rings: [square(r / 2, 0.15 * r, -0.1 * r)] });
  const stars = (r: number): Outline => ({ rings: [star(r, 5, 0.4)] });
  /** Waist, focus, plane, radius in µm; place in µm; the error allowed, over the extinction. */
  type Case = [string, Sphere, number[], [number, number, number], (r: number) => Outline, number, number?];
  const cases: Case[] = [
    ['20 um, on the axis, disc', BEAD, [20, 0, 5000, 100], [0, 0, 0], disc, 3e-6],
    ['20 um, half a waist off, disc', BEAD, [20, 0, 20000, 300], [10, 0, 0], disc, 1e-5],
    ['20 um, a waist off, annulus', BEAD, [20, 0, 50000, 700], [12, -16, 0], annulus, 3e-6],
    ['20 um, a waist off, star', large, [20, 0, 20000, 300], [20, 0, 0], stars, 1e-5],
    ['20 um, focused before the particle', BEAD, [20, -6000, 20000, 300], [80, 40, 0], aside, 1e-5],
    ['20 um, focused on the plane', BEAD, [20, 10000, 10000, 50], [60, 40, 0], stars, 2e-5],
    ['20 um, particle 2 mm behind its place', BEAD, [20, 1000, 20000, 250], [10, 15, 2000], aside, 1e-5],
    ['100 um, on the axis, square aside', large, [100, 0, 5000, 150], [0, 0, 0], aside, 1e-6],
    ['100 um, a waist off, disc', BEAD, [100, 0, 20000, 300], [60, 80, 0], disc, 1e-6],
    ['100 um, focused before the particle', dark, [100, -20000, 50000, 400], [50, 0, 0], stars, 1e-6],
    ['100 um, a faint small sphere', small, [100, 0, 10000, 200], [40, 0, 0], annulus, 1e-6],
    ['1 mm, on the axis, star', BEAD, [1000, 0, 5000, 250], [0, 0, 0], stars, 1e-6],
    ['1 mm, tenth of a waist off, annulus', BEAD, [1000, 0, 20000, 300], [60, 80, 0], annulus, 1e-6],
    ['1 mm, tenth of a waist off, polarised', BEAD, [1000, 0, 5000, 300], [60, 80, 0], annulus, 1e-6, 0.6],
    ['1 mm, a waist off, square', BEAD, [1000, 0, 50000, 200], [600, 800, 0], aside, 1e-6],
    ['five wavelengths and radii', limit, [3.175, 0, 50000, 2000], [0, 0, 0], disc, 1e-6],
    ['five wavelengths and radii, half a waist off', limit, [3.175, 0, 5000, 300], [1.6, 0, 0], stars, 2e-5],
    ['five wavelengths and radii, a waist off', limit, [3.175, 0, 5000, 300], [3.175, 0, 0], disc, 2e-5],
    ['five wavelengths and radii, out of focus', limit, [3.175, -30, 5000, 300], [2, 2, 0], stars, 2e-5],
    ['five wavelengths and radii, the whole beam', limit, [3.175, 0, 5000, 1200], [2, 0, 0], disc, 8e-5],
    ['five wavelengths and radii, polarised', limit, [3.175, 0, 5000, 300], [1.6, 0.5, 0], stars, 2e-5, 0.3],
    ['five wavelengths, a waist off', small, [3.175, 0, 5000, 200], [3.175, 0, 0], stars, 1e-6],
    ['five radii of a large sphere', giant, [50, 0, 20000, 200], [0, 0, 0], disc, 1e-6],
    ['five radii of a large sphere, a waist off', giant, [50, -3000, 20000, 200], [30, 40, 0], stars, 2e-5],
    ['particle outside beam and outline', BEAD, [50, 0, 20000, 150], [0, -140, 0], stars, 1e-6],
  ];

  it.each(cases)('%s', (_name, sphere, lengths, place, outlineOf, allowed, polarizationRad) => {
    const [waistM, focusM, planeM, radiusM] = lengths.map((length) => length * UM);
    const [x, y, z] = place.map((length) => length * UM);
    const offsetM = Math.hypot(x, y);
    const scenario = scenarioOf(sphere, Math.min(1.2, 0.1 + 12 * (radiusM / planeM)), {
      polarizationRad: polarizationRad ?? null,
    });
    const table = buildBeamTable(
      scenario,
      { waistM, focusM },
      placement(planeM - z, radiusM, { placeM: z, offsetM }),
    );
    const outline = outlineOf(radiusM);
    const arrangement = {
      wavenumber: K,
      waistM,
      focusM,
      planeM,
      place: [x, y, z] as const,
      sphere: mieCoefficients((K * sphere.diameterM) / 2, sphere.index),
      ...(polarizationRad === undefined ? {} : { polarizationRad }),
    };
    const quadrature = quadratureReading(arrangement, ruleOf(outline, radiusM, table, offsetM));
    const reading = beamReading(table, nodesOf(outline, table, offsetM), x, y);
    expect(Math.abs(reading - quadrature) / scenario.extinctionM2).toBeLessThan(allowed);
  });
});

describe('beamReading, exact fields', () => {
  it.each([
    ['on the axis', [0, 0], 1e-5],
    ['beside it', [40, 30], 1e-5],
  ] as const)(
    'is the sum over the plane waves, each with its field at the plane: %s',
    (_name, [x, y], allowed) => {
      const sphere = { diameterM: 20 * UM, index: [1.5, 0.01] } as const;
      const [waistM, planeM, radiusM] = [100 * UM, 3 * MM, 150 * UM];
      const scenario = scenarioOf(sphere, 0.3);
      const offsetM = Math.hypot(x, y) * UM;
      const place = placement(planeM, radiusM, { offsetM });
      const beam = { waistM, focusM: 0 };
      const outline = { rings: [star(radiusM, 5, 0.5)] };
      const read = (fields: 'far' | 'exact') => {
        const table = buildBeamTable(scenario, beam, { ...place, fields });
        return beamReading(table, nodesOf(outline, table, offsetM), x * UM, y * UM) / scenario.extinctionM2;
      };
      const sphereOf = mieCoefficients((K * sphere.diameterM) / 2, sphere.index);
      const rule = ruleOf(outline, radiusM, buildBeamTable(scenario, beam, place), offsetM);
      const set = {
        wavenumber: K,
        waistM,
        focusM: 0,
        planeM,
        place: [x * UM, y * UM, 0] as const,
        sphere: sphereOf,
      };
      const quadrature = quadratureReading({ ...set, near: true }, rule) / scenario.extinctionM2;
      expect(Math.abs(read('exact') - quadrature)).toBeLessThan(allowed);
      expect(Math.abs(read('far') - quadrature)).toBeGreaterThan(5e-4);
    },
  );
});

describe('beamReading, amplitudes without coefficients', () => {
  it('reads them as the sphere that they are of, at a waist of five wavelengths and radii', () => {
    const scenario = scenarioOf({ diameterM: 1.27 * UM, index: [1.59, 0] }, 0.1);
    const colours = scenario.colours.map(({ sphere: { coefficients: _, ...sphere }, ...colour }) => ({
      ...colour,
      sphere,
    }));
    const [x, radiusM] = [1.6 * UM, 300 * UM];
    const [whole, bare] = [scenario, { ...scenario, colours }].map((one) => {
      const place = placement(5 * MM, radiusM, { offsetM: x });
      const table = buildBeamTable(one, { waistM: 3.175 * UM, focusM: 0 }, place);
      return [0, x].map((at) => beamReading(table, discNodes(radiusM), at, 0) / scenario.extinctionM2);
    });
    bare.forEach((ratio, i) => {
      expect(Math.abs(ratio - whole[i])).toBeLessThan(2e-5);
    });
  });
});

describe('beamReading, limits', () => {
  const ring = Float64Array.from(star(400 * UM, 5, 0.5));
  const distanceM = 20 * MM;
  const nodes = ringNodes(
    [ring],
    { kappa: K / (2 * distanceM), offsetM: 20 * UM, perRadian: 1.2, least: 8 },
    RULES,
  );
  const wide = { waistM: 10, focusM: 0 };

  it.each([
    ['unpolarised', {}, 0, 1e-7],
    ['polarised', { polarizationRad: 0.5 }, 0, 1e-7],
    ['a line of 2 nm', { linewidthM: 2e-9 }, 0, 1e-7],
    ['random motion of 5 um', {}, 5 * UM, 1e-6],
    ['polarised, random motion of 10 um', { polarizationRad: 0.5 }, 10 * UM, 1e-6],
  ])(
    'a waist of 10 m reads as the flat wave does (boundaryReading): %s',
    (_name, light, spreadM, allowed) => {
      const scenario = scenarioOf(BEAD, 0.1, light);
      const flat = buildRadialTable(scenario, distanceM, 430 * UM, spreadM);
      const table = buildBeamTable(
        scenario,
        wide,
        placement(distanceM, 400 * UM, { spreadM, offsetM: 25 * UM }),
      );
      for (const [x, y] of [
        [0, 0],
        [10, 0],
        [-12, 15],
      ]) {
        const gap = beamReading(table, nodes, x * UM, y * UM) - boundaryReading(flat, nodes, x * UM, y * UM);
        expect(Math.abs(gap) / scenario.extinctionM2).toBeLessThan(allowed);
      }
    },
  );

  it('reads the flat wave out to 15 degrees as well', () => {
    const scenario = scenarioOf({ ...BEAD, diameterM: 4 * UM }, 0.6, { polarizationRad: 0.5 });
    const flat = buildRadialTable(scenario, 8 * MM, 2.3 * MM, 0);
    const table = buildBeamTable(scenario, wide, placement(8 * MM, 2.3 * MM));
    const disc = discNodes(2.2 * MM);
    const gap = beamReading(table, disc, 0, 0) - boundaryReading(flat, disc, 0, 0);
    expect(Math.abs(gap) / scenario.extinctionM2).toBeLessThan(1e-7);
  });

  it('a detector that takes in the whole beam reads |u(p)|² C_ext less the scattered light it catches, without fringes', () => {
    for (const [sphere, waistM, allowed] of [
      [{ diameterM: 0.2 * UM, index: [1.5, 0.5] }, 20 * UM, 1e-4],
      [BEAD, 100 * UM, 1e-4],
    ] as [Sphere, number, number][]) {
      const scenario = scenarioOf(sphere, 1.2);
      const coefficients = mieCoefficients((K * sphere.diameterM) / 2, sphere.index);
      const beamRadiusM = waistM * Math.hypot(1, distanceM / ((K * waistM ** 2) / 2));
      for (const offsetM of [0, 0.7 * waistM]) {
        for (const times of [4, 4.5, 5, 6]) {
          const radiusM = times * beamRadiusM;
          const table = buildBeamTable(
            scenario,
            { waistM, focusM: 0 },
            placement(distanceM, radiusM, { offsetM }),
          );
          const irradiance = localIrradiance(table, offsetM, 0);
          expect(irradiance).toBeCloseTo(Math.exp(-2 * (offsetM / waistM) ** 2), 12);
          const reading = beamReading(table, discNodes(radiusM), offsetM, 0) / irradiance;
          const caught = caughtLight(coefficients, Math.atan(radiusM / distanceM));
          expect(Math.abs((reading + caught) / scenario.extinctionM2 - 1)).toBeLessThan(allowed);
        }
      }
    }
  });

  it('is the closed form ∮ w(1 − e^{−αw·w})/(2αw·w) of a constant amplitude in a Gaussian beam (divergence theorem)', () => {
    const sphere = { diameterM: 0.05 * UM, index: [1.5, 0.5] } as const;
    const scenario = scenarioOf(sphere, 0.2);
    const [waistM, focusM, planeM] = [60 * UM, -3 * MM, 40 * MM];
    const [x, y] = [35 * UM, -20 * UM];
    const table = buildBeamTable(
      scenario,
      { waistM, focusM },
      placement(planeM, 400 * UM, { offsetM: Math.hypot(x, y) }),
    );
    const own = nodesOf({ rings: [[...ring]] }, table, Math.hypot(x, y));
    const forward = mieCoefficients((K * sphere.diameterM) / 2, sphere.index);
    const expected = closedForm(own, waistM, focusM, planeM, x, y, forwardOf(forward));
    expect(Math.abs(beamReading(table, own, x, y) - expected) / scenario.extinctionM2).toBeLessThan(1e-4);
  });

  it('does not care how an outline is cut up or turned together with the particle', () => {
    const scenario = scenarioOf(BEAD, 0.2);
    const table = buildBeamTable(
      scenario,
      { waistM: 60 * UM, focusM: 2 * MM },
      placement(distanceM, 600 * UM, { offsetM: 50 * UM }),
    );
    const read = (rings: number[][], x: number, y: number) =>
      beamReading(table, nodesOf({ rings }, table, 50 * UM), x * UM, y * UM) / scenario.extinctionM2;
    const box = square(200 * UM, 50 * UM);
    const halves = [
      [box[0], box[1], 20 * UM, box[3], 20 * UM, box[5], box[6], box[7]],
      [20 * UM, box[1], box[2], box[3], box[4], box[5], 20 * UM, box[5]],
    ];
    expect(read(halves, 30, 40)).toBeCloseTo(read([box], 30, 40), 6);
    const turned = [0, 2, 4, 6].flatMap((i) => [-box[i + 1], box[i]]);
    expect(read([turned], -40, 30)).toBeCloseTo(read([box], 30, 40), 9);
  });
});

describe('beamReading, random motion', () => {
  it.each([
    ['200 um', 200, 0, 5, 10],
    ['50 um', 50, 0, 5, 20],
    ['20 um, focused before the particle', 20, -5000, 5, 20],
    ['20 um, half of it', 20, 0, 10, 10],
  ])(
    'is the mean of readings at rest over the places (Gauss–Hermite): %s',
    (_name, waist, focus, spread, offset) => {
      const scenario = scenarioOf(BEAD, 0.6);
      const beam = { waistM: waist * UM, focusM: focus * UM };
      const reach = (offset + 9 * spread) * Math.SQRT2 * UM;
      const place = placement(20 * MM, 300 * UM, { offsetM: offset * UM });
      const moving = buildBeamTable(scenario, beam, { ...place, spreadM: spread * UM });
      const still = buildBeamTable(scenario, beam, { ...place, offsetM: reach });
      const nodes = nodesOf({ rings: [star(300 * UM, 5, 0.5)] }, still, reach);
      const { nodes: at, weights } = gaussHermite(20);
      let mean = 0;
      let irradiance = 0;
      for (let i = 0; i < at.length; i++) {
        for (let j = 0; j < at.length; j++) {
          const [x, y] = [(offset + spread * at[i]) * UM, spread * at[j] * UM];
          mean += weights[i] * weights[j] * beamReading(still, nodes, x, y);
          irradiance += weights[i] * weights[j] * localIrradiance(still, x, y);
        }
      }
      const reading = beamReading(moving, nodes, offset * UM, 0);
      expect(Math.abs(reading - mean) / scenario.extinctionM2).toBeLessThan(1e-5);
      expect(localIrradiance(moving, offset * UM, 0)).toBeCloseTo(irradiance, 6);
    },
  );
});

describe('beamReading, edges', () => {
  const scenario = scenarioOf(BEAD, 0.1);
  const beam = { waistM: 50 * UM, focusM: 0 };

  it('refuses a detector beyond the cone that the sphere is solved for', () => {
    expect(() => buildBeamTable(scenario, beam, placement(20 * MM, 3 * MM))).toThrow(RimwrightError);
    expect(() => buildBeamTable(scenario, beam, placement(20 * MM, 3 * MM))).toThrow(
      'and known to 5.730 deg',
    );
  });

  it('gives NaN for nodes beyond the table, and 0 for a particle far outside the beam', () => {
    const table = buildBeamTable(scenario, beam, placement(20 * MM, 200 * UM, { offsetM: 1 * MM }));
    expect(beamReading(table, discNodes(1 * MM), 0, 0)).toBeNaN();
    expect(beamReading(table, discNodes(200 * UM), 0.3 * MM, 0)).toBe(0);
    expect(Math.abs(beamReading(table, discNodes(200 * UM), 0.17 * MM, 0))).toBeLessThan(
      1e-5 * scenario.extinctionM2,
    );
  });
});

/** Light scattered into a cone about the axis, m²: ∫ (|S1|² + |S2|²)/2 dΩ/k². */
function caughtLight(coefficients: ReturnType<typeof mieCoefficients>, halfAngle: number): number {
  const { nodes, weights } = gaussLegendre(60);
  const out = new Float64Array(4);
  let sum = 0;
  for (let i = 0; i < nodes.length; i++) {
    const theta = (halfAngle * (1 + nodes[i])) / 2;
    scatteringAmplitudes(coefficients, Math.cos(theta), out);
    const power = (out[0] ** 2 + out[1] ** 2 + out[2] ** 2 + out[3] ** 2) / 2;
    sum += weights[i] * power * Math.sin(theta) * Math.PI * halfAngle;
  }
  return sum / K ** 2;
}

function forwardOf(coefficients: ReturnType<typeof mieCoefficients>): [number, number] {
  const out = new Float64Array(4);
  scatteringAmplitudes(coefficients, 1, out);
  return [out[0], out[1]];
}

type Pair = [number, number];
const times = (a: Pair, b: Pair): Pair => [a[0] * b[0] - a[1] * b[1], a[0] * b[1] + a[1] * b[0]];
const over = (a: Pair, b: Pair): Pair => {
  const norm = b[0] ** 2 + b[1] ** 2;
  return [(a[0] * b[0] + a[1] * b[1]) / norm, (a[1] * b[0] - a[0] * b[1]) / norm];
};
const exp = (a: Pair): Pair => [Math.exp(a[0]) * Math.cos(a[1]), Math.exp(a[0]) * Math.sin(a[1])];

/**
 * −Re ∬ 2 u* u(p) S(0) e^{ikρ'²/2d}/(−ikd) dA over the axial irradiance, paraxial: the integrand is a complex Gaussian
 * e^{−α(r − c)²} about a complex centre c.
 */
function closedForm(
  nodes: Float64Array,
  waistM: number,
  focusM: number,
  d: number,
  px: number,
  py: number,
  forward: Pair,
): number {
  const rayleighM = (K * waistM ** 2) / 2;
  const q: Pair = [-focusM, -rayleighM];
  const plane: Pair = [d - focusM, rayleighM];
  const inverse = over([1, 0], plane);
  const alpha: Pair = times([0, -K / 2], [1 / d - inverse[0], -inverse[1]]);
  const centre = over([0, -K / d / 2], alpha);
  const p2 = px * px + py * py;
  const [startRe, startIm] = times([0, (K * p2) / 2], over([1, 0], q));
  const square = times(alpha, times(centre, centre));
  const phase = exp([startRe + square[0] * p2, startIm + (K * p2) / (2 * d) + square[1] * p2]);
  // |Q|²/(Q Q*(plane)) is u(p) u*(plane) on the axis over the axial irradiance; −2/(−ikd) = −2i/(kd).
  const fields = over([q[0] ** 2 + q[1] ** 2, 0], times(q, plane));
  const front = times(times([0, -2 / (K * d)], forward), times(fields, phase));
  let sum: Pair = [0, 0];
  for (let i = 0; i < nodes.length; i += 4) {
    const x: Pair = [nodes[i] - centre[0] * px, -centre[1] * px];
    const y: Pair = [nodes[i + 1] - centre[0] * py, -centre[1] * py];
    const w2: Pair = [times(x, x)[0] + times(y, y)[0], times(x, x)[1] + times(y, y)[1]];
    const exponent = times(alpha, w2);
    const [fallRe, fallIm] = exp([-exponent[0], -exponent[1]]);
    const factor = over([1 - fallRe, -fallIm], [2 * exponent[0], 2 * exponent[1]]);
    const flow: Pair = [x[0] * nodes[i + 3] - y[0] * nodes[i + 2], x[1] * nodes[i + 3] - y[1] * nodes[i + 2]];
    const part = times(factor, flow);
    sum = [sum[0] + part[0], sum[1] + part[1]];
  }
  return times(front, sum)[0];
}
