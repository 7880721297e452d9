import type { FamilyName } from '../outline/families/family.ts';
import type { OutlineElement } from '../outline/shape.ts';
import type { Fields } from '../reading/tableShelf.ts';
import type { Scores } from '../score/scores.ts';
import type { GivenDesign } from './givenDesign.ts';
import type { RankedDesign } from './ranking.ts';

/** One element. */
interface ElementJson {
  weight: number;
  /** Where it stands in another plane than the design's, and its part of the light: behind a beam splitter. */
  distance_m?: number;
  share?: number;
  rings_mm: [x: number, y: number][][];
  /**
   * The same rings as straight edges and arcs, where they consist of these: each vertex with the bulge of what follows it, the
   * tangent of a quarter of the arc's angle, 0 for an edge, above 0 to the left. A whole circle is two half circles.
   */
  curves_mm?: [x: number, y: number, bulge: number][][];
}

/** A design as results hold it: SI units in the keys' names, coordinates in mm. */
export interface DesignJson {
  id: string;
  family: FamilyName | 'given';
  distance_m: number;
  elements: ElementJson[];
  /** Fields of the sphere behind the scores, and what the others make of the design. */
  fields: Fields;
  otherFields?: { worst: number; difference: number };
  /** The worst correction of the drawing itself, where the shop's cutting changes the outline: `scores` are as cut. */
  asDrawn?: { worst: number };
  scores: Scores & { shop: { fits: boolean; notes: readonly string[] } };
  /** 1 is the front. */
  rank: number;
  meetsTarget: boolean;
}

/** Decimals of a coordinate in mm: one nanometre, the grid on which a search draws. */
const DECIMALS = 6;
/** Of the exact curves, which are not on that grid. */
const CURVE_DECIMALS = 9;
const BULGE_DIGITS = 12;

/** The plain form of a design: what front.json and a design's own file hold. */
export function designToJson(design: RankedDesign): DesignJson {
  const { id, family, distanceM, elements, scores, fields, otherFields, asDrawn } = design;
  const { shop, rank, meetsTarget } = design;
  return {
    id,
    family,
    distance_m: distanceM,
    elements: elements.map(elementToJson),
    fields,
    ...(otherFields && { otherFields }),
    ...(asDrawn && { asDrawn }),
    scores: { ...scores, shop: { fits: shop.fits, notes: shop.notes } },
    rank,
    meetsTarget,
  };
}

/** The plain form of an outline from outside, without scores: these belong to a brief. */
export function outlineToJson({ id, family, elements }: GivenDesign, distanceM: number) {
  return { id, family, distance_m: distanceM, elements: elements.map(elementToJson) };
}

function elementToJson({ weight, rings, curves, distanceM, share }: OutlineElement): ElementJson {
  const inMm = (metres: number) => Number((metres * 1e3).toFixed(DECIMALS)) + 0;
  return {
    weight,
    ...(distanceM !== undefined && { distance_m: distanceM }),
    ...(share !== undefined && { share }),
    rings_mm: rings.map((ring) =>
      Array.from({ length: ring.length / 2 }, (_, k) => [inMm(ring[2 * k]), inMm(ring[2 * k + 1])]),
    ),
    ...(curves && { curves_mm: curves.map(curveToJson) }),
  };
}

function curveToJson(loop: Float64Array): [number, number, number][] {
  const inMm = (metres: number) => Number((metres * 1e3).toFixed(CURVE_DECIMALS)) + 0;
  const rounded = (bulge: number) => Number(bulge.toPrecision(BULGE_DIGITS)) + 0;
  return Array.from({ length: loop.length / 3 }, (_, k) => [
    inMm(loop[3 * k]),
    inMm(loop[3 * k + 1]),
    rounded(loop[3 * k + 2]),
  ]);
}
