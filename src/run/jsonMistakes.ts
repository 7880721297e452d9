import type { Problem } from '../base/errors.ts';
import { nearestName } from '../base/nearestName.ts';

const MOST_LISTED = 10;

/** Collects the mistakes of one JSON file. */
export interface JsonMistakes {
  /** The first ten. */
  readonly problems: Problem[];
  /** Notes a mistake; `found` in words. */
  note(key: string, found: string, expected: string): void;
  /** Notes a value that is not what its key needs. */
  refuse(key: string, value: unknown, expected: string): void;
  /** The value as a mapping without unknown keys; null, and noted, where it is none. */
  mapping(key: string, value: unknown, known: readonly string[]): Record<string, unknown> | null;
}

/** @param file its name, for messages */
export function jsonMistakes(file: string): JsonMistakes {
  const problems: Problem[] = [];
  const note = (key: string, found: string, expected: string) => {
    if (problems.length < MOST_LISTED) problems.push({ file, key, found, expected });
  };
  const refuse = (key: string, value: unknown, expected: string) => note(key, inWords(value), expected);
  return {
    problems,
    note,
    refuse,
    mapping(key, value, known) {
      if (typeof value !== 'object' || value === null || Array.isArray(value)) {
        refuse(key, value, `an object with the keys ${known.join(', ')}`);
        return null;
      }
      for (const name of Object.keys(value)) {
        if (known.includes(name)) continue;
        const nearest = nearestName(name, known);
        const hint = nearest === undefined ? '' : ` (did you mean ${nearest}?)`;
        const place = key === '' ? '' : `${key}.`;
        note(`${place}${printable(name)}`, 'an unknown key', `only ${known.join(', ')}${hint}`);
      }
      return value as Record<string, unknown>;
    },
  };
}

/** A value of a file as an error quotes it. */
function inWords(value: unknown): string {
  if (value === undefined) return 'nothing';
  if (Array.isArray(value) && value.length > 3) return `a list of ${value.length}`;
  // JSON writes the infinity that 1e999 gives as null.
  return typeof value === 'number' ? String(value) : shortened(JSON.stringify(value));
}

function printable(name: string): string {
  return /^[\w-]{1,60}$/.test(name) ? name : shortened(JSON.stringify(name));
}

function shortened(text: string): string {
  return text.length > 60 ? `${text.slice(0, 60)}…` : text;
}
