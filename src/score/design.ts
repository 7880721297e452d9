import type { FamilyName } from '../outline/families/family.ts';
import type { OutlineElement } from '../outline/shape.ts';
import type { Fields } from '../reading/tableShelf.ts';
import type { ShopReport } from '../shop/inspect.ts';
import type { Scores } from './scores.ts';

/** A detector as it would be made: points, distance, and what it is worth. */
export interface Design {
  family: FamilyName | 'given';
  distanceM: number;
  elements: readonly OutlineElement[];
  scores: Scores;
  /** Which fields of the sphere the scores were computed from. */
  fields: Fields;
  /**
   * The same design judged by the other fields, where that was done: the worst correction then, and the largest difference
   * of a reading between the two, over gain and extinction.
   */
  otherFields?: { worst: number; difference: number };
  /** What the drawing itself would do, where the shop's cutting changes it: `scores` are of the outline as cut. */
  asDrawn?: { worst: number };
  shop: ShopReport;
}
