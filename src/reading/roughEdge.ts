import { inputError } from '../base/errors.ts';
import type { RandomSource } from '../base/random.ts';
import { forTaps, makeTexture, measureEdges, mitre, pieceCount } from './edgeTexture.ts';

/**
 * One outline ring with a rough edge: its points, and more between them, moved across the edge by a normal random height δ
 * of the autocorrelation ⟨δ(s) δ(s′)⟩ = rms² e^(−(s − s′)²/ξ²), periodic along the ring's length s.
 *
 * The heights are white noise smoothed by e^(−2s²/ξ²), whose own autocorrelation is the wanted one. A positive height widens
 * the opening. Corners are kept, and move so that both of their edges move by δ.
 *
 * @param ring flat [x0, y0, x1, y1, …], metres, the last point not repeated; the opening on the left of the direction of travel
 * @param rmsM 0 or more; far less than the outline's own features, or the edge may cross itself
 * @param correlationM ξ, above 0
 * @returns such a ring, with points at most ξ/8 apart before they move; straight between them, the heights' mean square is 0.5 % low
 * @throws RimwrightError `input` for lengths out of range or a ring of more than 4 million points
 */
export function roughen(
  ring: Float64Array,
  rmsM: number,
  correlationM: number,
  random: RandomSource,
): Float64Array {
  checkLengths(rmsM, correlationM);
  const edges = measureEdges(ring);
  const texture = makeTexture(edges, rmsM, correlationM);
  const noise = Float64Array.from({ length: texture.cells }, () => random.normal());
  const out: number[] = [];
  for (const [i, { x, y, tx, ty, from, length }] of edges.entries()) {
    const pieces = pieceCount(length, correlationM);
    for (let k = 0; k < pieces; k++) {
      const along = (length * k) / pieces;
      let height = 0;
      forTaps(texture, from + along, (cell, weight) => {
        height += weight * noise[cell];
      });
      // Seen from this edge, the corner at its start moves back as far as the corner juts out.
      const slide = k === 0 ? -mitre(edges, i) : 0;
      out.push(x + tx * along + height * (ty + slide * tx), y + ty * along + height * (slide * ty - tx));
    }
  }
  return Float64Array.from(out);
}

/** Writes the reading per unit detector area at (x, y) and its two derivatives: [w, ∂w/∂x, ∂w/∂y]. */
export type EdgeDensity = (x: number, y: number, out: Float64Array) => void;

/** What a rough edge does to a reading, in the density's unit times m². */
export interface RoughEdgeEstimate {
  /** Mean change. */
  mean: number;
  /** Standard deviation from one edge to the next. */
  spread: number;
}

/**
 * The closed estimate of what `roughen` does to the reading ∬ w dA, without trying any rough edge.
 *
 * An edge moved outwards by δ(s), n being the outward normal and c the curvature, changes the reading by
 *
 *     ∮ ∫₀^δ w(s, n) (1 + cn) dn ds = ∮ w δ ds + ½ ∮ (∂w/∂n + c w) δ² ds + …
 *
 * The mean is that of the second term, ½ rms² ∮ (∂w/∂n + c w) ds, where a corner of turn θ counts as ∫ c ds = 2 tan(θ/2);
 * the variance is that of the first, ∬ w w′ ⟨δδ′⟩ ds ds′, which for ξ far shorter than w's own turns is √π ξ rms² ∮ w² ds.
 * With δ = A·noise the variance is |Aᵀ(w ds)|², which is how it is summed. Separate rings are independent.
 *
 * Holds while rms is far less than the length over which w turns: 2κρ · rms ≪ 1 at small angles.
 *
 * @param stepM largest step along the edge; a small part of the length over which w turns
 * @throws RimwrightError `input` as `roughen` does
 */
export function roughEdgeEstimate(
  rings: readonly Float64Array[],
  density: EdgeDensity,
  rmsM: number,
  correlationM: number,
  stepM: number,
): RoughEdgeEstimate {
  checkLengths(rmsM, correlationM);
  const out = new Float64Array(3);
  let bend = 0;
  let variance = 0;
  for (const ring of rings) {
    const edges = measureEdges(ring);
    const texture = makeTexture(edges, rmsM, correlationM);
    const pull = new Float64Array(texture.cells);
    for (const [i, { x, y, tx, ty, from, length }] of edges.entries()) {
      const pieces = Math.max(pieceCount(length, correlationM), Math.ceil(length / stepM));
      const piece = length / pieces;
      for (let k = 0; k < pieces; k++) {
        const along = piece * (k + 0.5);
        density(x + tx * along, y + ty * along, out);
        bend += (out[1] * ty - out[2] * tx) * piece;
        const flux = out[0] * piece;
        forTaps(texture, from + along, (cell, weight) => {
          pull[cell] += weight * flux;
        });
      }
      density(x, y, out);
      bend += 2 * mitre(edges, i) * out[0];
    }
    for (const value of pull) variance += value * value;
  }
  return { mean: (rmsM * rmsM * bend) / 2, spread: Math.sqrt(variance) };
}

function checkLengths(rmsM: number, correlationM: number): void {
  if (!(rmsM >= 0 && rmsM < Infinity)) {
    throw inputError([{ key: 'rmsM', found: `${rmsM}`, expected: 'a length of 0 or more, metres' }]);
  }
  if (!(correlationM > 0 && correlationM < Infinity)) {
    throw inputError([
      { key: 'correlationM', found: `${correlationM}`, expected: 'a length above 0, metres' },
    ]);
  }
}
