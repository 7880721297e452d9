import { nodesArea } from '../outline/area.ts';
import type { ElementArea } from './cost.ts';

/** One detector element ready for integration. */
export interface ElementNodes extends ElementArea {
  nodes: Float64Array;
  /** Its own distance and share of the light: see `ShapeElement`. */
  distanceM?: number;
  share?: number;
}

/**
 * @param element its weight and place
 * @param nodes of the element's boundary (see `boundaryNodes`)
 */
export function elementNodes(
  { weight, distanceM, share }: Pick<ElementNodes, 'weight' | 'distanceM' | 'share'>,
  nodes: Float64Array,
): ElementNodes {
  return {
    weight,
    nodes,
    areaM2: nodesArea(nodes),
    ...(distanceM !== undefined && { distanceM }),
    ...(share !== undefined && { share }),
  };
}

/** By what a reading of the element counts in the sum. */
export function factorOf({ weight, share }: Pick<ElementNodes, 'weight' | 'share'>): number {
  return share === undefined ? weight : weight * share;
}

/** Elements in one plane. */
export interface ElementPlane {
  distanceM: number;
  elements: readonly ElementNodes[];
}

/** Elements by their distance; mostly there is one plane, that of the design. */
export function planesOf(elements: readonly ElementNodes[], distanceM: number): ElementPlane[] {
  const distances = [...new Set(elements.map((one) => one.distanceM ?? distanceM))];
  if (distances.length === 1) return [{ distanceM: distances[0], elements }];
  return distances.map((own) => ({
    distanceM: own,
    elements: elements.filter((one) => (one.distanceM ?? distanceM) === own),
  }));
}

/** The distance of the plane in which a step of the particle changes most: places that do for it do for all. */
export function nearestPlane(elements: readonly { distanceM?: number }[], distanceM: number): number {
  return Math.min(...elements.map((one) => one.distanceM ?? distanceM));
}

/** All elements as one list of nodes: a reading is linear in the tangents. */
export function weightedNodes(elements: readonly ElementNodes[]): Float64Array {
  const all = new Float64Array(elements.reduce((sum, { nodes }) => sum + nodes.length, 0));
  let at = 0;
  for (const element of elements) {
    const { nodes } = element;
    const weight = factorOf(element);
    all.set(nodes, at);
    for (let i = at; i < at + nodes.length; i += 4) {
      all[i + 2] *= weight;
      all[i + 3] *= weight;
    }
    at += nodes.length;
  }
  return all;
}
