import { existsSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { inputError } from '../base/errors.ts';
import { nearestName } from '../base/nearestName.ts';
import { presetsFolder } from '../base/presetsFolder.ts';
import { parseYaml } from '../base/yamlFile.ts';
import type { Brief } from './brief.ts';
import type { OpenedBrief } from './openBrief.ts';
import { readBrief } from './readBrief.ts';

/** One of the two keys that a trade goes over, and its values as a brief writes them, rising. */
export interface TradeAxis {
  /** `detector.distance`. */
  key: string;
  values: string[];
}

/** A brief for each pair of values: the first axis' values, and for each of them the second's. */
export interface TradeGrid {
  axes: [TradeAxis, TradeAxis];
  briefs: Brief[];
}

/** Keys with quantities that may be called by their last word alone. */
const KEYS = [
  ...['wavelength', 'linewidth', 'drift', 'sourceAngle', 'irradiance'].map((key) => `light.${key}`),
  ...['offset', 'depth', 'spread'].map((key) => `placement.${key}`),
  ...['distance', 'radius', 'responsivity', 'noiseCurrent'].map((key) => `detector.${key}`),
  ...['correction', 'lobe', 'time'].map((key) => `target.${key}`),
];

/** Around a single value: from half of it to twice of it. */
const REACH = 2;

const QUANTITY = /^([+-]?[\d.]+(?:e[+-]?\d+)?)\s*(.*)$/i;

/**
 * Lays out the briefs of a trade over two keys.
 *
 * @param over two keys with a comma between them: `distance,offset`, each with a range of its own where that of the brief is
 *   not meant: `distance=10 mm..60 mm,offset=0 um..20 um`. Without one it goes over the range that the brief gives, or from
 *   half to twice its value. Steps are geometric, and even where a range begins at 0.
 * @param steps values of each key, 2 or more
 * @throws RimwrightError `input` for keys and ranges that cannot be used, or as `readBrief` for any brief of the grid
 */
export async function tradeGrid(opened: OpenedBrief, over: string, steps: number): Promise<TradeGrid> {
  const parts = over.split(',').map((part) => part.trim());
  if (parts.length !== 2) {
    throw refused(over, 'two keys of the brief, such as distance,offset');
  }
  const { file, text } = opened;
  const value = parseYaml(text, file).value as Record<string, unknown>;
  const axes = parts.map((part) => axisOf(part, value, steps)) as [TradeAxis, TradeAxis];
  if (axes[0].key === axes[1].key) throw refused(over, 'two different keys');
  const folder = existsSync(file) ? dirname(file) : join(presetsFolder(), 'briefs');
  const briefs: Brief[] = [];
  for (const first of axes[0].values) {
    for (const second of axes[1].values) {
      const changed = withValue(withValue(value, axes[0].key, first), axes[1].key, second);
      // JSON is YAML, too.
      const brief = await readBrief(JSON.stringify(changed), file, presetsFolder(), folder);
      briefs.push({ ...brief, search: opened.brief.search });
    }
  }
  return { axes, briefs };
}

function axisOf(part: string, brief: Record<string, unknown>, steps: number): TradeAxis {
  const [name, given] = part.split('=').map((side) => side.trim());
  const key = keyOf(name);
  const [section, word] = key.split('.');
  const own = (brief[section] as Record<string, unknown> | undefined)?.[word];
  const [low, high] = given === undefined ? ownRange(key, own) : rangeOf(part, given, /\.\.|\sto\s/);
  if (!(high.number > low.number) || low.number < 0 || low.unit !== high.unit) {
    throw refused(part, 'a range that rises, with one unit, such as distance=10 mm..60 mm');
  }
  const values = Array.from({ length: steps }, (_, i) => {
    const share = i / (steps - 1);
    const value =
      low.number > 0
        ? low.number * (high.number / low.number) ** share
        : low.number + (high.number - low.number) * share;
    return `${Number(value.toPrecision(4))} ${low.unit}`.trim();
  });
  return { key, values };
}

function keyOf(name: string): string {
  const key = KEYS.find((known) => known === name || known.split('.')[1] === name);
  if (key !== undefined) return key;
  const words = KEYS.map((known) => known.split('.')[1]);
  const nearest = nearestName(name, [...words, ...KEYS]);
  const hint = nearest === undefined ? '' : ` (did you mean ${nearest}?)`;
  throw refused(name, `one of ${words.join(', ')}${hint}`);
}

interface Quantity {
  number: number;
  unit: string;
}

/** The range that the brief gives a key, or one around its value. */
function ownRange(key: string, own: unknown): [Quantity, Quantity] {
  const example = `${key}=10 um..20 um`;
  const expected = `its range, as in '${example}'`;
  if (typeof own !== 'string' && typeof own !== 'number') throw refused(key, expected);
  if (/\sto\s/.test(String(own))) return rangeOf(key, String(own), /\sto\s/);
  const { number, unit } = quantityOf(key, String(own));
  if (!(number > 0)) throw refused(`${key}: ${own}`, expected);
  return [
    { number: number / REACH, unit },
    { number: number * REACH, unit },
  ];
}

function rangeOf(what: string, text: string, between: RegExp): [Quantity, Quantity] {
  const ends = text.split(between);
  if (ends.length !== 2) throw refused(what, 'a range, such as distance=10 mm..60 mm');
  return [quantityOf(what, ends[0]), quantityOf(what, ends[1])];
}

function quantityOf(what: string, text: string): Quantity {
  const match = QUANTITY.exec(text.trim());
  if (match === null || !Number.isFinite(Number(match[1]))) throw refused(what, 'numbers with their unit');
  return { number: Number(match[1]), unit: match[2] };
}

function withValue(brief: Record<string, unknown>, key: string, value: string): Record<string, unknown> {
  const [section, word] = key.split('.');
  return { ...brief, [section]: { ...(brief[section] as object | undefined), [word]: value } };
}

function refused(found: string, expected: string) {
  return inputError([{ key: '--over', found: JSON.stringify(found), expected }]);
}
