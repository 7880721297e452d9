import { z } from 'zod';
import type { Dimension, Units } from '../base/quantity.ts';
import { quantityInWords } from '../base/quantity.ts';
import type { Tolerance } from '../score/tolerances.ts';
import { NO_TOLERANCE } from '../score/tolerances.ts';
import type { Holds } from './holds.ts';

/** What is wrong with a value, and where inside it. */
interface ValueMistake {
  path: (string | number)[];
  expected: string;
}

/** How one value of a brief is checked and turned into what the program works with. */
export interface ValueRule<T> {
  /** The same rule as data. */
  readonly holds: Holds;
  /** `undefined` stands for a value that is missing: its mistake says what is expected. */
  check(value: unknown): { value: T } | { mistakes: ValueMistake[] };
}

/** Least and largest value allowed, both included, in the brief's notation. */
type Limits = readonly [from: string, to: string];

/** Rules for quantities with units; values come out in SI units. */
export function quantityRules(units: Units) {
  const areWithin = (values: readonly number[], dimension: Dimension, [from, to]: Limits) =>
    values.every((value) => value >= units.parse(from, dimension) && value <= units.parse(to, dimension));
  // A ratio needs no unit, so YAML gives it as a number; any other bare number is a quantity without its unit.
  const asText = (value: unknown, dimension: Dimension) =>
    typeof value === 'number' && dimension === 'ratio' ? String(value) : value;

  return {
    /** `other` is what stands in its place, for messages. */
    quantity(dimension: Dimension, limits: Limits, example: string, other = ''): ValueRule<number> {
      const [from, to] = limits;
      const holds: Holds = { kind: 'quantity', dimension, isRange: false, from, to, example };
      return derived(holds, (value) => {
        const text = asText(value, dimension);
        const read = typeof text === 'string' ? units.read(text, dimension) : null;
        if (read === null) return { expected: quantityInWords(dimension, example) + other };
        return areWithin([read], dimension, limits)
          ? { value: read }
          : { expected: `a value from ${limits[0]} to ${limits[1]}` };
      });
    },

    /** Limits either way, such as `2 um`, or a standard deviation, such as `2 um rms`, or `none`. */
    tolerance(dimension: Dimension, largest: string, example: string): ValueRule<Tolerance> {
      const expected = `none, or ${quantityInWords(dimension, `${example} (limits either way)`)} or ${example} rms`;
      return derived({ kind: 'tolerance', dimension, largest, example }, (value) => {
        const text = asText(value, dimension);
        if (text === 'none') return { value: NO_TOLERANCE };
        if (typeof text !== 'string') return { expected };
        const isRms = /\srms$/.test(text);
        const size = units.read(text.replace(/\srms$/, ''), dimension);
        if (size === null) return { expected };
        if (size < 0 || size > units.parse(largest, dimension)) {
          return { expected: `none, or a value up to ${largest}` };
        }
        return { value: { law: isRms ? 'rms' : 'limits', size } };
      });
    },

    /** `A to B`, or one quantity for both ends. */
    quantityRange(dimension: Dimension, limits: Limits, example: string): ValueRule<[number, number]> {
      const [from, to] = limits;
      const holds: Holds = { kind: 'quantity', dimension, isRange: true, from, to, example };
      return derived(holds, (value) => {
        const text = asText(value, dimension);
        const ends = typeof text === 'string' ? units.readRange(text, dimension) : null;
        if (ends === null) return { expected: quantityInWords(dimension, example) };
        if (ends[0] > ends[1]) return { expected: `the smaller value first, such as ${example}` };
        return areWithin(ends, dimension, limits)
          ? { value: ends }
          : { expected: `values from ${limits[0]} to ${limits[1]}` };
      });
    },
  };
}

/** One of a few words. */
export function word<const W extends string>(words: readonly W[], expected = oneOf(words)): ValueRule<W> {
  return bySchema({ kind: 'words', words, isList: false }, z.enum(words, { error: expected }));
}

/** A list without repeats, each item one of a few words. */
export function words<const W extends string>(known: readonly W[]): ValueRule<W[]> {
  const expected = `a list with at least one of ${known.join(', ')}`;
  const list = z.array(z.enum(known, { error: oneOf(known) }), { error: expected }).min(1, expected);
  return bySchema(
    { kind: 'words', words: known, isList: true },
    list.superRefine((items, context) => {
      items.forEach((item, i) => {
        if (items.indexOf(item) < i)
          context.addIssue({ code: 'custom', path: [i], message: 'each of them once' });
      });
    }),
  );
}

/** YAML's true or false. */
export function trueOrFalse(): ValueRule<boolean> {
  return bySchema({ kind: 'true or false' }, z.boolean({ error: 'true or false' }));
}

/** A number without a unit, both ends included. */
export function plainNumber(from: number, to: number, what: string, example: number): ValueRule<number> {
  const expected = `${what} from ${from} to ${to}`;
  const holds: Holds = { kind: 'number', what, from, to, isWhole: false, example };
  return bySchema(holds, z.number({ error: expected }).min(from, expected).max(to, expected));
}

export function wholeNumber(from: number, to: number, example: number): ValueRule<number> {
  const what = 'a whole number';
  const expected = `${what} from ${from} to ${to}`;
  const holds: Holds = { kind: 'number', what, from, to, isWhole: true, example };
  return bySchema(holds, z.int({ error: expected }).min(from, expected).max(to, expected));
}

/** One line of text for people. */
export function textLine(longest: number): ValueRule<string> {
  const expected = `one line of text, 1 to ${longest} characters`;
  const visible = z.string({ error: expected }).max(longest, expected).regex(/\S/, expected);
  return bySchema({ kind: 'text', longest }, visible.regex(/^[^\p{C}\p{Zl}\p{Zp}]*$/u, expected));
}

/** A file's path. */
export function fileName(expected: string, example: string): ValueRule<string> {
  return bySchema(
    { kind: 'file', example },
    z
      .string({ error: expected })
      .max(1000, expected)
      .regex(/^[^\p{C}\p{Zl}\p{Zp}]+$/u, expected),
  );
}

/** No plain value at all. */
export function refused(expected: string): ValueRule<never> {
  return { holds: { kind: 'nothing' }, check: () => ({ mistakes: [{ path: [], expected }] }) };
}

/** One word as itself, and everything else by another rule. */
export function orWord<const W extends string, T>(known: W, other: ValueRule<T>): ValueRule<T | W> {
  return {
    holds: { kind: 'either', of: [{ kind: 'words', words: [known], isList: false }, other.holds] },
    check(value) {
      if (value === known) return { value: known };
      const checked = other.check(value);
      if ('value' in checked) return checked;
      const mistakes = checked.mistakes.map(({ path, expected }) => ({
        path,
        expected: `${known}, ${expected}`,
      }));
      return { mistakes };
    },
  };
}

/** `none` as null, and everything else by another rule. */
export function orNone<T>(other: ValueRule<T>): ValueRule<T | null> {
  return {
    holds: { kind: 'either', of: [{ kind: 'words', words: ['none'], isList: false }, other.holds] },
    check(value) {
      if (value === 'none') return { value: null };
      const checked = other.check(value);
      if ('value' in checked) return checked;
      return {
        mistakes: checked.mistakes.map(({ path, expected }) => ({ path, expected: `none, or ${expected}` })),
      };
    },
  };
}

/** A value that the function makes of what was given, or what it expects instead. */
export function derived<T>(
  holds: Holds,
  convert: (value: unknown) => { value: T } | { expected: string },
): ValueRule<T> {
  return {
    holds,
    check(value) {
      const made = convert(value);
      return 'value' in made ? made : { mistakes: [{ path: [], expected: made.expected }] };
    },
  };
}

function bySchema<T>(holds: Holds, schema: z.ZodType<T>): ValueRule<T> {
  return {
    holds,
    check(value) {
      const result = schema.safeParse(value);
      if (result.success) return { value: result.data };
      const mistakes = result.error.issues.map(({ path, message }) => ({
        path: path.filter((part) => typeof part !== 'symbol'),
        expected: message,
      }));
      return { mistakes };
    },
  };
}

function oneOf(known: readonly string[]): string {
  return known.length <= 2 ? known.join(' or ') : `one of ${known.join(', ')}`;
}
