import type { Distribution } from '../metrology/distribution.ts';
import type { Instrument, Response } from '../metrology/extinctionModel.ts';
import type { Particle } from '../optics/particle.ts';
import type { Fields } from '../reading/tableShelf.ts';
import { currentNoise } from '../score/cost.ts';
import { litElements } from '../score/litElements.ts';
import type { Scores } from '../score/scores.ts';
import { worstOf } from '../score/scores.ts';
import type { Task } from '../score/task.ts';
import type { Brief } from './brief.ts';
import { expectedReadings } from './expectedReadings.ts';
import type { GivenDesign } from './givenDesign.ts';
import { judgeOutline } from './judgeOutline.ts';
import { asMade, scoreGiven } from './scoreGiven.ts';

/** A brief's instrument, built after one design. */
export interface BuiltInstrument {
  task: Task;
  given: GivenDesign;
  fields: Fields;
  instrument: Instrument;
  distanceM: number;
  radiusM: number;
  /** Power on the detector without a particle, W: the weighted sum over its elements. */
  powerW: number;
  scores: Scores;
}

/**
 * The instrument that a brief describes, with the scores of its design: noise by the design's model, correction by its worst.
 *
 * @param particles whose reading says what distance and wavelength do; the brief's own if left out
 * @throws RimwrightError `input` as `judgeOutline`
 */
export function instrumentOf(
  { task, uncertainties }: Brief,
  outline: GivenDesign,
  distance: number | null,
  fields: Fields,
  particles: readonly Particle[] = task.particles,
): BuiltInstrument {
  const given = asMade(task, outline);
  const judged = judgeOutline(task, given, distance, null, fields);
  const { judge, distanceM, radiusM } = judged;
  const { scores } = scoreGiven({ ...task, shop: null }, given, judged);
  const { light, detector } = task;
  const lit = litElements(task, judge.outlineNodes(given.elements, distanceM), distanceM);
  const noise = currentNoise(lit, { ...detector, ...light });
  const weightedArea = lit.reduce((sum, { weight, areaM2 }) => sum + weight * areaM2, 0);
  const still = {
    ...task,
    light: { ...light, driftM: 0 },
    placement: { ...task.placement, depthM: 0 },
  };
  const readAt = (distanceM: number, wavelengthM: number) =>
    expectedReadings(
      { ...still, light: { ...still.light, wavelengthM } },
      given,
      distanceM,
      particles,
      fields,
    ).map(({ meanM2 }) => meanM2);
  const { wavelengthM } = light;
  const instrument: Instrument = {
    irradianceWm2: light.irradianceWm2,
    responsivityAW: detector.responsivityAW,
    noiseW2Hz: noise / detector.responsivityAW ** 2,
    gain: {
      value: scores.gain,
      standardUncertainty: uncertainties.gain * scores.gain,
      degreesOfFreedom: Number.POSITIVE_INFINITY,
      isFitted: false,
    },
    correction: correctionDistribution(scores),
    distance: responseTo(distanceM, uncertainties.distanceM, (value) => readAt(value, wavelengthM)),
    wavelength: responseTo(wavelengthM, uncertainties.wavelengthM, (value) => readAt(distanceM, value)),
    uncertainties,
  };
  const powerW = light.irradianceWm2 * weightedArea;
  return { task, given, fields, instrument, distanceM, radiusM, powerW, scores };
}

/**
 * What is known of the correction of an unknown particle at an unknown place: that it is within the worst, evenly, or near the
 * ends as of a swing where its rms is beyond that. Where the readings are off to one side, and the rms so large that no swing has
 * it, the ends move out until one has.
 */
export function correctionDistribution(scores: Pick<Scores, 'correction'>): Distribution {
  const worst = worstOf(scores);
  const { rms } = scores.correction;
  return rms <= worst / Math.sqrt(3)
    ? { kind: 'rectangular', mean: 0, half: worst }
    : { kind: 'arcsine', mean: 0, half: Math.max(worst, Math.SQRT2 * rms) };
}

/** Slope and curvature of the relative reading over one standard uncertainty to either side: rms over the particles. */
function responseTo(atM: number, uncertaintyM: number, readAt: (valueM: number) => number[]): Response {
  if (uncertaintyM === 0) return { atM, slope: 0, curvature: 0 };
  const [below, at, above] = [atM - uncertaintyM, atM, atM + uncertaintyM].map(readAt);
  const overAll = (of: (i: number) => number) =>
    Math.sqrt(at.reduce((sum, _, i) => sum + of(i) ** 2, 0) / at.length);
  return {
    atM,
    slope: overAll((i) => (above[i] - below[i]) / (2 * uncertaintyM * at[i])),
    curvature: overAll((i) => (above[i] - 2 * at[i] + below[i]) / (uncertaintyM ** 2 * at[i])),
  };
}
