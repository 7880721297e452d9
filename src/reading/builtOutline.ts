import type { OutlineElement } from '../outline/shape.ts';
import { measureEdges, mitre } from './edgeTexture.ts';

/** How a mask differs from its drawing: edges moved outwards, and the whole of it tilted about x, then about y, then shifted. */
export interface MaskError {
  shiftM: number;
  xM: number;
  yM: number;
  tiltXRad: number;
  tiltYRad: number;
}

/**
 * The element in its nominal plane that reads as it does where the mask is.
 *
 * Power is neither lost nor made between two surfaces with the same rim, so what a tilted mask reads depends on where its rim
 * is alone, and a rim point at the radius ρ and the distance z + ζ counts as one at the nominal distance whose wave from the
 * particle is as far out of step with the beam: r − z is the same. What that leaves out is that it sees the particle at an angle that
 * differs by ζ/z of itself, a few parts in 10⁵ for a millimetre at a degree.
 *
 * @param stretch ρ over ζ: what else the radius is multiplied by for a rim point ζ behind the plane; `flatStretch` in a flat wave
 */
export function builtOutline(
  { curves: _, ...element }: OutlineElement,
  error: MaskError,
  stretch: (rho2: number, behindM: number) => number,
): OutlineElement {
  const [cosX, sinX] = [Math.cos(error.tiltXRad), Math.sin(error.tiltXRad)];
  const [cosY, sinY] = [Math.cos(error.tiltYRad), Math.sin(error.tiltYRad)];
  const place = (ring: Float64Array) => {
    for (let i = 0; i < ring.length; i += 2) {
      const along = ring[i];
      const [y, up] = [ring[i + 1] * cosX, ring[i + 1] * sinX];
      const [x, behind] = [along * cosY + up * sinY + error.xM, up * cosY - along * sinY];
      const moved = y + error.yM;
      const factor = behind === 0 ? 1 : stretch(x * x + moved * moved, behind);
      ring[i] = factor * x;
      ring[i + 1] = factor * moved;
    }
    return ring;
  };
  return { ...element, rings: element.rings.map((ring) => place(movedEdges(ring, error.shiftM))) };
}

/** Radius in the plane at `distanceM` over that of a rim point `behindM` behind it with the same r − z. */
export function flatStretch(distanceM: number): (rho2: number, behindM: number) => number {
  return (rho2, behindM) => {
    if (rho2 === 0) return 1;
    const far = distanceM + behindM;
    const lag = rho2 / (Math.sqrt(rho2 + far * far) + far);
    return Math.sqrt((lag * (lag + 2 * distanceM)) / rho2);
  };
}

/** A ring with every edge moved outwards by `shiftM`, the opening on the left of its direction; corners stay sharp. */
export function movedEdges(ring: Float64Array, shiftM: number): Float64Array {
  const edges = measureEdges(ring);
  const out = new Float64Array(2 * edges.length);
  for (const [i, { x, y, tx, ty }] of edges.entries()) {
    // Along this edge, the corner at its start moves back as far as it juts out.
    const slide = -mitre(edges, i);
    out[2 * i] = x + shiftM * (ty + slide * tx);
    out[2 * i + 1] = y + shiftM * (slide * ty - tx);
  }
  return out;
}
