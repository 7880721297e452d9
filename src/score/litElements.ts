import { lightThrough } from '../reading/litArea.ts';
import type { ElementArea } from './cost.ts';
import type { ElementNodes } from './elementNodes.ts';
import type { Task } from './task.ts';

/** Elements with the areas that would collect as much power in a flat wave of the irradiance at the particle. */
export function litElements(
  { light, medium }: Pick<Task, 'light' | 'medium'>,
  elements: readonly ElementNodes[],
  distanceM: number,
): readonly ElementArea[] {
  const { beam } = light;
  if (beam === undefined) return elements;
  return elements.map(({ weight, nodes }) => ({
    weight,
    areaM2: lightThrough({ ...light, beam }, medium, distanceM, nodes),
  }));
}
