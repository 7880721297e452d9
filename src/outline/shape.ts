import type { Segment } from './segment.ts';

/** A closed ring of segments, each starting where the one before ends. Outer rings run counter-clockwise, holes clockwise. */
export type Loop = readonly Segment[];

/** One detector element: its weight in the sum, and the rings around its sensitive area. */
export interface ShapeElement extends ElementPlace {
  weight: number;
  loops: readonly Loop[];
  /** Its distance over the design's, as a family draws it: 1 if left out. */
  distanceRatio?: number;
}

/** Where an element stands that is not simply in the design's plane, in all of the light. */
interface ElementPlace {
  /** From the particle, metres; the design's distance if left out. */
  distanceM?: number;
  /** Part of the light that a beam splitter sends to it; 1 if left out. */
  share?: number;
}

/** A detector as a family draws it: exact curves, and the symmetry that scoring may use. */
export interface Shape {
  elements: readonly ShapeElement[];
  /** The shape repeats itself this many times in a turn about the axis; Infinity for circles about it. */
  folds: number;
  /** Whether the x axis is a mirror line. */
  mirror: boolean;
  /** The elements' weights are to be solved for (see `solveWeights`); those in `elements` only stand in. */
  freeWeights?: true;
}

/** One detector element as points: rings are flat [x0, y0, x1, y1, …] in metres, the last point not repeated. */
export interface OutlineElement extends ElementPlace {
  weight: number;
  rings: readonly Float64Array[];
  /**
   * Where the outline consists of straight edges and arcs, these exactly: for each ring its arc loop (see `arcLoop.ts`). The ring is a
   * polygon of the same area. Whoever changes the rings leaves this out.
   */
  curves?: readonly Float64Array[];
}
