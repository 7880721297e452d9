import { studentQuantile } from '../numeric/studentT.ts';
import type { Distribution } from './distribution.ts';
import { standardUncertainty } from './distribution.ts';

/** A quantity that the result depends on. */
export interface BudgetInput {
  name: string;
  distribution: Distribution;
  /** Of its standard uncertainty; those of Student's t, else infinite, if left out. */
  degreesOfFreedom?: number;
  /** ∂f/∂x where it is known; taken from the model if left out. */
  sensitivity?: number;
}

/** How two inputs, by their numbers in the list, go together. */
export interface Correlation {
  between: readonly [number, number];
  /** −1 to 1. */
  coefficient: number;
}

/** The result as a function of the inputs' values, in their order. */
export type Model = (values: Float64Array) => number;

export interface BudgetLine {
  name: string;
  value: number;
  distribution: Distribution['kind'];
  standardUncertainty: number;
  degreesOfFreedom: number;
  sensitivity: number;
  /** |sensitivity| · standard uncertainty, in the result's unit. */
  contribution: number;
  /** Of the result's variance; all of them add up to 1. */
  share: number;
}

export interface Budget {
  value: number;
  lines: BudgetLine[];
  /** Combined. */
  standardUncertainty: number;
  /** Effective, by Welch and Satterthwaite; infinite where all of the inputs' are. */
  degreesOfFreedom: number;
  /** Probability that the expanded interval is meant to hold the value with. */
  coverage: number;
  coverageFactor: number;
  expandedUncertainty: number;
}

/**
 * The uncertainty of a result after the GUM (JCGM 100:2008): sensitivities by central differences over one standard uncertainty
 * to either side (5.1.3, note 2), the law of propagation (equation 13), effective degrees of freedom (equation G.2b, which is
 * meant for inputs that are not correlated), and a coverage factor from Student's t at the next lower whole number of them (G.4.1).
 *
 * @param coverage above 0 and below 1, such as 0.95
 * @param factorFor the coverage factor, for callers that keep those they have met
 */
export function uncertaintyBudget(
  model: Model,
  inputs: readonly BudgetInput[],
  coverage: number,
  correlations: readonly Correlation[] = [],
  factorFor = coverageFactor,
): Budget {
  const values = Float64Array.from(inputs, ({ distribution }) => distribution.mean);
  const parts = inputs.map((input, i) => {
    const uncertainty = standardUncertainty(input.distribution);
    const sensitivity = input.sensitivity ?? slope(model, values, i, uncertainty);
    return { input, uncertainty, sensitivity, signed: sensitivity * uncertainty };
  });
  // Each input's part of the variance, the half of its common parts with others included.
  const variances = parts.map(({ signed }) => signed * signed);
  for (const { between, coefficient } of correlations) {
    const [a, b] = between;
    const common = coefficient * parts[a].signed * parts[b].signed;
    variances[a] += common;
    variances[b] += common;
  }
  const variance = Math.max(
    0,
    variances.reduce((sum, part) => sum + part, 0),
  );
  const lines = parts.map(
    ({ input, uncertainty, sensitivity, signed }, i): BudgetLine => ({
      name: input.name,
      value: values[i],
      distribution: input.distribution.kind,
      standardUncertainty: uncertainty,
      degreesOfFreedom: freedomOf(input),
      sensitivity,
      contribution: Math.abs(signed),
      share: variance === 0 ? 0 : variances[i] / variance,
    }),
  );
  const combined = Math.sqrt(variance);
  const degreesOfFreedom = effectiveFreedom(combined, lines);
  const k = factorFor(coverage, degreesOfFreedom);
  return {
    value: model(values),
    lines,
    standardUncertainty: combined,
    degreesOfFreedom,
    coverage,
    coverageFactor: k,
    expandedUncertainty: k * combined,
  };
}

/** Student's t at the next lower whole number of degrees of freedom, at least 1 (JCGM 100:2008, G.4.1). */
export function coverageFactor(coverage: number, degreesOfFreedom: number): number {
  return studentQuantile((1 + coverage) / 2, Math.max(1, Math.floor(degreesOfFreedom + 1e-9)));
}

function slope(model: Model, values: Float64Array, i: number, uncertainty: number): number {
  const step = uncertainty > 0 ? uncertainty : 1e-6 * (Math.abs(values[i]) || 1);
  const at = (value: number) => model(values.with(i, value));
  return (at(values[i] + step) - at(values[i] - step)) / (2 * step);
}

function freedomOf({ degreesOfFreedom, distribution }: BudgetInput): number {
  const own = distribution.kind === 'student' ? distribution.degreesOfFreedom : Number.POSITIVE_INFINITY;
  return degreesOfFreedom ?? own;
}

/** u_c⁴ / Σ (u_i⁴/ν_i), JCGM 100:2008, equation G.2b. */
function effectiveFreedom(combined: number, lines: readonly BudgetLine[]): number {
  const sum = lines.reduce(
    (total, { contribution, degreesOfFreedom }) => total + contribution ** 4 / degreesOfFreedom,
    0,
  );
  return sum === 0 ? Number.POSITIVE_INFINITY : combined ** 4 / sum;
}
