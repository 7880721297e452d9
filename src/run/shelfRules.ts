import { RimwrightError } from '../base/errors.ts';
import type { Shelf } from '../base/presetFiles.ts';
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
/** An index as a brief writes it. */
export const INDEX_PATTERN = `^(${NUMBER})(?:\\s*\\+\\s*(${NUMBER})\\s*i)?$`;

const ONE_OF: Record<Shelf, string> = {
  media: 'a medium',
  materials: 'a material',
  shops: 'a shop',
  briefs: 'a brief',
};

/**
 * A name on the shelf.
 *
 * @param load gives what the name stands for, and throws an `input` error for an unknown name
 * @param other what may stand in its place, for messages
 */
export function shelfName<T>(
  shelf: Shelf,
  load: (name: string) => T,
  example: string,
  other = '',
): ValueRule<Named<T>> {
  const expected = `the name of ${ONE_OF[shelf]} on the shelf, such as ${example}${other}`;
  return derived({ kind: 'shelf', shelf, example }, (value) => {
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
  return derived({ kind: 'index', n: [least, largest], k: largestK }, (value) => {
    const name = String(value);
    const match = isIndex(value) ? new RegExp(INDEX_PATTERN).exec(name) : null;
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
  return {
    holds: { kind: 'either', of: [shelf.holds, index.holds] },
    check: (value) => (isIndex(value) ? index : shelf).check(value),
  };
}

/** Numbers, and texts that begin as numbers do, are meant as an index. */
function isIndex(value: unknown): value is number | string {
  return typeof value === 'number' || (typeof value === 'string' && /^[-+.\d]/.test(value));
}
