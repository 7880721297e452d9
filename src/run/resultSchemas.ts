import type { Miss } from '../score/aim.ts';
import type { DesignJson } from './designJson.ts';
import { designSchema } from './designSchema.ts';
import type { Ending } from './ending.ts';
import type { JsonSchema } from './jsonSchema.ts';
import {
  anyMapping,
  DRAFT,
  flag,
  list,
  mapping,
  number,
  numberOrNull,
  numbers,
  oneOf,
  optional,
  orNull,
  text,
} from './jsonSchema.ts';
import type { Reading, ReadParticle } from './readings.ts';
import type { Response, ResponsePoint } from './response.ts';
import type { SearchJson, SmallestJson } from './results.ts';

/** The JSON Schemas of what commands print with `--json`. `search` is that of front.json too. */
export const RESULT_SCHEMAS = {
  search: () => ({
    $schema: DRAFT,
    title: 'Result of rimwright search, and front.json',
    ...mapping<SearchJson>('the front of a search', {
      brief: briefSchemaOfResults(),
      designs: list('those worth having, the best first', designSchema()),
      nearest: orNull(
        mapping<NonNullable<SearchJson['nearest']>>('the best where none meets the target', {
          design: designSchema(),
          misses: missesSchema(),
        }),
      ),
      ...common(),
    }),
  }),
  smallest: () => ({
    $schema: DRAFT,
    title: 'Result of rimwright smallest',
    ...mapping<SmallestJson>('the smallest design that meets the target', {
      brief: briefSchemaOfResults(),
      design: orNull(designSchema()),
      nearest: orNull(designSchema()),
      misses: missesSchema(),
      ...common(),
    }),
  }),
  reading: () => ({
    $schema: DRAFT,
    title: 'Result of rimwright reading',
    ...mapping<ReadingJson>('what an outline reads', {
      fields: oneOf('fields of the sphere behind the readings', ['far', 'exact']),
      readings: list('one for each particle, wavelength and place', readingSchema()),
      rough: optional(anyMapping('with --rough: what rough edges read')),
      design: orNull(designSchema()),
      brief: briefSchemaOfResults(),
      warnings: list('what to mind', text('a warning')),
    }),
  }),
  response: () => ({
    $schema: DRAFT,
    title: 'Result of rimwright response',
    ...mapping<ResponseJson>('what a design reads of spheres of every size', {
      fields: oneOf('fields of the sphere behind the readings', ['far', 'exact']),
      distance_m: number('from the particle to the mask, metres'),
      radius_m: number('of the circle around the outline, metres'),
      material: text('of the spheres'),
      gain: number("calibrated over the brief's particles"),
      target: number('largest correction allowed'),
      points: list('one for each diameter', responsePointSchema()),
      holds: list('runs of diameters that hold the target', numbers('first and last, metres', 2)),
      brief: briefSchemaOfResults(),
      warnings: list('what to mind', text('a warning')),
    }),
  }),
} satisfies Record<string, () => JsonSchema>;

/** What `rimwright reading --json` prints. */
interface ReadingJson {
  fields: string;
  readings: Reading[];
  rough?: object;
  /** Null for one place alone. */
  design: DesignJson | null;
  brief: object;
  warnings: string[];
}

/** What `rimwright response --json` prints. */
interface ResponseJson extends Response {
  fields: string;
  brief: object;
  warnings: string[];
}

/** What searches of both kinds end with. */
function common() {
  return {
    warnings: list('what to mind', text('a warning')),
    evaluations: number('candidates that were tried'),
    seconds: number('how long it took'),
    stopped: flag('whether it was interrupted'),
    ending: mapping<Ending>('how it ended', {
      reason: oneOf('why', ['spent', 'settled', 'interrupted']),
      movedInLastQuarter: numberOrNull('how much of the front its last quarter brought'),
      hints: list('what to change in the brief', text('a sentence that begins with a key')),
    }),
  };
}

function missesSchema(): JsonSchema {
  return list(
    'limits that it misses, the worst first',
    mapping<Miss>('a limit', {
      limit: text('its key in the brief'),
      factor: number('by which it is used up'),
    }),
  );
}

function readingSchema(): JsonSchema {
  const index = numbers('real and imaginary part, relative to vacuum', 2);
  return mapping<Reading>('a reading', {
    particle: mapping<ReadParticle>('the particle', {
      diameter_m: number('metres'),
      index: orNull(index),
      core: optional(
        mapping<NonNullable<ReadParticle['core']>>('of a layered sphere', {
          diameter_m: number('metres'),
          index,
        }),
      ),
      material: text('as the brief names it'),
    }),
    wavelength_m: number('in vacuum, metres'),
    distance_m: number('from the particle to the mask, metres'),
    position_m: numbers('x, y, z of the particle, metres', 3),
    spread_m: number('rms motion along each axis, metres'),
    local_irradiance: optional(number('in a focused beam: over that on the axis')),
    extinction_m2: number('extinction cross-section, m²'),
    reading_m2: number('what is read in its place, m²'),
    correction: number('reading over extinction, less 1'),
  });
}

function responsePointSchema(): JsonSchema {
  return mapping<ResponsePoint>('spheres of one diameter', {
    diameter_m: number('metres'),
    extinction_m2: number('extinction cross-section, m²'),
    reading_m2: number('mean of what is read in its place, m²'),
    calibrated_m2: number('that over gain, m²'),
    correction: mapping<ResponsePoint['correction']>('reading over gain and extinction, less 1', {
      least: number('over all places and wavelengths'),
      most: number('over all places and wavelengths'),
    }),
    holds: flag('whether both keep the target'),
  });
}

/** The brief with every key filled: quantities in the SI units that the keys' names end in. */
function briefSchemaOfResults(): JsonSchema {
  const parts = ['light', 'medium', 'placement', 'detector', 'target'];
  return {
    description: 'the brief as checked: every key filled, in the SI units that names end in',
    type: 'object',
    properties: {
      title: text('as in the brief'),
      task: {
        description: 'what scores are taken over',
        type: 'object',
        properties: {
          ...Object.fromEntries(parts.map((part) => [part, anyMapping(`the brief's ${part}`)])),
          particles: list('every particle', anyMapping('a particle')),
          shop: orNull(anyMapping("the shop's rules")),
        },
        required: [...parts, 'particles', 'shop'],
      },
      families: list('kinds of outlines', text('a family')),
      search: anyMapping('candidates and seed'),
      mediumName: text('as the brief writes it'),
      shopName: text('as the brief writes it'),
      defaults: list('keys that were left out', text('a key and what stands for it')),
    },
    required: ['title', 'task', 'families', 'search', 'mediumName', 'shopName', 'defaults'],
  };
}
