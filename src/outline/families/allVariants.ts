import { discVariants } from './disc.ts';
import type { FamilyName, PhaseLimits, Variant } from './family.ts';
import { fourierVariants } from './fourier.ts';
import { gridVariants } from './grid.ts';
import { polygonVariants } from './polygon.ts';
import { rampVariants } from './ramp.ts';
import { ringsVariants } from './rings.ts';
import { sectorsVariants } from './sectors.ts';
import { splitterVariants } from './splitter.ts';

/** Every variant of the named families, in a fixed order. */
export function allVariants(families: readonly FamilyName[], limits: PhaseLimits): Variant[] {
  const makers: Record<FamilyName, (limits: PhaseLimits) => Variant[]> = {
    disc: discVariants,
    rings: ringsVariants,
    ramp: rampVariants,
    fourier: fourierVariants,
    polygon: polygonVariants,
    sectors: sectorsVariants,
    grid: gridVariants,
    splitter: splitterVariants,
  };
  return families.flatMap((family) => makers[family](limits));
}
