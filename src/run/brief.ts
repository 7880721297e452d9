import type { FamilyName } from '../outline/families/family.ts';
import type { Task } from '../score/task.ts';

export { FAMILY_NAMES } from '../outline/families/family.ts';

/** A brief as checked: every key filled, every quantity in SI units. */
export interface Brief {
  title: string;
  task: Task;
  families: FamilyName[];
  search: { candidates: number; seed: number };
  /** The medium's and the shop's names as written, for tables. */
  mediumName: string;
  shopName: string;
  /** Keys that the brief left out, with the value used, in the brief's own notation: `light.drift: 0 nm`. */
  defaults: string[];
}
