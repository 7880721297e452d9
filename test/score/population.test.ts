import { describe, expect, it } from 'vitest';
import { readBrief } from '../../src/run/readBrief.ts';
import { SEARCH_FINENESS } from '../../src/score/fineness.ts';
import { Judge } from '../../src/score/judge.ts';
import { populationCorrection } from '../../src/score/population.ts';

const briefOf = (particles: string) =>
  readBrief(
    `
light: { wavelength: 635 nm, drift: 1 nm }
particles: [${particles}]
placement: { offset: 10 um }
detector: { distance: 20 mm, radius: 20 um to 0.4 mm }
target: { correction: 1 %, gain: free }
`,
    'a.yaml',
  );
const judgeOf = async (particles: string) => new Judge((await briefOf(particles)).task, SEARCH_FINENESS);

/** A square of 0.2 mm beside the axis. */
const SQUARE = [
  { weight: 1, rings: [Float64Array.of(-8e-5, -8e-5, 1.2e-4, -8e-5, 1.2e-4, 1.2e-4, -8e-5, 1.2e-4)] },
];

describe('populationCorrection', () => {
  it('is that of the weighted mean at its worst place, after the gain', () => {
    const populations = [
      [
        { scenario: 0, share: 0.75 },
        { scenario: 2, share: 0.25 },
      ],
    ];
    const ratios = [Float64Array.of(2, 2.2), Float64Array.of(9, 9), Float64Array.of(1.6, 2.6)];
    // Means 1.9 and 2.3, over a gain of 2.
    expect(populationCorrection(populations, ratios, 2)).toBeCloseTo(0.15, 12);
    expect(populationCorrection([], ratios, 2)).toBeNull();
  });

  it('stands in scores where the brief has a distribution, and nowhere else', async () => {
    const particles = '{ distribution: { median: 1.5 um, gsd: 1.4 }, count: 5, index: 1.59 }';
    const judge = await judgeOf(particles);
    const { gain, correction } = judge.scoreOutline(SQUARE, 0.02).scores;
    // Straight from the definition: |Σ share · reading/(gain Σ share · extinction) − 1|.
    const { ratios } = judge.outlineRatios(SQUARE, 0.02);
    let worst = 0;
    for (const wavelengthM of new Set(judge.scenarios.map((scenario) => scenario.wavelengthM))) {
      for (let place = 0; place < ratios[0].length; place++) {
        let reading = 0;
        let extinction = 0;
        judge.scenarios.forEach((scenario, s) => {
          if (scenario.wavelengthM !== wavelengthM) return;
          const weight = (scenario.particle.population?.share ?? Number.NaN) * scenario.extinctionM2;
          reading += weight * ratios[s][place];
          extinction += weight;
        });
        worst = Math.max(worst, Math.abs(reading / (gain * extinction) - 1));
      }
    }
    expect(correction.population).toBeCloseTo(worst, 12);
    expect(correction.population).toBeLessThanOrEqual(correction.worst);
    const spheres = await judgeOf('{ diameter: 1 um to 2 um, index: 1.59 }');
    expect(Object.keys(spheres.scoreOutline(SQUARE, 0.02).scores.correction)).toEqual(['worst', 'rms']);
  });

  it('of two distributions is the worse one, and spheres beside them have no part in it', async () => {
    const [a, b] = [1, 3].map(
      (um) => `{ distribution: { median: ${um} um, gsd: 1.2 }, count: 4, index: 1.59 }`,
    );
    const task = (await briefOf(`${a}, { diameter: 6 um, index: 1.33 }, ${b}`)).task;
    const at = (particles: typeof task.particles) => {
      const fixed = { ...task, particles, target: { ...task.target, gain: 'one' as const } };
      return new Judge(fixed, SEARCH_FINENESS).scoreOutline(SQUARE, 0.02).scores.correction.population;
    };
    const alone = [at(task.particles.slice(0, 4)), at(task.particles.slice(5))].map(Number);
    expect(alone[0]).not.toBeCloseTo(alone[1], 4);
    expect(at(task.particles)).toBeCloseTo(Math.max(...alone), 9);
  });
});
