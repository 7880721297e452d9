import type { Uncertainties } from '../metrology/uncertainties.ts';
import type { FamilyName } from '../outline/families/family.ts';
import type { Task } from '../score/task.ts';
import type { BriefTolerances } from './briefTolerances.ts';

export { FAMILY_NAMES } from '../outline/families/family.ts';

/** A brief as checked: every key filled, every quantity in SI units. */
export interface Brief {
  title: string;
  task: Task;
  families: FamilyName[];
  /** How builds may differ from their drawing. */
  tolerances: BriefTolerances;
  search: { candidates: number; seed: number };
  /** The medium's and the shop's names as written, for tables. */
  mediumName: string;
  shopName: string;
  /** Of the built instrument: what `budget` and `evaluate` count with. */
  uncertainties: Uncertainties;
  /** Keys of its `uncertainties` that the brief left out, as `defaults`. */
  uncertaintyDefaults: string[];
  /** Other keys that the brief left out, with the value used, in the brief's own notation: `light.drift: 0 nm`. */
  defaults: string[];
  /** Those of `tolerances`, likewise. */
  toleranceDefaults: string[];
}
