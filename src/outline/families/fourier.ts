import type { RandomSource } from '../../base/random.ts';
import type { Shape } from '../shape.ts';
import type { Misdrawn, PhaseLimits, Variant } from './family.ts';

/** Least ρ² in phase: nearer to the axis a boundary is no longer told apart from it. */
const LEAST = 0.01;

/** What is expanded: ρ² itself or ρ; and with sines besides the cosines or not. */
interface Expansion {
  of: 'square' | 'radius';
  folds: number;
  terms: number;
  sines: boolean;
}

/**
 * Fourier boundaries: ρ² (or ρ) = c₀ + Σ c_k cos(k n φ) [+ s_k sin(k n φ)], n-fold; one-fold with sines is the free form.
 *
 * A series of ρ² must stay above 0. One of ρ may swing through it, since ρ² is its square and a little more: where it rests near 0,
 * small ripples leave a valley down to a small hub. With many terms it comes near to any star.
 */
export function fourierVariants(limits: PhaseLimits): Variant[] {
  const expansions: Expansion[] = [
    ...[2, 3, 4, 5, 6].map((folds) => ({ of: 'square', folds, terms: 6, sines: false }) as const),
    ...[10, 14].map((terms) => ({ of: 'square', folds: 6, terms, sines: false }) as const),
    ...[3, 5].map((folds) => ({ of: 'radius', folds, terms: 6, sines: false }) as const),
    ...[14, 24, 30].map((terms) => ({ of: 'radius', folds: 6, terms, sines: false }) as const),
    ...[3, 5].map((folds) => ({ of: 'square', folds, terms: 3, sines: true }) as const),
    { of: 'square', folds: 1, terms: 6, sines: true },
  ];
  return expansions.map((expansion) => fourierVariant(expansion, limits));
}

function fourierVariant(expansion: Expansion, limits: PhaseLimits): Variant {
  const { of, folds, terms, sines } = expansion;
  const harmonics = terms - 1;
  const largest = of === 'square' ? limits.high : Math.sqrt(limits.high);
  const swing = Math.min(largest, of === 'square' ? 60 : 8);
  const parameters = [{ name: 'c0', low: of === 'square' ? LEAST : Math.sqrt(LEAST), high: largest }];
  for (let k = 1; k <= harmonics; k++) parameters.push({ name: `c${k}`, low: -swing, high: swing });
  if (sines)
    for (let k = 1; k <= harmonics; k++) parameters.push({ name: `s${k}`, low: -swing, high: swing });
  return {
    family: 'fourier',
    id: `fourier-${of}-${folds}-fold-${terms}${sines ? '-sines' : ''}`,
    parameters,
    draw: (values, unitM) => drawFourier(values, expansion, unitM),
    ...(of === 'square' && { margins: (values) => seriesMargins(values, expansion) }),
    fromProfile: (profile) => expandProfile(profile, expansion),
    start: (random) => startFourier(random, expansion, limits),
  };
}

/** The series and its derivative in φ, into out[0] and out[1]. */
function sumSeries(
  values: ArrayLike<number>,
  { folds, terms, sines }: Expansion,
  phi: number,
  out: Float64Array,
): void {
  let value = values[0];
  let slope = 0;
  // cos kα and sin kα by rotation: one pair of trigonometric calls serves all harmonics.
  const cos1 = Math.cos(folds * phi);
  const sin1 = Math.sin(folds * phi);
  let cos = 1;
  let sin = 0;
  for (let k = 1; k < terms; k++) {
    const next = cos * cos1 - sin * sin1;
    sin = sin * cos1 + cos * sin1;
    cos = next;
    const c = values[k];
    const s = sines ? values[terms - 1 + k] : 0;
    value += c * cos + s * sin;
    slope += k * folds * (s * cos - c * sin);
  }
  out[0] = value;
  out[1] = slope;
}

/** How far the series stays above its least value, at even azimuths over one fold (half a fold where it is a mirror). */
function seriesMargins(values: ArrayLike<number>, expansion: Expansion): Float64Array {
  const { folds, terms, sines } = expansion;
  const out = new Float64Array(2);
  const probes = (sines ? 12 : 6) * terms;
  return Float64Array.from({ length: probes + 1 }, (_, i) => {
    sumSeries(values, expansion, ((sines ? 2 : 1) * Math.PI * i) / (probes * folds), out);
    return out[0] - LEAST;
  });
}

/** Azimuths at which a profile is sampled to expand it. */
const PROFILE_SAMPLES = 400;

/**
 * Cosine coefficients of a profile, smoothed by Lanczos' factors against the overshoot at its steps, and with the swing reduced
 * where the series would still come too near to the axis.
 */
function expandProfile(profile: (share: number) => number, { of, terms, sines }: Expansion): number[] {
  const own = (share: number) => (of === 'square' ? profile(share) : Math.sqrt(profile(share)));
  const series = Array.from({ length: terms }, (_, k) => {
    let sum = 0;
    for (let i = 0; i < PROFILE_SAMPLES; i++) {
      const share = (i + 0.5) / PROFILE_SAMPLES;
      sum += own(share) * Math.cos(k * Math.PI * share);
    }
    const turn = (Math.PI * k) / terms;
    return (sum / PROFILE_SAMPLES) * (k === 0 ? 1 : (2 * Math.sin(turn)) / turn);
  });
  const [mean, ...waves] = series;
  const kept =
    of === 'radius' ? series : [Math.max(mean, 2 * LEAST), ...shrink(waves, Math.max(mean, 2 * LEAST))];
  return sines ? [...kept, ...Array<number>(terms - 1).fill(0)] : kept;
}

/** Waves about a mean, made smaller where they would take the series down to the axis. */
function shrink(waves: readonly number[], mean: number): number[] {
  let deepest = 0;
  for (let i = 0; i <= PROFILE_SAMPLES; i++) {
    const turn = (Math.PI * i) / PROFILE_SAMPLES;
    const value = waves.reduce((sum, wave, k) => sum + wave * Math.cos((k + 1) * turn), 0);
    deepest = Math.max(deepest, -value);
  }
  const share = Math.min(1, (mean - 1.5 * LEAST) / Math.max(deepest, LEAST));
  return waves.map((wave) => share * wave);
}

function drawFourier(values: ArrayLike<number>, expansion: Expansion, unitM: number): Shape | Misdrawn {
  const { of, folds, terms, sines } = expansion;
  if (of === 'square') {
    // Margins a little below 0 are still drawn, so that a search can take differences where they hold with equality.
    const least = Math.min(...seriesMargins(values, expansion)) + LEAST / 2;
    if (least < 0) return { misdrawnBy: -least };
  }
  const area = unitM * unitM;
  const squared = (phi: number, out: Float64Array) => {
    sumSeries(values, expansion, phi, out);
    if (of === 'radius') {
      out[1] *= 2 * out[0];
      out[0] = out[0] * out[0] + LEAST / 2;
    }
    // Between the probes the boundary may dip a little lower, but never to the axis: there it keeps to a small circle.
    const isCut = out[0] < LEAST / 4;
    out[0] = isCut ? (LEAST / 4) * area : out[0] * area;
    out[1] = isCut ? 0 : out[1] * area;
  };
  // The square of a series has waves twice as fine.
  const waves = (of === 'radius' ? 2 : 1) * (terms - 1);
  const loop = [{ kind: 'polar', from: 0, to: 2 * Math.PI, folds, waves, squared }] as const;
  return { elements: [{ weight: 1, loops: [loop] }], folds, mirror: !sines };
}

function startFourier(random: RandomSource, { of, terms, sines }: Expansion, limits: PhaseLimits) {
  const high = Math.min(limits.high, 16);
  const mean = Math.max(limits.low, 1.2 + (0.6 * high - 1.2) * random.uniform() ** 2);
  const values = [mean];
  const spreads = [0.15 * mean];
  for (let part = 0; part < (sines ? 2 : 1); part++) {
    for (let k = 1; k < terms; k++) {
      values.push(
        k === 1 && part === 0 ? mean * (0.4 + 0.5 * random.uniform()) : ((0.2 * mean) / k) * random.normal(),
      );
      spreads.push((0.2 * mean) / Math.sqrt(k));
    }
  }
  // A series of ρ has half the relative swing of one of ρ², about the root of the mean.
  if (of === 'radius') {
    const root = Math.sqrt(mean);
    return {
      values: values.map((value, k) => (k === 0 ? root : value / (2 * root))),
      spreads: spreads.map((spread) => spread / (2 * root)),
    };
  }
  return { values, spreads };
}
