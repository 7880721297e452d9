import { nearestName } from '../base/nearestName.ts';
import type { Path, Report } from './briefReport.ts';
import type { ValueRule } from './valueRules.ts';

/**
 * A key with a plain value, and what stands for it where it is left out: a value in the brief's notation, or nothing.
 * Here as below, `about` says in one line what the key means.
 */
export interface ValueKey<T> {
  kind: 'value';
  about: string;
  rule: ValueRule<T>;
  leftOut: 'refused' | 'allowed' | { use: unknown };
}

/** A key that holds more keys. Left out, it counts as a mapping without keys. */
export interface SectionKey<Keys> {
  kind: 'section';
  about: string;
  keys: Keys;
}

/** A key that holds more keys or the word `none`, which is also its default. */
export interface NoneOrSectionKey<Keys> {
  kind: 'none or section';
  about: string;
  keys: Keys;
}

/** A key that holds a plain value, or more keys. */
export interface ValueOrSectionKey<T, Keys> {
  kind: 'value or section';
  about: string;
  value: ValueKey<T>;
  keys: Keys;
  /** The keys with values, in the brief's notation. */
  example: string;
}

/** A key that holds a list of 1 to `longest` mappings, and may not be left out. */
export interface ListKey<Keys> {
  kind: 'list';
  about: string;
  keys: Keys;
  longest: number;
  /** One entry, in the brief's notation. */
  example: string;
}

/** A key that holds such a list or the word `none`, which is also its default. */
export interface NoneOrListKey<Keys> {
  kind: 'none or list';
  about: string;
  keys: Keys;
  longest: number;
  /** One entry, in the brief's notation. */
  example: string;
}

/** The keys of one mapping. */
export interface Keys {
  [name: string]:
    | ValueKey<unknown>
    | SectionKey<Keys>
    | NoneOrSectionKey<Keys>
    | ValueOrSectionKey<unknown, Keys>
    | ListKey<Keys>
    | NoneOrListKey<Keys>;
}

/** What was read; a key is absent where its value is wrong, or was left out and has no default. */
export type Values<K> = { [Name in keyof K]?: ValueOf<K[Name]> };

type ValueOf<Key> =
  Key extends ValueKey<infer T>
    ? T
    : Key extends SectionKey<infer K>
      ? Values<K>
      : Key extends NoneOrSectionKey<infer K>
        ? Values<K> | null
        : Key extends ValueOrSectionKey<infer T, infer K>
          ? T | Values<K>
          : Key extends ListKey<infer K>
            ? Values<K>[]
            : Key extends NoneOrListKey<infer K>
              ? Values<K>[] | null
              : never;

/**
 * Reads one mapping of a YAML file by its table of keys. Unknown keys, missing keys and wrong values go to the report.
 *
 * @param value what stands at `path`; undefined counts as a mapping without keys
 */
export function readMapping<K extends Keys>(value: unknown, path: Path, keys: K, report: Report): Values<K> {
  if (value !== undefined && !isMapping(value)) {
    report.refuse(path, keysInWords(keys));
    return {};
  }
  const given = value ?? {};
  const meant = refuseUnknownKeys(given, path, Object.keys(keys), report);
  const values: Record<string, unknown> = {};
  for (const [name, key] of Object.entries(keys)) {
    const isGiven = Object.hasOwn(given, name);
    // A mistyped key is one mistake, not also a missing one.
    if (!isGiven && meant.has(name)) continue;
    const read = readKey(isGiven ? given[name] : undefined, [...path, name], key, report);
    if (read !== undefined) values[name] = read;
  }
  return values as Values<K>;
}

function readKey(raw: unknown, path: Path, key: Keys[string], report: Report): unknown {
  switch (key.kind) {
    case 'value':
      return readValue(raw, path, key, report);
    case 'section':
      return readMapping(raw, path, key.keys, report);
    case 'none or section':
      if (raw === undefined) report.noteDefault(path, 'none');
      if (raw === undefined || raw === 'none') return null;
      if (isMapping(raw)) return readMapping(raw, path, key.keys, report);
      report.refuse(path, `none, or ${keysInWords(key.keys)}`);
      return undefined;
    case 'value or section':
      if (isMapping(raw)) return readMapping(raw, path, key.keys, report);
      return readValue(raw, path, key.value, report);
    case 'list':
    case 'none or list': {
      const isNone = key.kind === 'none or list' && (raw === undefined || raw === 'none');
      if (isNone && raw === undefined) report.noteDefault(path, 'none');
      if (isNone) return null;
      if (Array.isArray(raw) && raw.length > 0 && raw.length <= key.longest) {
        return raw.map((item, i) => readMapping(item ?? null, [...path, i], key.keys, report));
      }
      const list = `a list of 1 to ${key.longest} entries, each with ${keysInWords(key.keys)}`;
      report.refuse(path, key.kind === 'list' ? list : `none, or ${list}`);
      return undefined;
    }
  }
}

function readValue(raw: unknown, path: Path, { rule, leftOut }: ValueKey<unknown>, report: Report): unknown {
  let value = raw;
  if (raw === undefined) {
    if (leftOut === 'allowed') return undefined;
    if (leftOut !== 'refused') {
      value = leftOut.use;
      report.noteDefault(path, value);
    }
  }
  const checked = rule.check(value);
  if ('value' in checked) return checked.value;
  for (const { path: inner, expected } of checked.mistakes) {
    report.refuse([...path, ...inner], expected);
  }
  return undefined;
}

/** Refuses each unknown key, and gives the known keys that they seem to mean. */
function refuseUnknownKeys(given: object, path: Path, known: readonly string[], report: Report): Set<string> {
  const meant = new Set<string>();
  const missing = known.filter((name) => !Object.hasOwn(given, name));
  for (const name of Object.keys(given).filter((name) => !known.includes(name))) {
    const nearest = nearestName(name, [...missing, ...known]);
    if (nearest !== undefined) meant.add(nearest);
    const hint = nearest === undefined ? '' : ` (did you mean ${nearest}?)`;
    report.refuse([...path, name], `one of ${known.join(', ')}${hint}`, 'an unknown key');
  }
  return meant;
}

function isMapping(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

function keysInWords(keys: Keys): string {
  return `the keys ${Object.keys(keys).join(', ')}`;
}
