/** Annuli of equal area about the axis, each cut into equal pieces of a wedge; more of them farther out. */
export interface PlaneGrid {
  radiusM: number;
  /** Where the wedge begins, and how wide it is, radians. */
  axisRad: number;
  wedgeRad: number;
  /** Whether the ends of the wedge are mirrors; else half a turn leads on. */
  mirrors: boolean;
  /** Pieces of each annulus. */
  pieces: Int32Array;
  /** Number of the first cell of each annulus, and after them the number of cells. */
  first: Int32Array;
}

/** Phase of one cell along the radius, radians, where there are not too many of them; along the azimuth, where edges seldom cross, it may be more. */
const CELL_PHASE = 0.16;
const AZIMUTH_PHASE = 1.5;

/** Most cells; with more of them, what a place adds in each takes too long to be told. */
const MOST_CELLS = 160_000;

/** Fewest annuli, and fewest pieces of a quarter turn: a field's direction makes half a wave there. */
const LEAST_ANNULI = 240;
const LEAST_PIECES = 6;

/** The cells on either side of one: along the radius those of its own azimuth, along the azimuth in the mirror or half a turn on. */
export function neighbours(
  grid: PlaneGrid,
  annulus: number,
  piece: number,
): [number, number, number, number] {
  const { pieces, first, mirrors } = grid;
  const count = pieces[annulus];
  const beside = (place: number) => {
    if (place >= 0 && place < count) return place;
    if (mirrors) return place < 0 ? 0 : count - 1;
    return place < 0 ? count - 1 : 0;
  };
  const at = (a: number) => first[a] + Math.floor(((piece + 0.5) * pieces[a]) / count);
  return [
    at(Math.max(0, annulus - 1)),
    at(Math.min(pieces.length - 1, annulus + 1)),
    first[annulus] + beside(piece - 1),
    first[annulus] + beside(piece + 1),
  ];
}

/**
 * Integrals over cells from values in their middles, in units of the cell: with second differences added they err by 17 h⁴/5760 of
 * the phase h of a cell. Where the cells of an annulus do not lie in line with its neighbours', the second difference is that of the next.
 */
export function cellIntegrals(grid: PlaneGrid, middles: ArrayLike<number>): Float32Array {
  const { pieces, first } = grid;
  const out = new Float32Array(middles.length);
  for (let a = 0; a < pieces.length; a++) {
    const count = pieces[a];
    // The annulus about which second differences along the radius are taken.
    const about = [a, a + 1, a - 1].find((b) => pieces[b - 1] === count && pieces[b + 1] === count);
    for (let piece = 0; piece < count; piece++) {
      const cell = first[a] + piece;
      const [, , before, after] = neighbours(grid, a, piece);
      let bends = middles[before] + middles[after] - 2 * middles[cell];
      if (about !== undefined) {
        const centre = first[about] + piece;
        bends += middles[centre - count] + middles[centre + count] - 2 * middles[centre];
      }
      out[cell] = middles[cell] + bends / 24;
    }
  }
  return out;
}

/** What decides how fine a grid is. */
export interface GridPhases {
  /** η at the outer end. */
  largest: number;
  /** 2κ times the radius times the farthest place of the particle: what it swings over a quarter turn at the rim. */
  swing: number;
  /** Grids of the same layout and another number of cells: 2 halves them in both directions. 1 if left out. */
  finer?: number;
}

export function planeGrid(
  radiusM: number,
  { axisRad, mirrors }: { axisRad: number; mirrors: boolean },
  { largest, swing, finer = 1 }: GridPhases,
): PlaneGrid {
  const quarters = mirrors ? 1 : 2;
  let phase = CELL_PHASE;
  let pieces = piecesOf(phase);
  for (; total(pieces) > MOST_CELLS * finer * finer; phase *= 1.05) pieces = piecesOf(phase);
  const first = new Int32Array(pieces.length + 1);
  pieces.forEach((count, a) => {
    first[a + 1] = first[a] + count;
  });
  return { radiusM, axisRad, mirrors, wedgeRad: (quarters * Math.PI) / 2, pieces, first };

  function piecesOf(size: number): Int32Array {
    const annuli = Math.max(LEAST_ANNULI, Math.ceil(largest / size)) * finer;
    return Int32Array.from({ length: annuli }, (_, a) => {
      const asked = (swing * Math.sqrt((a + 1) / annuli)) / (AZIMUTH_PHASE * size);
      return quarters * finer * stepped(asked);
    });
  }
}

/** The next of 6, 9, 12, 18, 24, 36 …: in steps, so that most annuli are cut as their neighbours are. */
function stepped(asked: number): number {
  let step = LEAST_PIECES;
  while (step < asked) step = Math.log2(step / LEAST_PIECES) % 1 === 0 ? step * 1.5 : (step * 4) / 3;
  return step;
}

function total(pieces: Int32Array): number {
  return pieces.reduce((sum, count) => sum + count, 0);
}
