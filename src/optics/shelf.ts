import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { inputError, RimwrightError } from '../base/errors.ts';
import { nearestName } from '../base/nearestName.ts';
import type { IndexModel } from './indexModel.ts';
import type { IndexPreset } from './indexPreset.ts';
import { readIndexPreset } from './indexPreset.ts';

/** Media surround the particle and are transparent; materials are what particles are made of. */
export type ShelfKind = 'media' | 'materials';

/** A medium or material as tables show it. */
export interface ShelfEntry extends IndexPreset {
  /** The file's name without `.yaml`: what a brief calls it. */
  name: string;
  /** Vacuum wavelengths for which its index is known, metres. */
  rangeM: [min: number, max: number];
}

/**
 * The index of a medium or material by its name on the shelf.
 *
 * @param presetsFolder see `presetsFolder()`
 * @throws RimwrightError `input` for a name that is not on the shelf or a preset with mistakes, `machine` where the folder
 *   cannot be read
 */
export function loadIndexModel(kind: ShelfKind, name: string, presetsFolder: string): IndexModel {
  const names = namesOf(kind, presetsFolder);
  // Only names that were found on the shelf become a path: `../secret` is just an unknown name.
  if (!names.includes(name)) {
    const nearest = nearestName(name, names);
    const hint = nearest === undefined ? '' : ` (did you mean ${nearest}?)`;
    const expected = `one of the ${kind} on the shelf: ${names.join(', ')}${hint}`;
    throw inputError([{ found: JSON.stringify(name), expected }]);
  }
  return readEntry(kind, name, presetsFolder).model;
}

/**
 * Everything on the shelf of one kind, by name in alphabetical order.
 *
 * @throws RimwrightError as `loadIndexModel`
 */
export function listIndexModels(kind: ShelfKind, presetsFolder: string): ShelfEntry[] {
  return namesOf(kind, presetsFolder).map((name) => readEntry(kind, name, presetsFolder));
}

function readEntry(kind: ShelfKind, name: string, presetsFolder: string): ShelfEntry {
  const file = join(presetsFolder, kind, `${name}.yaml`);
  const preset = readIndexPreset(
    fromDisk(file, () => readFileSync(file, 'utf8')),
    file,
  );
  return { ...preset, name, rangeM: preset.model.rangeM };
}

function namesOf(kind: ShelfKind, presetsFolder: string): string[] {
  const folder = join(presetsFolder, kind);
  return fromDisk(folder, () => readdirSync(folder))
    .filter((file) => file.endsWith('.yaml'))
    .map((file) => file.slice(0, -'.yaml'.length))
    .sort();
}

function fromDisk<T>(path: string, read: () => T): T {
  try {
    return read();
  } catch (cause) {
    throw new RimwrightError('machine', `cannot read ${path}: ${(cause as Error).message}`);
  }
}
