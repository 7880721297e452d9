import type { Problem } from './errors.ts';
import { inputError } from './errors.ts';
import type { YamlSource } from './yamlFile.ts';

/**
 * Reads the flat fields of a small YAML file, such as a preset. Each mistake is noted with its line, and a stand-in value
 * given, so that `finish` can report all of them at once.
 */
export interface YamlFields {
  /** A text that is not empty. */
  text(key: string): string;
  /** One of the given texts. */
  choice<Option extends string>(key: string, options: readonly Option[]): Option;
  /** A number from `min` to `max`. */
  number(key: string, min: number, max: number): number;
  /** A list of one number or more, each from `min` to `max`. */
  numbers(key: string, min: number, max: number): number[];
  /** Notes a mistake that involves more than one key. */
  refuse(key: string, found: string, expected: string): void;
  /** Throws an `input` error if there was any mistake, or a key that nobody asked for. */
  finish(): void;
}

/** @throws RimwrightError `input` where the file does not hold keys with values */
export function yamlFields(source: YamlSource): YamlFields {
  const { value } = source;
  if (typeof value !== 'object' || value === null || Array.isArray(value)) {
    throw inputError([{ file: source.file, line: 1, found: inWords(value), expected: 'keys with values' }]);
  }
  const fields = new Map<string, unknown>(Object.entries(value));
  const asked = new Set<string>();
  const problems: Problem[] = [];

  function refuse(key: string, found: string, expected: string): void {
    if (problems.some((problem) => problem.key === key)) return; // the first mistake explains the others
    problems.push({ file: source.file, line: source.lineOf([key]), key, found, expected });
  }
  function get<T>(key: string, isGood: (value: unknown) => value is T, expected: string, standIn: T): T {
    asked.add(key);
    const value = fields.get(key);
    if (isGood(value)) return value;
    refuse(key, inWords(value), expected);
    return standIn;
  }

  return {
    refuse,
    text: (key) => get(key, isText, 'a text', ''),
    choice<Option extends string>(key: string, options: readonly Option[]) {
      const isOption = (value: unknown): value is Option => options.some((option) => option === value);
      return get(key, isOption, `one of ${options.join(', ')}`, options[0]);
    },
    number: (key, min, max) => get(key, isNumber(min, max), `a number from ${min} to ${max}`, Number.NaN),
    numbers(key, min, max) {
      const isGood = isNumber(min, max);
      const areGood = (value: unknown): value is number[] =>
        Array.isArray(value) && value.length > 0 && value.every(isGood);
      return get(key, areGood, `a list of numbers from ${min} to ${max}`, []);
    },
    finish() {
      for (const key of fields.keys()) {
        if (!asked.has(key)) refuse(key, 'an unknown key', `only ${[...asked].join(', ')}`);
      }
      if (problems.length > 0) throw inputError(problems);
    },
  };
}

function isText(value: unknown): value is string {
  return typeof value === 'string' && value.trim() !== '';
}

function isNumber(min: number, max: number) {
  return (value: unknown): value is number => typeof value === 'number' && value >= min && value <= max;
}

function inWords(value: unknown): string {
  return value === undefined ? 'nothing' : JSON.stringify(value);
}
