import { presetsFolder } from '../base/presetsFolder.ts';
import { loadUnits } from '../base/quantity.ts';
import { briefSchema } from './briefSchema.ts';
import type { Keys, ValueKey } from './readMapping.ts';

/** One key of a brief. */
export type BriefKey = Keys[string];

/** A key with the names that lead to it: `['light', 'linewidth']`. Entries of lists have no name of their own. */
export interface PlacedKey {
  path: readonly string[];
  key: BriefKey;
  /** The keys that hold it, outermost first. */
  holders: readonly BriefKey[];
}

/** The keys of a brief that has no file yet. */
export async function loadBriefKeys(): Promise<Keys> {
  return briefSchema(await loadUnits(), presetsFolder(), null);
}

/** Every key, each before those that it holds. */
export function allKeys(
  keys: Keys,
  path: readonly string[] = [],
  holders: readonly BriefKey[] = [],
): PlacedKey[] {
  return Object.entries(keys).flatMap(([name, key]) => {
    const placed = { path: [...path, name], key, holders };
    return [placed, ...allKeys(innerKeys(key), placed.path, [...holders, key])];
  });
}

export function isList(key: BriefKey): key is Extract<BriefKey, { longest: number }> {
  return key.kind === 'list' || key.kind === 'none or list';
}

/** The keys that a key holds, if any. */
export function innerKeys(key: BriefKey): Keys {
  return key.kind === 'value' ? {} : key.keys;
}

/** The plain value that a key may have, if any. */
export function plainValueOf(key: BriefKey): ValueKey<unknown> | null {
  if (key.kind === 'value') return key;
  return key.kind === 'value or section' && key.value.rule.holds.kind !== 'nothing' ? key.value : null;
}

/** Whether a brief cannot do without the key. */
export function isRequired(key: BriefKey): boolean {
  if (key.kind === 'section') return Object.values(key.keys).some(isRequired);
  if (key.kind === 'list') return true;
  return plainValueOf(key)?.leftOut === 'refused';
}

/** What stands for a key that is left out, as YAML would give it; undefined for nothing. */
export function defaultOf(key: BriefKey): unknown {
  if (key.kind === 'none or section' || key.kind === 'none or list') return 'none';
  const leftOut = plainValueOf(key)?.leftOut;
  return typeof leftOut === 'object' ? leftOut.use : undefined;
}
