import { allVariants } from '../outline/families/allVariants.ts';
import type { FamilyName, PhaseLimits, Variant } from '../outline/families/family.ts';
import type { Judge } from './judge.ts';
import type { Task } from './task.ts';

/** Neighbouring distances of a search differ by at most this factor. */
const DISTANCE_STEP = 1.02;

/** Phases beyond this are not searched: a detector so large costs hundreds of times the floor. */
const LARGEST_PHASE = 400;

/** Everything a search may choose: the variants that draw outlines, and the distances. */
export interface SearchSpace {
  variants: readonly Variant[];
  /** Ascending, metres; one alone where the brief fixes it. */
  distances: readonly number[];
}

export function searchSpace(task: Task, families: readonly FamilyName[], judge: Judge): SearchSpace {
  const distances = distanceGrid(...task.detector.distanceM);
  const { balanced, elements } = task.detector;
  const variants = allVariants(families, phaseLimits(task, judge)).filter(({ weighted }) =>
    weighted ? elements !== 'one' : !balanced,
  );
  return { variants, distances };
}

/** The phases that the brief's radii span at its distances. */
function phaseLimits(task: Task, judge: Judge): PhaseLimits {
  const { radiusM, distanceM } = task.detector;
  const low = judge.kappa(distanceM[1]) * radiusM[0] ** 2;
  const high = judge.kappa(distanceM[0]) * radiusM[1] ** 2;
  return {
    low,
    high: Math.max(low * 1.001, Math.min(high, Math.max(LARGEST_PHASE, 4 * low))),
    gapM: task.detector.gapM ?? 0,
    distanceSpan: distanceM[1] / distanceM[0],
  };
}

/** Distances in even ratios, rounded to a micrometre: a search that knows them all need not table every distance. */
function distanceGrid(leastM: number, mostM: number): number[] {
  if (leastM === mostM) return [leastM];
  const steps = Math.max(1, Math.ceil(Math.log(mostM / leastM) / Math.log(DISTANCE_STEP)));
  const grid = Array.from({ length: steps + 1 }, (_, i) => leastM * (mostM / leastM) ** (i / steps));
  const rounded = grid.slice(1, -1).map((distance) => Math.round(distance * 1e6) / 1e6);
  return [leastM, ...rounded.filter((distance) => distance > leastM && distance < mostM), mostM];
}
