import { basename, extname } from 'node:path';
import { inputError, RimwrightError } from '../base/errors.ts';
import type { Units } from '../base/quantity.ts';
import type { BriefKey } from './briefKeys.ts';
import { allKeys, defaultOf, innerKeys, isRequired, plainValueOf } from './briefKeys.ts';
import type { GivenValues } from './briefText.ts';
import { briefText } from './briefText.ts';
import { exampleOf } from './holds.ts';
import { readBrief } from './readBrief.ts';
import type { Keys } from './readMapping.ts';

/** What a new brief is asked for, in this order, and the keys that the answers fill. */
const ASKED = {
  particles: 'particles',
  wavelength: 'light.wavelength',
  distance: 'detector.distance',
  radius: 'detector.radius',
  target: 'target.correction',
  medium: 'medium',
  shop: 'shop',
  title: 'title',
} as const;

export type Asked = keyof typeof ASKED;
/** Answers as text; what is missing is left out of the brief. */
export type Answers = { readonly [Name in Asked]?: string };

/** One thing that a new brief is asked for. */
export interface Question {
  name: Asked;
  /** What the key means. */
  about: string;
  /** Whether a brief needs it. */
  isNeeded: boolean;
  /** What an empty answer stands for: the default, or an example where there is none. */
  offered: string;
}

const PARTICLES_EXAMPLE = '1 um to 4 um polystyrene';

/** Every question, needed ones first. */
export function questionsFor(keys: Keys, file: string): Question[] {
  return (Object.keys(ASKED) as Asked[]).map((name) => {
    const key = keyOf(name, keys);
    const plain = plainValueOf(key);
    const example = plain === null ? PARTICLES_EXAMPLE : exampleOf(plain.rule.holds);
    const offered = name === 'title' ? basename(file, extname(file)) : String(defaultOf(key) ?? example);
    return { name, about: key.about, isNeeded: isRequired(key), offered };
  });
}

/** What is expected in place of an answer, or null where it is good. */
export function expectedFor(name: Asked, answer: string, keys: Keys, units: Units): string | null {
  if (name === 'particles') {
    const entries = particleEntries(answer, keys, units);
    return 'expected' in entries ? entries.expected : null;
  }
  const checked = plainValueOf(keyOf(name, keys))?.rule.check(answer);
  return checked !== undefined && 'mistakes' in checked ? checked.mistakes[0].expected : null;
}

/**
 * The text of a new brief, which `readBrief` takes.
 *
 * @param file the name that it will have
 * @throws RimwrightError `input` that names the option of an answer that cannot be used, alone or with the others
 */
export async function newBrief(answers: Answers, file: string, keys: Keys, units: Units): Promise<string> {
  const given = new Map<string, string | readonly string[]>();
  for (const [name, answer] of Object.entries(answers) as [Asked, string][]) {
    const expected = expectedFor(name, answer, keys, units);
    if (expected !== null) throw refused(name, answer, expected);
    const entries = name === 'particles' ? particleEntries(answer, keys, units) : null;
    given.set(ASKED[name], entries !== null && 'entries' in entries ? entries.entries : answer);
  }
  const text = briefText(keys, given as GivenValues);
  try {
    await readBrief(text, file);
  } catch (error) {
    if (!(error instanceof RimwrightError) || error.code !== 'input') throw error;
    // There is no such file yet, so its lines would say nothing.
    throw inputError(
      error.problems.map(({ key = '', found, expected }) => ({ key: optionOf(key), found, expected })),
    );
  }
  return text;
}

/** `1 um to 4 um polystyrene; 2 um 1.5 + 0.1i` as entries of `particles`, or what is expected instead. */
function particleEntries(
  answer: string,
  keys: Keys,
  units: Units,
): { entries: string[] } | { expected: string } {
  const { diameter, material, index } = innerKeys(keyOf('particles', keys));
  const expected = `diameters with a material or an index, such as "${PARTICLES_EXAMPLE}" or "2 um 1.5 + 0.1i"; further kinds after a semicolon`;
  const entries: string[] = [];
  for (const part of answer.split(';')) {
    const words = part.trim().split(/\s+/);
    const count = words.findLastIndex(
      (_, i) => units.readRange(words.slice(0, i).join(' '), 'length') !== null,
    );
    if (count < 1) return { expected };
    const [size, made] = [words.slice(0, count).join(' '), words.slice(count).join(' ')];
    const name = /^[-+.\d]/.test(made) ? 'index' : 'material';
    const mistake = mistakeOf(diameter, size) ?? mistakeOf(name === 'index' ? index : material, made);
    if (mistake !== null) return { expected: mistake };
    entries.push(`{ diameter: ${size}, ${name}: ${made} }`);
  }
  return { entries };
}

function mistakeOf(key: BriefKey, text: string): string | null {
  const checked = plainValueOf(key)?.rule.check(text);
  return checked !== undefined && 'mistakes' in checked ? checked.mistakes[0].expected : null;
}

function keyOf(name: Asked, keys: Keys): BriefKey {
  const placed = allKeys(keys).find(({ path }) => path.join('.') === ASKED[name]);
  if (placed === undefined) throw new Error(`no key ${ASKED[name]}`);
  return placed.key;
}

/** The option that fills a key, or else the key. */
function optionOf(key: string): string {
  const names = Object.entries(ASKED).find(([, path]) => key === path || key.startsWith(`${path}[`));
  return names === undefined ? key : `--${names[0]}`;
}

function refused(name: Asked, answer: string, expected: string) {
  return inputError([{ key: `--${name}`, found: JSON.stringify(answer.slice(0, 60)), expected }]);
}
