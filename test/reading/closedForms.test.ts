import { describe, expect, it } from 'vitest';
import { forwardAmplitude } from '../../src/optics/mieAmplitudes.ts';
import { mieCoefficients } from '../../src/optics/mieCoefficients.ts';
import reference from '../reference/finite-detector.json' with { type: 'json' };
import { constantScenario, discNodes, polygonNodes, ratioOf, sphereScenario, square } from './setup.ts';

/**
 * The closed forms leave out four things that the program holds: the obliquity (1 + cosθ)/2 and 1/r for 1/z, η/(2kz) each; for
 * squares the path beyond the paraxial one, up to η²/(2kz) of phase; and the scattered flux. With kz = 1e13 and η up to
 * 8000 the first three are below 1e-5 rad and 1e-9, and `constantScenario` makes the last vanish. What is left is the table's bound.
 */
const KZ = 1e13;
const WAVENUMBER = 1e7;
const DISTANCE_M = KZ / WAVENUMBER;
const KAPPA = WAVENUMBER / (2 * DISTANCE_M);
const TOLERANCE = 1e-6;

/** Radius at which the paraxial phase is η, metres. */
const radiusAt = (eta: number) => Math.sqrt(eta / KAPPA);

/** The amplitude that a reference speaks of: `real S`, or S(0) of `m=1.5+0.1i x=10`. */
function forwardOf(sphere: string): readonly [number, number] {
  if (sphere === 'real S') return [1, 0];
  return forwardAmplitude(mieCoefficients(Number(sphere.split('x=')[1]), indexOf(sphere)));
}

function indexOf(sphere: string): [number, number] {
  const [, n, k = '0'] = /m=([\d.]+)(?:\+([\d.]+)i)?/.exec(sphere) ?? [];
  return [Number(n), Number(k)];
}

describe('a constant amplitude, test/reference/finite-detector.json', () => {
  // K = 1 − Re{S e^{iφ}}/Re S
  it.each(reference.circles)('disc on the axis: $id, $sphere, phase $phase', ({ sphere, phase, K }) => {
    const scenario = constantScenario(WAVENUMBER, forwardOf(sphere));
    const path = Number(phase) / WAVENUMBER;
    const radiusM = Math.sqrt(path * (path + 2 * DISTANCE_M));
    const ratio = ratioOf(scenario, DISTANCE_M, discNodes(radiusM, KAPPA));
    expect(Math.abs(ratio - Number(K))).toBeLessThan(TOLERANCE);
  });

  // K = −2 Re{i S F(u)²}/Re S with Fresnel's F = C + iS, and η = πu²/2 in the middle of a side
  it.each(reference.squares)('square on the axis: $id, $sphere, u = $u', ({ sphere, u, K }) => {
    const half = radiusAt((Math.PI * Number(u) ** 2) / 2);
    const ratio = ratioOf(
      constantScenario(WAVENUMBER, forwardOf(sphere)),
      DISTANCE_M,
      polygonNodes([square(half)], KAPPA),
    );
    expect(Math.abs(ratio - Number(K))).toBeLessThan(TOLERANCE);
  });

  // Real S tells Re f, S = 1 + i tells Re f − Im f.
  it.each(reference.squareRims)('mean of e^{iη} around a square: $id', ({ u, oneMinusMean }) => {
    const nodes = polygonNodes([square(radiusAt((Math.PI * Number(u) ** 2) / 2))], KAPPA);
    const real = ratioOf(constantScenario(WAVENUMBER, [1, 0]), DISTANCE_M, nodes);
    const turned = ratioOf(constantScenario(WAVENUMBER, [1, 1]), DISTANCE_M, nodes);
    expect(Math.abs(real - Number(oneMinusMean[0]))).toBeLessThan(TOLERANCE);
    expect(Math.abs(real - turned - Number(oneMinusMean[1]))).toBeLessThan(2 * TOLERANCE);
  });

  it.each(reference.offsetCircles)('disc, particle aside: $id', ({ rimPhase, offsetPhase, K, rimMean }) => {
    const offset = radiusAt(Number(offsetPhase));
    const nodes = discNodes(radiusAt(Number(rimPhase)), KAPPA, 0, 0, offset);
    const place = [offset * Math.cos(0.7), offset * Math.sin(0.7)] as const;
    const real = ratioOf(constantScenario(WAVENUMBER, [1, 0]), DISTANCE_M, nodes, place);
    const turned = ratioOf(constantScenario(WAVENUMBER, [1, 1]), DISTANCE_M, nodes, place);
    expect(Math.abs(real - Number(K))).toBeLessThan(TOLERANCE);
    expect(Math.abs(turned - real - Number(rimMean[1]))).toBeLessThan(2 * TOLERANCE);
  });
});

describe('discs behind whole spheres, test/reference/finite-detector.json', () => {
  // The reading counts what falls in: reading/extinction = K − scatteredIn.
  // kz = 1e5 at 80° would take a table of 13 million cells: left out.
  const discs = reference.mieDiscs.filter(
    ({ kz, halfAngleDeg }) => kz * Math.tan((halfAngleDeg * Math.PI) / 180) ** 2 < 1e6,
  );

  it.each(discs)('$id: $sphere, x = $x, kz = $kz, half-angle $halfAngleDeg°', (one) => {
    const wavelengthM = (2 * Math.PI) / WAVENUMBER;
    const scenario = sphereScenario(
      (2 * one.x) / WAVENUMBER,
      indexOf(one.sphere),
      { wavelengthM },
      { halfAngle: 1.4 },
    );
    const distanceM = one.kz / WAVENUMBER;
    const radiusM = distanceM * Math.tan((one.halfAngleDeg * Math.PI) / 180);
    const ratio = ratioOf(scenario, distanceM, discNodes(radiusM, WAVENUMBER / (2 * distanceM)));
    const expected = Number(one.K) - Number(one.scatteredIn);
    expect(Math.abs(ratio - expected)).toBeLessThan(TOLERANCE);
  });
});
