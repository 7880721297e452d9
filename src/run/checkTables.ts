import { RimwrightError } from '../base/errors.ts';
import { formatQuantity } from '../base/quantity.ts';
import { checkExtinction } from '../optics/amplitudeTable.ts';
import type { IndexModel } from '../optics/indexModel.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import type { Particle, TabledParticle } from '../optics/particle.ts';
import { isTabled } from '../optics/particle.ts';
import { shortReach } from '../optics/tableAmplitudes.ts';
import type { Task } from '../score/task.ts';
import { coneHalfAngle } from '../score/taskScenarios.ts';
import type { Path, Report } from './briefReport.ts';

/** Of the wavelength: how far the light may stray from the one that a table was computed for. */
const MOST_STRAY = 0.01;

/**
 * A table of amplitudes is of one wavelength, and must give the extinction that its computation gave.
 *
 * @param wavelengths shortest, nominal and longest of the light, metres
 * @param path of the entry
 */
export function checkTable(
  { amplitudes, material }: TabledParticle,
  extinctionM2: number,
  medium: IndexModel,
  [shortest, wavelength, longest]: readonly number[],
  path: Path,
  report: Report,
): void {
  if (Math.max(longest - wavelength, wavelength - shortest) > MOST_STRAY * wavelength) {
    const [low, high] = [shortest, longest].map((metres) => formatQuantity(metres, 'length'));
    const expected = 'light that strays 1 % at most from the one wavelength of a table';
    report.refuse([...path, 'amplitudes'], expected, `${material} in light of ${low} to ${high}`);
  }
  const wavenumber = (2 * Math.PI * refractiveIndex(medium, wavelength)[0]) / wavelength;
  try {
    checkExtinction(amplitudes, wavenumber, extinctionM2, material);
  } catch (error) {
    if (!(error instanceof RimwrightError) || error.code !== 'input') throw error;
    const [{ found, expected }] = error.problems;
    report.refuse([...path, 'extinction'], expected, found);
  }
}

/** Tables must reach as far as detectors may. */
export function checkReach(task: Task, entries: readonly Particle[][], report: Report): void {
  const halfAngle = coneHalfAngle(task);
  entries.forEach(([particle], i) => {
    if (!isTabled(particle)) return;
    const short = shortReach(particle.amplitudes, halfAngle);
    if (short !== null) report.refuse(['particles', i, 'amplitudes'], short.expected, short.found);
  });
}
