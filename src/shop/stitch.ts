import { ringArea } from '../outline/area.ts';
import type { Boundary } from './boundary.ts';
import type { Foot } from './edgeGrid.ts';
import { edgeGrid } from './edgeGrid.ts';

/** Where a changed outline leaves the original's boundary and comes back to it. */
export interface Departure {
  /** Null for a ring that nowhere touches the original. */
  from: Foot | null;
  to: Foot | null;
}

/** A changed outline that runs on the original's own vertices wherever the change does not reach. */
export interface Stitched {
  rings: readonly Float64Array[];
  departures: Departure[];
  /** Numbers of the original's rings that nothing of the result follows. */
  lost: number[];
}

/** A path along the original that is longer than the chord by more is a corner or a notch that was cut off. */
const LONGER_PATH = 1.1;

/**
 * Lays a changed outline (an opening, a closing) over the original: where a vertex lies within `nearM` of it, the original's own
 * vertices are taken, to the last digit. What an offset there and back moves by rounding, or by the chords of its arcs, is gone with
 * that, and an outline that nothing touches comes back as it is.
 *
 * @param original of rings that do not cross
 * @param rings as `original`, the opening on the left of every edge
 */
export function stitch(
  original: Boundary,
  originalRings: readonly Float64Array[],
  rings: readonly Float64Array[],
  nearM: number,
): Stitched {
  const track = trackOf(original);
  const footOf = edgeGrid(original, nearM);
  const departures: Departure[] = [];
  const followed = new Set<number>();
  const stitched = rings.map((ring) => {
    const count = ring.length / 2;
    const feet = Array.from({ length: count }, (_, k) => footOf(ring[2 * k], ring[2 * k + 1]));
    const start = feet.findIndex((foot) => foot !== null);
    if (start < 0) {
      departures.push({ from: null, to: null });
      return ring;
    }
    const points: number[] = [];
    let from = feet[start] as Foot;
    let isCut = false;
    followed.add(track.ringOf[from.edge]);
    for (let step = 1; step <= count; step++) {
      const k = (start + step) % count;
      const to = feet[k];
      if (to === null) {
        if (!isCut) points.push(from.x, from.y);
        isCut = true;
        points.push(ring[2 * k], ring[2 * k + 1]);
        continue;
      }
      followed.add(track.ringOf[to.edge]);
      if (!isCut && track.runsOn(from, to, nearM)) track.follow(from, to, nearM, points);
      else {
        if (!isCut) points.push(from.x, from.y);
        departures.push({ from, to });
        points.push(to.x, to.y);
        isCut = false;
      }
      from = to;
    }
    return withoutRepeats(points, original.touchM);
  });
  const lost = original.rings.map((_, k) => k).filter((k) => !followed.has(k));
  if (departures.length === 0 && lost.length === 0) return { rings: originalRings, departures, lost };
  const whole = stitched.filter(({ length }) => length >= 6);
  // Feet lie within nearM of what they stand for: an area that differs by more has lost its way, and the offset's own vertices serve.
  const perimeterM = original.rings.reduce((sum, ring) => sum + ring.perimeterM, 0);
  const isTrue = Math.abs(areaOf(whole) - areaOf(rings)) <= 2 * nearM * perimeterM;
  return { rings: isTrue ? whole : rings, departures, lost };
}

function areaOf(rings: readonly Float64Array[]): number {
  return rings.reduce((sum, ring) => sum + ringArea(ring), 0);
}

/** Walking along the original's rings. */
interface Track {
  /** The ring of each edge. */
  ringOf: Int32Array;
  /** Whether the way from one foot to the next is what the line between them stands for. */
  runsOn(from: Foot, to: Foot, nearM: number): boolean;
  /** Adds the vertices between two feet. */
  follow(from: Foot, to: Foot, nearM: number, points: number[]): void;
}

function trackOf(b: Boundary): Track {
  const ringOf = new Int32Array(b.count);
  const startM = new Float64Array(b.count);
  b.rings.forEach(({ first, end }, ring) => {
    let sum = 0;
    for (let i = first; i < end; i++) {
      ringOf[i] = ring;
      startM[i] = sum;
      sum += b.lengthM[i];
    }
  });
  /** Along the ring, from 0 to its perimeter. */
  const way = (from: Foot, to: Foot): number => {
    const distance = startM[to.edge] + to.alongM - startM[from.edge] - from.alongM;
    return distance < 0 ? distance + b.rings[ringOf[from.edge]].perimeterM : distance;
  };
  /** Rounding may set a vertex back a little. */
  const isSetBack = (from: Foot, to: Foot, nearM: number) =>
    b.rings[ringOf[from.edge]].perimeterM - way(from, to) < 4 * nearM;
  return {
    ringOf,
    runsOn(from, to, nearM) {
      if (ringOf[from.edge] !== ringOf[to.edge]) return false;
      const chordM = Math.hypot(to.x - from.x, to.y - from.y);
      return isSetBack(from, to, nearM) || way(from, to) <= LONGER_PATH * chordM + 4 * nearM;
    },
    follow(from, to, nearM, points) {
      if (isSetBack(from, to, nearM)) return;
      // One vertex as the start of its edge, and then as the end of the edge before: the way on would be all around.
      if (to.edge === b.previous[from.edge] && way(from, to) < nearM) return;
      for (let i = from.edge; i !== to.edge; ) {
        i = b.next[i];
        points.push(b.x[i], b.y[i]);
      }
    },
  };
}

function withoutRepeats(points: readonly number[], touchM: number): Float64Array {
  const kept: number[] = [];
  for (let k = 0; k < points.length; k += 2) {
    const last = kept.length - 2;
    const isAgain = last >= 0 && Math.hypot(points[k] - kept[last], points[k + 1] - kept[last + 1]) <= touchM;
    if (!isAgain) kept.push(points[k], points[k + 1]);
  }
  while (kept.length >= 4) {
    const last = kept.length - 2;
    if (Math.hypot(kept[0] - kept[last], kept[1] - kept[last + 1]) > touchM) break;
    kept.length = last;
  }
  return Float64Array.from(kept);
}
