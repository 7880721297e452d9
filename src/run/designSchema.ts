import { FAMILY_NAMES } from '../outline/families/family.ts';
import type { Certificate, Scores } from '../score/scores.ts';
import type { DesignJson } from './designJson.ts';
import type { JsonSchema } from './jsonSchema.ts';
import { flag, list, mapping, number, numbers, oneOf, optional, text } from './jsonSchema.ts';

const FIELDS = ['far', 'exact'];

/** What a design is in results. */
export function designSchema(): JsonSchema {
  return mapping<DesignJson>('a design', {
    id: text('its name, such as rings-1'),
    family: oneOf('what drew it; given: a file', [...FAMILY_NAMES, 'given']),
    distance_m: number('from the particle to the mask, metres'),
    elements: list('what the detector is made of', elementSchema()),
    fields: oneOf('fields of the sphere behind the scores', FIELDS),
    otherFields: optional(
      mapping<NonNullable<DesignJson['otherFields']>>('what the other fields make of it', {
        worst: number('worst correction by the other fields'),
        difference: number('largest difference of a reading over gain and extinction'),
      }),
    ),
    asDrawn: optional(
      mapping<NonNullable<DesignJson['asDrawn']>>("the drawing itself, where the shop's cutting changes it", {
        worst: number('worst correction'),
      }),
    ),
    scores: scoresSchema(),
    rank: number('1 is the front'),
    meetsTarget: flag('whether it keeps every limit of the brief'),
  });
}

function elementSchema(): JsonSchema {
  const loops = (description: string, point: JsonSchema) => list(description, list('a ring', point));
  return mapping<DesignJson['elements'][number]>('an element', {
    weight: number('by which its signal counts'),
    distance_m: optional(number('of an element in another plane than the design, metres')),
    share: optional(number('its part of the light behind a beam splitter')),
    rings_mm: loops('its outline, rings within others being holes; mm', numbers('x, y', 2)),
    curves_mm: optional(loops('the same as edges and arcs; mm', numbers('x, y, bulge of what follows', 3))),
  });
}

function scoresSchema(): JsonSchema {
  return mapping<DesignJson['scores']>('what it costs and how true it reads', {
    gain: number('reading over extinction that is taken out'),
    correction: mapping<Scores['correction']>('relative to gain times extinction', {
      worst: number('largest over all samples'),
      rms: number('rms over all samples'),
      population: optional(number('of the mean over a whole distribution of sizes')),
      certified: optional(number('largest that climbing finds anywhere between the samples')),
      certifiedAt: optional(
        mapping<Certificate['certifiedAt']>('where that is', {
          diameter_m: number('of the particle, metres'),
          material: text('of the particle'),
          wavelength_m: number('in vacuum, metres'),
          depth_m: number('before or behind the nominal place, metres'),
          position_m: numbers('x, y of the particle, metres', 2),
        }),
      ),
    }),
    lobe: mapping<Scores['lobe']>('against diffraction', {
      ratio: number("half-angle over that of diffraction's first dark ring"),
    }),
    snr: mapping<Scores['snr']>('what one measurement needs', {
      required: number('signal-to-noise ratio, of the light without the particle'),
      time_s: number('seconds'),
    }),
    area_m2: number('of all elements, m²'),
    weightedArea_m2: optional(number('with weights and shares, m²')),
    radius_m: number('of the circle around the outline, metres'),
    areaOverFloor: number('area over gain, over wavelength times distance'),
    leastAreaOverFloor: optional(number('the least of that which any mask is proven to need')),
    shop: mapping<DesignJson['scores']['shop']>('whether the shop can cut it', {
      fits: flag('whether it keeps the rules'),
      notes: list('what was measured', text('a note')),
    }),
  });
}
