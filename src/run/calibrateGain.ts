import type { Expectations } from '../metrology/evaluatePowers.ts';
import { powerNoise } from '../metrology/extinctionModel.ts';
import type { GainFit, GainReading } from '../metrology/gainFit.ts';
import { fitGain } from '../metrology/gainFit.ts';
import type { PowerReading } from '../metrology/powerReading.ts';
import { expectedReadings } from './expectedReadings.ts';
import type { BuiltInstrument } from './instrument.ts';
import type { SphereKind } from './sphereLike.ts';

/** Least step by which a diameter is changed to see what its reading makes of that. */
const LEAST_STEP = 1e-3;

/** A reference sphere that may count. */
export type ReferenceReading = PowerReading & { reference: NonNullable<PowerReading['reference']> };

/**
 * The gain that readings of reference spheres speak for. What the design reads of each of these diameters more or less than the
 * brief's gain says is taken out, so that all of them speak for one number.
 *
 * @param readings at least one, without mistakes
 */
export function calibrateGain(
  { task, given, fields, distanceM, scores, instrument }: BuiltInstrument,
  readings: readonly ReferenceReading[],
  kind: SphereKind,
  averagingS: Expectations['averagingS'],
  { limit, omit }: { limit: number; omit: ReadonlySet<number> | 'outliers' },
): GainFit {
  const spheres = new Map(readings.map(({ reference }) => [reference.diameterM, reference]));
  const batches = [...spheres.values()];
  const steps = batches.map(({ diameterM, standardUncertaintyM }) =>
    Math.max(LEAST_STEP, Math.min(0.1, standardUncertaintyM / diameterM)),
  );
  const around = batches.flatMap(({ diameterM }, i) =>
    [1 - steps[i], 1, 1 + steps[i]].map((factor) => ({ ...kind, diameterM: diameterM * factor })),
  );
  const expected = expectedReadings(task, given, distanceM, around, fields);
  const known = new Map(
    batches.map(({ diameterM }, i) => {
      const [below, at, above] = expected.slice(3 * i, 3 * i + 3);
      const slope = (above.meanM2 - below.meanM2) / (2 * steps[i] * at.meanM2);
      // Anywhere within the brief's places and wavelengths.
      const spread = (at.mostM2 - at.leastM2) / (2 * Math.sqrt(3) * at.meanM2);
      return [diameterM, { meanM2: at.meanM2, slope, spread }];
    }),
  );
  const { irradianceWm2, uncertainties } = instrument;
  const gains = readings.map((reading): GainReading => {
    const { reference, withoutW, withW, line } = reading;
    const { meanM2, slope, spread } = known.get(reference.diameterM) ?? { meanM2: 1, slope: 0, spread: 0 };
    const perWatt = scores.gain / (irradianceWm2 * meanM2);
    const noiseW = Math.SQRT2 * powerNoise(instrument, reading.averagingS ?? averagingS);
    const driftW = (uncertainties.lightDrift * withoutW) / Math.sqrt(3);
    const relative = (slope * reference.standardUncertaintyM) / reference.diameterM;
    return {
      line,
      batch: reference.diameterM,
      gain: (withoutW - withW) * perWatt,
      independent: Math.hypot(perWatt * noiseW, perWatt * driftW, scores.gain * spread),
      common: scores.gain * Math.abs(relative),
    };
  });
  return fitGain(gains, limit, omit);
}
