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

function refused(key: string, text: string, expected: string) {
  return inputError([{ key, found: JSON.stringify(text.slice(0, 60)), expected }]);
}
