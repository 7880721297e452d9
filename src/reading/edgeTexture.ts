import { inputError } from '../base/errors.ts';

/** A straight edge: its start, unit direction, length, and the ring's length before it. */
export interface Edge {
  x: number;
  y: number;
  tx: number;
  ty: number;
  from: number;
  length: number;
}

/** The edges of a flat ring; a repeated point makes none. */
export function measureEdges(ring: Float64Array): Edge[] {
  const edges: Edge[] = [];
  let from = 0;
  for (let i = 0; i < ring.length; i += 2) {
    const j = (i + 2) % ring.length;
    const dx = ring[j] - ring[i];
    const dy = ring[j + 1] - ring[i + 1];
    const length = Math.hypot(dx, dy);
    if (length === 0) continue;
    edges.push({ x: ring[i], y: ring[i + 1], tx: dx / length, ty: dy / length, from, length });
    from += length;
  }
  return edges;
}

/** tan(θ/2) of the turn at the start of edge `i`, to the left positive; sharper than 143° counts as 3, or it would shoot off. */
export function mitre(edges: readonly Edge[], i: number): number {
  const before = edges[(i + edges.length - 1) % edges.length];
  const after = edges[i];
  const sin = before.tx * after.ty - before.ty * after.tx;
  const cos = before.tx * after.tx + before.ty * after.ty;
  return Math.max(-3, Math.min(3, sin / Math.max(1 + cos, 1e-12)));
}

/** Smoothed noise around a ring: δ(s) = Σ amplitude · e^(−2(s − s_j)²/ξ²) · noise_j, s_j every `stepM`. */
export interface Texture {
  cells: number;
  stepM: number;
  correlationM: number;
  amplitudeM: number;
}

const MOST_POINTS = 4_000_000;

/**
 * The texture whose δ has the given rms and the autocorrelation rms² e^(−(s − s′)²/ξ²), periodic along the ring.
 *
 * @throws RimwrightError `input` for a ring of more than 4 million points
 */
export function makeTexture(edges: readonly Edge[], rmsM: number, correlationM: number): Texture {
  const lengthM = edges.reduce((sum, { length }) => sum + length, 0);
  const points = edges.reduce((sum, { length }) => sum + pieceCount(length, correlationM), 0);
  if (points > MOST_POINTS) {
    throw inputError([
      {
        key: 'correlationM',
        found: `${correlationM} m on a ring of ${lengthM} m`,
        expected: `a length that ${MOST_POINTS} points can follow, eight of them a correlation length`,
      },
    ]);
  }
  // At two ring lengths the ring already moves as a whole, to 1e-17.
  const smoothM = Math.min(correlationM, 2 * lengthM);
  // Four cells a correlation length: sums over them then differ from integrals by 1e-17.
  const cells = Math.ceil((4 * lengthM) / smoothM);
  const stepM = lengthM / cells;
  // The variance is Σ e^(−4 s_j²/ξ²), and a ring shorter than a few ξ meets its own tail.
  let wraps = 1;
  for (let m = 1; m * lengthM < 6 * smoothM; m++) wraps += 2 * Math.exp(-(((m * lengthM) / smoothM) ** 2));
  const variance = ((Math.sqrt(Math.PI) * smoothM) / (2 * stepM)) * wraps;
  return { cells, stepM, correlationM: smoothM, amplitudeM: rmsM / Math.sqrt(variance) };
}

/** Calls `visit` with every noise cell that counts at `at`, and its weight; e^−18 and less is left out. */
export function forTaps(texture: Texture, at: number, visit: (cell: number, weight: number) => void): void {
  const { cells, stepM, correlationM, amplitudeM } = texture;
  const last = Math.floor((at + 3 * correlationM) / stepM);
  for (let j = Math.ceil((at - 3 * correlationM) / stepM); j <= last; j++) {
    const u = (at - j * stepM) / correlationM;
    visit(((j % cells) + cells) % cells, amplitudeM * Math.exp(-2 * u * u));
  }
}

/** Straight pieces that an edge is divided into: eight a correlation length. */
export function pieceCount(length: number, correlationM: number): number {
  return Math.ceil((8 * length) / correlationM);
}
