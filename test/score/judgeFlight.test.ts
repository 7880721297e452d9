import { describe, expect, it } from 'vitest';
import { gaussLegendre } from '../../src/numeric/gaussLegendre.ts';
import { samplePositions } from '../../src/reading/positions.ts';
import { REPORT_FINENESS, SEARCH_FINENESS } from '../../src/score/fineness.ts';
import { Judge } from '../../src/score/judge.ts';
import type { Task } from '../../src/score/task.ts';
import { drawn, ringsOf, variantNamed } from '../outline/drawings.ts';
import { presetTask } from './presetTasks.ts';

const Z = 0.02;
const OFFSET = await presetTask('offset-range');
const FLIGHT = { spanM: 6e-5, headingRad: Math.PI / 2 };

/** The offset brief with particles that fly, at three depths. */
function flying(crossing: Task['placement']['crossing'], offsetM = OFFSET.placement.offsetM): Task {
  return { ...OFFSET, placement: { ...OFFSET.placement, offsetM, depthM: 1e-4, crossing } };
}

const SHAPES = [
  { name: 'ramp-peak-5-fold', values: [3, 9] },
  { name: 'ramp-peak-4-fold', values: [3, 9] },
  { name: 'rings-2', values: [3, 6, 9, 12] },
].map(({ name, values }) => ({ name, shape: drawn(variantNamed(name), values) }));

describe('Judge: flights', () => {
  it.each(SHAPES)('read $name as the mean over places along them', ({ shape }) => {
    const elements = [{ weight: 1, rings: ringsOf(shape, 180) }];
    const middles = samplePositions(OFFSET.placement.offsetM, 1e4, 0.5, { folds: 1, mirror: false });
    const { ratios } = new Judge(flying(FLIGHT), REPORT_FINENESS).outlineRatios(elements, Z, middles);
    // The same places by a judge whose particles stay, and may stay as far out as the flights lead.
    const still = new Judge(flying(null, OFFSET.placement.offsetM + FLIGHT.spanM), REPORT_FINENESS);
    const { nodes, weights } = gaussLegendre(40);
    const places = Array.from(middles).flatMap((x, i) =>
      i % 2 === 1 ? [] : Array.from(nodes, (t) => [x, middles[i + 1] + (FLIGHT.spanM * t) / 2]).flat(),
    );
    const read = still.outlineRatios(elements, Z, Float64Array.from(places)).ratios;
    ratios.forEach((row, s) => {
      row.forEach((ratio, p) => {
        const mean = weights.reduce(
          (sum, weight, i) => sum + (weight / 2) * read[s][p * nodes.length + i],
          0,
        );
        expect(Math.abs(ratio - mean)).toBeLessThan(1e-5);
      });
    });
  });

  it.each(SHAPES)('judge $name in a search as finely as without its symmetry', ({ shape }) => {
    const judge = new Judge(flying(FLIGHT), SEARCH_FINENESS);
    const known = judge.scoreShape(shape, Z);
    const unknown = judge.scoreShape({ ...shape, folds: 1, mirror: false }, Z);
    expect(known.ratios.length).toBeLessThan(0.7 * unknown.ratios.length);
    for (const part of ['worst', 'rms'] as const) {
      const [here, there] = [known, unknown].map(({ scores }) => scores.correction[part]);
      expect(Math.abs(here / there - 1)).toBeLessThan(part === 'worst' ? 0.01 : 0.2);
    }
  });

  it.each(SHAPES)('read $name alike for headings a fold apart', ({ shape }) => {
    const folds = Number.isFinite(shape.folds) ? shape.folds : 7;
    const [here, there] = [0, (2 * Math.PI) / folds].map((turn) => {
      const judge = new Judge(flying({ ...FLIGHT, headingRad: FLIGHT.headingRad + turn }), SEARCH_FINENESS);
      return judge.scoreShape(shape, Z).ratios;
    });
    expect(here.length).toBe(there.length);
    expect(Math.max(...here.map((ratio, i) => Math.abs(ratio - there[i])))).toBeLessThan(1e-4);
  });

  it('are read within the cone that particles are solved for, however wide the offset', () => {
    // The corner of the rectangle about these flights is 1.3 times farther out than any of them.
    const offsetM = 3.6e-4;
    const { detector, light, ...task } = flying({ spanM: 1.4e-4, headingRad: 0 }, offsetM);
    const limits = { ...detector, radiusM: [5e-5, 1e-4], distanceM: [Z, Z] } satisfies Task['detector'];
    const judge = new Judge({ ...task, light: { ...light, driftM: 0 }, detector: limits }, SEARCH_FINENESS);
    const square = { weight: 1, rings: [Float64Array.of(1e-4, 0, 0, 1e-4, -1e-4, 0, 0, -1e-4)] };
    // Few enough places, and each flight would be read for itself.
    const most = { circles: 16, steps: 300 };
    const places = samplePositions(offsetM, 5e6, 0.5, { folds: 1, mirror: false }, most);
    const { ratios } = judge.outlineRatios([square], Z, places);
    expect(ratios[0].every(Number.isFinite)).toBe(true);
  });
});
