import { inputError } from '../base/errors.ts';
import { loadUnits } from '../base/quantity.ts';
import { DISTANCES_M } from '../run/givenDesign.ts';

/** Farthest from the axis that a place may be, metres. */
const FARTHEST_M = 1;

/** `--distance "20 mm"` in metres, null where it is left out. */
export async function readDistance(text: string | undefined): Promise<number | null> {
  if (text === undefined) return null;
  const distance = (await loadUnits()).parse(text, 'length', '--distance');
  if (distance >= DISTANCES_M[0] && distance <= DISTANCES_M[1]) return distance;
  throw refused('--distance', text, 'a distance from 0.1 mm to 10 m');
}

/** `--position "50 um, -30 um"` in metres, null where it is left out. */
export async function readPosition(text: string | undefined): Promise<[x: number, y: number] | null> {
  if (text === undefined) return null;
  const parts = text.split(',').map((part) => part.trim());
  if (parts.length !== 2) throw refused('--position', text, 'two lengths, such as "50 um, -30 um"');
  const units = await loadUnits();
  const [x, y] = parts.map((part) => units.parse(part, 'length', '--position'));
  if (Math.hypot(x, y) <= FARTHEST_M) return [x, y];
  throw refused('--position', text, 'a place within 1 m of the axis');
}

/** `--at-least "95 %"` as a share above 0 and below 1, null where it is left out. */
export async function readShare(text: string | undefined, option: string): Promise<number | null> {
  if (text === undefined) return null;
  const share = (await loadUnits()).parse(text, 'ratio', option);
  if (share > 0 && share < 1) return share;
  throw refused(option, text, 'a share above 0 and below 100 %');
}

/** Diameters that reference spheres may have, metres. */
const DIAMETERS_M = [1e-11, 1e-2] as const;

/** `--from "0.2 um" --to "10 um"` in metres. */
export async function readDiameters(from: string, to: string): Promise<[from: number, to: number]> {
  const units = await loadUnits();
  const fromM = units.parse(from, 'length', '--from');
  const toM = units.parse(to, 'length', '--to');
  if (!(fromM >= DIAMETERS_M[0])) throw refused('--from', from, 'a diameter of 0.01 nm or more');
  if (!(toM <= DIAMETERS_M[1])) throw refused('--to', to, 'a diameter of 10 mm or less');
  if (fromM < toM) return [fromM, toM];
  throw refused('--to', to, `a diameter above that of --from, ${from}`);
}

/** `--diameter "2 um"` in metres, null where it is left out. */
export async function readDiameter(text: string | undefined): Promise<number | null> {
  if (text === undefined) return null;
  const diameter = (await loadUnits()).parse(text, 'length', '--diameter');
  if (diameter >= DIAMETERS_M[0] && diameter <= DIAMETERS_M[1]) return diameter;
  throw refused('--diameter', text, 'a diameter from 0.01 nm to 10 mm');
}

/** Probabilities that an expanded uncertainty may be asked for. */
const COVERAGES = [0.5, 0.9999] as const;

/** `--coverage "95 %"` */
export async function readCoverage(text: string): Promise<number> {
  const coverage = (await loadUnits()).parse(text, 'ratio', '--coverage');
  if (coverage >= COVERAGES[0] && coverage <= COVERAGES[1]) return coverage;
  throw refused('--coverage', text, 'a probability from 50 % to 99.99 %');
}

/** Heights and correlation lengths that an edge may have, metres. */
const ROUGH_M = [1e-9, 1e-2] as const;

/** `--rough "2 um, 50 um"`: rms height and correlation length in metres, null where it is left out. */
export async function readRoughness(
  text: string | undefined,
): Promise<{ rmsM: number; correlationM: number } | null> {
  if (text === undefined) return null;
  const parts = text.split(',').map((part) => part.trim());
  const expected = 'an rms height and a correlation length, such as "2 um, 50 um"';
  if (parts.length !== 2) throw refused('--rough', text, expected);
  const units = await loadUnits();
  const [rmsM, correlationM] = parts.map((part) => units.parse(part, 'length', '--rough'));
  const isWithin = [rmsM, correlationM].every((length) => length >= ROUGH_M[0] && length <= ROUGH_M[1]);
  if (isWithin) return { rmsM, correlationM };
  throw refused('--rough', text, 'lengths from 1 nm to 10 mm');
}

function refused(key: string, text: string, expected: string) {
  return inputError([{ key, found: JSON.stringify(text.slice(0, 60)), expected }]);
}
