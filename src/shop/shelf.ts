import { presetNames, presetText } from '../base/presetFiles.ts';
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
  return readShop(name, presetsFolder);
}

/**
 * Every shop on the shelf, by name in alphabetical order.
 *
 * @throws RimwrightError as `loadShop`
 */
export function listShops(presetsFolder: string): ShopRules[] {
  return presetNames('shops', presetsFolder).map((name) => readShop(name, presetsFolder));
}

function readShop(name: string, presetsFolder: string): ShopRules {
  const { text, file } = presetText('shops', name, presetsFolder);
  return readShopPreset(name, text, file);
}
