import { countText } from '../draw/quantityText.ts';
import type { FittedReading, GainFit } from '../metrology/gainFit.ts';
import { fitMark } from '../run/evaluationCsv.ts';
import { withUncertainty } from './areaWithUncertainty.ts';
import type { Column } from './table.ts';
import { table } from './table.ts';

/** Readings of reference spheres that a terminal is filled with: outliers first of all. */
const MOST_SHOWN = 20;

/** How well reference spheres agree on one gain, as a paragraph. */
export function fitText(fit: GainFit, isUsed: boolean): string {
  const { used, chiSquared, birge, withoutOutliers, readings } = fit;
  const [value, uncertainty] = withUncertainty(fit.gain, fit.standardUncertainty);
  const scatter =
    birge === null
      ? ''
      : `; χ² ${countText(chiSquared)} for ${used - 1} degrees of freedom, Birge ratio ${countText(birge)}` +
        (birge > 1 ? ', by which the uncertainty is widened' : '');
  const kept = isUsed ? '' : " It was not used: --keep-gain asks for the design's.";
  return `Gain from ${used} ${used === 1 ? 'reading' : 'readings'} of reference spheres: ${value} ± ${uncertainty}${scatter}.${outlierText()}${kept}`;

  function outlierText(): string {
    const outliers = readings.filter(({ isOutlier }) => isOutlier);
    if (outliers.length === 0) return '';
    const lines = outliers.slice(0, 10).map(({ line }) => line);
    const more = outliers.length > lines.length ? ` and ${outliers.length - lines.length} more` : '';
    const where = `${outliers.length === 1 ? '1 outlier, line' : `${outliers.length} outliers, lines`} ${lines.join(', ')}${more}`;
    if (withoutOutliers === null) return ` Left out: ${where}.`;
    const [gain, own] = withUncertainty(withoutOutliers.gain, withoutOutliers.standardUncertainty);
    return ` There ${outliers.length === 1 ? 'is' : 'are'} ${where}, and ${outliers.length === 1 ? 'it counts' : 'they count'}: without, the gain is ${gain} ± ${own} (--omit outliers).`;
  }
}

/** The reference readings with their residuals, those that stray farthest first. */
export function fitTable({ readings }: GainFit): string {
  const shown = readings.toSorted((a, b) => Math.abs(b.residual) - Math.abs(a.residual)).slice(0, MOST_SHOWN);
  const left = readings.length - shown.length;
  return table(COLUMNS, shown) + (left === 0 ? '' : `\n… and ${left} that stray less`);
}

const partsOf = ({ gain, independent, common }: FittedReading) =>
  withUncertainty(gain, Math.hypot(independent, common));

const COLUMNS: readonly Column<FittedReading>[] = [
  { title: ['line'], cell: ({ line }) => String(line) },
  { title: ['reference', 'µm'], cell: ({ batch }) => countText(batch * 1e6) },
  { title: ['gain'], cell: (reading) => partsOf(reading)[0] },
  { title: ['±'], cell: (reading) => partsOf(reading)[1] },
  { title: ['residual'], cell: ({ residual }) => residual.toFixed(2) },
  { title: ['fit'], cell: fitMark, align: 'left' },
];
