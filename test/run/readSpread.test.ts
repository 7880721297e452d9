import { describe, expect, it } from 'vitest';
import { diffusionCoefficient } from '../../src/optics/diffusion.ts';
import { spreadOf } from '../../src/reading/spreadOf.ts';
import { readBrief } from '../../src/run/readBrief.ts';
import { diffusionWarning } from '../../src/run/warnings.ts';
import { SEARCH_FINENESS } from '../../src/score/fineness.ts';
import { Judge } from '../../src/score/judge.ts';

const brief = (spread: string, medium = 'air', particle = 'diameter: 1 um to 2 um, count: 2, index: 1.59') =>
  readBrief(
    `light: { wavelength: 635 nm }
medium: ${medium}
particles: [{ ${particle} }]
placement: { spread: ${spread} }
detector: { distance: 20 mm, radius: 20 um to 0.4 mm }
target: { correction: 1 % }
`,
    'spread.yaml',
  );

describe('placement.spread as Brownian motion', () => {
  it('spreads each particle by √(D t) of its own diameter', async () => {
    const { task, defaults } = await brief('{ diffusing for: 10 ms, temperature: 20 degC }');
    expect(task.placement.diffusion).toEqual({ durationS: 0.01, temperatureK: 293.15, medium: 'air' });
    expect(defaults.filter((line) => line.includes('placement.spread'))).toEqual([]);
    // Stokes–Einstein by hand: kT = 4.0474e-21 J, η = 1.813e-5 Pa s, slip after Kim et al. (2005)
    // 1 + 1.165·Kn = 1.157 with Kn = 2·67.5 nm/1 µm in air.
    const byHand = Math.sqrt(((4.0474e-21 * 1.157) / (3 * Math.PI * 1.813e-5 * 1e-6)) * 0.01);
    expect(spreadOf(task.placement, 1e-6) / byHand).toBeCloseTo(1, 2);
    const ratio = spreadOf(task.placement, 1e-6) / spreadOf(task.placement, 2e-6);
    const coefficients = [1e-6, 2e-6].map((d) => diffusionCoefficient(d, 293.15, 'air'));
    expect(ratio).toBeCloseTo(Math.sqrt(coefficients[0] / coefficients[1]), 12);
    expect(ratio).toBeGreaterThan(Math.SQRT2);
  });

  it('knows water, and takes the viscosity of what it does not know', async () => {
    const water = (await brief('{ diffusing for: 1 s, temperature: 25 °C }', 'water')).task.placement;
    expect(water.diffusion).toMatchObject({ medium: 'water', temperatureK: 298.15 });
    const oil = await brief('{ diffusing for: 1 s, temperature: 300 K, viscosity: 1.2 mPa s }', '1.45');
    expect(oil.task.placement.diffusion?.medium).toEqual({ viscosityPaS: 0.0012 });
    // IAPWS 2008: water at 25 °C has 0.890 mPa s.
    const kT = 1.380649e-23 * 298.15;
    expect(spreadOf(water, 1e-6) ** 2 / (kT / (3 * Math.PI * 0.89e-3 * 1e-6))).toBeCloseTo(1, 3);
  });

  it('gives each particle a table of its own spread', async () => {
    const { task } = await brief('{ diffusing for: 20 ms }');
    const square = {
      weight: 1,
      rings: [Float64Array.of(-4e-4, -4e-4, 4e-4, -4e-4, 4e-4, 4e-4, -4e-4, 4e-4)],
    };
    const both = new Judge(task, SEARCH_FINENESS).outlineRatios([square], 0.02).ratios;
    task.particles.forEach((particle, i) => {
      const { diffusion, ...placement } = task.placement;
      const spreadM = spreadOf(task.placement, particle.diameterM);
      const alone = { ...task, particles: [particle], placement: { ...placement, spreadM } };
      const [[ratio]] = new Judge(alone, SEARCH_FINENESS).outlineRatios([square], 0.02).ratios;
      // The amplitudes' series differ in length where the cone does.
      expect(Math.abs(both[i][0] - ratio)).toBeLessThan(1e-6);
      const still = { ...alone, placement: { ...placement, spreadM: 0 } };
      const [[fixed]] = new Judge(still, SEARCH_FINENESS).outlineRatios([square], 0.02).ratios;
      expect(Math.abs(fixed - ratio)).toBeGreaterThan(1e-4);
    });
  });

  it('warns where one normal law says too much: 2κρσ above 0.7 at the radius', async () => {
    const { task } = await brief('{ diffusing for: 20 ms }');
    const perRadius = ((2 * Math.PI) / 635e-9 / 0.02) * spreadOf(task.placement, 1e-6);
    const outline = (phase: number) => [{ radiusM: phase / perRadius, distanceM: 0.02 }];
    expect(diffusionWarning(task, outline(0.69))).toBeNull();
    expect(diffusionWarning(task, outline(0.71))).toContain('particles of 1 µm');
    const fixed = await brief('10 um');
    expect(diffusionWarning(fixed.task, outline(9))).toBeNull();
  });
});
