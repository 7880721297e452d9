import { inputError } from '../base/errors.ts';
import { formatQuantity } from '../base/quantity.ts';
import { DIFFUSING_DIAMETERS_M } from '../optics/diffusion.ts';
import { beamProblems } from '../optics/gaussianBeam.ts';
import type { IndexModel } from '../optics/indexModel.ts';
import { coversWavelength, refractiveIndex } from '../optics/indexModel.ts';
import { linesOf, wavelengthRange } from '../optics/light.ts';
import type { Fields } from '../reading/tableShelf.ts';
import type { Task } from '../score/task.ts';
import type { GivenDesign } from './givenDesign.ts';
import { judgeOutline } from './judgeOutline.ts';
import { asMade, scoreGiven } from './scoreGiven.ts';

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
  /** In the brief's light at its nominal wavelength: the mean over its lines. */
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
  /** Of the outline. */
  radius_m: number;
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

/**
 * The expected reading of a design against the diameter of reference spheres.
 *
 * @throws RimwrightError `input` for spheres that cannot be computed in the brief's light and medium, or as `judgeOutline`
 */
export function responseOf(
  task: Task,
  outline: GivenDesign,
  spheres: ReferenceSpheres,
  distanceM: number | null,
  fields: Fields = 'far',
): Response {
  checkSpheres(task, spheres);
  const given = asMade(task, outline);
  const judged = judgeOutline(task, given, distanceM, null, fields);
  const { gain } = scoreGiven({ ...task, shop: null }, given, judged).scores;
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
  const { distanceM: distance_m, radiusM: radius_m } = judged;
  return { distance_m, radius_m, material, gain, target, points, holds: runsOf(points) };
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

/**
 * @param from, to what the ends of the diameters are called in messages
 * @throws RimwrightError `input` for spheres that cannot be computed in the brief's light and medium
 */
export function checkSpheres(
  { light, medium, placement }: Task,
  { fromM, toM, index, material }: Omit<ReferenceSpheres, 'count'>,
  from = '--from',
  to = '--to',
): void {
  const [shortest, longest] = wavelengthRange(light);
  if (!coversWavelength(index, shortest) || !coversWavelength(index, longest)) {
    const [low, high] = index.rangeM.map(inLength);
    const colours =
      shortest === longest ? inLength(shortest) : `${inLength(shortest)} to ${inLength(longest)}`;
    const expected = `light from ${low} to ${high}, where its index is known`;
    throw inputError([{ key: '--material', found: `${material} in light of ${colours}`, expected }]);
  }
  const colours = [shortest, ...linesOf(light).map(({ wavelengthM }) => wavelengthM), longest];
  const isInvisible = colours.some((wavelengthM) => {
    const [n, k] = refractiveIndex(index, wavelengthM);
    const [nMedium] = refractiveIndex(medium, wavelengthM);
    return Math.hypot(n / nMedium - 1, k / nMedium) <= LEAST_CONTRAST;
  });
  if (isInvisible) {
    throw inputError([{ key: '--material', found: material, expected: 'another material than the medium' }]);
  }
  // Diameters whose size parameter is 1.
  const units = colours.map(
    (wavelengthM) => wavelengthM / (Math.PI * refractiveIndex(medium, wavelengthM)[0]),
  );
  const found = fromM === toM ? inLength(fromM) : `${inLength(fromM)} to ${inLength(toM)}`;
  const least = SIZE_PARAMETERS[0] * Math.max(...units);
  const most = SIZE_PARAMETERS[1] * Math.min(...units);
  if (fromM < least || toM > most) {
    const expected = `diameters from ${inLength(least)} to ${inLength(most)} in this light`;
    throw inputError([{ key: from, found, expected }]);
  }
  if (light.beam !== undefined) {
    const wavelengthM = light.wavelengthM / refractiveIndex(medium, light.wavelengthM)[0];
    const [problem] = beamProblems(light.beam, wavelengthM, toM / 2);
    if (problem !== undefined) {
      const expected = `smaller spheres: of light.beam.waist they ask ${problem.expected}`;
      throw inputError([{ key: to, found: inLength(toM), expected }]);
    }
  }
  if (placement.diffusion === undefined) return;
  const [small, large] = DIFFUSING_DIAMETERS_M;
  if (fromM >= small && toM <= large) return;
  const expected = `diameters from ${inLength(small)} to ${inLength(large)}, for which the brief's diffusion is known`;
  throw inputError([{ key: from, found, expected }]);
}

const inLength = (metres: number) => formatQuantity(metres, 'length');
