import type { Interval } from './coverageIntervals.ts';
import type { DiameterCurve } from './equivalentDiameter.ts';
import { diametersWithin, equivalentDiameters, shownRange } from './equivalentDiameter.ts';
import type { Instrument } from './extinctionModel.ts';
import { extinctionInputs, extinctionModel, powerNoise } from './extinctionModel.ts';
import type { PowerReading } from './powerReading.ts';
import { coverageFactor, uncertaintyBudget } from './uncertaintyBudget.ts';

/** `unusable` rows have no result; `doubtful` ones have, and a reason not to trust it. */
type Grade = 'good' | 'doubtful' | 'unusable';

interface Extinction {
  valueM2: number;
  standardUncertaintyM2: number;
  degreesOfFreedom: number;
  expandedUncertaintyM2: number;
}

export interface EvaluatedReading {
  reading: PowerReading;
  grade: Grade;
  reasons: string[];
  extinction: Extinction | null;
  /** Every diameter whose sphere shows that extinction, metres; several where the curve ripples. */
  diametersM: number[];
  /** From the smallest to the largest that the expanded uncertainty allows. */
  diameterIntervalM: Interval | null;
}

/** What rows are held against. */
export interface Expectations {
  coverage: number;
  /** Averaging time of rows that state none, seconds. */
  averagingS: number;
  /** Power without a particle that the light should make, W; null where elements of weights below 0 cancel it. */
  powerW: number | null;
  /** Whose light that is, as messages say it. */
  lightOf: string;
  /** Power from which the detector does not tell any more, W; null where none was stated. */
  saturationW: number | null;
  /** null where there is no kind of sphere to compare with. */
  curve: DiameterCurve | null;
}

/** The light may be off by this much, or by five standard uncertainties of its scale. */
const LIGHT_WITHIN = 0.01;

/** Turns every row into an extinction, or says why not; rows keep their order, and nothing about them is changed. */
export function evaluatePowers(
  readings: readonly PowerReading[],
  instrument: Instrument,
  expected: Expectations,
): EvaluatedReading[] {
  const { curve, coverage } = expected;
  const model = extinctionModel(instrument);
  const range = curve && shownRange(curve);
  const seen = new Map<string, number>();
  // Thousands of rows share a few degrees of freedom.
  const factors = new Map<number, number>();
  const factorAt = (_: number, degreesOfFreedom: number) => {
    const whole = Math.floor(degreesOfFreedom);
    const known = factors.get(whole) ?? coverageFactor(coverage, whole);
    factors.set(whole, known);
    return known;
  };
  return readings.map((reading): EvaluatedReading => {
    const { withoutW, withW, line } = reading;
    const unusable = unusableReasons(reading, expected);
    const averagingS = reading.averagingS ?? expected.averagingS;
    if (unusable.length > 0) {
      const nothing = { extinction: null, diametersM: [], diameterIntervalM: null };
      return { reading, grade: 'unusable', reasons: unusable, ...nothing };
    }
    const inputs = extinctionInputs(instrument, { withoutW, withW, averagingS });
    const budget = uncertaintyBudget(model, inputs, coverage, [], factorAt);
    const { value, standardUncertainty, degreesOfFreedom, expandedUncertainty } = budget;
    const ends: Interval = [value - expandedUncertainty, value + expandedUncertainty];
    const key = JSON.stringify([withoutW, withW, reading.averagingS, reading.label]);
    const earlier = seen.get(key);
    if (earlier === undefined) seen.set(key, line);
    const noiseW = Math.SQRT2 * powerNoise(instrument, averagingS) * factorAt(0, Number.POSITIVE_INFINITY);
    const reasons = [
      lightReason(withoutW, expected, instrument),
      withW > withoutW ? 'more light with the particle than without' : null,
      withW <= withoutW && withoutW - withW < noiseW ? 'below the noise' : null,
      range !== null && ends[1] < range[0] ? "outside of the design's range: too small" : null,
      range !== null && ends[0] > range[1] ? "outside of the design's range: too large" : null,
      earlier === undefined ? null : `the same as line ${earlier}`,
    ].filter((reason) => reason !== null);
    return {
      reading,
      grade: reasons.length === 0 ? 'good' : 'doubtful',
      reasons,
      extinction: {
        valueM2: value,
        standardUncertaintyM2: standardUncertainty,
        degreesOfFreedom,
        expandedUncertaintyM2: expandedUncertainty,
      },
      diametersM: curve === null ? [] : equivalentDiameters(curve, value),
      diameterIntervalM: curve && diametersWithin(curve, ends),
    };
  });
}

/** Whether a row counts twice, which a calibration must not. */
export function isRepeated({ reasons }: EvaluatedReading): boolean {
  return reasons.some((reason) => reason.startsWith('the same as line'));
}

function unusableReasons(
  { withoutW, withW, mistakes }: PowerReading,
  { saturationW, powerW }: Expectations,
): string[] {
  if (mistakes.length > 0) return [...mistakes];
  // Elements of weights below 0 may well read nothing, or less.
  if (powerW !== null && withoutW < 0) return ['negative power without the particle'];
  if (powerW !== null && withW < 0) return ['negative power with the particle'];
  if (powerW !== null && withoutW === 0) return ['no light without the particle'];
  const most = saturationW ?? Number.POSITIVE_INFINITY;
  if (withoutW >= most) return ['saturated without the particle'];
  return withW >= most ? ['saturated with the particle'] : [];
}

/** Where the light is not the one whose irradiance the row is divided by. */
function lightReason(
  withoutW: number,
  { powerW, lightOf }: Expectations,
  { uncertainties, gain }: Instrument,
): string | null {
  if (powerW === null) return null;
  const off = withoutW / powerW - 1;
  const scale = gain.isFitted ? 0 : Math.hypot(uncertainties.irradiance, uncertainties.responsivity);
  if (Math.abs(off) <= Math.max(LIGHT_WITHIN, 5 * scale)) return null;
  return `light ${Number((100 * Math.abs(off)).toPrecision(2))} % ${off > 0 ? 'above' : 'below'} ${lightOf}`;
}
