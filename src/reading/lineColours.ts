import { evenNormal } from '../numeric/evenNormal.ts';
import { gaussHermite } from '../numeric/gaussHermite.ts';
import type { QuadratureRule } from '../numeric/gaussLegendre.ts';
import { gaussLegendre } from '../numeric/gaussLegendre.ts';
import type { LineShape } from '../optics/light.ts';
import { LINE_REACH } from '../optics/light.ts';

/** The colours that stand for a line; the weights add up to 1. */
export interface LineColours {
  colours: { weight: number; colourM: number }[];
  /** The line's light at colours between them, where a sphere's resonances are to be averaged into them (see `resonantColours`). */
  profile: ((colourM: number) => number) | null;
  /**
   * Path r − z, times the wavenumber, at which the line's crossed flux has faded; Infinity for a single colour. A finite number of
   * colours would come back into step farther out: a real line never does.
   */
  fadedPhase: number;
}

/** Standard deviation over full width at half maximum of a Gaussian. */
const SIGMA_PER_FWHM = 1 / Math.sqrt(8 * Math.LN2);

/** Gaussian colours farther out than this many σ (two full widths) carry less than 3e-6 of the light. */
const GAUSSIAN_REACH = LINE_REACH.gaussian / SIGMA_PER_FWHM;
/** Rms phase over a Gaussian line at which its colours have cancelled: e^−25. */
const GAUSSIAN_FADED = Math.sqrt(50);

/** In half widths at half maximum: ten full widths. */
const LORENTZIAN_REACH = 2 * LINE_REACH.lorentzian;
/** Phase over a Lorentzian's half width at which its colours have cancelled: e^−12. */
const LORENTZIAN_FADED = 12;

/** Step in size parameter beyond which colours pass over the resonances of a clear sphere. */
const RESONANCE_STEP = 0.02;

/**
 * Colours of one line, enough for the crossed flux at any phase up to `largestPhase`, and where the resonances of a sphere
 * would fall between them, enough for what is smooth beside these.
 *
 * @param linewidthM full width at half maximum, metres of vacuum wavelength; 0 for a single colour
 * @param largestPhase largest η = κρ² at which readings are wanted, at this wavelength
 * @param sizeParameter of the sphere, at this wavelength
 */
export function lineColours(
  shape: LineShape,
  wavelengthM: number,
  linewidthM: number,
  largestPhase: number,
  sizeParameter: number,
): LineColours {
  if (linewidthM === 0)
    return { colours: [{ weight: 1, colourM: wavelengthM }], profile: null, fadedPhase: Infinity };
  const isGaussian = shape === 'gaussian';
  const unitM = linewidthM * (isGaussian ? SIGMA_PER_FWHM : 0.5);
  const relative = unitM / wavelengthM;
  const reach = isGaussian ? GAUSSIAN_REACH : LORENTZIAN_REACH;
  const faded = isGaussian ? GAUSSIAN_FADED : LORENTZIAN_FADED;
  const spread = Math.min(largestPhase * relative, faded);
  const fadedPhase = faded / relative;
  const even = Math.ceil((reach * (spread + (isGaussian ? 6 : 13))) / Math.PI) + 1;
  const resonant = (2 * reach * sizeParameter * relative) / RESONANCE_STEP;
  if (resonant > even) {
    const profile = isGaussian ? gaussian : lorentzian;
    const count = isGaussian ? gaussianCount(spread) : lorentzianCount(spread);
    const colours = Array.from({ length: count }, (_, i) => {
      const node = reach * ((2 * i) / (count - 1) - 1);
      return { weight: profile(node), colourM: wavelengthM + unitM * node };
    });
    return { colours, profile: (colourM) => profile((colourM - wavelengthM) / unitM), fadedPhase };
  }
  const rule = isGaussian ? gaussianRule : lorentzianRule;
  const { nodes, weights } = rule(spread, even, resonant);
  const within = [...nodes.keys()].filter((i) => Math.abs(nodes[i]) <= reach);
  const total = within.reduce((sum, i) => sum + weights[i], 0);
  return {
    colours: within.map((i) => ({ weight: weights[i] / total, colourM: wavelengthM + unitM * nodes[i] })),
    profile: null,
    fadedPhase,
  };
}

/**
 * Nodes in σ. A phase η spreads by η σ/λ over the line: n Gauss–Hermite nodes follow cos up to about √(2n) − 1, and for
 * wide spreads evenly spaced ones are fewer. Where the line is wide enough for a sphere's resonances, they decide.
 */
function gaussianRule(spread: number, even: number, resonant: number): QuadratureRule {
  const hermite = Math.ceil(4 + 2 * spread + spread * spread);
  return hermite < even && resonant <= hermite ? gaussHermite(hermite) : evenNormal(even, GAUSSIAN_REACH);
}

/** Evenly spaced nodes at which the polynomials of `resonantColours` follow a phase over the line to 1e-6 (tried). */
function gaussianCount(spread: number): number {
  return Math.ceil(16 + 4.6 * spread);
}

/**
 * Nodes in half widths: the Lorentzian 1/(1 + u²), which goes to zero smoothly over the outer half of its reach. A sharp cut
 * would ring on for ever in the crossed flux; this falls as e^−(phase over a half width), 5 % above that of the uncut line, since
 * the tails' light is in the middle.
 *
 * Evenly spaced nodes for e^{iψu} return at ψ = 2π/spacing, where they must not be seen. For small phases, Gauss–Legendre nodes
 * in arctan u, evenly spread over the light, are fewer. Both counts hold to 4e-6 (tried).
 */
function lorentzianRule(spread: number, even: number, resonant: number): QuadratureRule {
  const legendre = Math.ceil(24 + 520 * spread);
  if (legendre < even && resonant <= legendre) {
    const { nodes, weights } = gaussLegendre(legendre);
    const tilted = nodes.map((node) => Math.tan(node * Math.atan(LORENTZIAN_REACH)));
    return { nodes: tilted, weights: weights.map((weight, i) => weight * fading(tilted[i])) };
  }
  const nodes = Float64Array.from(
    { length: even },
    (_, i) => (LORENTZIAN_REACH * (2 * i + 1 - even)) / (even + 1),
  );
  return { nodes, weights: nodes.map(lorentzian) };
}

/** The same for a Lorentzian. */
function lorentzianCount(spread: number): number {
  return Math.ceil(40 + 13 * spread);
}

function gaussian(sigmas: number): number {
  return Math.exp((-sigmas * sigmas) / 2);
}

function lorentzian(halfWidths: number): number {
  return fading(halfWidths) / (1 + halfWidths * halfWidths);
}

/** 1 out to half of the reach, then cos² down to 0 at the reach. */
function fading(node: number): number {
  const outer = (2 * Math.abs(node)) / LORENTZIAN_REACH - 1;
  return outer <= 0 ? 1 : Math.cos((Math.PI / 2) * outer) ** 2;
}
