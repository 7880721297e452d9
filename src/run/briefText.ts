import { parseYaml } from '../base/yamlFile.ts';
import type { BriefKey } from './briefKeys.ts';
import { defaultOf, innerKeys, isList } from './briefKeys.ts';
import { keyExamples } from './keyExample.ts';
import type { Keys } from './readMapping.ts';

/** Values of a new brief by the path of their key, as text; of `particles` one text for each entry, in flow notation. */
export type GivenValues = ReadonlyMap<string, string | readonly string[]>;

/** Where the explanations begin, if values leave room for it. */
const COLUMN = 36;

/**
 * A brief with the given values, in which every key is explained. Keys without a value are comments that show what stands for
 * them, or an example where nothing does.
 */
export function briefText(keys: Keys, given: GivenValues): string {
  const lines = Object.entries(keys).flatMap(([name, key]) => ['', ...keyLines([name], key, given)]);
  const head = [
    '# What the instrument must do. Lines that begin with # are left out, and show what stands for them or an example.',
    '# rimwright help light.linewidth tells more of a key.',
  ];
  return `${[...head, ...lines].map(aligned).join('\n')}\n`;
}

function keyLines(path: readonly string[], key: BriefKey, given: GivenValues): string[] {
  const indent = '  '.repeat(path.length - 1);
  const place = path.join('.');
  const name = path.at(-1) ?? '';
  const value = given.get(place);
  if (Array.isArray(value)) {
    const entries = value.map((entry) => `${indent}  - ${entry}`);
    return [
      explained(`${indent}${name}:`, key.about),
      ...entries,
      `${indent}  # An entry may have these keys:`,
      ...innerLines(key, 1).map((line) => `${indent}  # ${line}`),
    ];
  }
  if (typeof value === 'string') return [explained(`${indent}${name}: ${plainOrQuoted(value)}`, key.about)];
  const hasGiven = [...given.keys()].some((one) => one.startsWith(`${place}.`));
  if (!hasGiven) return leftOutLines(name, key).map((line) => `${indent}# ${line}`);
  const inner = Object.entries(innerKeys(key));
  return [
    explained(`${indent}${name}:`, key.about),
    ...inner.flatMap(([one, innerKey]) => keyLines([...path, one], innerKey, given)),
  ];
}

/** A key that is left out, without the marks of a comment. */
function leftOutLines(name: string, key: BriefKey): string[] {
  const use = defaultOf(key);
  const inner = innerLines(key, 1);
  const keys = inner.length === 0 ? [] : [`${name}:`, ...inner];
  if (key.kind === 'section') return [explained(`${name}:`, key.about), ...inner];
  if (use === undefined && key.kind !== 'value') return [explained(keys[0], key.about), ...inner];
  const shown = use === undefined ? keyExamples(key)[0] : Array.isArray(use) ? `[${use.join(', ')}]` : use;
  const others = keys.length === 0 ? '' : '; or with keys:';
  return [explained(`${name}: ${shown}`, key.about + others), ...keys];
}

function innerLines(key: BriefKey, depth: number): string[] {
  const inner = Object.entries(innerKeys(key)).flatMap(([name, one]) => leftOutLines(name, one));
  const indent = '  '.repeat(depth);
  if (!isList(key)) return inner.map((line) => indent + line);
  return inner.map((line, i) => `${indent}${i === 0 ? '- ' : '  '}${line}`);
}

/** A line with its explanation after a tab, which no value holds. */
function explained(line: string, about: string): string {
  return `${line}\t# ${about}`;
}

function aligned(line: string): string {
  const [value, about] = line.split('\t');
  return about === undefined ? line : `${value.padEnd(COLUMN)} ${about}`;
}

/** A text as YAML reads it back. */
function plainOrQuoted(text: string): string {
  try {
    const { value } = parseYaml(`a: ${text}`, '');
    const read = (value as { a: unknown }).a;
    // Numbers may stay numbers: the checks take them as such.
    if (String(read) === text && text.trim() === text) return text;
  } catch {
    // Not YAML at all, so it needs quotes.
  }
  return JSON.stringify(text);
}
