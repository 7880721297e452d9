import { csvText } from './csvText.ts';
import type { Evaluation } from './evaluateData.ts';

/** An evaluation as CSV, row by row as the data came. Several diameters stand in one cell, with spaces between. */
export function evaluationCsv({ rows, fit }: Evaluation): string {
  const header = [
    ...['line', 'label', 'extinction_um2', 'standard_uncertainty_um2', 'expanded_uncertainty_um2'],
    ...['diameters_um', 'diameter_least_um', 'diameter_most_um', 'grade', 'reasons'],
  ];
  const fitted = new Map(fit?.readings.map((reading) => [reading.line, reading]));
  const ofFit = fit === null ? [] : ['reference_diameter_um', 'gain', 'residual', 'calibration'];
  const digits = (value: number | undefined, perUnit = 1) =>
    value === undefined ? '' : Number((value * perUnit).toPrecision(8));
  const lines = rows.map(({ reading, grade, reasons, extinction, diametersM, diameterIntervalM }) => {
    const reference = fitted.get(reading.line);
    const calibration = reference && fitMark(reference);
    return [
      reading.line,
      reading.label,
      digits(extinction?.valueM2, 1e12),
      digits(extinction?.standardUncertaintyM2, 1e12),
      digits(extinction?.expandedUncertaintyM2, 1e12),
      diametersM.length === 1 ? digits(diametersM[0], 1e6) : diametersM.map((d) => digits(d, 1e6)).join(' '),
      digits(diameterIntervalM?.[0], 1e6),
      digits(diameterIntervalM?.[1], 1e6),
      grade,
      reasons.join('; '),
      ...(fit === null
        ? []
        : [
            digits(reading.reference?.diameterM, 1e6),
            digits(reference?.gain),
            digits(reference?.residual),
            calibration ?? '',
          ]),
    ];
  });
  return csvText([[...header, ...ofFit], ...lines]);
}

/** What became of a reference sphere's reading: `used`, `outlier`, `left out`, or both of these. */
export function fitMark({ isOutlier, isUsed }: { isOutlier: boolean; isUsed: boolean }): string {
  return [isOutlier ? 'outlier' : '', isUsed ? 'used' : 'left out'].filter((word) => word !== '').join(', ');
}
