import { inputError } from '../base/errors.ts';
import { FAMILY_NAMES } from '../outline/families/family.ts';
import { orientElement } from '../outline/nesting.ts';
import { findRingsCrossing } from '../outline/selfCrossing.ts';
import type { OutlineElement } from '../outline/shape.ts';
import type { DesignJson } from './designJson.ts';
import type { GivenDesign } from './givenDesign.ts';
import { DISTANCES_M } from './givenDesign.ts';
import type { JsonMistakes } from './jsonMistakes.ts';
import { jsonMistakes } from './jsonMistakes.ts';
import { readCurves } from './readCurves.ts';
import { isNumber, readRing } from './readRing.ts';

const MOST_POINTS = 100_000;
const MOST_RINGS = 1000;
const LARGEST_WEIGHT = 1e6;
const LEAST_SHARE = 1e-6;

const ID = /^[A-Za-z0-9][A-Za-z0-9._-]{0,59}$/;
const FAMILIES: readonly string[] = [...FAMILY_NAMES, 'given'];
const DESIGN_KEYS: readonly (keyof DesignJson)[] = [
  'id',
  'family',
  'distance_m',
  'elements',
  'fields',
  'otherFields',
  'asDrawn',
  'scores',
  'rank',
  'meetsTarget',
];
const ELEMENT_KEYS: readonly (keyof DesignJson['elements'][number])[] = [
  'weight',
  'distance_m',
  'share',
  'rings_mm',
  'curves_mm',
];

/**
 * Reads a design's geometry from its plain form. Its scores and rank are passed over: they belong to the brief that they
 * were computed for. Rings may run either way; within an element they must not meet, between elements they may.
 *
 * @param value what JSON gave
 * @param file its name, for messages
 * @throws RimwrightError `input` that names the key of each mistake (the first ten)
 */
export function readDesignJson(value: unknown, file: string): GivenDesign {
  const mistakes = jsonMistakes(file);
  const design = mistakes.mapping('', value, DESIGN_KEYS);
  const { id, family, distance_m, elements } = design ?? {};
  if (design !== null) {
    checkIdentity({ id, family, distance_m }, mistakes);
    if (!isFilledList(elements)) mistakes.refuse('elements', elements, 'a list with at least one element');
  }
  const list = isFilledList(elements) ? elements : [];
  const read = list.map((element, e) => readElement(element, `elements[${e}]`, mistakes));
  checkSize(read, mistakes);
  // Rings with other mistakes are not worth comparing.
  if (mistakes.problems.length === 0) {
    for (const [e, element] of read.entries()) refuseCrossing(element, e, mistakes);
  }
  if (mistakes.problems.length > 0) throw inputError(mistakes.problems);
  return {
    id: id as string,
    family: (family ?? 'given') as GivenDesign['family'],
    distanceM: distance_m as number,
    elements: read.map(orientElement),
    file,
  };
}

function checkIdentity(
  { id, family, distance_m }: Record<'id' | 'family' | 'distance_m', unknown>,
  mistakes: JsonMistakes,
): void {
  if (typeof id !== 'string' || !ID.test(id)) {
    mistakes.refuse('id', id, 'a name of up to 60 letters, digits, dots, hyphens and underscores');
  }
  if (family !== undefined && !FAMILIES.includes(family as string)) {
    mistakes.refuse('family', family, `one of ${FAMILIES.join(', ')}`);
  }
  if (!isNumber(distance_m, ...DISTANCES_M)) {
    mistakes.refuse('distance_m', distance_m, `a distance from ${DISTANCES_M.join(' to ')} m`);
  }
}

function readElement(value: unknown, key: string, mistakes: JsonMistakes): OutlineElement {
  const nothing = { weight: 1, rings: [] };
  const element = mistakes.mapping(key, value, ELEMENT_KEYS);
  if (element === null) return nothing;
  const { weight, distance_m, share, rings_mm, curves_mm } = element;
  if (!isNumber(weight, -LARGEST_WEIGHT, LARGEST_WEIGHT) || weight === 0) {
    const range = `from -${LARGEST_WEIGHT} to ${LARGEST_WEIGHT}`;
    mistakes.refuse(`${key}.weight`, weight, `a number other than 0, ${range}`);
    return nothing;
  }
  if (!isFilledList(rings_mm)) {
    mistakes.refuse(`${key}.rings_mm`, rings_mm, 'a list with at least one ring of points [x, y]');
    return nothing;
  }
  if (distance_m !== undefined && !isNumber(distance_m, ...DISTANCES_M)) {
    mistakes.refuse(`${key}.distance_m`, distance_m, `a distance from ${DISTANCES_M.join(' to ')} m`);
  }
  if (share !== undefined && !isNumber(share, LEAST_SHARE, 1)) {
    mistakes.refuse(`${key}.share`, share, `a part of the light from ${LEAST_SHARE} to 1`);
  }
  const rings = rings_mm.map((ring, r) => readRing(ring, `${key}.rings_mm[${r}]`, mistakes));
  const curves = curves_mm === undefined ? null : readCurves(curves_mm, rings, `${key}.curves_mm`, mistakes);
  return {
    weight,
    ...(distance_m !== undefined && { distanceM: distance_m as number }),
    ...(share !== undefined && { share: share as number }),
    rings,
    ...(curves && { curves }),
  };
}

function checkSize(elements: readonly OutlineElement[], mistakes: JsonMistakes): void {
  const rings = elements.flatMap((element) => element.rings);
  const points = rings.reduce((sum, { length }) => sum + length / 2, 0);
  if (points > MOST_POINTS) mistakes.note('elements', `${points} points`, `at most ${MOST_POINTS} points`);
  if (rings.length > MOST_RINGS)
    mistakes.note('elements', `${rings.length} rings`, `at most ${MOST_RINGS} rings`);
}

function refuseCrossing({ rings }: OutlineElement, e: number, mistakes: JsonMistakes): void {
  const crossing = findRingsCrossing(rings);
  if (crossing === null) return;
  const { ringI, ringJ, i, j } = crossing;
  const [x, y] = [crossing.x, crossing.y].map((metres) => Number((metres * 1000).toPrecision(6)));
  const other = ringI === ringJ ? `edge ${j}` : `edge ${j} of ring ${ringJ}`;
  mistakes.note(
    `elements[${e}].rings_mm[${ringI}]`,
    `edge ${i} meeting ${other} at x = ${x} mm, y = ${y} mm`,
    'rings that do not cross or touch themselves or each other',
  );
}

function isFilledList(value: unknown): value is unknown[] {
  return Array.isArray(value) && value.length > 0;
}
