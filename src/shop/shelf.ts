import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { inputError, RimwrightError } from '../base/errors.ts';
import { nearestName } from '../base/nearestName.ts';
import { readShopPreset } from './shopPreset.ts';
import type { ShopRules } from './shopRules.ts';

/**
 * A shop's rules by its name on the shelf.
 *
 * @param presetsFolder see `presetsFolder()`
 * @throws RimwrightError `input` for a name that is not on the shelf or a preset with mistakes, `machine` where the folder
 *   cannot be read
 */
export function loadShop(name: string, presetsFolder: string): ShopRules {
  const names = namesOf(presetsFolder);
  // Only names that were found on the shelf become a path: `../secret` is just an unknown name.
  if (!names.includes(name)) {
    const nearest = nearestName(name, names);
    const hint = nearest === undefined ? '' : ` (did you mean ${nearest}?)`;
    const expected = `one of the shops on the shelf: ${names.join(', ')}${hint}`;
    throw inputError([{ found: JSON.stringify(name), expected }]);
  }
  return readShop(name, presetsFolder);
}

/**
 * Every shop on the shelf, by name in alphabetical order.
 *
 * @throws RimwrightError as `loadShop`
 */
export function listShops(presetsFolder: string): ShopRules[] {
  return namesOf(presetsFolder).map((name) => readShop(name, presetsFolder));
}

function readShop(name: string, presetsFolder: string): ShopRules {
  const file = join(presetsFolder, 'shops', `${name}.yaml`);
  const text = fromDisk(file, () => readFileSync(file, 'utf8'));
  return readShopPreset(name, text, file);
}

function namesOf(presetsFolder: string): string[] {
  const folder = join(presetsFolder, 'shops');
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
