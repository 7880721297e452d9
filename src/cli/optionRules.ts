import { inputError } from '../base/errors.ts';
import { nearestName } from '../base/nearestName.ts';
import type { LengthUnit } from '../outline/files/lengthUnit.ts';
import { LENGTH_UNITS } from '../outline/files/lengthUnit.ts';

/** Turns an option's text into its value. */
type OptionRule<T> = (text: string) => T;

/** A whole number, both ends included. */
export function wholeNumber(option: string, least: number, most: number): OptionRule<number> {
  return (text) => {
    const value = Number(text);
    if (/^\d{1,12}$/.test(text) && value >= least && value <= most) return value;
    throw refused(option, text, `a whole number from ${least} to ${most}`);
  };
}

/** One of a few words. */
export function oneOf<const W extends string>(option: string, words: readonly W[]): OptionRule<W> {
  return (text) => {
    const word = words.find((known) => known === text);
    if (word !== undefined) return word;
    const nearest = nearestName(text, words);
    const hint = nearest === undefined ? '' : ` (did you mean ${nearest}?)`;
    throw refused(option, text, `one of ${words.join(', ')}${hint}`);
  };
}

/** The value of `--unit`. */
export function lengthUnit(text: string): LengthUnit {
  return oneOf('--unit', Object.keys(LENGTH_UNITS) as LengthUnit[])(text);
}

function refused(option: string, text: string, expected: string) {
  return inputError([{ key: option, found: JSON.stringify(text.slice(0, 60)), expected }]);
}
