import { inputError } from '../base/errors.ts';
import type { Cauchy } from './cauchy.ts';
import { cauchy } from './cauchy.ts';
import type { CiddorAir } from './ciddorAir.ts';
import { ciddorAir } from './ciddorAir.ts';
import type { IapwsWater } from './iapwsWater.ts';
import { iapwsWater } from './iapwsWater.ts';
import type { Sellmeier } from './sellmeier.ts';
import { sellmeier } from './sellmeier.ts';
import type { TabulatedIndex } from './tabulatedIndex.ts';
import { tabulatedIndex } from './tabulatedIndex.ts';

/** The same index at every wavelength of its range. */
export interface ConstantIndex {
  formula: 'constant';
  /** Vacuum wavelengths, metres. */
  rangeM: [min: number, max: number];
  /** Index relative to vacuum. */
  n: number;
  /** Absorption index, 0 or more. */
  k: number;
}

/** How a refractive index depends on the wavelength: plain data, which may be sent to a worker or written as JSON. */
export type IndexModel = ConstantIndex | Sellmeier | Cauchy | CiddorAir | IapwsWater | TabulatedIndex;

/** An index that a brief gives as a number, for any wavelength of light (0.1 nm to 1 m). */
export function constantIndex(n: number, k = 0): ConstantIndex {
  return { formula: 'constant', rangeM: [1e-10, 1], n, k };
}

/**
 * The index n + ik relative to vacuum, for the time factor exp(−iωt).
 *
 * @param vacuumWavelengthM metres, within the model's `rangeM`
 * @throws RimwrightError `input` outside that range
 */
export function refractiveIndex(model: IndexModel, vacuumWavelengthM: number): [n: number, k: number] {
  if (!coversWavelength(model, vacuumWavelengthM)) {
    const [min, max] = model.rangeM.map(inNanometres);
    const expected = `a vacuum wavelength from ${min} to ${max}, where the index (${model.formula}) is known`;
    throw inputError([{ found: inNanometres(vacuumWavelengthM), expected }]);
  }
  switch (model.formula) {
    case 'constant':
      return [model.n, model.k];
    case 'sellmeier':
      return [sellmeier(model, vacuumWavelengthM), 0];
    case 'cauchy':
      return [cauchy(model, vacuumWavelengthM), 0];
    case 'ciddor':
      return [ciddorAir(model, vacuumWavelengthM), 0];
    case 'iapws-r9-97':
      return [iapwsWater(model, vacuumWavelengthM), 0];
    case 'tabulated':
      return tabulatedIndex(model, vacuumWavelengthM);
  }
}

/** Whether the model's index is known at this vacuum wavelength (metres). */
export function coversWavelength({ rangeM: [min, max] }: IndexModel, vacuumWavelengthM: number): boolean {
  // A wavelength that went through a change of units misses an end of the range by a rounding error.
  const slack = 1e-9;
  return vacuumWavelengthM >= min * (1 - slack) && vacuumWavelengthM <= max * (1 + slack);
}

function inNanometres(wavelengthM: number): string {
  return `${Number((wavelengthM * 1e9).toPrecision(7))} nm`;
}
