import type { Problem } from '../base/errors.ts';
import { inputError } from '../base/errors.ts';
import type { Complex } from '../numeric/complex.ts';
import { add, divide, multiply, scale, subtract } from '../numeric/complex.ts';
import type { LayerFunctions } from './layerFunctions.ts';
import { layerFunctions, shiftBetween } from './layerFunctions.ts';
import type { MieCoefficients } from './mieCoefficients.ts';
import { mieCoefficients } from './mieCoefficients.ts';
import { emptyCoefficients, setCoefficient, sizeProblems, withoutTail } from './mieModes.ts';
import { riccatiBessel } from './riccatiBessel.ts';
import { seriesOrder } from './seriesOrder.ts';
import { sphereInterior } from './sphereInterior.ts';

/** One layer of a sphere: the core, or a shell around what comes before it. */
export interface SphereLayer {
  /** Size parameter of the layer's outer radius, 2π × radius × n_medium / vacuum wavelength. */
  x: number;
  /** Its index n + ik relative to the medium. */
  m: readonly [n: number, k: number];
}

/** d ln u/dx of the field inside, at some radius: U for b_n, V for a_n (u' over m²), for n = 0 … order. */
interface Slopes {
  b: Complex[];
  a: Complex[];
}

const LEAST_INDEX = 0.01;
const LARGEST_INDEX = 100;
/** Of |m − 1|, a little below 1e-6, as for one sphere. */
const LEAST_CONTRAST = 0.999_999e-6;
/** What is this much smaller than the layer around it is nothing: its volume is 1e-21. */
const NO_CORE = 1e-7;
/** Im z from which the outgoing wave replaces χ. Below it ψ and χ differ well, and lossless layers stay real. */
const ABSORBING = 1;

/**
 * Mie's coefficients of concentric layers, time factor exp(−iωt) (Bohren & Huffman 1983, section 8.1).
 *
 * The logarithmic derivative of the field is handed on from the core outwards, layer by layer, as in Wu & Wang (1991),
 * Radio Science 26, 1393, with Bessel functions in ratios that neither overflow nor cancel, as in Yang (2003), Appl. Opt.
 * 42, 1710, and Peña & Pal (2009), Comput. Phys. Commun. 180, 2348. With s = m for b_n and 1/m for a_n, U the derivative at
 * the layer's inner radius, ψ and ω at z = mx there and at the outer radius:
 *
 *     T = −(U ψ − s ψ')/(U ω − s ω')   (inner),   U = s (ψ' + T ω')/(ψ + T ω)   (outer)
 *
 * They take the outgoing wave for ω throughout. Here ω = χ in layers that hardly absorb, so that U of a lossless sphere is
 * exactly real, and −Im U, what a mode absorbs, keeps its digits when it is tiny.
 *
 * Against 60 digits, for x from 0.01 to 2000, Qext, Qsca and S(0) are right to 1e-12, S at other angles to 1e-11 of itself.
 * When all layers are faint, digits of the contrast are lost: for |m − 1| = 1e-5 that is 5e-11 and 2e-10.
 *
 * Layers of no thickness, outermost ones of the medium's index, and what has less than 1e-7 of the radius of the layer
 * around it count as absent;
 * neighbours of one index become one. Of one layer the result is that of `mieCoefficients`.
 *
 * @param layers from the core outwards; x ascending from 0 or more, the outermost 0.001 to 20 000; n ≥ 0, k ≥ 0,
 *   |m| 0.01 to 100, at least one layer with |m − 1| of 1e-6 or more
 * @throws RimwrightError `input` outside these ranges
 */
export function layeredSphere(layers: readonly SphereLayer[]): MieCoefficients {
  const problems = layerProblems(layers);
  if (problems.length > 0) throw inputError(problems);
  const sphere = withoutIdleLayers(layers);
  const x = sphere.at(-1)?.x ?? 0;
  const tooSmall = sizeProblems(x);
  if (tooSmall.length > 0) throw inputError(tooSmall);
  const [core, ...shells] = sphere;
  if (shells.length === 0) return mieCoefficients(core.x, core.m);

  const order = seriesOrder(x);
  let slopes = coreSlopes(core, order);
  let innerX = core.x;
  for (const shell of shells) {
    slopes = throughShell(slopes, innerX, shell, order);
    innerX = shell.x;
  }
  return outsideCoefficients(slopes, x, order);
}

function coreSlopes({ x, m }: SphereLayer, order: number): Slopes {
  // Of what `sphereInterior` gives, the slopes alone are wanted: they do not ask for the functions outside.
  const outside = { psi: new Float64Array(order + 1), chi: new Float64Array(0) };
  const { slopeRe, slopeIm } = sphereInterior(x, m, outside);
  const b = Array.from(slopeRe, (re, n): Complex => [re, slopeIm[n]]);
  const square = multiply(m, m);
  return { b, a: b.map((slope) => divide(slope, square)) };
}

function throughShell(slopes: Slopes, innerX: number, { x, m }: SphereLayer, order: number): Slopes {
  const zInner = scale(m, innerX);
  const zOuter = scale(m, x);
  const outgoing = zOuter[1] > ABSORBING;
  const inner = layerFunctions(zInner, order, outgoing);
  const outer = layerFunctions(zOuter, order, outgoing);
  const decay = outgoing ? Math.exp(2 * (zInner[1] - zOuter[1])) : 1;
  const inverse = divide([1, 0], m);
  const next: Slopes = { a: [[0, 0]], b: [[0, 0]] };
  for (let n = 1; n <= order; n++) {
    const factor = decay * shiftBetween(inner, outer, n);
    next.b.push(handOn(slopes.b[n], m, inner, outer, n, factor));
    next.a.push(handOn(slopes.a[n], inverse, inner, outer, n, factor));
  }
  return next;
}

/** From U at a layer's inner radius to U at its outer one; `factor` is what both radii take out of ψ/ω. */
function handOn(
  slope: Complex,
  s: Complex,
  inner: LayerFunctions,
  outer: LayerFunctions,
  n: number,
  factor: number,
): Complex {
  const above = subtract(multiply(s, inner.psiSlope[n]), multiply(slope, inner.psi[n]));
  const below = subtract(multiply(slope, inner.omega[n]), multiply(s, inner.omegaSlope[n]));
  const t = scale(divide(above, notZero(below)), factor);
  const field = add(outer.psi[n], multiply(t, outer.omega[n]));
  const fieldSlope = add(outer.psiSlope[n], multiply(t, outer.omegaSlope[n]));
  return multiply(s, divide(fieldSlope, notZero(field)));
}

/** A pole may be any large number: the next step takes it back. */
function notZero(z: Complex): Complex {
  return z[0] === 0 && z[1] === 0 ? [1e-30, 0] : z;
}

/** b_n = N/(N − iC), N = U ψ_n − ψ_n', C = U χ_n − χ_n', a_n with V (see `mieCoefficients`). */
function outsideCoefficients({ a, b }: Slopes, x: number, order: number): MieCoefficients {
  const { psi, chi } = riccatiBessel(x, order);
  const result = emptyCoefficients(x, order);
  for (let n = 1; n <= order; n++) {
    const psiSlope = psi[n - 1] - (n / x) * psi[n];
    const chiSlope = chi[n - 1] - (n / x) * chi[n];
    const set = (re: Float64Array, im: Float64Array, [slopeRe, slopeIm]: Complex) => {
      const nRe = slopeRe * psi[n] - psiSlope;
      const cRe = slopeRe * chi[n] - chiSlope;
      // No layer gives energy: what is below 0 is rounding.
      const loss = Math.max(0, -slopeIm);
      setCoefficient(re, im, n, nRe, slopeIm * psi[n], cRe, slopeIm * chi[n], loss);
    };
    set(result.aRe, result.aIm, a[n]);
    set(result.bRe, result.bIm, b[n]);
  }
  return withoutTail(result);
}

function withoutIdleLayers(layers: readonly SphereLayer[]): SphereLayer[] {
  let count = layers.length;
  while (count > 1 && layers[count - 1].m[0] === 1 && layers[count - 1].m[1] === 0) count--;
  const kept: SphereLayer[] = [];
  for (const layer of layers.slice(0, count)) {
    const below = kept.at(-1);
    if (layer.x === (below?.x ?? 0)) continue;
    if (below !== undefined && below.x < NO_CORE * layer.x) kept.length = 0;
    else if (below?.m[0] === layer.m[0] && below.m[1] === layer.m[1]) kept.pop();
    kept.push(layer);
  }
  return kept;
}

function layerProblems(layers: readonly SphereLayer[]): Problem[] {
  if (layers.length === 0) return [{ key: 'layers', found: 'none', expected: 'one layer or more' }];
  const problems: Problem[] = [];
  let before = 0;
  layers.forEach(({ x, m }, i) => {
    if (!(x >= before)) {
      const expected = `a size parameter of ${before} or more, that of the layer inside`;
      problems.push({ key: `layers[${i}].x`, found: String(x), expected });
    }
    before = x;
    const modulus = Math.hypot(m[0], m[1]);
    if (m[0] >= 0 && m[1] >= 0 && modulus >= LEAST_INDEX && modulus <= LARGEST_INDEX) return;
    const expected =
      `an index n + ik relative to the medium with n ≥ 0, k ≥ 0, ` +
      `modulus ${LEAST_INDEX} to ${LARGEST_INDEX}`;
    problems.push({ key: `layers[${i}].m`, found: `${m[0]} + ${m[1]}i`, expected });
  });
  problems.push(...sizeProblems(before, `layers[${layers.length - 1}].x`));
  if (problems.length > 0) return problems;
  if (layers.some(({ m }) => Math.hypot(m[0] - 1, m[1]) >= LEAST_CONTRAST)) return [];
  const expected = 'at least one layer whose index is 1e-6 or more away from that of the medium';
  return [{ key: 'layers', found: 'the medium alone', expected }];
}
