import { describe, expect, it } from 'vitest';
import type { Brief } from '../../src/run/brief.ts';
import { endingText } from '../../src/run/ending.ts';
import { hintsFor } from '../../src/run/hints.ts';
import type { Design } from '../../src/score/design.ts';
import { presetBrief } from '../score/presetTasks.ts';

const NOMINAL = await presetBrief('nominal-sphere');

/** A brief with every limit: 1 %, lobe 10 %, 1 ms, 20 µm to 400 µm, 10 mm to 30 mm. */
const BRIEF: Brief = {
  ...NOMINAL,
  task: {
    ...NOMINAL.task,
    target: { correction: 0.01, gain: 'free', lobe: 0.1, timeS: 1e-3 },
    detector: { ...NOMINAL.task.detector, distanceM: [0.01, 0.03], radiusM: [2e-5, 4e-4] },
    shop: null,
  },
};

interface Parts {
  worst?: number;
  lobe?: number;
  time?: number;
  radius?: number;
  distance?: number;
}

/** A design that lies at no limit but where it is said to. */
function design({ worst = 0.005, lobe = 0.02, time = 1e-4, radius = 1e-4, distance = 0.02 }: Parts): Design {
  return {
    family: 'disc',
    distanceM: distance,
    elements: [{ weight: 1, rings: [Float64Array.of(0, 0, 1e-5, 0, 1e-5, 1e-5, 0, 1e-5)] }],
    scores: {
      gain: 1,
      correction: { worst, rms: worst / 2 },
      lobe: { ratio: lobe },
      snr: { required: 1e5, time_s: time },
      area_m2: 1e-8,
      radius_m: radius,
      areaOverFloor: 2,
    },
    fields: 'exact',
    shop: { fits: true, notes: [], misfit: 0 },
  };
}

describe('hintsFor', () => {
  it('has nothing to say where nothing binds', () => {
    expect(hintsFor(BRIEF, [design({}), design({})], 0.01)).toEqual([]);
  });

  it.each<[Parts, string]>([
    [{ lobe: 0.098 }, 'target.lobe: 1 of 2 designs lie at 10 %, a higher limit may lead further'],
    [{ time: 0.99e-3 }, 'target.time: 1 of 2 designs lie at 1 ms, a longer time may lead further'],
    [{ radius: 3.95e-4 }, 'detector.radius: 1 of 2 designs lie at 400 µm, a larger one may lead further'],
    [{ radius: 2e-5 }, 'detector.radius: 1 of 2 designs lie at 20 µm, a smaller one may lead further'],
    [{ distance: 0.03 }, 'detector.distance: 1 of 2 designs lie at 30 mm, a longer one may lead further'],
    [{ distance: 0.01 }, 'detector.distance: 1 of 2 designs lie at 10 mm, a shorter one may lead further'],
  ])('%j', (parts, expected) => {
    expect(hintsFor(BRIEF, [design({}), design(parts)], null)).toEqual([expected]);
  });

  it('says where designs read worst at the edge of where the particle may be', () => {
    const { placement } = BRIEF.task;
    const brief = {
      ...BRIEF,
      task: { ...BRIEF.task, placement: { ...placement, offsetM: 1e-5, depthM: 1e-3 } },
    };
    const worstAt = (position_m: [number, number], depth_m: number): Design => {
      const one = design({});
      const certifiedAt = { diameter_m: 2e-6, material: '1.59', wavelength_m: 6.35e-7, depth_m, position_m };
      const correction = { ...one.scores.correction, certified: 0.006, certifiedAt };
      return { ...one, scores: { ...one.scores, correction } };
    };
    const shown = [worstAt([6e-6, -8e-6], 0), worstAt([1e-6, 0], -1e-3), design({})];
    expect(hintsFor(brief, shown, null)).toEqual([
      'placement.offset: 1 of 3 designs read worst at 10 µm, less may lead further',
      'placement.depth: 1 of 3 designs read worst at 1 mm, less may lead further',
    ]);
    expect(hintsFor(BRIEF, shown, null)).toEqual([]);
  });

  it('counts those that meet the target, and what misses a limit does not lie at it', () => {
    const missing = design({ lobe: 0.099, worst: 0.02 });
    expect(hintsFor(BRIEF, [design({}), missing], null)).toEqual([]);
    expect(hintsFor(BRIEF, [missing], null)).toHaveLength(1);
    expect(hintsFor(BRIEF, [design({ lobe: 0.2 })], null)).toEqual([]);
  });

  it('says what a looser target buys, by a design that was found and that it would let through', () => {
    const looser = design({ worst: 0.02341, time: 5e-5 });
    const [hint] = hintsFor(BRIEF, [looser, design({})], null);
    expect(hint).toBe('target.correction: 2.35 % would do with 50 µs in place of 100 µs');
    const loose = { ...BRIEF, task: { ...BRIEF.task, target: { ...BRIEF.task.target, correction: 0.0235 } } };
    expect(hintsFor(loose, [looser], null)).toEqual([]);
    // Hardly faster, or beyond another limit as well, it is no reason.
    expect(hintsFor(BRIEF, [design({ worst: 0.02, time: 0.95e-4 }), design({})], null)).toEqual([]);
    expect(hintsFor(BRIEF, [design({ worst: 0.02, time: 5e-5, lobe: 0.2 }), design({})], null)).toEqual([]);
  });

  it('names what the brief keeps out, the shop, and a front that still moves', () => {
    const { task } = BRIEF;
    const shop = {
      ...NOMINAL.task.shop,
      name: 'mine',
      smallestOpeningM: 1e-5,
      smallestWebM: 1e-5,
    } as NonNullable<Brief['task']['shop']>;
    const brief: Brief = {
      ...BRIEF,
      families: ['disc', 'rings'],
      task: {
        ...task,
        shop,
        detector: { ...task.detector, elements: 'one' },
        target: { ...task.target, gain: 'one' },
      },
    };
    expect(hintsFor(brief, [design({})], 0.05)).toEqual([
      `search.candidates: the front has not come to rest, more than ${brief.search.candidates} may take it further`,
      'shop: the design lies at the smallest widths of mine, a finer process may lead further',
      'target.gain: free would let one calibrated factor for all particles be taken out',
      'detector.elements: several would let weighted elements be tried',
      'families: ramp, fourier, polygon, sectors, grid, splitter were not looked at',
    ]);
  });
});

describe('endingText', () => {
  it.each([
    [
      'spent',
      0.071,
      'The search ended because its candidates were spent: 90 of 100 candidates were tried, the others were kept for repairs. In their last quarter the front moved by 7.1 %.',
    ],
    [
      'settled',
      0,
      'The search ended because every lap had settled: 90 of 100 candidates were tried. In their last quarter the front moved by less than 0.01 %.',
    ],
    ['interrupted', null, 'The search was interrupted: 90 of 100 candidates were tried.'],
  ] as const)('%s', (reason, movedInLastQuarter, expected) => {
    expect(endingText({ reason, movedInLastQuarter, hints: [] }, 90, 100)).toBe(expected);
  });

  it('keeps nothing for repairs where all candidates were tried', () => {
    const ending = { reason: 'spent' as const, movedInLastQuarter: null, hints: [] };
    expect(endingText(ending, 100, 100)).toBe(
      'The search ended because its candidates were spent: 100 of 100 candidates were tried.',
    );
  });
});
