import type { Complex } from '../numeric/complex.ts';
import { add, exponential, multiply, scale, subtract } from '../numeric/complex.ts';
import { owenTComplex } from '../numeric/owenT.ts';
import type { EdgeDensity } from './roughEdge.ts';

/** The boundary integral of a constant amplitude around a set of rings. */
export interface ClosedForm {
  /** f = (1/2π) ∮ e^(−αρ²) dφ. */
  f: Complex;
  /** (1/2π) ∮ dφ: 1 with the axis inside the opening, 0 outside it. */
  winding: number;
}

/**
 * f of flat polygons for an amplitude that does not depend on angle, in closed form: the cost does not grow with η.
 *
 * On the edge whose line passes the particle's axis at the distance d, with t running along it from the nearest point,
 * ρ² = d² + t² and dφ = d dt/ρ², so with a = t/d its share is
 *
 *     (1/2π) ∫ e^(−αρ²) dφ = T(h, a₂) − T(h, a₁),   h² = 2αd²,   T after Owen (1956); d < 0 where the edge runs clockwise.
 *
 * Good to about 1e-15 an edge. With the axis on an edge or a vertex, the principal value: edges through the axis subtend no
 * angle. There f and `winding` jump alike, so the correction made of them is continuous.
 *
 * @param rings flat [x0, y0, x1, y1, …], metres, the last point not repeated; the opening on the left of the direction of travel
 * @param alpha from `spreadCoefficient`, 1/m²; real part 0 or more
 * @param px place of the particle, metres
 */
export function polygonClosedForm(
  rings: readonly Float64Array[],
  alpha: Complex,
  px: number,
  py: number,
): ClosedForm {
  let f: Complex = [0, 0];
  let angle = 0;
  for (const ring of rings) {
    const n = ring.length;
    for (let i = 0; i < n; i += 2) {
      const j = (i + 2) % n;
      const x = ring[i] - px;
      const y = ring[i + 1] - py;
      const dx = ring[j] - ring[i];
      const dy = ring[j + 1] - ring[i + 1];
      const length = Math.hypot(dx, dy);
      const distance = (x * dy - y * dx) / length;
      // Also passes over a repeated point, whose direction is 0/0.
      if (!(Math.abs(distance) > 0)) continue;
      const along = (x * dx + y * dy) / length;
      const from = along / distance;
      const to = (along + length) / distance;
      const hSquared = scale(alpha, 2 * distance * distance);
      f = add(f, subtract(owenTComplex(hSquared, to), owenTComplex(hSquared, from)));
      angle += Math.atan(to) - Math.atan(from);
    }
  }
  return { f, winding: angle / (2 * Math.PI) };
}

/**
 * α = −iκ/(1 − 2iκσ²): a normal spread of the particle's place turns (α/π) e^(−αρ²) with α = −iκ into the same with this α,
 * and with it the boundary form.
 *
 * @param kappa k/(2z), 1/m²
 * @param spreadM σ per axis, metres; 0 for a fixed particle
 */
export function spreadCoefficient(kappa: number, spreadM: number): Complex {
  const chirp = 2 * kappa * spreadM * spreadM;
  const factor = kappa / (1 + chirp * chirp);
  return [factor * chirp, -factor];
}

/**
 * reading/extinction − 1 of a particle with the constant amplitude S(0): winding − 1 − Re[S(0) f]/Re S(0).
 * At small angles and with few scattered photons on the detector it is the full correction.
 *
 * @param forward S(0), Bohren & Huffman's convention, with a positive real part
 * @param winding 1 with the axis inside the opening, where the correction is −Re[S(0) f]/Re S(0)
 */
export function closedFormCorrection(forward: Complex, f: Complex, winding = 1): number {
  return winding - 1 - multiply(forward, f)[0] / forward[0];
}

/**
 * What a unit of detector area adds to reading/extinction for a constant amplitude, 1/m²:
 * w = Re[S(0) (α/π) e^(−αρ²)]/Re S(0), since winding − f = (α/π) ∬ e^(−αρ²) dA by Green's theorem.
 *
 * @param forward S(0)
 * @param alpha from `spreadCoefficient`, 1/m²
 * @param px place of the particle, metres
 */
export function closedFormDensity(forward: Complex, alpha: Complex, px: number, py: number): EdgeDensity {
  const factor = scale(multiply(forward, alpha), 1 / (Math.PI * forward[0]));
  return (x, y, out) => {
    const dx = x - px;
    const dy = y - py;
    const value = multiply(factor, exponential(scale(alpha, -(dx * dx + dy * dy))));
    const slope = -2 * multiply(alpha, value)[0];
    out[0] = value[0];
    out[1] = slope * dx;
    out[2] = slope * dy;
  };
}
