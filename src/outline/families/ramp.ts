import type { RandomSource } from '../../base/random.ts';
import type { Segment } from '../segment.ts';
import type { Shape } from '../shape.ts';
import type { Misdrawn, PhaseLimits, Variant } from './family.ts';

const LEAST = 0.01;

/**
 * Outlines whose ρ² runs piecewise linearly in azimuth, n-fold.
 *
 * Where a run spans a multiple of 2π in phase its share of f vanishes. `ramp-saw` rises and falls back along a radius,
 * `ramp-peak` rises and falls, `ramp-knots` joins several heights at chosen azimuths.
 */
export function rampVariants(limits: PhaseLimits): Variant[] {
  return [
    ...[3, 5, 8, 12].map((folds) => sawVariant(folds, limits)),
    ...[3, 4, 5, 6, 8].map((folds) => peakVariant(folds, limits)),
    ...[3, 5].map((folds) => knotsVariant(folds, 4, limits)),
  ];
}

function sawVariant(folds: number, limits: PhaseLimits): Variant {
  return {
    family: 'ramp',
    id: `ramp-saw-${folds}-fold`,
    parameters: twoHeights(limits),
    draw: (values, unitM) => drawRuns([0, 1], [values[0], values[1]], folds, unitM, false),
    start: (random) => startHeights(random, limits),
  };
}

function peakVariant(folds: number, limits: PhaseLimits): Variant {
  return {
    family: 'ramp',
    id: `ramp-peak-${folds}-fold`,
    parameters: twoHeights(limits),
    draw: (values, unitM) => drawRuns([0, 0.5, 1], [values[0], values[1], values[0]], folds, unitM, true),
    fromProfile: (profile) => [Math.max(2 * LEAST, profile(0.8)), Math.max(2 * LEAST, profile(0.2))],
    start: (random) => startHeights(random, limits),
  };
}

function knotsVariant(folds: number, knots: number, limits: PhaseLimits): Variant {
  const parameters = [
    ...Array.from({ length: knots }, (_, i) => ({ name: `height ${i + 1}`, low: LEAST, high: limits.high })),
    ...Array.from({ length: knots }, (_, i) => ({ name: `run ${i + 1}`, low: 0.05, high: 1 })),
  ];
  return {
    family: 'ramp',
    id: `ramp-knots-${folds}-fold`,
    parameters,
    draw(values, unitM) {
      const all = Array.from(values);
      const heights = all.slice(0, knots);
      const shares = all.slice(knots);
      const total = shares.reduce((sum, share) => sum + share, 0);
      const places = [0];
      for (const share of shares) places.push(places[places.length - 1] + share / total);
      return drawRuns(places, [...heights, heights[0]], folds, unitM, false);
    },
    fromProfile(profile) {
      // Knots at even azimuths, from the tip down to the valley and up again.
      const heights = Array.from({ length: knots }, (_, i) => profile(1 - Math.abs(1 - (2 * i) / knots)));
      return [...heights.map((height) => Math.max(2 * LEAST, height)), ...heights.map(() => 0.5)];
    },
    start(random) {
      const { values, spreads } = startHeights(random, limits);
      const heights = Array.from({ length: knots }, (_, i) => {
        const height = (i % 2 === 0 ? values[0] : values[1]) * Math.exp(0.3 * random.normal());
        return Math.min(Math.max(height, 2 * LEAST), limits.high);
      });
      return {
        values: [...heights, ...heights.map(() => 0.3 + 0.4 * random.uniform())],
        spreads: [...heights.map(() => spreads[0]), ...heights.map(() => 0.15)],
      };
    },
  };
}

function twoHeights(limits: PhaseLimits) {
  return [
    { name: 'low', low: LEAST, high: limits.high },
    { name: 'high', low: LEAST, high: limits.high },
  ];
}

function startHeights(random: RandomSource, limits: PhaseLimits) {
  const low = 0.05 + 4 * random.uniform() ** 2;
  const high = low + 2 * Math.PI * (random.uniform() < 0.3 ? 2 : 1) * (0.8 + 0.4 * random.uniform());
  return { values: [low, Math.min(high, limits.high)], spreads: [0.5, 0.5] };
}

/** Runs between (place, height) pairs, places in shares of one fold; a jump between folds is a straight radial edge. */
function drawRuns(
  places: readonly number[],
  heights: readonly number[],
  folds: number,
  unitM: number,
  mirror: boolean,
): Shape | Misdrawn {
  const jump = Math.abs(heights[0] - heights[heights.length - 1]) > 1e-9;
  const area = unitM * unitM;
  const fold = (2 * Math.PI) / folds;
  const segments: Segment[] = [];
  for (let n = 0; n < folds; n++) {
    for (let i = 0; i + 1 < places.length; i++) {
      const from = (n + places[i]) * fold;
      const to = (n + places[i + 1]) * fold;
      const start = heights[i] * area;
      const slope = ((heights[i + 1] - heights[i]) * area) / (to - from);
      segments.push({
        kind: 'polar',
        from,
        to,
        folds: 1,
        squared: (phi, out) => {
          out[0] = start + slope * (phi - from);
          out[1] = slope;
        },
      });
    }
    if (jump) {
      const angle = (n + 1) * fold;
      const outer = Math.sqrt(heights[heights.length - 1]) * unitM;
      const inner = Math.sqrt(heights[0]) * unitM;
      segments.push({
        kind: 'line',
        from: [outer * Math.cos(angle), outer * Math.sin(angle)],
        to: [inner * Math.cos(angle), inner * Math.sin(angle)],
      });
    }
  }
  return { elements: [{ weight: 1, loops: [segments] }], folds, mirror };
}
