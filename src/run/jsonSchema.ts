/** A JSON Schema, or a part of one. */
export type JsonSchema = { [keyword: string]: unknown };

/** The dialect of our schemas. */
export const DRAFT = 'https://json-schema.org/draft/2020-12/schema';

/** A key that may be missing. */
type Optional = readonly ['optional', JsonSchema];

/** A schema for each key of T, those that may be missing marked: a key that is forgotten does not compile. */
type Properties<T> = { [K in keyof T]-?: Record<never, never> extends Pick<T, K> ? Optional : JsonSchema };

/** A mapping with exactly the keys of T. */
export function mapping<T>(description: string, properties: Properties<T>): JsonSchema {
  const entries = Object.entries(properties) as [string, JsonSchema | Optional][];
  return {
    description,
    type: 'object',
    properties: Object.fromEntries(entries.map(([name, one]) => [name, isOptional(one) ? one[1] : one])),
    required: entries.filter(([, one]) => !isOptional(one)).map(([name]) => name),
    additionalProperties: false,
  };
}

function isOptional(one: JsonSchema | Optional): one is Optional {
  return Array.isArray(one);
}

export const optional = (schema: JsonSchema): Optional => ['optional', schema];
export const number = (description: string): JsonSchema => ({ description, type: 'number' });
export const numberOrNull = (description: string): JsonSchema => ({ description, type: ['number', 'null'] });
export const text = (description: string): JsonSchema => ({ description, type: 'string' });
export const flag = (description: string): JsonSchema => ({ description, type: 'boolean' });
export const oneOf = (description: string, words: readonly string[]): JsonSchema => ({
  description,
  enum: words,
});
export const list = (description: string, items: JsonSchema): JsonSchema => ({
  description,
  type: 'array',
  items,
});
export const orNull = (schema: JsonSchema): JsonSchema => ({ anyOf: [schema, { type: 'null' }] });
/** A list of so many numbers. */
export const numbers = (description: string, count: number): JsonSchema => ({
  description,
  type: 'array',
  items: { type: 'number' },
  minItems: count,
  maxItems: count,
});
/** A mapping of which no more is said. */
export const anyMapping = (description: string): JsonSchema => ({ description, type: 'object' });
