import type { RandomSource } from '../../base/random.ts';
import type { Loop, ShapeElement } from '../shape.ts';
import type { PhaseLimits, Variant } from './family.ts';

/** Least width of a photodiode and gap between two, metres. */
const LEAST_M = 1e-7;

/** Least part of its pitch that a photodiode takes. */
const LEAST_FILL = 0.1;

/**
 * Rows and columns of rectangular photodiodes about the axis, with even gaps. Mirror images of one another are one element: they
 * share a weight. `grid-n-by-n` has one pitch, and photodiodes that swap rows and columns share a weight as well;
 * `grid-r-by-c` has a pitch either way.
 */
export function gridVariants(limits: PhaseLimits): Variant[] {
  return [gridVariant(4, 4, limits), gridVariant(3, 5, limits)];
}

function gridVariant(rows: number, columns: number, limits: PhaseLimits): Variant {
  const isSquare = rows === columns;
  // The corner of the outermost photodiode may lie as far out as a search goes.
  const pitch = (name: string, count: number) => ({
    name,
    low: 1e-2,
    high: Math.max(2e-2, limits.high / (count / 2) ** 2),
  });
  return {
    family: 'grid',
    id: `grid-${rows}-by-${columns}`,
    weighted: true,
    parameters: [
      ...(isSquare ? [pitch('pitch', rows)] : [pitch('pitch across', columns), pitch('pitch up', rows)]),
      { name: 'fill', low: LEAST_FILL, high: 1 },
    ],
    draw(values, unitM) {
      const across = Math.sqrt(values[0]) * unitM;
      const up = isSquare ? across : Math.sqrt(values[1]) * unitM;
      const fill = values[isSquare ? 1 : 2];
      const gapM = Math.max(LEAST_M, limits.gapM ?? 0);
      const least = Math.min(across, up) - gapM - LEAST_M;
      if (least < 0) return { misdrawnBy: -least / unitM };
      // The gap is the same both ways: what the narrower pitch leaves.
      const gap = Math.max(gapM, Math.min(Math.min(across, up) - LEAST_M, (1 - fill) * Math.min(across, up)));
      return {
        elements: photodiodes(rows, columns, [across, up], gap),
        folds: isSquare ? 4 : 2,
        mirror: true,
        freeWeights: true,
      };
    },
    start: (random) => startGrid(random, rows, columns, isSquare, limits),
  };
}

function startGrid(
  random: RandomSource,
  rows: number,
  columns: number,
  isSquare: boolean,
  { high }: PhaseLimits,
) {
  // So that the grid reaches over one to a few zones.
  const reach = Math.PI * (1 + 3 * random.uniform());
  const pitchFor = (count: number) =>
    Math.min(
      Math.max((reach * (0.8 + 0.4 * random.uniform())) / (count / 2) ** 2, 0.02),
      high / (count / 2) ** 2,
    );
  const pitches = isSquare ? [pitchFor(rows)] : [pitchFor(columns), pitchFor(rows)];
  return {
    values: [...pitches, 0.8 + 0.2 * random.uniform()],
    spreads: [...pitches.map((value) => 0.15 * value), 0.1],
  };
}

/** One element for each set of photodiodes that mirrors, and in a square swaps, map onto each other. */
function photodiodes(
  rows: number,
  columns: number,
  [across, up]: readonly [number, number],
  gapM: number,
): ShapeElement[] {
  const isSquare = rows === columns;
  const groups = new Map<string, Loop[]>();
  for (let r = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++) {
      const [i, j] = [c - (columns - 1) / 2, r - (rows - 1) / 2];
      const sides = [Math.abs(i), Math.abs(j)];
      const key = (isSquare ? sides.sort((a, b) => a - b) : sides).join(' ');
      const loop = rectangle(i * across, j * up, across - gapM, up - gapM);
      groups.set(key, [...(groups.get(key) ?? []), loop]);
    }
  }
  return [...groups.values()].map((loops) => ({ weight: 1, loops }));
}

/** A rectangle about (x, y), counter-clockwise. */
function rectangle(x: number, y: number, width: number, height: number): Loop {
  const corners = [
    [x - width / 2, y - height / 2],
    [x + width / 2, y - height / 2],
    [x + width / 2, y + height / 2],
    [x - width / 2, y + height / 2],
  ] as const;
  return corners.map((from, i) => ({ kind: 'line', from, to: corners[(i + 1) % 4] }));
}
