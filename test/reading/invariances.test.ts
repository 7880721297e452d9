import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { boundaryReading } from '../../src/reading/boundaryReading.ts';
import { buildRadialTable } from '../../src/reading/radialTable.ts';
import type { Scenario } from '../../src/reading/scenario.ts';
import { discNodes, kappaOf, polygonNodes, ratioOf, sphereScenario, WAVELENGTH_M } from './setup.ts';

const DISTANCE_M = 0.02;
const REACH_M = 8e-4;
const POLARIZATION = 0.4;
const polarised = (angle: number) => sphereScenario(2e-6, [1.59, 0.01], { polarizationRad: angle });
const PLAIN = sphereScenario(2e-6, [1.59, 0.01]);
const KAPPA = kappaOf(PLAIN, DISTANCE_M);
/** Node counts may differ by one where an outline is turned: what `ringNodes` promises at 0.9 a radian. */
const TOLERANCE = 1e-6;
const RUNS = { numRuns: 25, seed: 11 };

type Point = readonly [x: number, y: number];
/** Rings that may cross themselves, run either way and lie anywhere: the boundary integral holds for all of them. */
const point = fc.tuple(
  fc.double({ min: -3e-4, max: 3e-4, noNaN: true }),
  fc.double({ min: -3e-4, max: 3e-4, noNaN: true }),
);
const outline = fc.array(point, { minLength: 3, maxLength: 7 });
const turn = fc.double({ min: -3, max: 3, noNaN: true });

function reading(scenario: Scenario, points: readonly Point[], [px, py]: Point): number {
  const table = buildRadialTable(scenario, DISTANCE_M, REACH_M, 0);
  const nodes = polygonNodes([points.flat()], KAPPA, 4.3e-4);
  return boundaryReading(table, nodes, px, py) / scenario.extinctionM2;
}

const turned = ([x, y]: Point, angle: number): Point => [
  x * Math.cos(angle) - y * Math.sin(angle),
  x * Math.sin(angle) + y * Math.cos(angle),
];

describe('readings do not depend on how the outline is written or where the axes lie', () => {
  it('turned with its particle, and with the field of polarised light', () => {
    fc.assert(
      fc.property(outline, point, turn, (points, place, angle) => {
        const round = points.map((p) => turned(p, angle));
        const plain = reading(PLAIN, points, place);
        expect(Math.abs(reading(PLAIN, round, turned(place, angle)) - plain)).toBeLessThan(TOLERANCE);
        const one = reading(polarised(POLARIZATION), points, place);
        const two = reading(polarised(POLARIZATION + angle), round, turned(place, angle));
        expect(Math.abs(one - two)).toBeLessThan(TOLERANCE);
      }),
      RUNS,
    );
  });

  it('mirrored: it runs the other way, and the field is mirrored too', () => {
    fc.assert(
      fc.property(outline, point, (points, place) => {
        const mirrored = points.map(([x, y]): Point => [x, -y]).reverse();
        const one = reading(polarised(POLARIZATION), points, place);
        const two = reading(polarised(-POLARIZATION), mirrored, [place[0], -place[1]]);
        expect(Math.abs(one - two)).toBeLessThan(1e-11);
      }),
      RUNS,
    );
  });

  it('begun at another vertex, or with the same vertex twice; run backwards, the sign turns', () => {
    fc.assert(
      fc.property(outline, point, fc.nat(6), (points, place, n) => {
        const scenario = polarised(POLARIZATION);
        const one = reading(scenario, points, place);
        const first = n % points.length;
        const begun = [...points.slice(first), ...points.slice(0, first)];
        expect(Math.abs(reading(scenario, begun, place) - one)).toBeLessThan(1e-11);
        const doubled = points.flatMap((p, i) => (i === first ? [p, p] : [p]));
        expect(Math.abs(reading(scenario, doubled, place) - one)).toBeLessThan(1e-11);
        expect(Math.abs(reading(scenario, [...points].reverse(), place) + one)).toBeLessThan(1e-11);
      }),
      RUNS,
    );
  });

  it('cut in two along any line between two vertices or through a point of its own', () => {
    fc.assert(
      fc.property(outline, point, point, (points, place, via) => {
        const scenario = polarised(POLARIZATION);
        const half = points.length >> 1;
        const one = [...points.slice(0, half + 1), via];
        const two = [...points.slice(half), points[0], via];
        const sum = reading(scenario, one, place) + reading(scenario, two, place);
        expect(Math.abs(sum - reading(scenario, points, place))).toBeLessThan(1e-11);
      }),
      RUNS,
    );
  });

  it('with a vertex more on an edge', () => {
    fc.assert(
      fc.property(outline, point, fc.double({ min: 0.01, max: 0.99, noNaN: true }), (points, place, t) => {
        const [[x0, y0], [x1, y1]] = points;
        const more: Point[] = [points[0], [x0 + t * (x1 - x0), y0 + t * (y1 - y0)], ...points.slice(1)];
        const scenario = polarised(POLARIZATION);
        const difference = reading(scenario, more, place) - reading(scenario, points, place);
        expect(Math.abs(difference)).toBeLessThan(TOLERANCE);
      }),
      RUNS,
    );
  });

  it('shifted together with its particle', () => {
    fc.assert(
      fc.property(outline, point, point, (points, place, [dx, dy]) => {
        const shifted = points.map(([x, y]): Point => [x + dx, y + dy]);
        const scenario = polarised(POLARIZATION);
        const one = reading(scenario, points, place);
        const two = reading(scenario, shifted, [place[0] + dx, place[1] + dy]);
        expect(Math.abs(one - two)).toBeLessThan(TOLERANCE);
      }),
      RUNS,
    );
  });

  it('with every length and the wavelength stretched alike', () => {
    fc.assert(
      fc.property(outline, point, fc.double({ min: 0.2, max: 8, noNaN: true }), (points, place, scale) => {
        const one = ratioOf(PLAIN, DISTANCE_M, polygonNodes([points.flat()], KAPPA, 5e-4), place);
        const light = { wavelengthM: WAVELENGTH_M * scale };
        const large = sphereScenario(2e-6 * scale, [1.59, 0.01], light);
        const nodes = polygonNodes(
          [points.flat().map((value) => value * scale)],
          KAPPA / scale ** 2,
          5e-4 * scale,
        );
        const two = ratioOf(large, DISTANCE_M * scale, nodes, [place[0] * scale, place[1] * scale]);
        expect(Math.abs(one - two)).toBeLessThan(1e-7);
        expect(large.extinctionM2 / PLAIN.extinctionM2 / scale ** 2).toBeCloseTo(1, 10);
      }),
      RUNS,
    );
  });

  it('unpolarised, it is the mean of two fields at right angles', () => {
    fc.assert(
      fc.property(outline, point, turn, (points, place, angle) => {
        const both =
          reading(polarised(angle), points, place) + reading(polarised(angle + Math.PI / 2), points, place);
        expect(Math.abs(both / 2 - reading(PLAIN, points, place))).toBeLessThan(1e-11);
      }),
      RUNS,
    );
  });

  it('a polygon of many sides is a disc', () => {
    const sides = 3000;
    const radiusM = 2e-4;
    const points = Array.from(
      { length: sides },
      (_, i): Point => turned([radiusM, 0], (2 * Math.PI * i) / sides),
    );
    const disc = ratioOf(PLAIN, DISTANCE_M, discNodes(radiusM, KAPPA, 0, 0, 5e-5), [3e-5, 2e-5]);
    expect(Math.abs(reading(PLAIN, points, [3e-5, 2e-5]) - disc)).toBeLessThan(5e-5);
  });
});
