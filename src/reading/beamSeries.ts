import type { BeamPath } from './beamPath.ts';
import { chirp, crossedSlope } from './beamPath.ts';

/** What decides how many powers of ν a place needs: at small angles the crossed flux goes as e^{−βs + cν}. */
export interface SeriesBound {
  /** Real part, 1/m²: the beam's fall at the detector plane. */
  fallPerM2: number;
  /** Modulus, 1/m². */
  slopePerM2: number;
  /** Farthest distance from the shadow, metres. */
  reachM: number;
}

/** Enough for the farthest place (see `farthestPlace`), which takes about 96. */
const MOST_TERMS = 120;
/** Of the largest term left out, over the crossed flux on the axis. */
const NEGLIGIBLE = Math.log(1e-7);

export function seriesBound(path: BeamPath, reachM: number): SeriesBound {
  return { fallPerM2: (path.wavenumber / 2) * chirp(path)[1], slopePerM2: crossedSlope(path), reachM };
}

/**
 * Powers of ν for a particle this far from the axis: every term left out, (cν)^n e^{−βs}/n!, is negligible where it is largest.
 */
export function seriesTerms({ fallPerM2, slopePerM2, reachM }: SeriesBound, offsetM: number): number {
  if (offsetM === 0) return 1;
  let logFactorial = 0;
  for (let n = 1; n < MOST_TERMS; n++) {
    logFactorial += Math.log(n);
    const s = Math.min(n / (2 * fallPerM2), reachM * reachM);
    const largest = n * Math.log(slopePerM2 * offsetM * Math.sqrt(s)) - fallPerM2 * s - logFactorial;
    if (largest < NEGLIGIBLE) return n;
  }
  return MOST_TERMS;
}
