import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { layeredSphere } from '../../src/optics/layeredSphere.ts';
import { forwardAmplitude, scatteringAmplitudes } from '../../src/optics/mieAmplitudes.ts';
import type { MieCoefficients } from '../../src/optics/mieCoefficients.ts';
import { mieCoefficients } from '../../src/optics/mieCoefficients.ts';
import { mieEfficiencies } from '../../src/optics/mieEfficiencies.ts';
import reference from '../reference/layered.json' with { type: 'json' };
import extra from '../reference/layered-extra.json' with { type: 'json' };
import { expectPrinted, relativeError, sphereErrors } from './mieReference.ts';

type Index = [number, number];

/** A sphere from the core outwards. */
const sphere = (...layers: [x: number, m: Index][]) => layeredSphere(layers.map(([x, m]) => ({ x, m })));

const sphereOf = ({ sizes, indices }: { sizes: number[]; indices: number[][] }) =>
  sphere(...sizes.map((x, i): [number, Index] => [x, indices[i] as Index]));

/** Largest difference of S over 0 to 180° against S(0). */
function difference(one: MieCoefficients, other: MieCoefficients): number {
  const a = new Float64Array(4);
  const b = new Float64Array(4);
  const size = Math.hypot(...forwardAmplitude(one));
  let largest = 0;
  for (let degrees = 0; degrees <= 180; degrees += 3) {
    scatteringAmplitudes(one, Math.cos((degrees * Math.PI) / 180), a);
    scatteringAmplitudes(other, Math.cos((degrees * Math.PI) / 180), b);
    for (let j = 0; j < 4; j++) largest = Math.max(largest, Math.abs(a[j] - b[j]) / size);
  }
  return largest;
}

describe('published and recomputed (layered.json)', () => {
  it.each(reference.spheres)('$id: $source', (record) => {
    const coefficients = sphereOf(record);
    const amplitudes = record.amplitudes.map(({ theta_deg, S1, S2 }) => ({
      cosTheta: Math.cos((Number(theta_deg) * Math.PI) / 180),
      S1,
      S2,
    }));
    const errors = sphereErrors(coefficients, {
      ...record.recomputed,
      Qback: record.recomputed.Qback_BH,
      amplitudes,
    });
    expect(errors.totals).toBeLessThan(4e-15);
    expect(errors.backscatter).toBeLessThan(2e-14);
    expect(errors.amplitudes).toBeLessThan(2e-14);
    if (record.published === undefined) return;
    const totals = mieEfficiencies(coefficients);
    expectPrinted(totals.extinction, record.published.Qext);
    expectPrinted(totals.scattering, record.published.Qsca);
    expectPrinted(totals.backscatter, record.published.Qback);
  });
});

describe('against mpmath with 60 digits or more (layered-extra.json)', () => {
  /** Largest relative errors allowed; faint means that no layer is 1e-3 away from the medium. */
  const TOLERANCES = [
    { faint: false, totals: 1e-12, backscatter: 1e-11, amplitudes: 1e-11 },
    { faint: true, totals: 5e-11, backscatter: 2e-10, amplitudes: 2e-10 },
  ];
  const isFaint = (indices: number[][]) => indices.every(([n, k]) => Math.hypot(n - 1, k) < 1e-3);

  it.each(TOLERANCES)('faint: $faint', ({ faint, ...allowed }) => {
    const worst = { totals: 0, backscatter: 0, amplitudes: 0 };
    for (const record of extra.cases.filter(({ indices }) => isFaint(indices) === faint)) {
      const coefficients = sphereOf(record);
      const { extinction, scattering, asymmetry } = mieEfficiencies(coefficients);
      // The asymmetry has its own test: given back as it is, it counts as right.
      const g = String(asymmetry);
      const errors = sphereErrors(coefficients, { ...record, g });
      for (const key of ['totals', 'backscatter', 'amplitudes'] as const) {
        worst[key] = Math.max(worst[key], errors[key]);
        expect(errors[key], `${key} of ${record.sizes}, ${record.indices}`).toBeLessThan(allowed[key]);
      }
      const lossless = record.indices.every(([, k]) => k === 0);
      if (lossless) expect(Math.abs(scattering / extinction - 1)).toBeLessThan(1e-14);
    }
    for (const key of ['totals', 'backscatter', 'amplitudes'] as const) {
      expect(worst[key], `${key} could be tighter`).toBeGreaterThan(allowed[key] / 30);
    }
  });

  it('asymmetry, where small and faint spheres lose digits of b_n', () => {
    for (const record of extra.cases) {
      const small = record.sizes[record.sizes.length - 1] < 0.1;
      const { asymmetry } = mieEfficiencies(sphereOf(record));
      const allowed = small || isFaint(record.indices) ? 1e-8 : 5e-12;
      expect(relativeError(asymmetry, record.g), `${record.sizes}`).toBeLessThan(allowed);
    }
  });

  it('a weak absorption beside a strong scattering keeps its digits', () => {
    // The shell of k = 1e-8 at x = 0.01.
    const small = extra.cases.find(({ indices }) => indices[1][1] === 1e-8);
    if (small === undefined) throw new Error('case is gone');
    const { absorption } = mieEfficiencies(sphereOf(small));
    expect(absorption / (Number(small.Qext) - Number(small.Qsca))).toBeCloseTo(1, 12);
  });
});

describe('limits', () => {
  const sizes = [0.001, 0.3, 7, 150];
  const indices: Index[] = [
    [1.33, 0],
    [1.59, 0.01],
    [0.05, 4],
    [0.4, 0],
    [3, 2],
  ];
  const soot: Index = [1.5, 0.2];

  it('a core like its shell is the homogeneous sphere', () => {
    for (const x of sizes) {
      for (const m of indices) {
        const one = mieCoefficients(x, m);
        expect(sphere([0.4 * x, m], [0.7 * x, m], [x, m])).toEqual(one);
        // Not merged, but all but alike.
        const nearly: Index = [m[0] * (1 + 4e-16), m[1]];
        expect(difference(one, sphere([0.4 * x, nearly], [x, m]))).toBeLessThan(1e-12);
        expect(difference(one, sphere([0.97 * x, m], [x, nearly]))).toBeLessThan(1e-12);
      }
    }
  });

  it('a core of no size, or a tiny one, leaves the shell', () => {
    for (const x of sizes) {
      for (const m of indices) {
        const one = mieCoefficients(x, m);
        expect(sphere([0, soot], [x, m])).toEqual(one);
        expect(sphere([1e-8 * x, soot], [x, m])).toEqual(one);
        expect(sphere([1e-90, soot], [1e-89, [3, 0]], [x, m])).toEqual(one);
        expect(difference(one, sphere([1e-5 * x, soot], [x, m]))).toBeLessThan(1e-12);
      }
    }
  });

  it('a shell of no thickness, or of the medium, leaves the core', () => {
    for (const x of sizes) {
      const core = mieCoefficients(x, soot);
      expect(sphere([x, soot], [x, [3, 0]])).toEqual(core);
      expect(sphere([x, soot], [2 * x, [1, 0]], [3 * x, [1, 0]])).toEqual(core);
      const nearly = sphere([x, soot], [2 * x, [1, 1e-15]]);
      expect(difference(core, nearly)).toBeLessThan(x < 0.1 ? 1e-11 : 1e-12);
    }
  });

  it('a thin shell changes the amplitudes in proportion to its thickness', () => {
    for (const x of [0.3, 7, 150]) {
      const none = forwardAmplitude(mieCoefficients(x, [1.5, 0]));
      const [once, twice] = [1e-7, 2e-7].map((share) =>
        forwardAmplitude(sphere([x, [1.5, 0]], [x * (1 + share), [1.33, 0.05]])),
      );
      expect((twice[0] - none[0]) / (once[0] - none[0])).toBeCloseTo(2, 2);
      expect((twice[1] - none[1]) / (once[1] - none[1])).toBeCloseTo(2, 2);
    }
  });

  it('nothing is seen of a core behind a shell that lets no light through', () => {
    const dark: Index = [1.5, 2];
    for (const x of [50, 2000]) {
      expect(difference(mieCoefficients(x, dark), sphere([x / 2, [1.33, 0]], [x, dark]))).toBeLessThan(1e-12);
    }
  });

  it('a small coated sphere has the polarisability of Bohren & Huffman (1983), eq. 5.36', () => {
    const [x, share] = [0.001, 0.4];
    const [core, shell] = [2.5, 1.8];
    const [e1, e2] = [core ** 2, shell ** 2];
    const top = (e2 - 1) * (e1 + 2 * e2) + share * (e1 - e2) * (1 + 2 * e2);
    const bottom = (e2 + 2) * (e1 + 2 * e2) + share * (2 * e2 - 2) * (e1 - e2);
    const { aIm } = sphere([x * Math.cbrt(share), [core, 0]], [x, [shell, 0]]);
    expect(aIm[0] / (((-2 / 3) * x ** 3 * top) / bottom)).toBeCloseTo(1, 5);
  });

  it('a layer split in two is one layer', () => {
    const shell: Index = [1.33, 0.01];
    const whole = sphere([8, [1.59, 0]], [20, shell]);
    for (const middle of [8.001, 9, 14, 19.9]) {
      const split = sphere([8, [1.59, 0]], [middle, shell], [20, [1.33 * (1 + 4e-16), 0.01]]);
      expect(difference(whole, split)).toBeLessThan(1e-12);
    }
  });
});

it('no mode gives energy, whatever the layers', () => {
  const part = fc.double({ min: -2, max: 1, noNaN: true }).map((e) => 10 ** e);
  const absorbing = fc.oneof(
    fc.constant(0),
    fc.double({ min: -9, max: 1, noNaN: true }).map((e) => 10 ** e),
  );
  const layer = fc.record({ thickness: part, m: fc.tuple(part, absorbing) });
  fc.assert(
    fc.property(fc.array(layer, { minLength: 1, maxLength: 5 }), (shells) => {
      let x = 0;
      const layers = shells.map(({ thickness, m }) => {
        x += thickness;
        return { x, m };
      });
      fc.pre(layers.every(({ m }) => Math.hypot(m[0] - 1, m[1]) > 1e-5));
      const { order, aRe, aIm, bRe, bIm } = layeredSphere(layers);
      const lossless = shells.every(({ m }) => m[1] === 0);
      for (let i = 0; i < order; i++) {
        for (const [re, im] of [
          [aRe[i], aIm[i]],
          [bRe[i], bIm[i]],
        ]) {
          const scattered = re * re + im * im;
          expect(re).toBeGreaterThanOrEqual(scattered * (1 - 1e-14));
          if (lossless) expect(re).toBeLessThanOrEqual(scattered * (1 + 1e-14));
        }
      }
    }),
    { numRuns: 500 },
  );
});

describe('refuses', () => {
  const inside = 'that of the layer inside';
  const index = 'expected an index n + ik relative to the medium with n ≥ 0, k ≥ 0, modulus 0.01 to 100';
  const glass: Index = [1.5, 0];
  const water: Index = [1.33, 0];

  it.each([
    [() => sphere(), 'layers: found none, expected one layer or more'],
    [
      () => sphere([2, glass], [1, water]),
      `layers[1].x: found 1, expected a size parameter of 2 or more, ${inside}`,
    ],
    [
      () => sphere([-1, glass], [1, water]),
      `layers[0].x: found -1, expected a size parameter of 0 or more, ${inside}`,
    ],
    [
      () => sphere([1, glass], [20_001, water]),
      'layers[1].x: found 20001, expected a size parameter from 0.001 to 20000',
    ],
    [() => sphere([1, [1.5, -0.1]], [2, water]), `layers[0].m: found 1.5 + -0.1i, ${index}`],
    [() => sphere([1, glass], [2, [Number.NaN, 0]]), `layers[1].m: found NaN + 0i, ${index}`],
    [
      () => sphere([1, [1, 0]], [2, [1, 1e-7]]),
      'layers: found the medium alone, expected at least one layer',
    ],
    [() => sphere([0, glass], [2, [1, 0]]), 'x: found 0, expected a size parameter from'],
    [() => sphere([1e-4, glass], [2, [1, 0]]), 'x: found 0.0001, expected a size parameter from'],
  ])('%s', (solve, message) => {
    expect(solve).toThrow(RimwrightError);
    expect(solve).toThrow(message);
  });
});
