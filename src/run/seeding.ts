import type { FoundMask, MaskJob, MaskResult } from '../crew/maskJob.ts';
import type { Variant } from '../outline/families/family.ts';
import { ringsOf, starProfile } from '../score/maskSteps.ts';
import { radiusWithinLobe } from '../score/radiusWithinLobe.ts';
import type { Task } from '../score/task.ts';

/** A start for a descent, drawn from a least mask. */
export interface Seed {
  variant: string;
  vector: number[];
}

/** What seeding needs to know of a search. */
interface Ground {
  task: Task;
  variants: readonly Variant[];
  /** Ascending, metres. */
  distances: readonly number[];
}

/** Distances, as places on the grid, and gains that masks are solved for: the first few where the budget is small. */
const PLACES = { any: [0, 0.2, 0.45, 0.75], star: [0, 0.33] } as const;
const GAINS = { any: [0.5, 1, 2], star: [1.4] } as const;

/**
 * Looks for the worst places for one gain: masks that a search only begins with need no tight bound. A source of finite angle
 * makes tables that take too long for any.
 */
const CUTS = 7;

/** Variants of rings that a mask's rings are handed to. */
const RINGS = ['rings-4', 'rings-2'];

/** Evaluations that a seed's descent should have, at the least; what a budget leaves room for decides how many masks are solved. */
const LEAST_SEED = 60;

/** Least masks to begin with, for as many seeds as a budget of evaluations has room for. */
export function maskJobs(ground: Ground, evaluations: number): MaskJob[] {
  const room = Math.floor(evaluations / LEAST_SEED);
  return (['any', 'star'] as const).flatMap((masks) => {
    const each = variantsFor(ground, masks).length;
    if (each === 0) return [];
    const { distances, task } = ground;
    const gains = task.target.gain === 'one' ? [1] : GAINS[masks];
    const places = distances.length === 1 ? [0] : PLACES[masks];
    return places.slice(0, Math.floor(room / 2 / (each * gains.length))).map((place) => ({
      kind: 'mask' as const,
      masks,
      distanceM: distances[Math.round(place * (distances.length - 1))],
      asks: gains.map((gain) => ({ gain, correction: task.target.correction })),
      cuts: task.light.sourceAngleRad ? 0 : CUTS,
    }));
  });
}

/** The seeds that least masks give, one for each variant that can draw something of the kind. */
export function seedsOf(ground: Ground, jobs: readonly MaskJob[], results: readonly MaskResult[]): Seed[] {
  return jobs.flatMap((job, i) =>
    results[i].found.flatMap((found) => {
      if (found === null) return [];
      const at = ground.distances.indexOf(job.distanceM);
      const slot = slotOf(ground.task, radiusWithinLobe(ground.task, job.distanceM));
      const place = ground.distances.length > 1 ? [at / (ground.distances.length - 1)] : [];
      return variantsFor(ground, job.masks).map((variant) => ({
        variant: variant.id,
        vector: [
          ...(job.masks === 'any' ? rimsFor(variant, found, slot) : starFor(variant, found)),
          ...place,
        ],
      }));
    }),
  );
}

function variantsFor({ variants }: Ground, masks: MaskJob['masks']): Variant[] {
  return variants.filter(({ id, fromProfile }) =>
    masks === 'any' ? RINGS.includes(id) : fromProfile !== undefined,
  );
}

/** Rims of a variant of rings; where the mask has fewer rings, the rest begin without width at the outer end. */
function rimsFor({ parameters }: Variant, { mask: { steps } }: FoundMask, slot: number): number[] {
  const unit = Math.sqrt(steps[steps.length - 1].end);
  const rims = widened(ringsOf(steps, parameters.length / 2), slot * unit);
  while (rims.length < parameters.length) rims.push(steps[steps.length - 1].end * 0.999);
  return within(rims, parameters);
}

/** The shop's smallest opening over the radius of the mask; 0 without a shop. */
function slotOf({ shop }: Task, radiusM: number): number {
  return shop === null ? 0 : shop.smallestOpeningM / radiusM;
}

/**
 * Rings at least so wide that the shop can cut them.
 *
 * @param rims in phase
 * @param least width in the root of phase
 */
function widened(rims: readonly number[], least: number): number[] {
  return Array.from({ length: rims.length / 2 }, (_, i) => {
    const [inner, outer] = [Math.sqrt(rims[2 * i]), Math.sqrt(rims[2 * i + 1])];
    const half = Math.max(outer - inner, 1.05 * least) / 2;
    const middle = Math.max((inner + outer) / 2, half);
    return [(middle - half) ** 2, (middle + half) ** 2];
  }).flat();
}

function starFor({ parameters, fromProfile }: Variant, { mask: { steps } }: FoundMask): number[] {
  return within(fromProfile?.(starProfile(steps)) ?? [], parameters);
}

function within(values: readonly number[], parameters: Variant['parameters']): number[] {
  return values.map((value, i) => Math.min(Math.max(value, parameters[i].low), parameters[i].high));
}
