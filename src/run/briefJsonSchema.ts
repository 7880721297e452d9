import { presetNames } from '../base/presetFiles.ts';
import { presetsFolder } from '../base/presetsFolder.ts';
import type { Units } from '../base/quantity.ts';
import { loadUnits } from '../base/quantity.ts';
import { quantityPattern } from '../base/quantityPattern.ts';
import type { BriefKey } from './briefKeys.ts';
import { defaultOf, isList, isRequired, loadBriefKeys, plainValueOf } from './briefKeys.ts';
import type { Holds } from './holds.ts';
import { holdsInWords } from './holds.ts';
import type { JsonSchema } from './jsonSchema.ts';
import { DRAFT } from './jsonSchema.ts';
import type { Keys } from './readMapping.ts';
import { INDEX_PATTERN } from './shelfRules.ts';

/**
 * The JSON Schema (draft 2020-12) of briefs, made of the keys that `readBrief` checks by. It knows keys, types, words, units and
 * names on the shelf; limits of quantities with units, and what keys ask of each other, only `readBrief` checks.
 */
export async function briefJsonSchema(): Promise<JsonSchema> {
  const units = await loadUnits();
  return {
    $schema: DRAFT,
    title: 'Brief of Rimwright',
    ...mappingSchema(await loadBriefKeys(), units),
  };
}

function mappingSchema(keys: Keys, units: Units): JsonSchema {
  const entries = Object.entries(keys);
  const required = entries.filter(([, key]) => isRequired(key)).map(([name]) => name);
  return {
    type: 'object',
    properties: Object.fromEntries(entries.map(([name, key]) => [name, describedSchema(key, units)])),
    ...(required.length > 0 && { required }),
    additionalProperties: false,
  };
}

function describedSchema(key: BriefKey, units: Units): JsonSchema {
  const use = defaultOf(key);
  const plain = plainValueOf(key);
  const value = plain === null ? '' : `: ${holdsInWords(plain.rule.holds)}`;
  return {
    description: key.about + value,
    ...(use !== undefined && { default: use }),
    ...keySchema(key, units),
  };
}

function keySchema(key: BriefKey, units: Units): JsonSchema {
  const plain = plainValueOf(key);
  const choices = plain === null ? [] : [holdsSchema(plain.rule.holds, units)];
  if (key.kind === 'none or section' || key.kind === 'none or list') choices.push({ const: 'none' });
  if (isList(key)) {
    const items = mappingSchema(key.keys, units);
    choices.push({ type: 'array', items, minItems: 1, maxItems: key.longest });
  } else if (key.kind !== 'value') {
    choices.push(mappingSchema(key.keys, units));
  }
  return oneOrAny(choices);
}

function holdsSchema(holds: Holds, units: Units): JsonSchema {
  switch (holds.kind) {
    case 'quantity': {
      const { dimension, isRange, from, to, example } = holds;
      const pattern = quantityPattern(dimension, isRange ? 'range' : 'quantity', from.startsWith('-'));
      const text = { type: 'string', pattern, examples: [example] };
      if (dimension !== 'ratio') return text;
      const [minimum, maximum] = [from, to].map((end) => units.parse(end, dimension));
      return { anyOf: [text, { type: 'number', minimum, maximum }] };
    }
    case 'tolerance': {
      const { dimension, largest, example } = holds;
      const pattern = quantityPattern(dimension, 'tolerance', false);
      const choices: JsonSchema[] = [{ const: 'none' }, { type: 'string', pattern, examples: [example] }];
      if (dimension === 'ratio') {
        choices.push({ type: 'number', minimum: 0, maximum: units.parse(largest, dimension) });
      }
      return { anyOf: choices };
    }
    case 'words': {
      const one = { enum: holds.words };
      return holds.isList ? { type: 'array', items: one, minItems: 1, uniqueItems: true } : one;
    }
    case 'number':
      return { type: holds.isWhole ? 'integer' : 'number', minimum: holds.from, maximum: holds.to };
    case 'true or false':
      return { type: 'boolean' };
    case 'text':
      return { type: 'string', pattern: '^[^\\n\\r]*\\S[^\\n\\r]*$', maxLength: holds.longest };
    case 'file':
      return { type: 'string', minLength: 1, examples: [holds.example] };
    case 'index': {
      const [minimum, maximum] = holds.n;
      const number = { type: 'number', minimum, maximum };
      return holds.k === 0 ? number : { anyOf: [number, { type: 'string', pattern: INDEX_PATTERN }] };
    }
    case 'shelf':
      return { enum: presetNames(holds.shelf, presetsFolder()) };
    case 'either':
      return oneOrAny(holds.of.map((one) => holdsSchema(one, units)));
    case 'nothing':
      return { not: {} };
  }
}

/** A single choice as it is; choices within choices become choices. */
function oneOrAny(choices: readonly JsonSchema[]): JsonSchema {
  const flat = choices.flatMap((choice) => {
    const inner = Object.keys(choice).length === 1 ? choice.anyOf : undefined;
    return (inner as JsonSchema[] | undefined) ?? [choice];
  });
  return flat.length === 1 ? flat[0] : { anyOf: flat };
}
