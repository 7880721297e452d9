import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { LegendreRules } from '../../src/numeric/gaussLegendre.ts';
import { boundaryReading } from '../../src/reading/boundaryReading.ts';
import { flightPoints, flightRule, samplePositions } from '../../src/reading/positions.ts';
import { buildRadialTable } from '../../src/reading/radialTable.ts';
import { discNodes, kappaOf, polygonNodes, sphereScenario, square } from './setup.ts';

const OFFSET_M = 30e-6;
const PER_METRE = 2e5;

describe('samplePositions', () => {
  it.each([
    { folds: 1, mirror: false },
    { folds: 1, mirror: true },
    { folds: 2, mirror: false },
    { folds: 3, mirror: true },
    { folds: 12, mirror: false },
    { folds: 12, mirror: true },
    { folds: Number.POSITIVE_INFINITY, mirror: true },
  ])(
    'leaves no place of the disc far from a sample, by symmetry: $folds-fold, mirror $mirror',
    (symmetry) => {
      const random = randomStream(3);
      const spacing = 0.5;
      const samples = samplePositions(OFFSET_M, PER_METRE, spacing, symmetry);
      for (let turn = 0; turn < 400; turn++) {
        const radius = OFFSET_M * Math.sqrt(random.uniform());
        const angle = 2 * Math.PI * random.uniform();
        let nearest = Number.POSITIVE_INFINITY;
        for (let i = 0; i < samples.length; i += 2) {
          const across = wedgeAngle(angle, symmetry);
          // Circles are alike all round: only the radius counts.
          const off = Number.isFinite(symmetry.folds)
            ? Math.hypot(radius * Math.cos(across) - samples[i], radius * Math.sin(across) - samples[i + 1])
            : Math.abs(radius - Math.hypot(samples[i], samples[i + 1]));
          nearest = Math.min(nearest, off);
        }
        // Neighbours are `spacing` apart along both directions: the middle between four is 1/√2 of that away.
        expect(nearest * PER_METRE).toBeLessThan(spacing / Math.SQRT2);
      }
    },
  );

  /** The angle of the wedge [0, π/folds] (mirror) or [0, 2π/folds] that stands for this one. */
  function wedgeAngle(angle: number, { folds, mirror }: { folds: number; mirror: boolean }): number {
    if (!Number.isFinite(folds)) return 0;
    const fold = (2 * Math.PI) / folds;
    const within = ((angle % fold) + fold) % fold;
    return mirror && within > fold / 2 ? fold - within : within;
  }

  it('begins on the axis, ends on the rim, and stays in the wedge', () => {
    const samples = samplePositions(OFFSET_M, PER_METRE, 0.5, { folds: 4, mirror: true });
    expect([samples[0], samples[1]]).toEqual([0, 0]);
    let farthest = 0;
    for (let i = 2; i < samples.length; i += 2) {
      farthest = Math.max(farthest, Math.hypot(samples[i], samples[i + 1]));
      const angle = Math.atan2(samples[i + 1], samples[i]);
      expect(angle).toBeGreaterThanOrEqual(0);
      expect(angle).toBeLessThanOrEqual(Math.PI / 4 + 1e-12);
    }
    expect(farthest).toBeCloseTo(OFFSET_M, 15);
    const ends = Array.from({ length: samples.length / 2 }, (_, i) =>
      Math.atan2(samples[2 * i + 1], samples[2 * i]),
    );
    expect(Math.max(...ends)).toBeCloseTo(Math.PI / 4, 12);
  });

  it('is the axis alone without an offset, and one ray for circles', () => {
    expect(samplePositions(0, PER_METRE, 0.5, { folds: 1, mirror: false })).toEqual(Float64Array.of(0, 0));
    const ray = samplePositions(OFFSET_M, PER_METRE, 0.5, { folds: Number.POSITIVE_INFINITY, mirror: true });
    expect(ray.every((value, i) => i % 2 === 0 || value === 0)).toBe(true);
  });

  it('is about ten times denser in area at the spacing of a report', () => {
    const [search, report] = [0.5, 0.16].map(
      (spacing) => samplePositions(1.5 * OFFSET_M, PER_METRE, spacing, { folds: 4, mirror: true }).length,
    );
    expect(report / search).toBeGreaterThan(8);
    expect(report / search).toBeLessThan(12);
  });

  it('sees how readings change with the n-fold pattern of a small outline', () => {
    // However small the phase, a step in azimuth must not skip the pattern: three steps to half a period.
    const samples = samplePositions(1e-7, 10, 0.5, { folds: 5, mirror: false });
    expect(samples.length / 2).toBe(1 + 3 * 7);
  });
});

describe('flightPoints', () => {
  it('is where the particle stays without a crossing', () => {
    expect(flightPoints(null, PER_METRE)).toEqual(Float64Array.of(0, 0));
  });

  it('runs evenly along its heading, about its middle', () => {
    const crossing = { spanM: 4e-4, headingRad: 0.7 };
    const points = flightPoints(crossing, PER_METRE);
    const count = points.length / 2;
    // No two neighbours farther apart than a tenth of a radian.
    expect((crossing.spanM / count) * PER_METRE).toBeLessThan(0.1);
    for (let i = 0; i < count; i++) {
      const along = crossing.spanM * ((i + 0.5) / count - 0.5);
      expect(points[2 * i]).toBeCloseTo(along * Math.cos(0.7), 15);
      expect(points[2 * i + 1]).toBeCloseTo(along * Math.sin(0.7), 15);
    }
  });

  it.each([
    { name: 'disc', spanM: 6e-5 },
    { name: 'disc', spanM: 4e-4 },
    { name: 'square', spanM: 4e-4 },
    { name: 'square', spanM: 1e-3 },
  ])('has the mean reading of a crossing of $spanM m in view of a $name', ({ name, spanM }) => {
    const scenario = sphereScenario(2e-6);
    const [distanceM, radiusM] = [0.02, 2.5e-4];
    const kappa = kappaOf(scenario, distanceM);
    const nodes =
      name === 'disc'
        ? discNodes(radiusM, kappa, 0, 0, spanM)
        : polygonNodes([square(radiusM / Math.SQRT2)], kappa, spanM);
    const table = buildRadialTable(scenario, distanceM, radiusM + spanM, 0);
    const at = (x: number, y: number) => boundaryReading(table, nodes, x + 1e-5, y) / scenario.extinctionM2;
    const mean = (points: Float64Array) => {
      let sum = 0;
      for (let i = 0; i < points.length; i += 2) sum += at(points[i], points[i + 1]);
      return (2 * sum) / points.length;
    };
    const brute = Array.from({ length: 20_001 }, (_, i) => {
      const along = spanM * ((i + 0.5) / 20_001 - 0.5);
      return [along * Math.cos(0.3), along * Math.sin(0.3)];
    });
    const crossing = { spanM, headingRad: 0.3 };
    const wanted = mean(Float64Array.from(brute.flat()));
    const even = flightPoints(crossing, 2 * kappa * radiusM);
    expect(Math.abs(mean(even) - wanted)).toBeLessThan(1e-5);
    const { points, weights } = flightRule(crossing, 2 * kappa * radiusM, new LegendreRules());
    const sum = weights.reduce(
      (total, weight, i) => total + weight * at(points[2 * i], points[2 * i + 1]),
      0,
    );
    expect(Math.abs(sum - wanted)).toBeLessThan(3e-6);
    expect(weights.length).toBeLessThan(even.length / 3);
  });
});
