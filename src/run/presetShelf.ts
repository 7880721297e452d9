import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { RimwrightError } from '../base/errors.ts';
import { parseYaml } from '../base/yamlFile.ts';

/** The parts of the shelf, in the order in which tables show them. */
export const SHELVES = ['media', 'materials', 'shops', 'briefs'] as const;
export type Shelf = (typeof SHELVES)[number];

/** A brief on the shelf, as tables show it. */
export interface ShelfBrief {
  /** The file's name without `.yaml`. */
  name: string;
  title: string;
  /** What it is an example of: the comment at its head. */
  about: string;
}

/**
 * Names on one part of the shelf, in alphabetical order.
 *
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
 * @param name one of `presetNames`
 * @throws RimwrightError `machine` where it cannot be read
 */
export function presetText(shelf: Shelf, name: string, presetsFolder: string): string {
  const file = join(presetsFolder, shelf, `${name}.yaml`);
  return fromDisk(file, () => readFileSync(file, 'utf8'));
}

/** Every brief on the shelf, by name in alphabetical order. */
export function listBriefs(presetsFolder: string): ShelfBrief[] {
  return presetNames('briefs', presetsFolder).map((name) => {
    const text = presetText('briefs', name, presetsFolder);
    const { title } = parseYaml(text, `${name}.yaml`).value as { title: string };
    const [about] = /^(?:#.*\n)*/.exec(text) ?? [''];
    return { name, title, about: about.replace(/^# ?/gm, '').trim().replaceAll('\n', ' ') };
  });
}

function fromDisk<T>(path: string, read: () => T): T {
  try {
    return read();
  } catch (cause) {
    throw new RimwrightError('machine', `cannot read ${path}: ${(cause as Error).message}`);
  }
}
