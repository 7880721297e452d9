import type { FamilyName } from '../outline/families/family.ts';
import type { OutlineElement } from '../outline/shape.ts';

/** Distances that a design may have, metres: those of a brief's `detector.distance`. */
export const DISTANCES_M = [1e-4, 10] as const;

/** An outline from outside: from a file, or made by a caller of the library. */
export interface GivenDesign {
  /** Fit for a file's name: letters, digits, dots, hyphens and underscores. */
  id: string;
  family: FamilyName | 'given';
  /** Particle to detector, metres; null where the outline came without a distance. */
  distanceM: number | null;
  /** Outer rings counter-clockwise, holes clockwise. */
  elements: readonly OutlineElement[];
  /** Where it came from, for messages. */
  file: string;
  /** What the user should know of how the file was read, such as the unit that was taken. */
  notes?: readonly string[];
}
