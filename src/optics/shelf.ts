import { presetNames, presetText } from '../base/presetFiles.ts';
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
  return readEntry(kind, name, presetsFolder).model;
}

/**
 * Everything on the shelf of one kind, by name in alphabetical order.
 *
 * @throws RimwrightError as `loadIndexModel`
 */
export function listIndexModels(kind: ShelfKind, presetsFolder: string): ShelfEntry[] {
  return presetNames(kind, presetsFolder).map((name) => readEntry(kind, name, presetsFolder));
}

function readEntry(kind: ShelfKind, name: string, presetsFolder: string): ShelfEntry {
  const { text, file } = presetText(kind, name, presetsFolder);
  const preset = readIndexPreset(text, file);
  return { ...preset, name, rangeM: preset.model.rangeM };
}
