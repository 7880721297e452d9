import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { inputError, RimwrightError } from './errors.ts';
import { nearestName } from './nearestName.ts';

/** The parts of the shelf, in the order in which tables show them. */
export const SHELVES = ['media', 'materials', 'shops', 'briefs'] as const;
export type Shelf = (typeof SHELVES)[number];

/**
 * Names on one part of the shelf, in alphabetical order.
 *
 * @param presetsFolder see `presetsFolder()`
 * @throws RimwrightError `machine` where the folder cannot be read
 */
export function presetNames(shelf: Shelf, presetsFolder: string): string[] {
  const folder = join(presetsFolder, shelf);
  return fromDisk(folder, () => readdirSync(folder))
    .filter((file) => file.endsWith('.yaml'))
    .map((file) => file.slice(0, -'.yaml'.length))
    .sort();
}

/**
 * The file of a preset, as it stands on the shelf.
 *
 * @throws RimwrightError `input` for a name that is not on the shelf, `machine` where it cannot be read
 */
export function presetText(
  shelf: Shelf,
  name: string,
  presetsFolder: string,
): { text: string; file: string } {
  const names = presetNames(shelf, presetsFolder);
  // Only names that were found on the shelf become a path: `../secret` is just an unknown name.
  if (!names.includes(name)) {
    const nearest = nearestName(name, names);
    const hint = nearest === undefined ? '' : ` (did you mean ${nearest}?)`;
    const expected = `one of the ${shelf} on the shelf: ${names.join(', ')}${hint}`;
    throw inputError([{ found: JSON.stringify(name), expected }]);
  }
  const file = join(presetsFolder, shelf, `${name}.yaml`);
  return { text: fromDisk(file, () => readFileSync(file, 'utf8')), file };
}

function fromDisk<T>(path: string, read: () => T): T {
  try {
    return read();
  } catch (cause) {
    throw new RimwrightError('machine', `cannot read ${path}: ${(cause as Error).message}`);
  }
}
