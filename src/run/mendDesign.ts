import { ringArea } from '../outline/area.ts';
import { mend } from '../shop/mend.ts';
import type { ShopRules } from '../shop/shopRules.ts';
import type { GivenDesign } from './givenDesign.ts';

/** A design near another one, that a shop can cut. */
export interface MendedDesign {
  given: GivenDesign;
  /** What was changed, and where: sentences without full stop. */
  changes: string[];
  /** Open area before and after, and what only one of the two covers, m². */
  areaM2: { before: number; after: number; difference: number };
  /** Whether the shop can cut it now, and its word on it. */
  fits: boolean;
  notes: string[];
}

/** Mends every element of a design for a shop (see `mend`). */
export function mendDesign(given: GivenDesign, rules: ShopRules): MendedDesign {
  const mended = given.elements.map(({ rings }) => mend(rings, rules));
  const name = (e: number) => (mended.length === 1 ? '' : `element ${e + 1}: `);
  const elements = given.elements.map(({ curves, ...element }, e) => {
    const { rings } = mended[e];
    return rings === element.rings ? { ...element, ...(curves && { curves }) } : { ...element, rings };
  });
  const areaOf = (outline: GivenDesign['elements']) =>
    outline.flatMap(({ rings }) => [...rings]).reduce((sum, ring) => sum + ringArea(ring), 0);
  return {
    given: { ...given, id: `${given.id.slice(0, 50)}-mended`, elements },
    changes: mended.flatMap(({ changes }, e) => changes.map((change) => name(e) + change)),
    areaM2: {
      before: areaOf(given.elements),
      after: areaOf(elements),
      difference: mended.reduce((sum, { differenceM2 }) => sum + differenceM2, 0),
    },
    fits: mended.every(({ report }) => report.fits),
    notes: mended.flatMap(({ report }, e) => report.notes.map((note) => name(e) + note)),
  };
}
