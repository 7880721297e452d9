import type { Problem } from '../base/errors.ts';
import { inputError } from '../base/errors.ts';
import { airMeanFreePath, airViscosity } from './airViscosity.ts';
import { slipCorrection } from './slipCorrection.ts';
import { waterViscosity } from './waterViscosity.ts';

/** What a particle diffuses in: a fluid whose viscosity is known here, or a liquid of a given viscosity. */
export type DiffusionMedium = 'air' | 'water' | { viscosityPaS: number };

const BOLTZMANN_JK = 1.380649e-23; // SI (2019), exact
const STANDARD_PRESSURE_PA = 101_325;

/** Where diffusion coefficients are given: least, largest, and what. */
type Range = readonly [low: number, high: number, what: string];
export const DIFFUSING_DIAMETERS_M: Range = [1e-9, 1e-2, 'a diameter in metres'];
const PRESSURE_PA: Range = [1000, 1e6, 'a pressure in pascals'];
const VISCOSITY_PAS: Range = [1e-7, 1e4, 'a viscosity in Pa s'];
const DIFFUSION_M2S: Range = [0, 1, 'a diffusion coefficient in m²/s'];
const DURATION_S: Range = [0, 1e6, 'a duration in seconds'];
/** Where each medium's formulas are good. */
export const DIFFUSION_TEMPERATURES_K: Record<'air' | 'water' | 'liquid', Range> = {
  air: [200, 600, 'a temperature of air in kelvin'],
  water: [253.15, 383.15, 'a temperature of liquid water in kelvin'],
  liquid: [1, 3000, 'a temperature in kelvin'],
};

/**
 * Diffusion coefficient of a sphere, m²/s: kT C/(3π η d), Einstein (1905), Annalen der Physik 322, 549, with the slip correction
 * C (Kim et al. 2005) in air and 1 in liquids.
 *
 * @param diameterM metres, 1 nm to 1 cm
 * @param temperatureK kelvin: air 200 to 600, water 253.15 to 383.15, else 1 to 3000
 * @param pressurePa of air, 1 kPa to 1 MPa; liquids do not feel it
 * @throws RimwrightError `input` outside these ranges
 */
export function diffusionCoefficient(
  diameterM: number,
  temperatureK: number,
  medium: DiffusionMedium,
  pressurePa: number = STANDARD_PRESSURE_PA,
): number {
  refuse([
    ...outside('diameterM', diameterM, DIFFUSING_DIAMETERS_M),
    ...outside(
      'temperatureK',
      temperatureK,
      DIFFUSION_TEMPERATURES_K[typeof medium === 'string' ? medium : 'liquid'],
    ),
    ...outside('pressurePa', pressurePa, PRESSURE_PA),
    ...(typeof medium === 'string' ? [] : outside('viscosityPaS', medium.viscosityPaS, VISCOSITY_PAS)),
  ]);
  const stokes = (BOLTZMANN_JK * temperatureK) / (3 * Math.PI * viscosity(medium, temperatureK) * diameterM);
  if (medium !== 'air') return stokes;
  return stokes * slipCorrection((2 * airMeanFreePath(temperatureK, pressurePa)) / diameterM);
}

/**
 * The normal spread that stands for Brownian motion during one measurement: rms per axis, metres.
 *
 * A time t' after the start the variance is 2 D t' per axis. A reading is the mean over 0 … t, so what it feels is the mean of
 * these variances: √(D t) about the place where the measurement started, not the √(2 D t) of its end. That is the default, for
 * positions in a brief say where a particle may be found. Where a position means the centre of the path instead, take
 * `about: 'centre'`: about its own mean a path has √(D t/3), and that mean has wandered by √(2 D t/3).
 *
 * One normal law has the right variance but not the right shape, as the particle is near its start for a part of the time.
 * With q = 2κρ, the phase per metre of displacement, the interference of a rim at ρ falls by (1 − e^{−A})/A, A = (qσ)²,
 * while a normal spread says e^{−A/2}. The two differ by A²/24: below 1 % up to qσ = 0.7. Beyond, a spread promises more
 * damping than diffusion gives.
 *
 * @param diffusionM2S m²/s, 0 to 1
 * @param durationS seconds of one measurement, 0 to 1e6
 * @param about what the spread is counted from: the particle's first place, or the mean of its path
 * @throws RimwrightError `input` outside these ranges
 */
export function diffusionSpread(
  diffusionM2S: number,
  durationS: number,
  about: 'start' | 'centre' = 'start',
): number {
  refuse([
    ...outside('diffusionM2S', diffusionM2S, DIFFUSION_M2S),
    ...outside('durationS', durationS, DURATION_S),
  ]);
  return Math.sqrt((diffusionM2S * durationS) / (about === 'start' ? 1 : 3));
}

function viscosity(medium: DiffusionMedium, temperatureK: number): number {
  if (medium === 'air') return airViscosity(temperatureK);
  if (medium === 'water') return waterViscosity(temperatureK);
  return medium.viscosityPaS;
}

function outside(key: string, value: number, [low, high, what]: Range): Problem[] {
  if (value >= low && value <= high) return [];
  return [{ key, found: String(value), expected: `${what} from ${low} to ${high}` }];
}

function refuse(problems: readonly Problem[]): void {
  if (problems.length > 0) throw inputError(problems);
}
