import type { Complex } from '../numeric/complex.ts';
import { divide, multiply, scale, subtract } from '../numeric/complex.ts';
import { seriesOrder } from './seriesOrder.ts';

/** Two independent solutions of the Riccati–Bessel equation and their derivatives at one z, for n = 0 … order. */
export interface LayerFunctions {
  /** ψ_n(z) = z j_n(z), of which 2^(−300 shift) e^y is taken out. */
  psi: Complex[];
  psiSlope: Complex[];
  /** ω_n(z), of which 2^(300 shift) e^(−y) is taken out. */
  omega: Complex[];
  omegaSlope: Complex[];
  /** One whole number an order: far above |z| ψ and ω pass the range of doubles. */
  shift: Int32Array;
}

const SHIFT_BITS = 300;
/** Values of ψ below this are brought up by its inverse. */
const UNDERFLOW = 2 ** -SHIFT_BITS;
/** Up to this imaginary part the upward recurrence of ψ loses at most a digit below n = |z|. */
const NEARLY_REAL = 1;

/**
 * ψ_n and ω_n of a complex argument: ω = χ (that is −z y_n), or with `outgoing` ω = χ + iψ = iξ, the outgoing wave.
 * χ keeps real what is real; ξ does not drown in ψ where Im z is large. Then e^y with y = Im z is taken out, else y = 0.
 * The Wronskian ψ'ω − ψω' is 1 either way (signs of Bohren & Huffman 1983, p. 101).
 *
 * ω runs upwards. ψ runs upwards as far as n = |z| where z is nearly real, and beyond, or everywhere, as a product of
 * ratios ψ_n/ψ_{n−1} from the downward recurrence: they have no poles near z, as all zeros of ψ_n are real.
 *
 * @param z not 0, Im z ≥ 0; at most NEARLY_REAL without `outgoing`
 * @param order 1 or more
 */
export function layerFunctions(z: Complex, order: number, outgoing: boolean): LayerFunctions {
  const size = Math.hypot(z[0], z[1]);
  const last = z[1] <= NEARLY_REAL ? Math.min(Math.floor(size), order) : 0;
  const ratios = last < order ? psiRatios(z, last, Math.max(order, seriesOrder(size)) + 20) : [];
  const { sine, cosine } = sineCosine(z, outgoing);
  const start: Complex = [Math.cos(z[0]), Math.sin(z[0])];
  let psiBefore: Complex = cosine;
  let psi: Complex = sine;
  let omegaBefore: Complex = outgoing ? [-start[1], start[0]] : scale(sine, -1);
  let omega: Complex = outgoing ? start : cosine;
  let shift = 0;
  const table: LayerFunctions = {
    psi: [psi],
    psiSlope: [psiBefore],
    omega: [omega],
    omegaSlope: [omegaBefore],
    shift: new Int32Array(order + 1),
  };
  for (let n = 1; n <= order; n++) {
    const step = divide([2 * n - 1, 0], z);
    const nextPsi = n <= last ? subtract(multiply(step, psi), psiBefore) : multiply(ratios[n], psi);
    const nextOmega = subtract(multiply(step, omega), omegaBefore);
    const perRadius = divide([n, 0], z);
    table.psi.push(nextPsi);
    table.psiSlope.push(subtract(psi, multiply(perRadius, nextPsi)));
    table.omega.push(nextOmega);
    table.omegaSlope.push(subtract(omega, multiply(perRadius, nextOmega)));
    table.shift[n] = shift;
    psiBefore = psi;
    psi = nextPsi;
    omegaBefore = omega;
    omega = nextOmega;
    if (n > last && Math.max(Math.abs(psi[0]), Math.abs(psi[1])) < UNDERFLOW) {
      psi = scale(psi, 1 / UNDERFLOW);
      omega = scale(omega, UNDERFLOW);
      omegaBefore = scale(omegaBefore, UNDERFLOW);
      shift++;
    }
  }
  return table;
}

/** What (ψ/ω) of the first over (ψ/ω) of the second has to be multiplied by, at order n, for what `shift` takes out. */
export function shiftBetween(first: LayerFunctions, second: LayerFunctions, n: number): number {
  return 2 ** (2 * SHIFT_BITS * (second.shift[n] - first.shift[n]));
}

/** ψ_n/ψ_{n−1} for n above `last`; from so far above, the error of starting with 0 dies out. */
function psiRatios(z: Complex, last: number, start: number): Complex[] {
  const ratios: Complex[] = new Array(start + 1);
  let ratio: Complex = [0, 0];
  for (let n = start; n > last; n--) {
    ratio = divide([1, 0], subtract(divide([2 * n + 1, 0], z), ratio));
    ratios[n] = ratio;
  }
  return ratios;
}

/** sin z and cos z, without e^y where `scaled`. */
function sineCosine([x, y]: Complex, scaled: boolean): { sine: Complex; cosine: Complex } {
  const cosh = scaled ? (1 + Math.exp(-2 * y)) / 2 : Math.cosh(y);
  const sinh = scaled ? -Math.expm1(-2 * y) / 2 : Math.sinh(y);
  const sin = Math.sin(x);
  const cos = Math.cos(x);
  return { sine: [sin * cosh, cos * sinh], cosine: [cos * cosh, -sin * sinh] };
}
