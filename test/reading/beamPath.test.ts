import { describe, expect, it } from 'vitest';
import { beamRadius, wavefrontCurvature } from '../../src/optics/gaussianBeam.ts';
import {
  beamFringes,
  beamPath,
  crossedSlope,
  farthestPlace,
  shadowScale,
} from '../../src/reading/beamPath.ts';

const K = (2 * Math.PI) / 635e-9;

describe('beamPath', () => {
  it('casts the shadow along the wavefront’s rays: 1 + d/R off the axis (geometrical optics)', () => {
    for (const focusM of [-8e-3, 0, 3e-3, 30e-3]) {
      const beam = { waistM: 30e-6, focusM };
      const path = beamPath(beam, K, 1e-3, 19e-3, 0);
      expect(shadowScale(path)).toBeCloseTo(1 + 19e-3 * wavefrontCurvature(beam, K, 1e-3), 10);
      const radii = beamRadius(beam, K, 1e-3) * beamRadius(beam, K, 20e-3);
      expect((crossedSlope(path) * radii) / 2).toBeCloseTo(1, 10);
      expect(farthestPlace(path) / beamRadius(beam, K, 1e-3)).toBeCloseTo(3.5, 10);
    }
  });

  it('has the fringes of a flat wave where the waist is wide, and the beam’s own fall where it is focused on the plane', () => {
    const wide = beamFringes(beamPath({ waistM: 1, focusM: 0 }, K, 0, 20e-3, 0));
    expect(wide.kappa / (K / (2 * 20e-3))).toBeCloseTo(1, 6);
    expect(wide.magnification).toBeCloseTo(1, 6);
    const focused = beamFringes(beamPath({ waistM: 5e-6, focusM: 20e-3 }, K, 0, 20e-3, 0));
    expect(focused.kappa * 5e-6 ** 2).toBeCloseTo(1, 4);
  });

  it('blurs the fringes of a moving particle: α = −iκ/(1 − 2iκσ²) in a flat wave (design.md, section 3)', () => {
    const [d, spreadM] = [20e-3, 30e-6];
    const kappa = K / (2 * d);
    const still = 1 / Math.hypot(1, 2 * kappa * spreadM ** 2);
    const path = beamPath({ waistM: 1, focusM: 0 }, K, 0, d, spreadM);
    expect(beamFringes(path).kappa / (kappa * still)).toBeCloseTo(1, 6);
  });
});
