import { scatteringAmplitudes } from '../../src/optics/mieAmplitudes.ts';
import type { MieCoefficients } from '../../src/optics/mieCoefficients.ts';

/** A sphere's amplitudes as a CSV file, from 0° to the last of `rows` angles, with `digits` significant digits. */
export function tableOf(coefficients: MieCoefficients, anglesDeg: readonly number[], digits = 17): string {
  const out = new Float64Array(4);
  const rows = anglesDeg.map((angleDeg) => {
    scatteringAmplitudes(coefficients, Math.cos((angleDeg * Math.PI) / 180), out);
    return [angleDeg, ...Array.from(out, (value) => value.toPrecision(digits))].join(',');
  });
  return ['angle_deg,s1_re,s1_im,s2_re,s2_im', ...rows, ''].join('\n');
}

/** 0, step, 2·step … up to `last`. */
export function steps(stepDeg: number, lastDeg: number): number[] {
  const count = Math.round(lastDeg / stepDeg) + 1;
  return Array.from({ length: count }, (_, i) => Number((i * stepDeg).toFixed(9)));
}
