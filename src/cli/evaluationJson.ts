import type { Evaluation } from '../run/evaluateData.ts';

/** An evaluation for JSON, in SI units; what has no value is null, infinite degrees of freedom too. */
export function evaluationJson({ gain, coverage, rows, fit, curve }: Evaluation) {
  return {
    coverage,
    gain,
    material: curve?.material ?? null,
    rows: rows.map(({ reading, grade, reasons, extinction, diametersM, diameterIntervalM }) => ({
      line: reading.line,
      label: reading.label,
      grade,
      reasons,
      extinction_m2: extinction?.valueM2 ?? null,
      standardUncertainty_m2: extinction?.standardUncertaintyM2 ?? null,
      degreesOfFreedom: extinction?.degreesOfFreedom ?? null,
      expandedUncertainty_m2: extinction?.expandedUncertaintyM2 ?? null,
      diameters_m: diametersM,
      diameterInterval_m: diameterIntervalM,
    })),
    calibration: fit && {
      gain: fit.gain,
      standardUncertainty: fit.standardUncertainty,
      degreesOfFreedom: fit.degreesOfFreedom,
      chiSquared: fit.chiSquared,
      birge: fit.birge,
      used: fit.used,
      withoutOutliers: fit.withoutOutliers,
      readings: fit.readings.map(({ line, batch, gain: own, independent, common, ...rest }) => ({
        line,
        reference_m: batch,
        gain: own,
        independent,
        common,
        ...rest,
      })),
    },
  };
}
