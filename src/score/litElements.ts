import { lightThrough } from '../reading/litArea.ts';
import type { ElementArea } from './cost.ts';
import type { ElementNodes } from './elementNodes.ts';
import type { Task } from './task.ts';

/**
 * Elements with the areas that would collect as much power in a flat wave of the irradiance at the particle; behind a beam splitter, its
 * share of that.
 */
export function litElements(
  { light, medium }: Pick<Task, 'light' | 'medium'>,
  elements: readonly ElementNodes[],
  distanceM: number,
): readonly ElementArea[] {
  const { beam } = light;
  return elements.map(({ weight, nodes, areaM2, share = 1, distanceM: own = distanceM }) => ({
    weight,
    areaM2: share * (beam === undefined ? areaM2 : lightThrough({ ...light, beam }, medium, own, nodes)),
  }));
}
