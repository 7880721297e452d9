import { inputError } from '../base/errors.ts';
import { formatQuantity } from '../base/quantity.ts';
import type { IndexModel } from '../optics/indexModel.ts';
import { coversWavelength, refractiveIndex } from '../optics/indexModel.ts';
import type { Fields } from '../reading/tableShelf.ts';
import type { Task } from '../score/task.ts';
import type { GivenDesign } from './givenDesign.ts';
import { judgeOutline } from './judgeOutline.ts';
import { scoreGiven } from './scoreGiven.ts';

/** Reference spheres: diameters evenly in the logarithm, both ends included. */
export interface ReferenceSpheres {
  fromM: number;
  toM: number;
  count: number;
  /** Relative to vacuum. */
  index: IndexModel;
  material: string;
}

/** What a design reads of reference spheres of one diameter, over every place and wavelength of the brief. */
export interface ResponsePoint {
  diameter_m: number;
  /** At the nominal wavelength. */
  extinction_m2: number;
  /** The mean over places and wavelengths of reading/extinction, times the extinction. */
  reading_m2: number;
  /** reading/gain: the cross-section that a calibrated detector shows. */
  calibrated_m2: number;
  /** reading/(gain · extinction) − 1: the least and the most. */
  correction: { least: number; most: number };
  /** Whether both keep the target. */
  holds: boolean;
}

export interface Response {
  distance_m: number;
  material: string;
  /** Calibrated over the brief's own particles, as scores do. */
  gain: number;
  target: number;
  points: ResponsePoint[];
  /** Runs of diameters that hold the target, metres: first and last of each. */
  holds: [from: number, to: number][];
}

/** Size parameters for which spheres can be computed, as for the particles of a brief. */
const SIZE_PARAMETERS = [0.001, 20_000] as const;
const LEAST_CONTRAST = 1e-6;
/** A Gaussian line is sampled to about twice its full width at half maximum on either side. */
const LINEWIDTHS_USED = 2;

/**
 * The expected reading of a design against the diameter of reference spheres.
 *
 * @throws RimwrightError `input` for spheres that cannot be computed in the brief's light and medium, or as `judgeOutline`
 */
export function responseOf(
  task: Task,
  given: GivenDesign,
  spheres: ReferenceSpheres,
  distanceM: number | null,
  fields: Fields = 'far',
): Response {
  checkSpheres(task, spheres);
  const judged = judgeOutline(task, given, distanceM, null, fields);
  const { gain } = scoreGiven(task, given, judged).scores;
  const target = task.target.correction;
  const points = diametersOf(spheres).map((diameterM): ResponsePoint => {
    const particle = { diameterM, index: spheres.index, material: spheres.material };
    const { judge } = judgeOutline({ ...task, particles: [particle] }, given, judged.distanceM, null, fields);
    const { ratios } = judge.outlineRatios(given.elements, judged.distanceM);
    const { least, most, mean } = extremes(ratios);
    const { wavelengthM } = task.light;
    const nominal = judge.scenarios.find((scenario) => scenario.wavelengthM === wavelengthM);
    const { extinctionM2 } = nominal ?? judge.scenarios[0];
    const correction = { least: least / gain - 1, most: most / gain - 1 };
    return {
      diameter_m: diameterM,
      extinction_m2: extinctionM2,
      reading_m2: mean * extinctionM2,
      calibrated_m2: (mean * extinctionM2) / gain,
      correction,
      holds: Math.max(-correction.least, correction.most) <= target,
    };
  });
  const { material } = spheres;
  return { distance_m: judged.distanceM, material, gain, target, points, holds: runsOf(points) };
}

function diametersOf({ fromM, toM, count }: ReferenceSpheres): number[] {
  const ratio = toM / fromM;
  return Array.from({ length: count }, (_, i) =>
    Number((fromM * ratio ** (i / (count - 1))).toPrecision(12)),
  );
}

function extremes(rows: readonly Float64Array[]): { least: number; most: number; mean: number } {
  let [least, most, sum, count] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY, 0, 0];
  for (const row of rows) {
    for (const ratio of row) {
      least = Math.min(least, ratio);
      most = Math.max(most, ratio);
      sum += ratio;
    }
    count += row.length;
  }
  return { least, most, mean: sum / count };
}

function runsOf(points: readonly ResponsePoint[]): [from: number, to: number][] {
  const runs: [number, number][] = [];
  points.forEach(({ diameter_m, holds }, i) => {
    if (!holds) return;
    if (i > 0 && points[i - 1].holds) runs[runs.length - 1][1] = diameter_m;
    else runs.push([diameter_m, diameter_m]);
  });
  return runs;
}

function checkSpheres({ light, medium }: Task, { fromM, toM, index, material }: ReferenceSpheres): void {
  const width = light.driftM + LINEWIDTHS_USED * light.linewidthM;
  const wavelengths = [light.wavelengthM - width, light.wavelengthM, light.wavelengthM + width];
  const inLength = (metres: number) => formatQuantity(metres, 'length');
  if (!wavelengths.every((wavelength) => coversWavelength(index, wavelength))) {
    const [low, high] = index.rangeM.map(inLength);
    const found = `${material} in light of ${inLength(light.wavelengthM)}`;
    throw inputError([
      { key: '--material', found, expected: `light from ${low} to ${high}, where its index is known` },
    ]);
  }
  const [n, k] = refractiveIndex(index, light.wavelengthM);
  const [nMedium] = refractiveIndex(medium, light.wavelengthM);
  if (Math.hypot(n / nMedium - 1, k / nMedium) <= LEAST_CONTRAST) {
    throw inputError([{ key: '--material', found: material, expected: 'another material than the medium' }]);
  }
  const unit = light.wavelengthM / (Math.PI * nMedium);
  const [least, most] = SIZE_PARAMETERS.map((size) => size * unit);
  if (fromM >= least && toM <= most) return;
  const found = `${inLength(fromM)} to ${inLength(toM)}`;
  const expected = `diameters from ${inLength(least)} to ${inLength(most)} in this light`;
  throw inputError([{ key: '--from', found, expected }]);
}
