import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { checkBudget, numericalTolerance } from '../../src/metrology/checkBudget.ts';
import type { Distribution } from '../../src/metrology/distribution.ts';
import { monteCarlo } from '../../src/metrology/monteCarlo.ts';
import type { BudgetInput, Model } from '../../src/metrology/uncertaintyBudget.ts';
import { uncertaintyBudget } from '../../src/metrology/uncertaintyBudget.ts';

// Values as the guides print them, from memory: clause by clause in the file.
const guide = JSON.parse(readFileSync(new URL('../reference/gum-examples.json', import.meta.url), 'utf8'));

const input = (name: string, distribution: Distribution, degreesOfFreedom?: number): BudgetInput => ({
  name,
  distribution,
  ...(degreesOfFreedom !== undefined && { degreesOfFreedom }),
});
const normal = (name: string, mean: number, deviation: number, dof?: number) =>
  input(name, { kind: 'normal', mean, deviation }, dof);
const rectangular = (name: string, [least, most]: number[]) =>
  input(name, { kind: 'rectangular', mean: (least + most) / 2, half: (most - least) / 2 });
const sum: Model = (values) => values.reduce((total, value) => total + value, 0);
const ALL = { coverage: 0.95, seed: 5, most: 400_000, tolerance: 0 };

describe('the end gauge (JCGM 100, H.1; JCGM 101, 9.5)', () => {
  const { gaugeBlock: block, gaugeBlockMonteCarlo } = guide;
  const NAMES = [
    'standard',
    'difference',
    'expansion',
    'temperature',
    'expansion diff.',
    'temperature diff.',
  ];
  const first: Model = ([standard, difference, expansion, temperature, dExpansion, dTemperature]) =>
    standard + difference - standard * (dExpansion * temperature + expansion * dTemperature);

  it('has the printed contributions, degrees of freedom and expanded uncertainty', () => {
    const { parts } = block.difference;
    const difference = Math.hypot(...parts.map(({ u }: { u: number }) => u));
    const freedom =
      difference ** 4 /
      parts.reduce((total: number, { u, dof }: { u: number; dof: number }) => total + u ** 4 / dof, 0);
    const { mean, u, cyclicHalf } = block.temperature;
    const budget = uncertaintyBudget(
      first,
      [
        normal(NAMES[0], block.standard.value, block.standard.u, block.standard.dof),
        normal(NAMES[1], block.difference.value, difference, freedom),
        input(NAMES[2], { kind: 'rectangular', mean: block.expansion.value, half: block.expansion.half }),
        normal(NAMES[3], mean, Math.hypot(u, cyclicHalf / Math.SQRT2)),
        input(NAMES[4], { kind: 'rectangular', mean: 0, half: block.expansionDifference.half }, 50),
        input(NAMES[5], { kind: 'rectangular', mean: 0, half: block.temperatureDifference.half }, 2),
      ],
      0.99,
    );
    expect(budget.value).toBeCloseTo(block.length, 6);
    const parted = budget.lines.map(({ contribution }) => contribution);
    expect(parted[0]).toBeCloseTo(25, 3);
    expect(Math.abs(parted[1] - block.contributions.difference)).toBeLessThan(0.06);
    expect(parted[2]).toBeLessThan(1e-6);
    expect(Math.abs(parted[4] - block.contributions.expansionDifference)).toBeLessThan(0.06);
    expect(Math.abs(parted[5] - block.contributions.temperatureDifference)).toBeLessThan(0.06);
    expect(Math.round(budget.standardUncertainty)).toBe(block.combined);
    expect(Math.floor(budget.degreesOfFreedom)).toBe(block.dof);
    // The guide multiplies the rounded 32 nm.
    expect(Math.round(budget.coverageFactor * block.combined)).toBe(block.expanded99);
    expect(Math.abs(budget.expandedUncertainty - block.expanded99)).toBeLessThan(1);
    expect(budget.lines.reduce((total, { share }) => total + share, 0)).toBeCloseTo(1, 12);
  });

  it('is wider by the second-order terms that a Monte Carlo run sees', () => {
    const student = (name: string, { u, dof }: { u: number; dof: number }, mean = 0) =>
      input(name, { kind: 'student', mean, scale: u, degreesOfFreedom: dof });
    const curved = (name: string, half: number, blur: number) =>
      input(name, { kind: 'curvilinear', mean: 0, half, blur });
    const model: Model = (v) =>
      v[0] + v[1] + v[2] + v[3] + block.difference.value - v[0] * (v[7] * (v[5] + v[6]) + v[4] * v[8]);
    const { mean, u, cyclicHalf } = block.temperature;
    const run = monteCarlo(
      model,
      [
        student('standard', block.standard, block.standard.value),
        ...block.difference.parts.map((part: { u: number; dof: number }, i: number) =>
          student(`d${i}`, part),
        ),
        input('expansion', { kind: 'rectangular', mean: block.expansion.value, half: block.expansion.half }),
        normal('temperature', mean, u),
        input('cycle', { kind: 'arcsine', mean: 0, half: cyclicHalf }),
        curved('expansion difference', block.expansionDifference.half, 1e-7),
        curved('temperature difference', block.temperatureDifference.half, 0.025),
      ],
      { ...ALL, coverage: 0.99 },
    );
    expect(Math.abs(run.mean - block.length)).toBeLessThan(0.5);
    expect(Math.round(run.standardUncertainty)).toBe(gaugeBlockMonteCarlo.combined);
    run.symmetric.forEach((end, i) => {
      expect(Math.abs(end - 50e6 - gaugeBlockMonteCarlo.interval99[i])).toBeLessThan(1);
    });
  });
});

describe('resistance, reactance and impedance (JCGM 100, H.2)', () => {
  const { impedance } = guide;
  const rows: number[][] = [impedance.voltage, impedance.current, impedance.phase];
  const means = rows.map((row) => row.reduce((total, value) => total + value, 0) / row.length);
  const covariance = (a: number, b: number) =>
    rows[a].reduce((total, value, i) => total + (value - means[a]) * (rows[b][i] - means[b]), 0) / 20;
  const inputs = ['V', 'I', 'phi'].map((name, i) => normal(name, means[i], Math.sqrt(covariance(i, i)), 4));
  const correlations = [
    [0, 1],
    [0, 2],
    [1, 2],
  ].map(([a, b]) => ({
    between: [a, b] as const,
    coefficient: covariance(a, b) / Math.sqrt(covariance(a, a) * covariance(b, b)),
  }));

  it('has the printed correlations', () => {
    const printed = Object.values<number>(impedance.correlations);
    correlations.forEach(({ coefficient }, i) => {
      expect(Math.abs(coefficient - printed[i])).toBeLessThan(0.0051);
    });
  });

  it.each<[string, Model]>([
    ['resistance', ([v, i, phi]) => (1e3 * v * Math.cos(phi)) / i],
    ['reactance', ([v, i, phi]) => (1e3 * v * Math.sin(phi)) / i],
    ['impedance', ([v, i]) => (1e3 * v) / i],
  ])('has the printed %s, and so has a Monte Carlo run of joint normals', (name, model) => {
    const budget = uncertaintyBudget(model, inputs, 0.95, correlations);
    expect(Math.abs(budget.value - impedance[name].value)).toBeLessThan(0.00051);
    // The guide goes on with rounded values: its 0.295 is 0.2956 without.
    expect(Math.abs(budget.standardUncertainty - impedance[name].u)).toBeLessThan(0.001);
    const run = monteCarlo(model, inputs, ALL, correlations);
    expect(run.standardUncertainty / budget.standardUncertainty).toBeCloseTo(1, 2);
    const without = uncertaintyBudget(model, inputs, 0.95);
    expect(Math.abs(without.standardUncertainty / budget.standardUncertainty - 1)).toBeGreaterThan(0.1);
  });
});

it('reads a thermometer’s line with its correlated coefficients (JCGM 100, H.3)', () => {
  const { thermometer } = guide;
  const { intercept, slope } = thermometer;
  const budget = uncertaintyBudget(
    ([a, b]) => a + b * (thermometer.at - thermometer.from),
    [normal('intercept', intercept.value, intercept.u, 9), normal('slope', slope.value, slope.u, 9)],
    0.95,
    [{ between: [0, 1], coefficient: thermometer.correlation }],
  );
  expect(budget.value).toBeCloseTo(thermometer.correction, 6);
  expect(Math.abs(budget.standardUncertainty - thermometer.combined)).toBeLessThan(0.0001);
});

describe('sums of four quantities (JCGM 101, 9.2)', () => {
  const { additive } = guide;
  const four = (make: (i: number) => BudgetInput) => [0, 1, 2, 3].map(make);

  it('of normal ones are normal', () => {
    const inputs = four((i) => normal(`x${i}`, 0, 1));
    const run = monteCarlo(sum, inputs, ALL);
    expect(Math.abs(run.standardUncertainty - additive.normal.u)).toBeLessThan(0.01);
    for (const ends of [run.symmetric, run.shortest]) {
      expect(Math.abs(ends[1] - additive.normal.half95)).toBeLessThan(0.06);
      expect(Math.abs(ends[0] + additive.normal.half95)).toBeLessThan(0.06);
    }
  });

  it('of rectangular ones are a little narrower, and a budget says so falsely', () => {
    const inputs = four((i) => rectangular(`x${i}`, [-Math.sqrt(3), Math.sqrt(3)]));
    const run = monteCarlo(sum, inputs, ALL);
    expect(Math.abs(run.symmetric[1] - additive.rectangular.half95)).toBeLessThan(0.02);
    const budget = uncertaintyBudget(sum, inputs, 0.95);
    expect(budget.expandedUncertainty).toBeCloseTo(additive.normal.half95, 2);
    expect(budget.standardUncertainty).toBeCloseTo(2, 12);
  });

  it('of which one is far wider are no longer normal, which the check finds', () => {
    const { widths, u, half95, budgetHalf95 } = additive.oneWide;
    const inputs = four((i) => rectangular(`x${i}`, [-Math.sqrt(3) * widths[i], Math.sqrt(3) * widths[i]]));
    const budget = uncertaintyBudget(sum, inputs, 0.95);
    expect(Math.abs(budget.standardUncertainty - u)).toBeLessThan(0.051);
    expect(Math.abs(budget.expandedUncertainty - budgetHalf95)).toBeLessThan(0.051);
    const check = checkBudget(sum, inputs, budget, { seed: 2, most: 1_000_000, digits: 2 });
    expect(Math.abs(check.monteCarlo.symmetric[1] - half95)).toBeLessThan(0.15);
    expect(check.monteCarlo.isStable).toBe(true);
    expect([check.tolerance, check.holds]).toEqual([0.5, false]);
    expect(check.high).toBeGreaterThan(2.5);
  });
});

it('finds a weight’s mass to be wider than its budget (JCGM 101, 9.3)', () => {
  const { mass } = guide;
  const model: Model = ([standard, added, air, weight, ofStandard]) =>
    (standard + added) * (1 + (air - mass.conventionalAirDensity) * (1 / weight - 1 / ofStandard)) -
    mass.nominal;
  const inputs = [
    normal('standard', mass.standard.value, mass.standard.u),
    normal('added', mass.added.value, mass.added.u),
    rectangular('air', mass.airDensity),
    rectangular('weight', mass.weightDensity),
    rectangular('of standard', mass.standardDensity),
  ];
  const budget = uncertaintyBudget(model, inputs, 0.95);
  expect(Math.abs(budget.value - mass.budget.value)).toBeLessThan(0.00051);
  expect(Math.abs(budget.standardUncertainty - mass.budget.u)).toBeLessThan(0.000051);
  const half = budget.expandedUncertainty;
  expect(Math.abs(budget.value - half - mass.budget.interval95[0])).toBeLessThan(0.0002);
  expect(Math.abs(budget.value + half - mass.budget.interval95[1])).toBeLessThan(0.0002);
  const { monteCarlo: run, holds } = checkBudget(model, inputs, budget, {
    seed: 3,
    most: 400_000,
    digits: 2,
  });
  expect(Math.abs(run.mean - mass.monteCarlo.value)).toBeLessThan(0.0006);
  expect(Math.abs(run.standardUncertainty - mass.monteCarlo.u)).toBeLessThan(0.0004);
  run.shortest.forEach((end, i) => {
    expect(Math.abs(end - mass.monteCarlo.interval95[i])).toBeLessThan(0.003);
  });
  expect(holds).toBe(false);
});

it('finds a comparison loss that a budget has nothing to say of (JCGM 101, 9.4)', () => {
  const { u, budget: printed, monteCarlo: expected } = guide.comparisonLoss;
  const squares: Model = ([re, im]) => re * re + im * im;
  const inputs = [normal('re', 0, u), normal('im', 0, u)];
  const budget = uncertaintyBudget(squares, inputs, 0.95);
  expect([budget.value, budget.standardUncertainty]).toEqual([printed.value, printed.u]);
  const { monteCarlo: run, holds } = checkBudget(squares, inputs, budget, {
    seed: 4,
    most: 400_000,
    digits: 2,
  });
  expect(Math.abs(run.mean / expected.value - 1)).toBeLessThan(0.01);
  expect(Math.abs(run.standardUncertainty / expected.u - 1)).toBeLessThan(0.01);
  expect(run.shortest[0]).toBeLessThan(0.5e-6);
  expect(Math.abs(run.shortest[1] / expected.shortest95[1] - 1)).toBeLessThan(0.02);
  expect([holds, run.isStable]).toEqual([false, false]);
});

it('takes half a unit of the last digit that counts for its tolerance (JCGM 101, 7.9.2)', () => {
  for (const { u, digits, tolerance } of guide.tolerance.cases) {
    expect(numericalTolerance(u, digits) / tolerance).toBeCloseTo(1, 12);
  }
  expect(numericalTolerance(0.0996, 2) / 0.005).toBeCloseTo(1, 12);
});
