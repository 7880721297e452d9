import type { MieCoefficients } from '../../src/optics/mieCoefficients.ts';
import { FIELD_NUMBERS, scatteredField } from '../../src/optics/scatteredField.ts';

/** The product of two complex numbers. */
export function times([aRe, aIm]: readonly number[], [bRe, bIm]: readonly number[]): number[] {
  return [aRe * bRe - aIm * bIm, aRe * bIm + aIm * bRe];
}

/** The scattered field Ex, Ey, Ez, Hx, Hy, Hz (re, im each) at the place k·(x, y, z), for unit incident fields. */
export function cartesianField(sphere: MieCoefficients, [x, y, z]: readonly number[]): number[] {
  const kr = Math.hypot(x, y, z);
  const rho = Math.hypot(x, y);
  const out = new Float64Array(FIELD_NUMBERS);
  scatteredField(sphere, kr, z > 0 ? rho ** 2 / (kr * (kr + z)) : 1 - z / kr, out);
  const [cosT, sinT, cosP, sinP] = [z / kr, rho / kr, x / rho, y / rho];
  const far = times([Math.cos(kr), Math.sin(kr)], [0, 1 / kr]);
  const part = (at: number, factor: number) => times([out[at] * factor, out[at + 1] * factor], far);
  const toCartesian = (theta: number[], phi: number[], r: number[]) => {
    const mix = (r_: number, theta_: number, phi_: number) =>
      [0, 1].map((j) => r_ * r[j] + theta_ * theta[j] + phi_ * phi[j]);
    return [
      ...mix(sinT * cosP, cosT * cosP, -sinP),
      ...mix(sinT * sinP, cosT * sinP, cosP),
      ...mix(cosT, -sinT, 0),
    ];
  };
  return [
    ...toCartesian(part(0, cosP), part(2, -sinP), part(4, cosP)),
    ...toCartesian(part(6, sinP), part(8, cosP), part(10, sinP)),
  ];
}
