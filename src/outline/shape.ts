import type { Segment } from './segment.ts';

/** A closed ring of segments, each starting where the one before ends. Outer rings run counter-clockwise, holes clockwise. */
export type Loop = readonly Segment[];

/** One detector element: its weight in the sum, and the rings around its sensitive area. */
export interface ShapeElement {
  weight: number;
  loops: readonly Loop[];
}

/** A detector as a family draws it: exact curves, and the symmetry that scoring may use. */
export interface Shape {
  elements: readonly ShapeElement[];
  /** The shape repeats itself this many times in a turn about the axis; Infinity for circles about it. */
  folds: number;
  /** Whether the x axis is a mirror line. */
  mirror: boolean;
}

/** One detector element as points: rings are flat [x0, y0, x1, y1, …] in metres, the last point not repeated. */
export interface OutlineElement {
  weight: number;
  rings: readonly Float64Array[];
  /**
   * Where the outline consists of straight edges and arcs, these exactly: for each ring its arc loop (see `arcLoop.ts`). The ring is a
   * polygon of the same area. Whoever changes the rings leaves this out.
   */
  curves?: readonly Float64Array[];
}
