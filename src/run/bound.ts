import { inputError } from '../base/errors.ts';
import { LinearModels } from '../numeric/linearModel.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import { measurementTime } from '../score/cost.ts';
import { leadingFields } from '../score/farZoneError.ts';
import type { BoundTools } from '../score/maskBound.ts';
import { boundTools, hasDirection, MaskBounds } from '../score/maskBound.ts';
import type { MaskKind } from '../score/maskProgram.ts';
import { radiusWithinLobe } from '../score/radiusWithinLobe.ts';
import type { Task } from '../score/task.ts';
import { taskScenarios } from '../score/taskScenarios.ts';

/** The proven bound of a brief at one distance and one gain. */
export interface BoundJson {
  distance_m: number;
  gain: number;
  /** Of the circle that outlines stay within: the brief's largest, or what its lobe limit allows. */
  radius_m: number;
  /** For any mask; null where none keeps the correction. */
  any: LeastJson | null;
  /**
   * For outlines about the axis that every ray from it leaves once: discs, ramps, Fourier boundaries, polygons. Left out in a brief
   * with a preferred direction.
   */
  star?: LeastJson | null;
}

interface LeastJson {
  /** Proven: (area / gain) over λz is at least this. */
  areaOverFloor: number;
  area_m2: number;
  /** Of a measurement with a detector of that area; null in a focused beam, where area does not tell the power. */
  time_s: number | null;
  /** Taken off the bound for the finite size of cells and tables, in the unit of `areaOverFloor`. */
  error: number;
  /** A mask that comes this near, and its own worst correction. */
  mask: { areaOverFloor: number; worst: number | null };
}

/** Gains that are tried where the brief leaves a choice. */
const GAINS = [0.5, 0.7, 1, 1.4, 2, 2.8, 4, 5.6, 8];

/** Proves the least area over gain of a brief, for a few distances and gains. */
export async function boundsOf(
  task: Task,
  distancesM: readonly number[],
  gains: readonly number[],
  onBound: (bound: BoundJson) => void = () => {},
): Promise<BoundJson[]> {
  checkDirection(task);
  const models = await LinearModels.load();
  const tools = boundTools(task, leadingFields(task));
  const found: BoundJson[] = [];
  for (const distanceM of distancesM) {
    const radiusM = radiusWithinLobe(task, distanceM);
    const leastsOf = (kind: MaskKind) => leasts(task, models, tools, { distanceM, radiusM, kind }, gains);
    const any = leastsOf('any');
    const star = hasDirection(task) ? null : leastsOf('star');
    gains.forEach((gain, i) => {
      const bound = {
        distance_m: distanceM,
        gain,
        radius_m: radiusM,
        any: any[i],
        ...(star === null ? {} : { star: star[i] }),
      };
      found.push(bound);
      onBound(bound);
    });
  }
  return found;
}

/** Distances at which a brief's bound is told: both ends of its range and their geometric mean. */
export function boundDistances({ detector: { distanceM } }: Task): number[] {
  const [least, most] = distanceM;
  return least === most ? [least] : [least, Math.sqrt(least * most), most];
}

/** Gains at which a brief's bound is told. */
export function boundGains({ target }: Task): readonly number[] {
  return target.gain === 'one' ? [1] : GAINS;
}

function leasts(
  task: Task,
  models: LinearModels,
  tools: BoundTools,
  { distanceM, radiusM, kind }: { distanceM: number; radiusM: number; kind: MaskKind },
  gains: readonly number[],
): (LeastJson | null)[] {
  const cells = hasDirection(task) ? 'plane' : 'radial';
  const bounds = new MaskBounds(task, models, tools, { distanceM, radiusM, kind, cells });
  try {
    return gains.map((gain) => {
      const { areaOverFloor, error, mask } = bounds.at(gain);
      if (areaOverFloor === null || mask === null) return null;
      const areaM2 = areaOverFloor * gain * floorArea(task, distanceM);
      return {
        areaOverFloor,
        area_m2: areaM2,
        time_s: leastTime(task, areaM2, gain),
        error,
        mask: { areaOverFloor: mask.areaOverFloor, worst: mask.worst },
      };
    });
  } finally {
    bounds.dispose();
  }
}

/** λz with λ in the medium, m². */
function floorArea({ light, medium }: Task, distanceM: number): number {
  return (light.wavelengthM / refractiveIndex(medium, light.wavelengthM)[0]) * distanceM;
}

function leastTime(task: Task, areaM2: number, gain: number): number | null {
  const { light, detector, target } = task;
  if (light.beam !== undefined) return null;
  const extinctionM2 = Math.min(...taskScenarios(task, 3).map((scenario) => scenario.extinctionM2));
  const electronics = { ...detector, ...light };
  return measurementTime([{ weight: 1, areaM2 }], target.correction, gain, extinctionM2, electronics);
}

function checkDirection(task: Task): void {
  if (task.light.beam === undefined || !hasDirection(task)) return;
  const key = task.light.polarizationRad === null ? 'placement.crossing' : 'light.polarization';
  const expected = 'unpolarised light and no crossing where light.beam is focused';
  throw inputError([{ key, found: 'a preferred direction in a focused beam', expected }]);
}
