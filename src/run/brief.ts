import type { Task } from '../score/task.ts';

/** The outline families a search can draw from, in the order in which tables name them. */
export const FAMILY_NAMES = ['disc', 'rings', 'ramp', 'fourier', 'polygon', 'sectors'] as const;
export type FamilyName = (typeof FAMILY_NAMES)[number];

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
