import type { FamilyName } from '../outline/families/family.ts';
import type { OutlineElement } from '../outline/shape.ts';
import type { ShopReport } from '../shop/inspect.ts';
import type { Scores } from './scores.ts';

/** A detector as it would be made: points, distance, and what it is worth. */
export interface Design {
  family: FamilyName | 'given';
  distanceM: number;
  elements: readonly OutlineElement[];
  scores: Scores;
  shop: ShopReport;
}
