import { RimwrightError } from '../base/errors.ts';
import type { IndexModel } from '../optics/indexModel.ts';
import { constantIndex } from '../optics/indexModel.ts';
import type { ValueRule } from './valueRules.ts';
import { derived } from './valueRules.ts';

/** Something from the shelf, or an index, with its name as the brief writes it. */
export interface Named<T> {
  name: string;
  item: T;
}

const NUMBER = String.raw`(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?`;
const INDEX = new RegExp(`^(${NUMBER})(?:\\s*\\+\\s*(${NUMBER})\\s*i)?$`);

/**
 * A name on the shelf.
 *
 * @param load gives what the name stands for, and throws an `input` error for an unknown name
 */
export function shelfName<T>(load: (name: string) => T, expected: string): ValueRule<Named<T>> {
  return derived((value) => {
    if (typeof value !== 'string') return { expected };
    try {
      return { value: { name: value, item: load(value) } };
    } catch (error) {
      // A mistake inside a preset names its own file, and is not the brief's.
      if (!(error instanceof RimwrightError) || error.code !== 'input') throw error;
      if (error.problems.length !== 1 || error.problems[0].file !== undefined) throw error;
      return { expected: error.problems[0].expected };
    }
  });
}

/** Least and largest real part, and largest imaginary part, of an index. */
interface IndexLimits {
  n: readonly [number, number];
  k: number;
}

/** An index relative to vacuum: 1.59, or `1.5 + 0.1i` where `k` of the limits is above 0. */
export function indexValue({ n: [least, largest], k: largestK }: IndexLimits): ValueRule<Named<IndexModel>> {
  const expected =
    largestK === 0
      ? `a real index from ${least} to ${largest}`
      : `an index such as 1.59 or 1.5 + 0.1i, real part ${least} to ${largest}, imaginary part 0 to ${largestK}`;
  return derived((value) => {
    const name = String(value);
    const match = isIndex(value) ? INDEX.exec(name) : null;
    if (match === null) return { expected };
    const n = Number(match[1]);
    const k = Number(match[2] ?? 0);
    const isGood = n >= least && n <= largest && k <= largestK;
    return isGood ? { value: { name, item: constantIndex(n, k) } } : { expected };
  });
}

/** A name on the shelf, or an index. */
export function indexOrShelfName(
  index: ValueRule<Named<IndexModel>>,
  shelf: ValueRule<Named<IndexModel>>,
): ValueRule<Named<IndexModel>> {
  return { check: (value) => (isIndex(value) ? index : shelf).check(value) };
}

/** Numbers, and texts that begin as numbers do, are meant as an index. */
function isIndex(value: unknown): value is number | string {
  return typeof value === 'number' || (typeof value === 'string' && /^[-+.\d]/.test(value));
}
