import { nodesArea } from '../outline/area.ts';
import type { ElementArea } from './cost.ts';

/** One detector element ready for integration. */
export interface ElementNodes extends ElementArea {
  nodes: Float64Array;
}

/** @param nodes of the element's boundary (see `boundaryNodes`) */
export function elementNodes(weight: number, nodes: Float64Array): ElementNodes {
  return { weight, nodes, areaM2: nodesArea(nodes) };
}

/** All elements as one list of nodes: a reading is linear in the tangents. */
export function weightedNodes(elements: readonly ElementNodes[]): Float64Array {
  const all = new Float64Array(elements.reduce((sum, { nodes }) => sum + nodes.length, 0));
  let at = 0;
  for (const { weight, nodes } of elements) {
    all.set(nodes, at);
    for (let i = at; i < at + nodes.length; i += 4) {
      all[i + 2] *= weight;
      all[i + 3] *= weight;
    }
    at += nodes.length;
  }
  return all;
}
