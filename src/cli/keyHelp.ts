import { wrapText } from '../draw/plainText.ts';
import type { BriefKey, PlacedKey } from '../run/briefKeys.ts';
import { defaultOf, innerKeys, isList, isRequired, plainValueOf } from '../run/briefKeys.ts';
import { holdsInWords } from '../run/holds.ts';
import { keyExamples } from '../run/keyExample.ts';
import type { Keys } from '../run/readMapping.ts';
import { coloursFor } from './colour.ts';
import { TERMINAL_WIDTH } from './table.ts';

/** What the keys of a brief are, in a list. */
export function briefHelp(keys: Keys): string {
  const { bold, dim } = coloursFor(process.stdout);
  const lines = Object.entries(keys).flatMap(([name, key]) => {
    const inner = Object.keys(innerKeys(key));
    return [
      `  ${bold(name)}${dim(leftOutInWords(key))}`,
      ...indented(key.about, 6),
      ...(inner.length === 0 ? [] : indented(`Keys: ${inner.join(', ')}`, 6).map(dim)),
    ];
  });
  return [
    'The keys of a brief, a YAML file. Quantities carry their units (635 nm), and',
    'ranges are written as 10 mm to 60 mm.',
    '',
    ...lines,
    '',
    'rimwright help light.linewidth tells more of one.',
  ].join('\n');
}

/** One key: what it means, what it may hold, what stands for it, the keys in it, and an example. */
export function keyHelp(placed: PlacedKey): string {
  const { bold, dim } = coloursFor(process.stdout);
  const { path, key } = placed;
  const plain = plainValueOf(key);
  const inner = Object.entries(innerKeys(key));
  const keysTitle = plain === null ? 'keys' : 'or keys';
  return [
    bold(path.join('.')) + dim(leftOutInWords(key)),
    ...indented(key.about, 2),
    ...(plain === null ? [] : ['', ...indented(`value: ${holdsInWords(plain.rule.holds)}`, 2)]),
    ...(inner.length === 0 ? [] : ['', `  ${listInWords(key)}${keysTitle}:`]),
    ...inner.flatMap(([name, one]) => [
      `    ${bold(name)}${dim(leftOutInWords(one))}`,
      ...indented(one.about, 8),
    ]),
    '',
    '  example:',
    ...keyExamples(key).flatMap((example) => exampleLines(placed, example)),
  ].join('\n');
}

function listInWords(key: BriefKey): string {
  const none = key.kind === 'none or list' || key.kind === 'none or section' ? 'none, or ' : '';
  if (isList(key)) return `${none}a list of 1 to ${key.longest} entries with these `;
  return none && `${none}these `;
}

function leftOutInWords(key: BriefKey): string {
  const use = defaultOf(key);
  // The one list among the defaults is of all that there is.
  if (Array.isArray(use)) return '  (all if left out)';
  if (use !== undefined) return `  (${use} if left out)`;
  return isRequired(key) ? '  (needed)' : '';
}

/** The example under the keys that lead to it; what is within a list begins an entry. */
function exampleLines({ path, holders }: PlacedKey, example: string): string[] {
  let indent = 4;
  return path.map((name, i) => {
    const holder = holders[i - 1];
    const dash = holder !== undefined && isList(holder) ? '- ' : '';
    const line = `${' '.repeat(indent)}${dash}${name}:${i === holders.length ? ` ${example}` : ''}`;
    indent += 2 + dash.length;
    return line;
  });
}

function indented(text: string, by: number): string[] {
  return wrapText(text, TERMINAL_WIDTH - by).map((line) => ' '.repeat(by) + line);
}
