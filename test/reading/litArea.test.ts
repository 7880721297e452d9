import { describe, expect, it } from 'vitest';
import { LegendreRules } from '../../src/numeric/gaussLegendre.ts';
import { beamRadius } from '../../src/optics/gaussianBeam.ts';
import { ringNodes } from '../../src/outline/ringNodes.ts';
import { litArea } from '../../src/reading/litArea.ts';
import { polygonRule } from './beamQuadrature.ts';
import { square } from './setup.ts';

const K = (2 * Math.PI) / 635e-9;
const DISTANCE_M = 0.02;
const DENSITY = { kappa: K / (2 * DISTANCE_M), offsetM: 0, perRadian: 0.9, least: 16 };

describe('litArea', () => {
  it.each([
    ['narrower than the outline', { waistM: 40e-6, focusM: -0.004 }],
    ['as wide', { waistM: 200e-6, focusM: 0 }],
    ['wider', { waistM: 3e-3, focusM: 0.1 }],
  ])('is the irradiance summed over the plane (quadrature): a beam %s', (_name, beam) => {
    const ring = square(150e-6, 40e-6, -20e-6);
    const w0 = beamRadius(beam, K, 0);
    const w = beamRadius(beam, K, DISTANCE_M);
    const rule = polygonRule(ring, 40, 40);
    let sum = 0;
    for (let i = 0; i < rule.length; i += 3) {
      sum += rule[i + 2] * (w0 / w) ** 2 * Math.exp((-2 * (rule[i] ** 2 + rule[i + 1] ** 2)) / (w * w));
    }
    const nodes = ringNodes([Float64Array.from(ring)], DENSITY, new LegendreRules());
    expect(litArea(beam, K, DISTANCE_M, nodes) / sum).toBeCloseTo(1, 10);
  });

  it('is the power of the whole beam for an outline around it, π w²/2 at the particle (Kogelnik & Li 1966)', () => {
    const beam = { waistM: 100e-6, focusM: 0 };
    const nodes = ringNodes([Float64Array.from(square(2e-3))], DENSITY, new LegendreRules());
    expect(litArea(beam, K, DISTANCE_M, nodes) / ((Math.PI / 2) * beam.waistM ** 2)).toBeCloseTo(1, 9);
  });
});
