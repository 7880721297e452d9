/** The gain that one reading of a reference sphere speaks for. */
export interface GainReading {
  /** Of the data file. */
  line: number;
  /** Spheres of one batch share their diameter, and so its uncertainty. */
  batch: number;
  gain: number;
  /** Standard uncertainty of this reading alone: noise, light drift, place of the sphere. */
  independent: number;
  /** Standard uncertainty that its whole batch shares. */
  common: number;
}

export interface FittedReading extends GainReading {
  /** (its gain − the fit's) over the standard uncertainty of that difference. */
  residual: number;
  isOutlier: boolean;
  /** Whether it counts in the fit. */
  isUsed: boolean;
}

export interface GainFit {
  gain: number;
  /** Widened by the Birge ratio where that exceeds 1. */
  standardUncertainty: number;
  /** Number of readings less one where the readings' own scatter widened it; else infinite. */
  degreesOfFreedom: number;
  chiSquared: number;
  /** √(χ²/(n − 1)): about 1 where the readings scatter as they should; null for a single one. */
  birge: number | null;
  used: number;
  readings: FittedReading[];
  /** The fit of the others, where there are outliers that count in this one. */
  withoutOutliers: { gain: number; standardUncertainty: number } | null;
}

/** More are not outliers but another law. */
const MOST_OUTLIERS = 1000;

/**
 * The weighted mean of gains (generalised least squares with one covariance a batch), with χ², Birge ratio (Birge 1932) and
 * normalised residuals. Outliers are judged one after the other, the farthest first, each against the fit of the rest and
 * against its own batch; they are shown, and count as long as they are not left out on purpose.
 *
 * @param readings at least one, uncertainties above 0
 * @param limit residual, over the Birge ratio of the rest where that exceeds 1, beyond which a reading is an outlier
 * @param omit lines to leave out, or all outliers
 */
export function fitGain(
  readings: readonly GainReading[],
  limit: number,
  omit: ReadonlySet<number> | 'outliers',
): GainFit {
  const kept = omit === 'outliers' ? readings : readings.filter(({ line }) => !omit.has(line));
  const outliers = findOutliers(kept, limit);
  const rest = kept.filter((reading) => !outliers.has(reading));
  const used = new Set(omit === 'outliers' ? rest : kept);
  const fit = solve([...used]);
  const { gain } = fit;
  const standardUncertainty = widened(fit);
  const isWidened = fit.birge !== null && fit.birge > 1;
  const others = outliers.size > 0 && omit !== 'outliers' ? solve(rest) : null;
  return {
    gain,
    standardUncertainty,
    degreesOfFreedom: isWidened ? used.size - 1 : Number.POSITIVE_INFINITY,
    chiSquared: fit.chiSquared,
    birge: fit.birge,
    used: used.size,
    readings: readings.map((reading) => ({
      ...reading,
      residual: residualOf(reading, fit, used.has(reading)),
      isOutlier: outliers.has(reading),
      isUsed: used.has(reading),
    })),
    withoutOutliers: others && { gain: others.gain, standardUncertainty: widened(others) },
  };
}

interface Batch {
  /** Σ 1/u² and the weighted mean of its own readings. */
  weight: number;
  mean: number;
  common: number;
  count: number;
  /** Of its mean, what is common to it included. */
  variance: number;
}

interface Solution {
  gain: number;
  /** Before any widening. */
  variance: number;
  chiSquared: number;
  birge: number | null;
  batches: Map<number, Batch>;
}

function solve(readings: readonly GainReading[]): Solution {
  const batches = new Map<number, Batch>();
  for (const { batch, gain, independent, common } of readings) {
    const known = batches.get(batch) ?? { weight: 0, mean: 0, common, count: 0, variance: 0 };
    const weight = 1 / independent ** 2;
    known.weight += weight;
    known.mean += (weight / known.weight) * (gain - known.mean);
    known.count += 1;
    batches.set(batch, known);
  }
  let [weights, sum] = [0, 0];
  for (const batch of batches.values()) {
    batch.variance = 1 / batch.weight + batch.common ** 2;
    weights += 1 / batch.variance;
    sum += batch.mean / batch.variance;
  }
  const gain = sum / weights;
  let chiSquared = 0;
  for (const { mean, variance } of batches.values()) chiSquared += (mean - gain) ** 2 / variance;
  for (const { batch, gain: own, independent } of readings) {
    chiSquared += ((own - (batches.get(batch)?.mean ?? own)) / independent) ** 2;
  }
  const birge = readings.length < 2 ? null : Math.sqrt(chiSquared / (readings.length - 1));
  return { gain, variance: 1 / weights, chiSquared, birge, batches };
}

function widened({ variance, birge }: Solution): number {
  return Math.sqrt(variance) * Math.max(1, birge ?? 1);
}

/** Normalised by the standard uncertainty of the difference, of which a reading that counts is a part itself. */
function residualOf(reading: GainReading, fit: Solution, isUsed: boolean): number {
  const own = reading.independent ** 2 + reading.common ** 2;
  const batch = fit.batches.get(reading.batch);
  const shared = batch === undefined ? 0 : (reading.common ** 2 * fit.variance) / batch.variance;
  const variance = isUsed ? own - fit.variance : own + fit.variance - 2 * shared;
  // A single reading is its own fit.
  return variance <= 1e-12 * own ? 0 : (reading.gain - fit.gain) / Math.sqrt(variance);
}

/** The same against its own batch, whose common uncertainty then does not count. */
function batchResidualOf(reading: GainReading, fit: Solution, isUsed: boolean): number {
  const batch = fit.batches.get(reading.batch);
  if (batch === undefined || (isUsed && batch.count < 2)) return 0;
  const variance = reading.independent ** 2 + (isUsed ? -1 : 1) / batch.weight;
  return (reading.gain - batch.mean) / Math.sqrt(Math.max(variance, 1e-12 * reading.independent ** 2));
}

function findOutliers(readings: readonly GainReading[], limit: number): Set<GainReading> {
  const outliers = new Set<GainReading>();
  let rest = [...readings];
  while (rest.length > 2 && outliers.size < MOST_OUTLIERS) {
    const fit = solve(rest);
    const strays = (reading: GainReading) =>
      Math.max(Math.abs(residualOf(reading, fit, true)), Math.abs(batchResidualOf(reading, fit, true)));
    const farthest = rest.reduce((p, q) => (strays(q) > strays(p) ? q : p));
    const others = rest.filter((reading) => reading !== farthest);
    const without = solve(others);
    const stray = Math.max(
      Math.abs(residualOf(farthest, without, false)),
      Math.abs(batchResidualOf(farthest, without, false)),
    );
    if (stray <= limit * Math.max(1, without.birge ?? 1)) break;
    outliers.add(farthest);
    rest = others;
  }
  return outliers;
}
