import { describe, expect, it } from 'vitest';
import { areaOverFloor, lobeRatio, measurementTime, requiredSnr } from '../../src/score/cost.ts';
import noise from '../reference/detector-noise.json' with { type: 'json' };

// biome-ignore lint/suspicious/noExplicitAny: entries differ in shape; each test knows its own
function published(id: string): any {
  const entry = noise.values.find((value) => value.id === id);
  if (!entry) throw new Error(`no published value ${id}`);
  return entry;
}

/** Light and electronics without any noise but the light's own graininess; a square metre gives an ampere. */
const QUIET = { responsivityAW: 1, irradianceWm2: 1, noiseCurrentA: 0, intensityNoisePerHz: 0 };

/** Time with target correction, gain and extinction of 1: the noise power over a signal of one ampere. */
const timeOf = (areaM2: number, electronics = QUIET) =>
  measurementTime([{ weight: 1, areaM2 }], 1, 1, 1, electronics);

describe('measurementTime', () => {
  it.each([
    ['shot_1e-3', 1e-3],
    ['shot_1e-6', 1e-6],
    ['shot_1e-9', 1e-9],
    ['shot_1e-12', 1e-12],
  ])('has the published shot noise: %s (Johnson 2003, table 3.1)', (id, currentA) => {
    const { i_n, ratio } = published(id).value;
    const density = Math.sqrt(timeOf(currentA));
    expect(density / Number(i_n)).toBeCloseTo(1, 8);
    expect(currentA / density / Number(ratio)).toBeCloseTo(1, 8);
  });

  it('doubles where the light is as noisy as its own photons: RIN = 2hν/P', () => {
    // 1 mW at 632.8 nm on a detector of unit quantum efficiency.
    const responsivityAW = Number.parseFloat(published('R_632.8').value);
    const perHz = 10 ** (Number(published('photon_rate_632.8').value.RIN) / 10);
    const shot = timeOf(1e-3, { ...QUIET, responsivityAW });
    const both = timeOf(1e-3, { ...QUIET, responsivityAW, intensityNoisePerHz: perHz });
    expect(both / shot).toBeCloseTo(2, 6);
  });

  it('doubles where a current drops 2kT/e over the resistor whose noise is added', () => {
    // 1 MΩ at 300 K: 2kT/e = 51.704 mV (SI 2019), so 51.704 nA.
    const noiseCurrentA = Number(published('johnson_1e6_300').value.i_n);
    const currentA = (2 * 1.380649e-23 * 300) / 1.602176634e-19 / 1e6;
    expect(timeOf(currentA, { ...QUIET, noiseCurrentA }) / timeOf(currentA)).toBeCloseTo(2, 6);
  });

  it('comes to a number worked by hand', () => {
    // 0.4 A/W · 5e4 W/m² = 2e4 A/m². Area 1e-7 m²: i = 2 mA. s = 2e4 · 2 · 1e-12 = 4e-8 A, of which 1 %: 4e-10 A.
    // 2ei = 6.408706536e-22, i_n² = 4e-24, RIN i² = 1e-15 · 4e-6 = 4e-21 A²/Hz; the sum is 4.6448706536e-21.
    const electronics = {
      responsivityAW: 0.4,
      irradianceWm2: 5e4,
      noiseCurrentA: 2e-12,
      intensityNoisePerHz: 1e-15,
    };
    const time = measurementTime([{ weight: 1, areaM2: 1e-7 }], 0.01, 2, 1e-12, electronics);
    expect(time / (4.6448706536e-21 / 1.6e-19)).toBeCloseTo(1, 9);
  });

  it('adds the noise of elements, and cancels that of the light where their weighted areas do', () => {
    const noisy = { ...QUIET, noiseCurrentA: 1e-12, intensityNoisePerHz: 1e-12 };
    const pair = [
      { weight: 1, areaM2: 2e-6 },
      { weight: -2, areaM2: 1e-6 },
    ];
    const balanced = measurementTime(pair, 1, 1, 1, noisy);
    // w² (2ei + i_n²): (2 + 4·1)·2e·1e-6 and (1 + 4)·1e-24.
    expect(balanced / (12e-6 * 1.602176634e-19 + 5e-24)).toBeCloseTo(1, 9);
    // With the same sign the light's own noise stays: RIN (4e-6 A)².
    const added = measurementTime([pair[0], { weight: 2, areaM2: 1e-6 }], 1, 1, 1, noisy);
    expect((added - balanced) / 1.6e-23).toBeCloseTo(1, 9);
  });

  it('falls with the square of correction, gain, extinction and, with shot noise alone, with the irradiance', () => {
    const at = (correction: number, gain: number, extinctionM2: number, irradianceWm2: number) =>
      measurementTime([{ weight: 1, areaM2: 1e-7 }], correction, gain, extinctionM2, {
        ...QUIET,
        irradianceWm2,
      });
    const once = at(0.01, 1, 1e-12, 1e4);
    expect(once / at(0.02, 1, 1e-12, 1e4)).toBeCloseTo(4, 10);
    expect(once / at(0.01, 3, 1e-12, 1e4)).toBeCloseTo(9, 10);
    expect(once / at(0.01, 1, 2e-12, 1e4)).toBeCloseTo(4, 10);
    expect(once / at(0.01, 1, 1e-12, 5e4)).toBeCloseTo(5, 10);
  });
});

describe('lobeRatio', () => {
  it('is the half-angle over that of the first dark ring', () => {
    // atan(0.02) = 0.0199973340 over 1.22 · 0.3175 = 0.38735
    expect(lobeRatio(0.4e-3, 20e-3, 635e-9, 2e-6)).toBeCloseTo(0.019997334 / 0.38735, 9);
    expect(lobeRatio(1.22 * 635e-9 * 1e4, 1, 635e-9, 1e-4)).toBeCloseTo(1, 4);
  });
});

describe('requiredSnr', () => {
  it('is area over what the correction, the gain and the extinction leave', () => {
    expect(requiredSnr([{ weight: 1, areaM2: 1e-7 }], 0.01, 2, 5e-12)).toBeCloseTo(1e6, 4);
    const pair = [
      { weight: 1, areaM2: 1e-7 },
      { weight: -2, areaM2: 1e-7 },
    ];
    expect(requiredSnr(pair, 0.01, 2, 5e-12)).toBeCloseTo(3e6, 4);
  });

  it('gives the common practice of design.md, section 4, with a large round or square detector', () => {
    // |f| falls as 1/√η, so 1 % needs η near 1e4. The lobe rule at 1/10 is R/z = 0.122 λ/d, hence η = 0.122 π R/d.
    const [lambda, diameter] = [635e-9, 2e-6];
    for (const [eta, correction, least, most] of [
      [1e4, 0.01, 1e11, 1e12],
      [1e2, 0.1, 5e5, 2e6],
    ]) {
      const radius = (eta * diameter) / (0.122 * Math.PI);
      const distance = (radius * diameter) / (0.122 * lambda);
      expect((Math.PI * radius ** 2) / (lambda * distance)).toBeCloseTo(eta, 6);
      expect(lobeRatio(radius, distance, lambda, diameter)).toBeCloseTo(0.1, 3);
      // Extinction of a large sphere: twice its cross-section.
      const extinction = (Math.PI * diameter ** 2) / 2;
      const snr = requiredSnr([{ weight: 1, areaM2: Math.PI * radius ** 2 }], correction, 1, extinction);
      expect(snr).toBeGreaterThan(least);
      expect(snr).toBeLessThan(most);
    }
  });
});

describe('areaOverFloor', () => {
  it('of a disc of phase η is η over the gain: the first Fresnel zone has π, or π/2 at its gain of two', () => {
    const [lambda, z] = [635e-9, 0.02];
    // η = πρ²/(λz) = π: the area is π λ z.
    const elements = [{ weight: 1, areaM2: Math.PI * lambda * z }];
    expect(areaOverFloor(elements, 1, lambda, z)).toBeCloseTo(Math.PI, 12);
    expect(areaOverFloor(elements, 2, lambda, z)).toBeCloseTo(Math.PI / 2, 12);
  });

  it('counts every element by the size of its weight', () => {
    const elements = [
      { weight: 1, areaM2: 2e-8 },
      { weight: -1, areaM2: 3e-8 },
    ];
    expect(areaOverFloor(elements, 1, 1e-6, 0.01)).toBeCloseTo(5, 12);
  });
});
