import { describe, expect, it } from 'vitest';
import { gaussLegendre } from '../../src/numeric/gaussLegendre.ts';
import { boundaryReading } from '../../src/reading/boundaryReading.ts';
import { FlightGrid } from '../../src/reading/flightGrid.ts';
import type { FlightMeans } from '../../src/reading/flightMeans.ts';
import { plainFlights } from '../../src/reading/flightMeans.ts';
import type { FlightMirrors } from '../../src/reading/flightMirrors.ts';
import { samplePositions } from '../../src/reading/positions.ts';
import { buildRadialTable } from '../../src/reading/radialTable.ts';
import { discNodes, kappaOf, polygonNodes, sphereScenario } from './setup.ts';

const DISTANCE_M = 0.02;
const RADIUS_M = 2.5e-4;
const NO_MIRRORS: FlightMirrors = { ends: false, sides: false, centre: false };
const TURN = 2 * Math.PI;

/** Ratio of readings to extinction by place, and the phase that a metre makes, for a regular polygon; a disc without corners. */
function view(corners: number, reachM: number, polarizationRad: number | null = null) {
  const scenario = sphereScenario(2e-6, [1.59, 0], { polarizationRad });
  const kappa = kappaOf(scenario, DISTANCE_M);
  const ring = Array.from({ length: corners }, (_, i) => [
    RADIUS_M * Math.cos((TURN * i) / corners),
    RADIUS_M * Math.sin((TURN * i) / corners),
  ]).flat();
  const nodes =
    corners === 0 ? discNodes(RADIUS_M, kappa, 0, 0, reachM) : polygonNodes([ring], kappa, reachM);
  const table = buildRadialTable(scenario, DISTANCE_M, RADIUS_M + 1.5 * reachM, 0);
  return {
    ratio: (x: number, y: number) => boundaryReading(table, nodes, x, y) / scenario.extinctionM2,
    phasePerMetre: 2 * kappa * (RADIUS_M + reachM),
  };
}

/** Brute force: so many Gauss–Legendre points a flight that more would change nothing. */
function brute(middles: Float64Array, { spanM, headingRad }: { spanM: number; headingRad: number }) {
  const { nodes, weights } = gaussLegendre(300);
  const points = Float64Array.from(
    Array.from(nodes, (t) => (t * spanM) / 2).flatMap((s) => [
      s * Math.cos(headingRad),
      s * Math.sin(headingRad),
    ]),
  );
  return plainFlights(middles, { points, weights: weights.map((weight) => weight / 2) });
}

function meansOf(flights: FlightMeans, read: (x: number, y: number) => number): Float64Array {
  const out = new Float64Array(flights.count);
  flights.means(read, out);
  return out;
}

function farthestApart(a: Float64Array, b: Float64Array): number {
  return Math.max(...a.map((value, i) => Math.abs(value - b[i])));
}

describe('FlightGrid', () => {
  it.each([
    { corners: 0, offsetM: 1e-5, spanM: 6e-5, headingRad: 0.3 },
    { corners: 0, offsetM: 1e-4, spanM: 1e-5, headingRad: 2 },
    { corners: 4, offsetM: 0, spanM: 1e-3, headingRad: 0.3 },
    { corners: 4, offsetM: 3e-5, spanM: 4e-4, headingRad: -1.2 },
    { corners: 3, offsetM: 1e-5, spanM: 1e-8, headingRad: 0.3 },
    { corners: 5, offsetM: 2e-5, spanM: 2e-4, headingRad: 1, polarizationRad: 0.4 },
  ])(
    'has the means of a $corners-gon over $spanM m, offset $offsetM m, by brute force',
    ({ corners, offsetM, spanM, headingRad, polarizationRad = null }) => {
      const { ratio, phasePerMetre } = view(corners, offsetM + spanM / 2, polarizationRad);
      const crossing = { spanM, headingRad };
      const middles = samplePositions(offsetM, 1e5, 0.5, { folds: 1, mirror: false });
      const wanted = meansOf(brute(middles, crossing), ratio);
      const errors = [3, 4.7].map((tail) => {
        const grid = new FlightGrid(middles, crossing, { phasePerMetre, mirrors: NO_MIRRORS, tail });
        return farthestApart(meansOf(grid, ratio), wanted);
      });
      expect(errors[0]).toBeLessThan(1e-4);
      expect(errors[1]).toBeLessThan(3e-6);
    },
  );

  it.each([
    { corners: 0, headingRad: 0.7, mirrors: { ends: true, sides: true, centre: true }, share: 0.3 },
    { corners: 4, headingRad: Math.PI / 4, mirrors: { ends: true, sides: true, centre: true }, share: 0.3 },
    { corners: 6, headingRad: 0.7, mirrors: { ends: false, sides: false, centre: true }, share: 0.53 },
    { corners: 3, headingRad: 0, mirrors: { ends: false, sides: true, centre: false }, share: 0.57 },
    {
      corners: 3,
      headingRad: Math.PI / 2,
      mirrors: { ends: true, sides: false, centre: false },
      share: 0.57,
    },
  ])(
    'reads mirror images of a $corners-gon once, for a heading of $headingRad',
    ({ corners, headingRad, mirrors, share }) => {
      const [offsetM, spanM] = [3e-5, 1e-4];
      const { ratio, phasePerMetre } = view(corners, offsetM + spanM / 2);
      // Middles all to one side: their own rectangle would not be symmetric.
      const middles = Float64Array.of(0, 0, 2e-5, 1e-5, 1e-5, 2.5e-5, 0, 3e-5);
      const wanted = meansOf(brute(middles, { spanM, headingRad }), ratio);
      const all = samplePositions(offsetM, 1e5, 0.5, { folds: 1, mirror: false });
      const grids = [mirrors, NO_MIRRORS].map((one) => {
        const options = { phasePerMetre, mirrors: one, tail: 4.7 };
        const grid = new FlightGrid(middles, { spanM, headingRad }, options);
        expect(farthestApart(meansOf(grid, ratio), wanted)).toBeLessThan(3e-6);
        return new FlightGrid(all, { spanM, headingRad }, options);
      });
      expect(grids[0].readings).toBeLessThan(share * grids[1].readings);
      // The mirrors do count: an outline off the axis, which has none, is read wrongly with them.
      const shifted = (x: number, y: number) => ratio(x + 1.7e-5, y + 1.1e-5);
      const wrong = new FlightGrid(middles, { spanM, headingRad }, { phasePerMetre, mirrors, tail: 4.7 });
      const right = meansOf(brute(middles, { spanM, headingRad }), shifted);
      expect(farthestApart(meansOf(wrong, shifted), right)).toBeGreaterThan(1e-3);
    },
  );

  it('reads no place beyond the farthest, and far fewer than flight by flight', () => {
    const { ratio, phasePerMetre } = view(4, 4.5e-5);
    const crossing = { spanM: 6e-5, headingRad: 0.3 };
    const middles = samplePositions(1.5e-5, phasePerMetre, 0.16, { folds: 1, mirror: false });
    const grid = new FlightGrid(middles, crossing, { phasePerMetre, mirrors: NO_MIRRORS, tail: 4.7 });
    let [reads, farthestM] = [0, 0];
    meansOf(grid, (x, y) => {
      reads++;
      farthestM = Math.max(farthestM, Math.hypot(x, y));
      return ratio(x, y);
    });
    expect(reads).toBe(grid.readings);
    expect(farthestM).toBeLessThanOrEqual(grid.farthestM);
    expect(grid.farthestM).toBeLessThan(1.06 * 4.5e-5);
    expect(reads).toBeLessThan(middles.length / 2);
  });
});
