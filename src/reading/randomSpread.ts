/** Radial samples of the flux density on a uniform grid of s = ρ². */
export interface FluxSamples {
  /** Grid step in s, m². */
  stepM2: number;
  /** Values at 0, step, 2·step …, by part. */
  crossedMean: Float64Array;
  crossedTwofold: Float64Array;
  scatteredMean: Float64Array;
  scatteredTwofold: Float64Array;
}

/** Averages this small are left out. */
const NEGLIGIBLE_EXPONENT = 25;

/**
 * Averages the flux density over a normal spread of the particle's transverse position.
 *
 * At distance ρ the average is ∬ w(ρ + ξ) N(ξ; σ) d²ξ, taken by the trapezoid rule, which converges exponentially for a
 * Gaussian weight once its step resolves the integrand's phase. The crossed part oscillates with the paraxial phase κρ²
 * and its average has the modulus exp(−2κ²σ²ρ²/(1 + 4κ²σ⁴)): where that is below e^−25 it is left at zero.
 *
 * @param fine samples on half of the wanted step, reaching at least (ρmax + 7σ)²
 * @param kappa k/(2z), 1/m²
 * @param count number of wanted samples
 */
export function averageOverSpread(
  fine: FluxSamples,
  kappa: number,
  spreadM: number,
  count: number,
): FluxSamples {
  const stepM2 = fine.stepM2 * 2;
  const averaged: FluxSamples = {
    stepM2,
    crossedMean: new Float64Array(count),
    crossedTwofold: new Float64Array(count),
    scatteredMean: new Float64Array(count),
    scatteredTwofold: new Float64Array(count),
  };
  const chirp = 2 * kappa * spreadM * spreadM;
  const pair = new Float64Array(2);
  for (let i = 0; i < count; i++) {
    const rho = Math.sqrt(i * stepM2);
    const phasePerSpread = 2 * kappa * rho * spreadM;
    // The scattered part varies slowly: the coarsest grid serves.
    average(fine.scatteredMean, fine.scatteredTwofold, fine.stepM2, rho, spreadM, 9, pair);
    averaged.scatteredMean[i] = pair[0];
    averaged.scatteredTwofold[i] = pair[1];
    if ((phasePerSpread * phasePerSpread) / (2 * (1 + chirp * chirp)) > NEGLIGIBLE_EXPONENT) continue;
    const highest = phasePerSpread + 7 * chirp;
    average(fine.crossedMean, fine.crossedTwofold, fine.stepM2, rho, spreadM, 9 + highest, pair);
    averaged.crossedMean[i] = pair[0];
    averaged.crossedTwofold[i] = pair[1];
  }
  return averaged;
}

/** Means of f(s) and of g(s)·cos 2φ about the point (ρ, 0); the grid resolves `frequency` radians a spread. */
function average(
  f: Float64Array,
  g: Float64Array,
  stepM2: number,
  rho: number,
  spreadM: number,
  frequency: number,
  out: Float64Array,
): void {
  const points = Math.ceil((14 * frequency) / (2 * Math.PI));
  const spacing = 14 / points;
  let sumF = 0;
  let sumG = 0;
  let total = 0;
  for (let i = 0; i <= points; i++) {
    const u = -7 + i * spacing;
    const x = rho + spreadM * u;
    // The lower half plane mirrors the upper one.
    for (let v = 0; v <= 7; v += spacing) {
      const y = spreadM * v;
      const weight = Math.exp(-(u * u + v * v) / 2) * (v === 0 ? 1 : 2);
      total += weight;
      const s = x * x + y * y;
      sumF += weight * cubicAt(f, s / stepM2);
      if (s > 0) sumG += (weight * cubicAt(g, s / stepM2) * (x * x - y * y)) / s;
    }
  }
  out[0] = sumF / total;
  out[1] = sumG / total;
}

/** Four-point Lagrange interpolation of uniform samples at `position` steps from the first. */
function cubicAt(values: Float64Array, position: number): number {
  const cell = Math.max(1, Math.min(Math.floor(position), values.length - 3));
  const t = position - cell;
  const a = values[cell - 1];
  const b = values[cell];
  const c = values[cell + 1];
  const d = values[cell + 2];
  const linear = c - a / 3 - b / 2 - d / 6;
  const square = (a + c) / 2 - b;
  const cube = (d - a) / 6 + (b - c) / 2;
  return b + t * (linear + t * (square + t * cube));
}
