import { inputError } from '../base/errors.ts';
import type { DiameterCurve } from '../metrology/equivalentDiameter.ts';
import type { EvaluatedReading } from '../metrology/evaluatePowers.ts';
import { evaluatePowers, isRepeated } from '../metrology/evaluatePowers.ts';
import type { Gain } from '../metrology/extinctionModel.ts';
import type { GainFit } from '../metrology/gainFit.ts';
import type { PowerReading } from '../metrology/powerReading.ts';
import type { ReferenceReading } from './calibrateGain.ts';
import { calibrateGain } from './calibrateGain.ts';
import { diameterCurve } from './diameterCurve.ts';
import type { BuiltInstrument } from './instrument.ts';
import { checkSpheres } from './response.ts';
import type { SphereKind } from './sphereLike.ts';

/** Share of the design's gain from which a fitted one is worth a word. */
const FAR_OFF = 0.2;

export interface EvaluationOptions {
  /** Of expanded uncertainties. */
  coverage: number;
  /** Power from which the detector does not tell any more, W. */
  saturationW: number | null;
  /** What equivalent diameters and references are made of; null for no diameters. */
  kind: SphereKind | null;
  /** Residual beyond which a reading of a reference sphere is an outlier. */
  limit: number;
  /** Lines that the fit of the gain leaves out, or all outliers. */
  omit: ReadonlySet<number> | 'outliers';
  /** Whether the design's gain stays where there are reference spheres. */
  keepGain: boolean;
}

export interface Evaluation {
  /** The one that rows were evaluated with. */
  gain: Gain;
  coverage: number;
  rows: EvaluatedReading[];
  fit: GainFit | null;
  curve: DiameterCurve | null;
  warnings: string[];
}

/**
 * Measured powers to extinction cross-sections and equivalent diameters. Where rows are of reference spheres, one gain is fitted
 * to those that can be used and are not there twice, and all rows are evaluated with it.
 *
 * @throws RimwrightError `input` for reference spheres that cannot be computed in the brief's light, and for lines to leave out that
 *   are no such rows, or all of them
 */
export function evaluateData(
  built: BuiltInstrument,
  readings: readonly PowerReading[],
  { coverage, saturationW, kind, limit, omit, keepGain }: EvaluationOptions,
): Evaluation {
  const { instrument, given, powerW, task } = built;
  const { averagingS } = instrument.uncertainties;
  const curve = kind && diameterCurve(built, kind);
  const isPlain = given.elements.every(({ weight }) => weight > 0);
  const expected = { coverage, averagingS, powerW: isPlain ? powerW : null, saturationW, curve };
  const ofBrief = { ...expected, lightOf: "the brief's" };
  const asDesigned = evaluatePowers(readings, instrument, ofBrief);
  const warnings: string[] = [];
  const references = asDesigned.flatMap((row) => {
    const { reference } = row.reading;
    const counts = reference !== null && row.grade !== 'unusable' && !isRepeated(row);
    return counts ? [{ ...row.reading, reference } satisfies ReferenceReading] : [];
  });
  checkOmitted(omit, references);
  let fit: GainFit | null = null;
  if (references.length > 0 && kind !== null) {
    const diameters = references.map(({ reference }) => reference.diameterM);
    const ends = { fromM: Math.min(...diameters), toM: Math.max(...diameters) };
    checkSpheres(task, { ...kind, ...ends }, 'reference_diameter', 'reference_diameter');
    fit = calibrateGain(built, references, kind, averagingS, { limit, omit });
    const off = fit.gain / instrument.gain.value - 1;
    if (Math.abs(off) > FAR_OFF) {
      const how = `${Number((100 * Math.abs(off)).toPrecision(2))} % ${off > 0 ? 'above' : 'below'} the design's`;
      warnings.push(
        `The fitted gain is ${how}: do the scale of powers, the irradiance and the reference spheres hold`,
      );
    }
  } else if (references.length > 0) {
    warnings.push('Reference spheres say nothing of the gain without their material: --material names it');
  } else if (readings.some(({ reference }) => reference !== null)) {
    warnings.push("No row with a reference sphere can be used: the gain is the design's");
  }
  if (fit === null || keepGain)
    return { gain: instrument.gain, coverage, rows: asDesigned, fit, curve, warnings };
  const gain: Gain = {
    value: fit.gain,
    standardUncertainty: fit.standardUncertainty,
    degreesOfFreedom: fit.degreesOfFreedom,
    isFitted: true,
  };
  // A fitted gain holds for the light that it was fitted in.
  const used = new Set(fit.readings.filter(({ isUsed }) => isUsed).map(({ line }) => line));
  const powers = references.filter(({ line }) => used.has(line)).map(({ withoutW }) => withoutW);
  const ofReferences = { ...expected, powerW: isPlain ? median(powers) : null, lightOf: "the references'" };
  const rows = evaluatePowers(readings, { ...instrument, gain }, ofReferences);
  return { gain, coverage, rows, fit, curve, warnings };
}

/** @throws RimwrightError `input` for lines that are no reference spheres, and where none is left */
function checkOmitted(omit: ReadonlySet<number> | 'outliers', references: readonly ReferenceReading[]): void {
  if (omit === 'outliers' || omit.size === 0) return;
  const lines = references.map(({ line }) => line);
  const stray = [...omit].filter((line) => !lines.includes(line));
  if (stray.length > 0) {
    const expected = 'lines of reference spheres that can be used';
    throw inputError([{ key: '--omit', found: stray.slice(0, 10).join(', '), expected }]);
  }
  if (omit.size < lines.length) return;
  const found = 'every line with a reference sphere';
  throw inputError([{ key: '--omit', found, expected: 'one at least that stays, or --keep-gain' }]);
}

function median(values: readonly number[]): number {
  const sorted = values.toSorted((a, b) => a - b);
  return (sorted[Math.floor((sorted.length - 1) / 2)] + sorted[Math.ceil((sorted.length - 1) / 2)]) / 2;
}
