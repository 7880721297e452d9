import type { Complex } from '../numeric/complex.ts';
import { add, divide, multiply, subtract } from '../numeric/complex.ts';
import type { GaussianBeam } from '../optics/gaussianBeam.ts';
import { complexDistance, pointWave, rayleighRange } from '../optics/gaussianBeam.ts';

/**
 * The distances that a reading in a focused beam hangs on, for one colour, metres.
 *
 * A particle that is spread normally by σ per axis scatters, on the mean, like a source of complex variance σ²/N about the
 * place p/N, N = 1 − ikσ²/Q: a Gaussian times a Gaussian beam is a Gaussian. Waves from it have come the complex
 * distance d − ikσ²/N, their angles are those of N times that. Without motion all three are d, N is 1.
 */
export interface BeamPath {
  wavenumber: number;
  rayleighM: number;
  /** From the particle to the detector plane. */
  distanceM: number;
  /** σ, rms random motion per axis. */
  spreadM: number;
  /** Q at the particle, and Q − ikσ²: the beam that a moving particle is in. */
  atParticle: Complex;
  blurred: Complex;
  /** Conjugate of Q at the detector plane. */
  atPlane: Complex;
  /** Complex distances of the scattered wave, and of its angles. */
  wave: Complex;
  angle: Complex;
  /** 1/N. */
  source: Complex;
}

/**
 * @param placeM z of the particle, from its nominal place, metres
 * @param distanceM from there to the detector plane, metres
 */
export function beamPath(
  beam: GaussianBeam,
  wavenumber: number,
  placeM: number,
  distanceM: number,
  spreadM: number,
): BeamPath {
  const atParticle = complexDistance(beam, wavenumber, placeM);
  const pull: Complex = [0, -wavenumber * spreadM * spreadM];
  const blurred = add(atParticle, pull);
  const source = divide(atParticle, blurred);
  const wave = add([distanceM, 0], multiply(pull, source));
  return {
    wavenumber,
    rayleighM: rayleighRange(beam, wavenumber),
    distanceM,
    spreadM,
    atParticle,
    blurred,
    atPlane: [atParticle[0] + distanceM, -atParticle[1]],
    wave,
    angle: divide(wave, source),
    source,
  };
}

/** 1/d − 1/Q* at the detector plane, 1/m: ik/2 times that is the exponent's part with ρ². */
export function chirp({ wave, atPlane }: BeamPath): Complex {
  return subtract(divide([1, 0], wave), divide([1, 0], atPlane));
}

/**
 * How far off the axis the particle's shadow falls, over the particle's own distance from it: 1 + d/R without motion, R the
 * radius of the wavefront. About the shadow fringes are rings, and the exponent's part with p·ρ smallest.
 */
export function shadowScale(path: BeamPath): number {
  return divide(divide(path.source, path.wave), chirp(path))[0];
}

/** Modulus of c in e^{cν}, the exponent's part with ν = p·ρ about the shadow at small angles, 1/m²: 2/ww' at rest. */
export function crossedSlope(path: BeamPath): number {
  const { wavenumber, source, wave, atPlane } = path;
  const shadow = shadowScale(path);
  const [re, im] = subtract(divide(subtract([shadow, 0], source), wave), divide([shadow, 0], atPlane));
  return wavenumber * Math.hypot(re, im);
}

/**
 * How far cosΘ of a particle beside the axis strays within its shadow: (x ε p)²/8 + (p(m − 1)/d)², ε p being the complex
 * tilt of the wave against the direction of its shadow, p no more than the beam's radius.
 */
export function tiltNumber(path: BeamPath, sizeParameter: number, offsetM: number): number {
  const { distanceM, atParticle } = path;
  const p2 = Math.min(offsetM * offsetM, squaredRadius(path));
  const turn = (shadowScale(path) - 1) / distanceM;
  const [re, im] = subtract([turn, 0], divide([1, 0], atParticle));
  return p2 * ((sizeParameter ** 2 * (re * re + im * im)) / 8 + turn * turn);
}

/** What sets how densely outlines and places must be sampled. */
export interface BeamFringes {
  /** In place of κ = k/2d, 1/m²: it counts fringes and the beam's own fall. */
  kappa: number;
  /** A particle beside the axis moves the fringes by this times its place: times the offset it stands for `offsetM`. */
  magnification: number;
}

export function beamFringes(path: BeamPath): BeamFringes {
  const kappa = (path.wavenumber / 2) * Math.hypot(...chirp(path));
  return { kappa, magnification: Math.abs(shadowScale(path)) + crossedSlope(path) / (2 * kappa) };
}

/**
 * Irradiance at the particle over that on the axis beside it, its mean over the motion:
 * e^{−2p²/(w² + 4σ²)} w²/(w² + 4σ²).
 */
export function particleIrradiance(path: BeamPath, p2: number): number {
  const overlap = meanPlace(path);
  return overlap * Math.exp((-2 * p2 * overlap) / squaredRadius(path));
}

/**
 * The same of the waves that the readings are computed with, which begin at a complex place (see `beamField`): they differ from the
 * Gaussian by about (p/z_R)².
 */
export function waveIrradiance(path: BeamPath, p2: number): number {
  const { wavenumber, atParticle } = path;
  const wave = multiply(atParticle, pointWave(atParticle, wavenumber, p2));
  const gaussian = Math.exp((-2 * p2) / squaredRadius(path));
  return gaussian === 0 ? 0 : (particleIrradiance(path, p2) * (wave[0] ** 2 + wave[1] ** 2)) / gaussian;
}

/** Mean place of a moving particle where the light is, over the middle of its motion: w²/(w² + 4σ²). */
export function meanPlace(path: BeamPath): number {
  const radius2 = squaredRadius(path);
  return radius2 / (radius2 + 4 * path.spreadM * path.spreadM);
}

/**
 * Farther from the axis, metres, a particle is out of the beam: its field is below e^−12 of that on the axis, and its reading
 * below 1e-5 of the extinction there.
 */
export function farthestPlace(path: BeamPath): number {
  return 3.5 * Math.sqrt(squaredRadius(path) / meanPlace(path));
}

/** w² at the particle, m². */
function squaredRadius({ wavenumber, rayleighM, atParticle }: BeamPath): number {
  const [re, im] = atParticle;
  return (2 * (re * re + im * im)) / (wavenumber * rayleighM);
}
