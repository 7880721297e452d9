import type { RandomSource } from '../../base/random.ts';
import type { Shape } from '../shape.ts';
import type { PhaseLimits, Variant } from './family.ts';
import { roundCorners } from './roundCorners.ts';

const LEAST = 0.05;

/**
 * Polygons about the axis, with rounded corners: regular ones, stars of two radii, and free ones whose vertices lie at
 * even azimuths (`polygon-free-f-fold-v`: v radii a fold). All radii are given as the phase of the sharp vertex.
 */
export function polygonVariants(limits: PhaseLimits): Variant[] {
  return [
    ...[3, 4, 6].map((folds) => polygonVariant('regular', folds, 1, limits)),
    ...[3, 4, 5, 6, 8, 12].map((folds) => polygonVariant('star', folds, 2, limits)),
    ...[3, 4, 5].map((folds) => polygonVariant('free', folds, 4, limits)),
    polygonVariant('free', 1, 9, limits),
  ];
}

function polygonVariant(kind: string, folds: number, perFold: number, limits: PhaseLimits): Variant {
  const parameters = Array.from({ length: perFold }, (_, i) => ({
    name: `vertex ${i + 1}`,
    low: LEAST,
    high: limits.high,
  }));
  // The corner radius is a share of the mean vertex radius.
  parameters.push({ name: 'corner', low: 0, high: 0.5 });
  return {
    family: 'polygon',
    id: kind === 'free' ? `polygon-free-${folds}-fold-${perFold}` : `polygon-${kind}-${folds}`,
    parameters,
    draw: (values, unitM) => drawPolygon(values, folds, perFold, unitM),
    ...(perFold > 1 && { fromProfile: (profile) => verticesOf(profile, perFold) }),
    start: (random) => startPolygon(random, perFold, limits),
  };
}

/** Vertices at even azimuths of a fold, the first at its tip; edges between them fall below the profile, so tips reach beyond. */
function verticesOf(profile: (share: number) => number, perFold: number): number[] {
  const vertices = Array.from({ length: perFold }, (_, i) => profile(1 - Math.abs(1 - (2 * i) / perFold)));
  return [...vertices.map((phase) => Math.max(2 * LEAST, phase)), 0];
}

function drawPolygon(values: ArrayLike<number>, folds: number, perFold: number, unitM: number): Shape {
  const points: number[] = [];
  let sum = 0;
  for (let i = 0; i < perFold; i++) sum += Math.sqrt(values[i]) * unitM;
  for (let i = 0; i < folds * perFold; i++) {
    const radius = Math.sqrt(values[i % perFold]) * unitM;
    const angle = (2 * Math.PI * i) / (folds * perFold);
    points.push(radius * Math.cos(angle), radius * Math.sin(angle));
  }
  const loop = roundCorners(points, (values[perFold] * sum) / perFold);
  return { elements: [{ weight: 1, loops: [loop] }], folds, mirror: perFold <= 2 };
}

function startPolygon(random: RandomSource, perFold: number, limits: PhaseLimits) {
  const high = Math.min(limits.high, 40);
  const outer = 2 + (0.8 * high - 2) * random.uniform() ** 2;
  const values = Array.from({ length: perFold }, (_, i) => {
    const radius = i % 2 === 0 ? outer : outer * (0.1 + 0.5 * random.uniform());
    return Math.min(Math.max(radius * Math.exp(perFold > 2 ? 0.2 * random.normal() : 0), LEAST), limits.high);
  });
  return {
    values: [...values, 0.05 + 0.1 * random.uniform()],
    spreads: [...values.map((value) => 0.1 * value + 0.2), 0.05],
  };
}
