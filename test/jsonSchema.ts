/**
 * A validator for the keywords of JSON Schema (draft 2020-12) that our schemas use. Others are mistakes of the schema.
 * Gives the places that do not fit, such as `/light/wavelength: pattern`.
 */
export function misfits(value: unknown, schema: Schema, root: Schema = schema, at = ''): string[] {
  return Object.entries(schema).flatMap(([keyword, rule]) => {
    const check = KEYWORDS[keyword];
    if (check === undefined) throw new Error(`${at}: the validator does not know ${keyword}`);
    return check(value, rule as never, { schema, root, at });
  });
}

export type Schema = { [keyword: string]: unknown };

interface Place {
  schema: Schema;
  root: Schema;
  at: string;
}

type Check = (value: unknown, rule: never, place: Place) => string[];

const isObject = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

const unless = (isGood: boolean, { at }: Place, keyword: string) => (isGood ? [] : [`${at}: ${keyword}`]);

/** Says nothing about a value. */
const annotation: Check = () => [];

const TYPES: Record<string, (value: unknown) => boolean> = {
  object: isObject,
  array: Array.isArray,
  string: (value) => typeof value === 'string',
  number: (value) => typeof value === 'number',
  integer: Number.isInteger,
  boolean: (value) => typeof value === 'boolean',
  null: (value) => value === null,
};

const KEYWORDS: Record<string, Check> = {
  $schema: annotation,
  $defs: annotation,
  title: annotation,
  description: annotation,
  default: annotation,
  examples: annotation,
  $ref: (value, rule: string, { root, at }) => {
    const name = rule.replace('#/$defs/', '');
    return misfits(value, (root.$defs as Record<string, Schema>)[name], root, at);
  },
  type: (value, rule: string | string[], place) =>
    unless(
      [rule].flat().some((type) => TYPES[type](value)),
      place,
      `type ${rule}`,
    ),
  enum: (value, rule: unknown[], place) => unless(rule.includes(value), place, 'enum'),
  const: (value, rule: unknown, place) => unless(value === rule, place, 'const'),
  pattern: (value, rule: string, place) =>
    unless(typeof value !== 'string' || new RegExp(rule, 'u').test(value), place, 'pattern'),
  minLength: (value, rule: number, place) =>
    unless(typeof value !== 'string' || value.length >= rule, place, 'minLength'),
  maxLength: (value, rule: number, place) =>
    unless(typeof value !== 'string' || value.length <= rule, place, 'maxLength'),
  minimum: (value, rule: number, place) =>
    unless(typeof value !== 'number' || value >= rule, place, 'minimum'),
  maximum: (value, rule: number, place) =>
    unless(typeof value !== 'number' || value <= rule, place, 'maximum'),
  minItems: (value, rule: number, place) =>
    unless(!Array.isArray(value) || value.length >= rule, place, 'minItems'),
  maxItems: (value, rule: number, place) =>
    unless(!Array.isArray(value) || value.length <= rule, place, 'maxItems'),
  uniqueItems: (value, rule: boolean, place) =>
    unless(!rule || !Array.isArray(value) || new Set(value).size === value.length, place, 'uniqueItems'),
  items: (value, rule: Schema, { root, at }) =>
    Array.isArray(value) ? value.flatMap((item, i) => misfits(item, rule, root, `${at}/${i}`)) : [],
  required: (value, rule: string[], { at }) =>
    isObject(value)
      ? rule.filter((name) => !Object.hasOwn(value, name)).map((name) => `${at}/${name}: required`)
      : [],
  properties: (value, rule: Record<string, Schema>, { root, at }) =>
    isObject(value)
      ? Object.entries(rule).flatMap(([name, one]) =>
          Object.hasOwn(value, name) ? misfits(value[name], one, root, `${at}/${name}`) : [],
        )
      : [],
  additionalProperties: (value, rule: Schema | false, { schema, root, at }) => {
    const known = Object.keys((schema.properties ?? {}) as object);
    const others = isObject(value) ? Object.entries(value).filter(([name]) => !known.includes(name)) : [];
    return others.flatMap(([name, one]) =>
      rule === false ? [`${at}/${name}: unknown`] : misfits(one, rule, root, `${at}/${name}`),
    );
  },
  anyOf: (value, rule: Schema[], { root, at }) => {
    const tries = rule.map((one) => misfits(value, one, root, at));
    return tries.some((found) => found.length === 0) ? [] : [`${at}: anyOf (${tries.flat().join('; ')})`];
  },
  not: (value, rule: Schema, place) =>
    unless(misfits(value, rule, place.root, place.at).length > 0, place, 'not'),
};
