import { describe, expect, it } from 'vitest';
import { gaussLegendre } from '../../src/numeric/gaussLegendre.ts';
import { forwardAmplitude, scatteringAmplitudes } from '../../src/optics/mieAmplitudes.ts';
import { mieCoefficients, mieCoefficientsConductor } from '../../src/optics/mieCoefficients.ts';
import { mieEfficiencies } from '../../src/optics/mieEfficiencies.ts';

const spheres = [
  mieCoefficients(0.01, [1.33, 1e-4]),
  mieCoefficients(3, [1.55, 0]),
  mieCoefficients(40, [1.000_1, 0]),
  mieCoefficients(120, [2, 1]),
  mieCoefficientsConductor(25),
];

function amplitudes(coefficients: (typeof spheres)[number], cosTheta: number): Float64Array {
  const out = new Float64Array(4);
  scatteringAmplitudes(coefficients, cosTheta, out);
  return out;
}

describe('scatteringAmplitudes', () => {
  it('is S(0) straight ahead, and S1 = −S2 straight back (Bohren & Huffman 1983, section 4.4)', () => {
    for (const sphere of spheres) {
      const [re, im] = forwardAmplitude(sphere);
      const size = Math.hypot(re, im);
      const ahead = amplitudes(sphere, 1);
      expect(Math.hypot(ahead[0] - re, ahead[1] - im) / size).toBeLessThan(1e-14);
      expect(Math.hypot(ahead[2] - re, ahead[3] - im) / size).toBeLessThan(1e-14);
      const back = amplitudes(sphere, -1);
      expect(back[0]).toBeCloseTo(-back[2], 12);
      expect(
        (4 * (back[0] ** 2 + back[1] ** 2)) / sphere.x ** 2 / mieEfficiencies(sphere).backscatter,
      ).toBeCloseTo(1, 11);
    }
  });

  it('integrates over all directions to scattering and asymmetry (eq. 4.61 and p. 120, by quadrature)', () => {
    for (const sphere of spheres) {
      const { nodes, weights } = gaussLegendre(sphere.order + 2);
      let scattering = 0;
      let forwardness = 0;
      nodes.forEach((cosTheta, i) => {
        const power = weights[i] * amplitudes(sphere, cosTheta).reduce((sum, s) => sum + s * s, 0);
        scattering += power / sphere.x ** 2;
        forwardness += (cosTheta * power) / sphere.x ** 2;
      });
      const totals = mieEfficiencies(sphere);
      expect(scattering / totals.scattering).toBeCloseTo(1, 12);
      expect(forwardness / scattering).toBeCloseTo(totals.asymmetry, 12);
    }
  });

  it('agrees with the recurrence in cosθ of eq. 4.47', () => {
    for (const cosTheta of [0.93, 0.2, 0, -0.4, -0.99]) {
      const { order, aRe, aIm, bRe, bIm } = spheres[1];
      const sum = [0, 0, 0, 0];
      let before = 0;
      let pi = 1;
      for (let n = 1; n <= order; n++) {
        const tau = n * cosTheta * pi - (n + 1) * before;
        const c = (2 * n + 1) / (n * (n + 1));
        sum[0] += c * (aRe[n - 1] * pi + bRe[n - 1] * tau);
        sum[1] += c * (aIm[n - 1] * pi + bIm[n - 1] * tau);
        sum[2] += c * (aRe[n - 1] * tau + bRe[n - 1] * pi);
        sum[3] += c * (aIm[n - 1] * tau + bIm[n - 1] * pi);
        [before, pi] = [pi, ((2 * n + 1) * cosTheta * pi - (n + 1) * before) / n];
      }
      amplitudes(spheres[1], cosTheta).forEach((value, j) => {
        expect(value).toBeCloseTo(sum[j], 12);
      });
    }
  });

  it('writes its four numbers at the offset and nothing else', () => {
    const out = new Float64Array(8).fill(7);
    scatteringAmplitudes(spheres[1], 0.3, out, 3);
    expect([...out.subarray(3, 7)]).toEqual([...amplitudes(spheres[1], 0.3)]);
    expect([out[0], out[1], out[2], out[7]]).toEqual([7, 7, 7, 7]);
  });
});
