import type {
  ListKey,
  NoneOrListKey,
  NoneOrSectionKey,
  SectionKey,
  ValueKey,
  ValueOrSectionKey,
} from './readMapping.ts';
import type { ValueRule } from './valueRules.ts';

// What the table of keys is written with; `about` says in one line what a key means.

/** A key that cannot be left out. */
export const required = <T>(about: string, rule: ValueRule<T>): ValueKey<T> => ({
  kind: 'value',
  about,
  rule,
  leftOut: 'refused',
});

/** A key that can be left out, and then says nothing. */
export const optional = <T>(about: string, rule: ValueRule<T>): ValueKey<T> => ({
  kind: 'value',
  about,
  rule,
  leftOut: 'allowed',
});

/** A key for which `use` stands where it is left out, in the brief's notation. */
export const withDefault = <T>(use: unknown, about: string, rule: ValueRule<T>): ValueKey<T> => ({
  kind: 'value',
  about,
  rule,
  leftOut: { use },
});

export const section = <K>(about: string, keys: K): SectionKey<K> => ({ kind: 'section', about, keys });

export const noneOrSection = <K>(about: string, keys: K): NoneOrSectionKey<K> => ({
  kind: 'none or section',
  about,
  keys,
});

export const valueOrSection = <T, K>(
  value: ValueKey<T>,
  example: string,
  keys: K,
): ValueOrSectionKey<T, K> => ({
  kind: 'value or section',
  about: value.about,
  value,
  example,
  keys,
});

export const listOf = <K>(longest: number, about: string, example: string, keys: K): ListKey<K> => ({
  kind: 'list',
  about,
  keys,
  longest,
  example,
});

export const noneOrListOf = <K>(
  longest: number,
  about: string,
  example: string,
  keys: K,
): NoneOrListKey<K> => ({
  kind: 'none or list',
  about,
  keys,
  longest,
  example,
});
