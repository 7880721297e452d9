import type { IndexModel } from '../optics/indexModel.ts';
import type { Light } from '../optics/light.ts';
import type { Condition, Kind } from './conditions.ts';
import type { Task } from './task.ts';
import { tellingDiameters } from './tellingDiameters.ts';

/** Step in size parameter of the diameters that a range is looked at with beside its telling ones. */
const SIZE_STEP = 0.5;

/** Most diameters of one range that are looked at for each of the two. */
const MOST_DIAMETERS = 100;

/** Most conditions between the ends of all ranges. */
const MOST_BETWEEN = 240;

/** Conditions that a search for the worst begins with. */
export interface FirstConditions {
  /**
   * Single diameters and both ends of a range at every wavelength of −drift, 0, +drift and every depth of −depth, 0, +depth;
   * the brief's other diameters as they are meant.
   */
  given: Condition[];
  /** Telling and evenly spaced diameters of ranges, each at the ends of drift and depth, or where those are many at one of them in turn. */
  between: Condition[];
}

export function firstConditions(task: Task, kinds: readonly Kind[]): FirstConditions {
  const { light, medium, placement } = task;
  const lightsOf = (wavelengths: readonly number[], depths: readonly number[]) =>
    wavelengths.flatMap((wavelengthM) => depths.map((depthM) => ({ wavelengthM, depthM })));
  const nominal = lightsOf([light.wavelengthM], [0]);
  const ends = lightsOf(endsOf(light.wavelengthM, light.driftM), endsOf(0, placement.depthM));
  const all = lightsOf(
    [...new Set([light.wavelengthM, ...endsOf(light.wavelengthM, light.driftM)])],
    [...new Set([0, ...endsOf(0, placement.depthM)])],
  );
  const given = kinds.flatMap((kind) =>
    kind.diametersM.flatMap((diameterM) => {
      const isEnd = diameterM === kind.leastM || diameterM === kind.largestM;
      return (isEnd ? all : nominal).map((one) => ({ kind, diameterM, ...one }));
    }),
  );
  const inside = kinds.flatMap((kind) =>
    diametersInside(kind, medium, light).map((diameterM) => ({ kind, diameterM })),
  );
  const isFew = inside.length * ends.length <= MOST_BETWEEN;
  const between = inside.flatMap((one, i) =>
    (isFew ? ends : [ends[i % ends.length]]).map((where) => ({ ...one, ...where })),
  );
  return { given, between };
}

function endsOf(middle: number, reach: number): number[] {
  return reach === 0 ? [middle] : [middle - reach, middle + reach];
}

/** Of more telling diameters than can be looked at, those with the extremes of turn. */
function diametersInside(kind: Kind, medium: IndexModel, light: Light): number[] {
  const { leastM, largestM } = kind;
  const telling = tellingDiameters(kind, medium, light).sort((p, q) => p.turn - q.turn);
  const half = MOST_DIAMETERS / 2;
  const kept = telling.filter((_, i) => i < half || i >= telling.length - half);
  const steps = Math.ceil((Math.PI * (largestM - leastM)) / (SIZE_STEP * light.wavelengthM));
  const count = Math.min(MOST_DIAMETERS, steps);
  const even = Array.from(
    { length: Math.max(0, count - 1) },
    (_, i) => leastM + ((largestM - leastM) * (i + 1)) / count,
  );
  return [...kept.map(({ diameterM }) => diameterM), ...even].sort((p, q) => p - q);
}
