import type { Boundary } from './boundary.ts';

/** A corner of the boundary. */
export interface Corner {
  /** Metres; 0 for a corner drawn sharp. */
  radiusM: number;
  /** How far the boundary turns there, radians, positive: all of it in a sharp corner, 0.4 or a little more in a round one. */
  turnRad: number;
  at: [x: number, y: number];
}

/** The tightest corners, or null where the boundary never turns that way by as much as a corner. */
export interface TightestCorners {
  inside: Corner | null;
  outside: Corner | null;
}

/**
 * What counts as a corner, radians (23°). Rounding a shallower one to a radius r moves its tip by less than r/48, and a
 * regular polygon of 16 or more sides passes for a circle.
 */
const CORNER_TURN = 0.4;

/**
 * The tightest corner of each sense.
 *
 * A vertex that turns by more than `CORNER_TURN` is a sharp corner, radius 0. Elsewhere the vertices are points on a
 * curve: its radius is arc length over turning, along the shortest stretch that turns by `CORNER_TURN`, and the tightest
 * stretch is the corner. A regular polygon inscribed in a circle gives the circle's radius. The work is the number of
 * vertices times those of the longest stretch.
 */
export function tightestCorners(b: Boundary): TightestCorners {
  const best: TightestCorners = { inside: null, outside: null };
  const keep = (corner: Corner, turn: number) => {
    const side = turn > 0 ? 'inside' : 'outside';
    const old = best[side];
    const isTighter =
      old === null ||
      corner.radiusM < old.radiusM ||
      (corner.radiusM === 0 && old.radiusM === 0 && corner.turnRad > old.turnRad);
    if (isTighter) best[side] = corner;
  };
  for (let i = 0; i < b.count; i++) {
    const turn = b.turnRad[i];
    if (Math.abs(turn) > CORNER_TURN)
      keep({ radiusM: 0, turnRad: Math.abs(turn), at: [b.x[i], b.y[i]] }, turn);
  }
  for (const ring of b.rings) {
    for (let i = ring.first; i < ring.end; i++) {
      const stretch = roundCorner(b, i, ring.end - ring.first);
      if (stretch !== null) keep(stretch.corner, stretch.turn);
    }
  }
  return best;
}

/** The stretch from the middle of the edge before vertex `start` to where it has turned by a corner; null if it never does. */
function roundCorner(b: Boundary, start: number, most: number): { corner: Corner; turn: number } | null {
  let turn = 0;
  let arcM = 0;
  let vertex = start;
  for (let steps = 1; steps <= most; steps++) {
    const here = b.turnRad[vertex];
    if (Math.abs(here) > CORNER_TURN) return null;
    turn += here;
    // Half of each edge beside the vertex; the last factor turns chords of a circle into arcs.
    const halves = (b.lengthM[b.previous[vertex]] + b.lengthM[vertex]) / 2;
    arcM += halves * (1 + (here * here) / 24);
    if (Math.abs(turn) >= CORNER_TURN) {
      const middle = stepsOn(b, start, steps >> 1);
      const turnRad = Math.abs(turn);
      return { corner: { radiusM: arcM / turnRad, turnRad, at: [b.x[middle], b.y[middle]] }, turn };
    }
    vertex = b.next[vertex];
  }
  return null;
}

function stepsOn(b: Boundary, start: number, steps: number): number {
  let vertex = start;
  for (let k = 0; k < steps; k++) vertex = b.next[vertex];
  return vertex;
}
