import type { Complex } from './complex.ts';
import { add, exponential, multiply, scale, squareRoot, subtract } from './complex.ts';
import { faddeeva } from './complexError.ts';
import { gaussLaguerre } from './gaussLaguerre.ts';
import { gaussLegendre } from './gaussLegendre.ts';

/**
 * Owen's function T(h, a) = (1/2π) ∫₀^a e^(−h²(1 + x²)/2)/(1 + x²) dx (Owen 1956, Ann. Math. Stat. 27, 1075).
 *
 * Holds to 1e-14 of itself, but for the rounding of the exponent where |h| is large.
 *
 * @param h any number; T is even in it
 * @param a any number, ±Infinity included; T is odd in it
 */
export function owenT(h: number, a: number): number {
  return owenTComplex([h * h, 0], a)[0];
}

/**
 * Owen's T of a complex h, given by its square since T is even in h, and real a.
 *
 * Holds to 1e-15, and to 1e-14 of itself but for the rounding of the exponent, at a cost that does not grow with |h²|. Tried
 * up to 1e7. With q = h²/2 and p = qa²:
 *
 *     |p| large:  T = ¼ erfc √q − (1/2π) ∫_a^∞, on the path where qx² = p + u with u real: e^(−u) times a smooth factor
 *     a ≤ 1:      the definition as it stands, whose integrand turns little
 *     a > 1:      T(h, a) = ¼ (1 − erf √q erf √p) − T(ah, 1/a) (Owen 1956, in terms of the error function)
 *
 * The bent path crosses no pole, since √q lies within 45° of the real axis.
 *
 * @param hSquared real part 0 or more
 * @param a any number, ±Infinity included; T is odd in it
 */
export function owenTComplex(hSquared: Complex, a: number): Complex {
  return a < 0 ? scale(positiveSlope(hSquared, -a), -1) : positiveSlope(hSquared, a);
}

/** Above this T(h, a) is T(h, ∞), since they differ by 1/(2πa) at the most. */
const STEEP = 1e20;
/** |Re p| + |Im p| from which the rule for the tail is good to 1e-15. */
const TAIL_LIMIT = 8;
const TAIL_RULE = gaussLaguerre(20);
/** The upper half of this even rule serves [0, 1]: the integrand is even as well. */
const EVEN_RULE = gaussLegendre(28);

function positiveSlope(hSquared: Complex, a: number): Complex {
  const q = scale(hSquared, 0.5);
  if (a > STEEP) return scale(erfcOfRoot(q), 0.25);
  const p = scale(q, a * a);
  if (Math.abs(p[0]) + Math.abs(p[1]) > TAIL_LIMIT) return withoutTail(q, p);
  if (a <= 1) return asDefined(q, p, a);
  // 1 − erf √q erf √p without the difference of nearly equal numbers
  const one = erfcOfRoot(q);
  const other = erfcOfRoot(p);
  const product = subtract(add(one, other), multiply(one, other));
  return subtract(scale(product, 0.25), asDefined(p, q, 1 / a));
}

/** e^(−q) {¼ w(i√q) − (1/4π) e^(−p) √q ∫₀^∞ e^(−u) du/(√(p + u) (q + p + u))}. */
function withoutTail(q: Complex, p: Complex): Complex {
  const { nodes, weights } = TAIL_RULE;
  let sumRe = 0;
  let sumIm = 0;
  for (let i = 0; i < nodes.length; i++) {
    const re = p[0] + nodes[i];
    const im = p[1];
    // √(p + u) by the half-angle formula; re > 0.
    const rootRe = Math.sqrt((Math.sqrt(re * re + im * im) + re) / 2);
    const rootIm = im / (2 * rootRe);
    const outerRe = q[0] + re;
    const outerIm = q[1] + im;
    const divisorRe = rootRe * outerRe - rootIm * outerIm;
    const divisorIm = rootRe * outerIm + rootIm * outerRe;
    const factor = weights[i] / (divisorRe * divisorRe + divisorIm * divisorIm);
    sumRe += factor * divisorRe;
    sumIm -= factor * divisorIm;
  }
  const root = squareRoot(q);
  const tail = multiply(multiply(root, [sumRe, sumIm]), exponential(scale(p, -1)));
  const whole = scale(scaledErfc(root), Math.PI);
  return scale(multiply(exponential(scale(q, -1)), subtract(whole, tail)), 1 / (4 * Math.PI));
}

/** (a/2π) e^(−q) ∫₀¹ e^(−py²)/(1 + a²y²) dy, for p of moderate size and a ≤ 1. */
function asDefined(q: Complex, p: Complex, a: number): Complex {
  const { nodes, weights } = EVEN_RULE;
  let re = 0;
  let im = 0;
  for (let i = nodes.length / 2; i < nodes.length; i++) {
    const squared = nodes[i] * nodes[i];
    const factor = (weights[i] * Math.exp(-p[0] * squared)) / (1 + a * a * squared);
    re += factor * Math.cos(p[1] * squared);
    im -= factor * Math.sin(p[1] * squared);
  }
  return scale(multiply(exponential(scale(q, -1)), [re, im]), a / (2 * Math.PI));
}

/** erfc √q; the exponent is q itself, not the square of a rounded root. */
function erfcOfRoot(q: Complex): Complex {
  return multiply(exponential(scale(q, -1)), scaledErfc(squareRoot(q)));
}

/** e^(z²) erfc z = w(iz), Re z ≥ 0. */
function scaledErfc(z: Complex): Complex {
  const out = new Float64Array(2);
  faddeeva(-z[1], z[0], out);
  return [out[0], out[1]];
}
