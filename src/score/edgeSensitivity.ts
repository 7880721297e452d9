import { ringsRadius } from '../outline/area.ts';
import type { OutlineElement } from '../outline/shape.ts';
import type { Judge } from './judge.ts';

/** What moving one ring's edge does to the readings. */
export interface EdgeSensitivity {
  /** Numbers of the element and of its ring, from 0. */
  element: number;
  ring: number;
  /**
   * Relative change of the reading, 1/m, as the ring's whole edge moves so that the opening gets wider: to first order, and for the
   * particle and wavelength which it changes most, the particle on the axis.
   */
  perMetre: number;
}

/** Step along an edge, in radians of phase: the flux density turns by no more between two samples. */
const PHASE_STEP = 0.2;

/** Readings below this share of the extinction do not count as smaller: next to nothing would change by any factor. */
const LEAST_READING = 0.5;

/**
 * How much each edge matters: the readings' first-order change as it moves, ∮ w ds.
 *
 * @returns the most sensitive ring first
 */
export function edgeSensitivities(
  judge: Judge,
  elements: readonly OutlineElement[],
  distanceM: number,
): EdgeSensitivity[] {
  const radiusM = Math.max(...elements.map(({ rings }) => ringsRadius(rings)));
  const stepM = PHASE_STEP / judge.phasePerMetre(radiusM, distanceM);
  const { ratios } = judge.outlineRatios(elements, distanceM, Float64Array.of(0, 0));
  const scenarios = ratios.map(([ratio], s) => ({
    reading: Math.max(LEAST_READING, Math.abs(ratio)),
    density: judge.edgeDensity(s, distanceM, radiusM, [0, 0]),
  }));
  const found = elements.flatMap(({ weight, rings }, element) =>
    rings.map((points, ring) => {
      let perMetre = 0;
      for (const { reading, density } of scenarios) {
        const change = (weight * alongRing(points, density, stepM)) / reading;
        if (Math.abs(change) > Math.abs(perMetre)) perMetre = change;
      }
      return { element, ring, perMetre };
    }),
  );
  return found.sort((p, q) => Math.abs(q.perMetre) - Math.abs(p.perMetre));
}

/** ∮ w ds by midpoints. */
function alongRing(
  points: Float64Array,
  density: (x: number, y: number, out: Float64Array) => void,
  stepM: number,
): number {
  const out = new Float64Array(3);
  let sum = 0;
  for (let i = 0; i < points.length; i += 2) {
    const [x, y] = [points[i], points[i + 1]];
    const next = (i + 2) % points.length;
    const [dx, dy] = [points[next] - x, points[next + 1] - y];
    const lengthM = Math.hypot(dx, dy);
    const pieces = Math.max(1, Math.ceil(lengthM / stepM));
    for (let k = 0; k < pieces; k++) {
      const share = (k + 0.5) / pieces;
      density(x + share * dx, y + share * dy, out);
      sum += (out[0] * lengthM) / pieces;
    }
  }
  return sum;
}
