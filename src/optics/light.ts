import type { GaussianBeam } from './gaussianBeam.ts';

/** How the power of a line is spread over its wavelengths. */
export const LINE_SHAPES = ['gaussian', 'lorentzian'] as const;
export type LineShape = (typeof LINE_SHAPES)[number];

/** How many full widths at half maximum a line reaches to either side; what lies farther out counts as if it were inside. */
export const LINE_REACH: Record<LineShape, number> = { gaussian: 2, lorentzian: 10 };

/** One more line of a light source. */
export interface FurtherLine {
  /** Vacuum wavelength, metres. */
  wavelengthM: number;
  /** Full width at half maximum, metres of vacuum wavelength; 0 for a single colour. */
  linewidthM: number;
  /** Its part of the whole power, between 0 and 1. */
  share: number;
}

/** The beam before the particle. */
export interface Light {
  /** Vacuum wavelength of the main line, metres. */
  wavelengthM: number;
  /** Full width at half maximum of the main line, metres of vacuum wavelength; 0 for a single colour. */
  linewidthM: number;
  /** Shape of all lines; gaussian if left out. */
  shape?: LineShape;
  /** Lines beside the main one, which has the rest of the power. */
  also?: readonly FurtherLine[];
  /** Half-angle of the disc of directions that plane waves come from, evenly and without coherence, radians; 0 if left out. */
  sourceAngleRad?: number;
  /** All lines may be off by this much either way, together, metres. */
  driftM: number;
  /** Angle of the electric field from the x axis, radians; null for unpolarised light. */
  polarizationRad: number | null;
  /** The focused beam that the light is; a flat wave if left out. */
  beam?: GaussianBeam;
  /** Irradiance at the particle, W/m²: on the axis of a focused beam, at the particle's nominal place. */
  irradianceWm2: number;
  /** Relative intensity noise, 1/Hz (10^(dB/10)); 0 for none. */
  intensityNoisePerHz: number;
}

/** Shortest and longest wavelength of a light with its drift and the reach of its lines, metres. */
export function wavelengthRange(light: Light): [shortest: number, longest: number] {
  const reach = LINE_REACH[light.shape ?? 'gaussian'];
  const ends = linesOf(light).map(({ wavelengthM, linewidthM }) => [
    wavelengthM - light.driftM - reach * linewidthM,
    wavelengthM + light.driftM + reach * linewidthM,
  ]);
  return [Math.min(...ends.map(([low]) => low)), Math.max(...ends.map(([, high]) => high))];
}

/** Every line of a light source, the main one first; the shares add up to 1. */
export function linesOf({ wavelengthM, linewidthM, also = [] }: Light): FurtherLine[] {
  const share = also.reduce((rest, line) => rest - line.share, 1);
  return [{ wavelengthM, linewidthM, share }, ...also];
}
