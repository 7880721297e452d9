import { inputError } from '../base/errors.ts';
import { gaussLegendre } from '../numeric/gaussLegendre.ts';
import type { MieCoefficients } from './mieCoefficients.ts';
import { mieEfficiencies } from './mieEfficiencies.ts';
import { FIELD_NUMBERS, scatteredField } from './scatteredField.ts';
import { seriesOrder } from './seriesOrder.ts';

/** What flows through a sphere around the particle, over the particle's shadow π radius². */
export interface EnergyBalance {
  /** Minus the outward flux of the crossed Poynting vector. */
  extinction: number;
  /** Outward flux of the scattered Poynting vector. */
  scattering: number;
  /** The two over the series of `mieEfficiencies`, minus 1. */
  extinctionError: number;
  scatteringError: number;
}

const LARGEST_KR = 20_000;

/**
 * Verifier of `scatteredField`: the exact flux through a closed sphere around the particle, by Gauss–Legendre over cosθ.
 * At every radius it must be the scattering and minus the extinction (Bohren & Huffman 1983, eq. 3.20 and section 4.4.1).
 *
 * e^{ikr(1 − cosθ)} counts as a polynomial of degree `seriesOrder(kr)`, which makes the rule exact to rounding. Small
 * lossless spheres lose digits close by, where fields that carry no power are far larger than those that do.
 *
 * @param kr wave number times the radius of the closed sphere, from x to 20 000; the time goes as its square
 * @throws RimwrightError `input` outside this range
 */
export function energyBalance(coefficients: MieCoefficients, kr: number): EnergyBalance {
  const { x, order } = coefficients;
  if (!(kr >= x && kr <= LARGEST_KR)) {
    throw inputError([{ key: 'kr', found: String(kr), expected: `a number from x = ${x} to ${LARGEST_KR}` }]);
  }
  const { nodes, weights } = gaussLegendre(Math.ceil((seriesOrder(kr) + order) / 2) + order + 2);
  const field = new Float64Array(FIELD_NUMBERS);
  let crossed = 0;
  let scattered = 0;
  for (let i = 0; i < nodes.length; i++) {
    const cosTheta = nodes[i];
    const versine = 1 - cosTheta;
    scatteredField(coefficients, kr, versine, field);
    const [eThetaRe, eThetaIm, ePhiRe, ePhiIm, , , hThetaRe, hThetaIm, hPhiRe, hPhiIm] = field;
    // The radial part of E×H*, averaged over the azimuth; the incident wave has Eθ = cosθ cosφ, Hφ = cosφ, ….
    const re = eThetaRe + hThetaRe + cosTheta * (ePhiRe + hPhiRe);
    const im = eThetaIm + hThetaIm + cosTheta * (ePhiIm + hPhiIm);
    crossed += weights[i] * (re * Math.sin(kr * versine) + im * Math.cos(kr * versine));
    scattered += weights[i] * (eThetaRe * hPhiRe + eThetaIm * hPhiIm + ePhiRe * hThetaRe + ePhiIm * hThetaIm);
  }
  const extinction = (crossed * kr) / (x * x);
  const scattering = scattered / (x * x);
  const series = mieEfficiencies(coefficients);
  return {
    extinction,
    scattering,
    extinctionError: extinction / series.extinction - 1,
    scatteringError: scattering / series.scattering - 1,
  };
}
