import { describe, expect, it } from 'vitest';
import { airMeanFreePath, airViscosity } from '../../src/optics/airViscosity.ts';
import { diffusionCoefficient, diffusionSpread } from '../../src/optics/diffusion.ts';
import type { SlipConstants } from '../../src/optics/slipCorrection.ts';
import { KIM_2005, slipCorrection } from '../../src/optics/slipCorrection.ts';
import { waterViscosity } from '../../src/optics/waterViscosity.ts';
import reference from '../reference/diffusion.json' with { type: 'json' };
import { expectPrinted, relativeError } from './mieReference.ts';

describe('air', () => {
  it.each(reference.airViscosity)('viscosity $viscosityPaS Pa s at $temperatureK K: $source', (row) => {
    expectPrinted(airViscosity(row.temperatureK), row.viscosityPaS);
  });

  it.each(reference.airMeanFreePath)('mean free path $freePathM m: $source', (row) => {
    expectPrinted(airMeanFreePath(row.temperatureK, row.pressurePa), row.freePathM);
  });

  it('has twice the mean free path at half the pressure', () => {
    expect(airMeanFreePath(300, 5e4) / airMeanFreePath(300, 1e5)).toBeCloseTo(2, 14);
  });
});

describe('water', () => {
  it.each(reference.waterViscosity)('$recomputed µPa s at $temperatureK K: $source', (row) => {
    const microPaS = 1e6 * waterViscosity(row.temperatureK);
    expectPrinted(microPaS, row.recomputed);
    if (row.viscosityMicroPaS !== undefined) expectPrinted(microPaS, row.viscosityMicroPaS);
  });

  it.each(reference.waterViscosityR12)('agrees with the full equation at $temperatureK K: $source', (row) => {
    expect(relativeError(1e6 * waterViscosity(row.temperatureK), row.viscosityMicroPaS)).toBeLessThan(4e-5);
  });
});

describe('slipCorrection', () => {
  const sources = Object.entries(reference.slipSources) as [
    keyof typeof reference.slipSources,
    (typeof reference.slipSources)['kim2005'],
  ][];

  it.each(sources)('%s', (name, { freePathNm, constants }) => {
    for (const row of reference.slip) {
      const knudsen = (2 * freePathNm) / (1000 * row.diameterUm);
      expectPrinted(slipCorrection(knudsen, constants as unknown as SlipConstants), row[name]);
    }
  });

  it('is that of Kim et al. unless told otherwise', () => {
    expect(KIM_2005).toEqual(reference.slipSources.kim2005.constants);
    expect(slipCorrection(0.7)).toBe(slipCorrection(0.7, KIM_2005));
  });
});

describe('diffusionCoefficient', () => {
  it.each(reference.stokesEinstein)('$diffusionM2S m²/s in water for $diameterNm nm', (row) => {
    const medium = { viscosityPaS: row.viscosityMilliPaS / 1000 };
    expectPrinted(diffusionCoefficient(row.diameterNm / 1e9, row.temperatureK, medium), row.diffusionM2S);
  });

  it.each(reference.slip)('$diffusionKim m²/s in air for $diameterUm µm', (row) => {
    const diameterM = row.diameterUm / 1e6;
    expectPrinted(diffusionCoefficient(diameterM, 293.15, 'air'), row.diffusionKim);
    // Hinds' own viscosity and slip.
    const hinds = Number(row.hinds1999) * diffusionCoefficient(diameterM, 293, { viscosityPaS: 1.81e-5 });
    expectPrinted(hinds, row.diffusionHinds);
    if (row.hindsTableA11 !== undefined) expectPrinted(hinds, row.hindsTableA11[1]);
  });

  it('takes water at its own viscosity', () => {
    const viscosityPaS = waterViscosity(298.15);
    expect(diffusionCoefficient(1e-7, 298.15, 'water')).toBe(
      diffusionCoefficient(1e-7, 298.15, { viscosityPaS }),
    );
  });

  it('in thin air becomes that of free molecules, as 1/(pressure d²)', () => {
    const thin = diffusionCoefficient(1e-9, 300, 'air', 2000);
    expect(diffusionCoefficient(2e-9, 300, 'air', 2000) / thin).toBeCloseTo(1 / 4, 4);
    expect(diffusionCoefficient(1e-9, 300, 'air', 4000) / thin).toBeCloseTo(1 / 2, 4);
  });

  it.each([
    [0, 300, 'air', 1e5, 'diameterM'],
    [Number.NaN, 300, 'air', 1e5, 'diameterM'],
    [1e-6, 20, 'air', 1e5, 'temperatureK'],
    [1e-6, 400, 'water', 1e5, 'temperatureK'],
    [1e-6, 300, 'air', 0, 'pressurePa'],
    [1e-6, 300, { viscosityPaS: 0 }, 1e5, 'viscosityPaS'],
  ] as const)('refuses %d m, %d K, %o, %d Pa', (diameterM, temperatureK, medium, pressurePa, key) => {
    expect(() => diffusionCoefficient(diameterM, temperatureK, medium, pressurePa)).toThrow(
      new RegExp(`^${key}: found .*, expected a .* from .* to `),
    );
  });

  it('lists every mistake', () => {
    expect(() => diffusionCoefficient(-1, -1, 'water')).toThrow(
      'diameterM: found -1, expected a diameter in metres from 1e-9 to 0.01\n' +
        'temperatureK: found -1, expected a temperature of liquid water in kelvin from 253.15 to 383.15',
    );
  });
});

describe('diffusionSpread', () => {
  const diffusionM2S = 3e-11;
  const durationS = 0.02;

  it('is the mean over the measurement of the variance 2 D t', () => {
    let mean = 0;
    for (let i = 0; i < 1000; i++) mean += (2 * diffusionM2S * durationS * (i + 0.5)) / 1000 / 1000;
    expect(diffusionSpread(diffusionM2S, durationS) ** 2 / mean).toBeCloseTo(1, 12);
  });

  it('splits into the spread about the centre of the path and the wandering of that centre', () => {
    // Var of the mean of a path: ∬ 2D min(t1, t2) dt1 dt2 / t².
    const steps = 400;
    let centre = 0;
    for (let i = 0; i < steps; i++) {
      for (let j = 0; j < steps; j++) {
        centre += (2 * diffusionM2S * durationS * (Math.min(i, j) + 0.5)) / steps ** 3;
      }
    }
    const parts = diffusionSpread(diffusionM2S, durationS, 'centre') ** 2 + centre;
    expect(parts / diffusionSpread(diffusionM2S, durationS) ** 2).toBeCloseTo(1, 5);
  });

  it('stands for the true mean of the interference up to a phase of 0.7 a spread', () => {
    const sigma = diffusionSpread(diffusionM2S, durationS);
    const q = 0.7 / sigma;
    let truth = 0;
    for (let i = 0; i < 1000; i++)
      truth += Math.exp(-q * q * diffusionM2S * durationS * ((i + 0.5) / 1000)) / 1000;
    const normal = Math.exp(-((q * sigma) ** 2) / 2);
    expect(normal).toBeLessThan(truth);
    expect(truth - normal).toBeLessThan(0.01);
    expect(truth - normal).toBeGreaterThan(0.005);
  });

  it('refuses negative values', () => {
    expect(() => diffusionSpread(-1, -1)).toThrow(
      'diffusionM2S: found -1, expected a diffusion coefficient in m²/s from 0 to 1\n' +
        'durationS: found -1, expected a duration in seconds from 0 to 1000000',
    );
  });
});
