import { yamlFields } from '../base/yamlFields.ts';
import { parseYaml } from '../base/yamlFile.ts';
import type { ShopRules } from './shopRules.ts';

const ISLANDS = ['held', 'fall out'] as const;

/** One metre, µm: the longest that a preset may say. */
const LONGEST_UM = 1e6;

/**
 * Reads a shop's preset: the keys of `ShopRules`, lengths in µm with names that end in `Um`. A thickness of 0 says that it
 * does not enter; `cautions` is a text with one caution a line.
 *
 * @param name what a brief calls the shop
 * @param text the YAML file's content
 * @param file its name, for messages
 * @throws RimwrightError `input` with one problem for each key that is missing, unknown or impossible
 */
export function readShopPreset(name: string, text: string, file: string): ShopRules {
  const fields = yamlFields(parseYaml(text, file));
  const metres = (key: string, leastUm = 0) => fields.number(key, leastUm, LONGEST_UM) / 1e6;
  const rules: ShopRules = {
    name,
    title: fields.text('title'),
    process: fields.text('process'),
    thicknessM: metres('thicknessUm') || null,
    smallestOpeningM: metres('smallestOpeningUm', 1e-3),
    smallestWebM: metres('smallestWebUm', 1e-3),
    insideCornerRadiusM: metres('insideCornerRadiusUm'),
    outsideCornerRadiusM: metres('outsideCornerRadiusUm'),
    kerfM: metres('kerfUm'),
    edgeToleranceM: metres('edgeToleranceUm'),
    gridM: metres('gridUm'),
    islands: fields.choice('islands', ISLANDS),
    cautions: fields.text('cautions').trim().split('\n'),
    source: fields.text('source'),
  };
  fields.finish();
  return rules;
}
