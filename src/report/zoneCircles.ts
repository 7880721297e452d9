/** The circles η = step·π, 2·step·π, … around the axis. */
export interface ZoneCircles {
  step: number;
  /** Metres, growing. */
  radiiM: readonly number[];
}

const STEPS = [1, 2, 5];

/**
 * Fresnel-zone circles of a particle on the axis: η = κρ² with κ = π/(λz), so that η = mπ lies at ρ = √(m λ z)
 * (design, section 2). Where many would fit, only each second, fifth, tenth, … is given.
 *
 * @param wavelengthM in the medium, positive
 * @param distanceM particle to detector, positive
 * @param largestM radius not to be exceeded
 * @param most how many circles there may be, at least 2
 */
export function zoneCircles(
  wavelengthM: number,
  distanceM: number,
  largestM: number,
  most: number,
): ZoneCircles {
  const zoneArea = wavelengthM * distanceM;
  const zones = Math.floor(largestM ** 2 / zoneArea);
  let step = 1;
  for (let k = 1; zones / step > most; k++) step = STEPS[k % 3] * 10 ** Math.floor(k / 3);
  const count = Math.floor(zones / step);
  return { step, radiiM: Array.from({ length: count }, (_, k) => Math.sqrt((k + 1) * step * zoneArea)) };
}
