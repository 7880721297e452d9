import type { RandomSource } from '../base/random.ts';
import type { SearchSpace } from '../score/searchSpace.ts';
import type { Trials } from './trials.ts';

/** Ranges of the parameters, and of the distance's place where there is a choice. */
export function boxOf({ variant, space }: Trials): { lower: Float64Array; upper: Float64Array } {
  return {
    lower: Float64Array.from([...variant.parameters.map(({ low }) => low), ...place(space, 0)]),
    upper: Float64Array.from([...variant.parameters.map(({ high }) => high), ...place(space, 1)]),
  };
}

/** A start of the variant's own within its ranges, anywhere on the distance grid, and natural lengths around it. */
export function drawStart({ variant, space }: Trials, random: RandomSource) {
  const { values, spreads } = variant.start(random);
  const within = values.map((value, i) => {
    const { low, high } = variant.parameters[i];
    return Math.min(Math.max(value, low), high);
  });
  return {
    start: Float64Array.from([...within, ...place(space, random.uniform())]),
    scales: Float64Array.from([...spreads, ...place(space, 0.2)]),
  };
}

/** A coordinate for the distance, or none where the brief fixes it. */
function place(space: SearchSpace, value: number): number[] {
  return space.distances.length > 1 ? [value] : [];
}
