import { describe, expect, it } from 'vitest';
import { standardUncertainty } from '../../src/metrology/distribution.ts';
import { ringsRadius } from '../../src/outline/area.ts';
import { diameterCurve } from '../../src/run/diameterCurve.ts';
import { expectedReadings } from '../../src/run/expectedReadings.ts';
import type { GivenDesign } from '../../src/run/givenDesign.ts';
import { correctionDistribution, instrumentOf } from '../../src/run/instrument.ts';
import { judgeOutline } from '../../src/run/judgeOutline.ts';
import { readBrief } from '../../src/run/readBrief.ts';
import type { SphereKind } from '../../src/run/sphereLike.ts';
import { measurementTime } from '../../src/score/cost.ts';

const BRIEF = `light: { wavelength: 635 nm, intensityNoise: -150 }
medium: 1.0
particles: [{ diameter: 1 um to 4 um, index: 1.59 }]
placement: { offset: 3 um }
detector: { distance: 20 mm, radius: 20 um to 1 mm }
target: { correction: 3 %, gain: free }
`;

const disc = (radiusM: number) =>
  Float64Array.from({ length: 240 }, (_, i) => {
    const angle = (2 * Math.PI * Math.floor(i / 2)) / 120;
    return radiusM * (i % 2 === 0 ? Math.cos(angle) : Math.sin(angle));
  });
const design = (elements: GivenDesign['elements']): GivenDesign => ({
  ...{ id: 'disc', family: 'given', distanceM: 0.02, file: 'disc', elements },
});
const PLAIN = design([{ weight: 1, rings: [disc(1.127e-4)] }]);

describe('expectedReadings', () => {
  it('are those of a judge, whatever particles stand beside', async () => {
    const { task } = await readBrief(BRIEF, 'b.yaml');
    const { judge } = judgeOutline(task, PLAIN, null);
    const { ratios } = judge.outlineRatios(PLAIN.elements, 0.02);
    const [sphere] = task.particles;
    const many = Array.from({ length: 40 }, (_, i) => ({ ...sphere, diameterM: 1e-6 + i * 1e-8 }));
    const found = expectedReadings(task, PLAIN, 0.02, [...task.particles, ...many, sphere] as never, 'far');
    expect(found).toHaveLength(44);
    task.particles.forEach((_, i) => {
      const { extinctionM2 } = judge.scenarios[i];
      const mean = ratios[i].reduce((sum, ratio) => sum + ratio, 0) / ratios[i].length;
      expect(found[i].extinctionM2 / extinctionM2).toBeCloseTo(1, 9);
      // Places are sampled more coarsely.
      expect(found[i].meanM2 / (mean * extinctionM2)).toBeCloseTo(1, 3);
      expect(found[i].leastM2).toBeLessThanOrEqual(found[i].meanM2);
      expect(found[i].mostM2).toBeGreaterThanOrEqual(found[i].meanM2);
    });
    expect(found[43].meanM2 / found[0].meanM2).toBeCloseTo(1, 6);
  });
});

describe('instrumentOf', () => {
  it('has the power and the noise of its detector', async () => {
    const brief = await readBrief(BRIEF, 'b.yaml');
    const { instrument, powerW, scores } = instrumentOf(brief, PLAIN, null, 'far');
    expect(powerW / (5e4 * scores.area_m2)).toBeCloseTo(1, 9);
    // Two readings averaged over the design's own time are uncertain by the target correction of the smallest extinction.
    const { time_s } = scores.snr;
    const noise = Math.sqrt(instrument.noiseW2Hz / time_s);
    const { judge } = judgeOutline(brief.task, PLAIN, null);
    const least = Math.min(...judge.scenarios.map(({ extinctionM2 }) => extinctionM2));
    expect(noise / (0.03 * 5e4 * scores.gain * least)).toBeCloseTo(1, 9);
    expect(
      measurementTime([{ weight: 1, areaM2: scores.area_m2 }], 0.03, scores.gain, least, {
        ...{ responsivityAW: 0.42, irradianceWm2: 5e4, noiseCurrentA: 2e-12, intensityNoisePerHz: 1e-15 },
      }) / time_s,
    ).toBeCloseTo(1, 9);
  });

  it('feels the distance as the readings themselves do', async () => {
    const brief = await readBrief(BRIEF, 'b.yaml');
    const wide = design([{ weight: 1, rings: [disc(0.9e-4)] }]);
    const [, sphere] = brief.task.particles;
    const { instrument } = instrumentOf(brief, wide, null, 'far', [sphere]);
    const at = (distanceM: number) =>
      expectedReadings(brief.task, wide, distanceM, [sphere], 'far')[0].meanM2;
    const slope = (at(0.0201) - at(0.0199)) / (0.0002 * at(0.02));
    expect(instrument.distance.slope / Math.abs(slope)).toBeCloseTo(1, 2);
    expect(instrument.distance.atM).toBe(0.02);
  });

  it('lets elements of both weights cancel the light', async () => {
    const brief = await readBrief(BRIEF, 'b.yaml');
    const inner = disc(1.127e-4);
    const outer = disc(1.127e-4 * Math.SQRT2);
    const ring = { weight: -1, rings: [outer, inner.toReversed()] };
    // Reversed point by point: x and y keep their places.
    for (let i = 0; i < ring.rings[1].length; i += 2) {
      const [y, x] = ring.rings[1].subarray(i, i + 2);
      ring.rings[1].set([x, y], i);
    }
    const both = design([{ weight: 1, rings: [inner] }, ring]);
    expect(ringsRadius(ring.rings)).toBeCloseTo(1.594e-4, 6);
    const { powerW, instrument } = instrumentOf(brief, both, null, 'far');
    const plain = instrumentOf(brief, PLAIN, null, 'far');
    expect(Math.abs(powerW)).toBeLessThan(1e-6 * plain.powerW);
    // Shot noise adds up all the same; the common noise of the light does not.
    expect(instrument.noiseW2Hz).toBeLessThan(plain.instrument.noiseW2Hz);
    expect(instrument.noiseW2Hz).toBeGreaterThan((2 * 2 * 1.6e-19 * plain.powerW) / 0.42);
  });
});

describe('correctionDistribution', () => {
  it.each([
    ['rectangular', 0.02, 0.01, 0.02 / Math.sqrt(3)],
    ['arcsine', 0.02, 0.013, 0.02 / Math.SQRT2],
    // Off to one side everywhere: the rms itself.
    ['arcsine', 0.02, 0.0199, 0.0199],
  ])('is %s for a worst of %d and an rms of %d', (kind, worst, rms, expected) => {
    const distribution = correctionDistribution({ correction: { worst, rms } });
    expect(distribution.kind).toBe(kind);
    expect(standardUncertainty(distribution)).toBeCloseTo(expected, 12);
    expect(standardUncertainty(distribution)).toBeGreaterThanOrEqual(rms * (1 - 1e-12));
  });
});

describe('diameterCurve', () => {
  it('is what a response shows, and nearly the same from few readings', async () => {
    const brief = await readBrief(BRIEF, 'b.yaml');
    const built = instrumentOf(brief, PLAIN, null, 'far');
    const [sphere] = brief.task.particles;
    const kind = { index: sphere.index, material: '1.59' } as SphereKind;
    const full = diameterCurve(built, kind, 1);
    const usual = diameterCurve(built, kind);
    const sparse = diameterCurve(built, kind, 40);
    expect(full.rangeM).toEqual([1e-6, 4e-6]);
    expect(full.diametersM.at(0)).toBeCloseTo(0.8e-6, 12);
    expect(full.diametersM.at(-1)).toBeCloseTo(5e-6, 12);
    expect(full.diametersM).toContain(4e-6);
    const farthest = ({ shownM2 }: typeof full) =>
      shownM2.reduce((most, shown, i) => Math.max(most, Math.abs(full.shownM2[i] / shown - 1)), 0);
    expect(farthest(usual)).toBeLessThan(0.001);
    expect(farthest(sparse)).toBeLessThan(0.0015);
    const at = full.diametersM.indexOf(4e-6);
    const [{ meanM2 }] = expectedReadings(brief.task, PLAIN, 0.02, [brief.task.particles[2]], 'far');
    expect(full.shownM2[at] * built.scores.gain).toBeCloseTo(meanM2, 18);
  });
});
