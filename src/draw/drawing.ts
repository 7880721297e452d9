import { inputError, type Problem } from '../base/errors.ts';
import { ringArea } from '../outline/area.ts';
import type { OutlineElement } from '../outline/shape.ts';
import type { Fact } from './titleBlock.ts';

/**
 * What every drawing is made from. Coordinates have their origin on the beam axis; x points right and y up for someone
 * behind the mask who looks towards the particle, so that the light (along +z) comes towards the reader.
 */
export interface Drawing {
  title: string;
  /** Each element counts the light through its openings with its weight; outer rings run counter-clockwise, holes clockwise. */
  elements: readonly OutlineElement[];
  /** What the shop must know, for the title block: sheet, tolerance, corners. */
  facts: readonly Fact[];
  notes: readonly string[];
  /** Particle to mask, metres. */
  distanceM: number;
  /** Identifies the design that was drawn. */
  hash: string;
}

/** How drawings name the side they are seen from: a mask without mirror symmetry reads differently when turned over. */
export const VIEW_NOTE =
  'Seen from behind the mask, looking towards the particle: x to the right, y up, origin on the beam axis.';

/**
 * Refuses a drawing that no shop could cut.
 *
 * @throws RimwrightError `input` for no element, an element without rings, a ring of fewer than three points, a
 *   coordinate that is not finite, or a ring without area
 */
export function checkDrawing(drawing: Drawing): void {
  const problems: Problem[] = [];
  if (drawing.elements.length === 0) {
    problems.push({ key: 'elements', found: 'none', expected: 'at least one element' });
  }
  drawing.elements.forEach((element, e) => {
    if (element.rings.length === 0) {
      problems.push({ key: `elements[${e}].rings`, found: 'none', expected: 'at least one ring' });
    }
    element.rings.forEach((ring, r) => {
      const problem = ringProblem(ring);
      if (problem) problems.push({ key: `elements[${e}].rings[${r}]`, ...problem });
    });
  });
  if (problems.length > 0) throw inputError(problems);
}

function ringProblem(ring: Float64Array): Problem | null {
  if (ring.length < 6 || ring.length % 2 !== 0) {
    return { found: `${ring.length} numbers`, expected: 'x and y of at least three points' };
  }
  const odd = ring.find((value) => !Number.isFinite(value));
  if (odd !== undefined) return { found: String(odd), expected: 'finite coordinates in metres' };
  if (ringArea(ring) === 0) return { found: 'a ring without area', expected: 'a ring around some area' };
  return null;
}
