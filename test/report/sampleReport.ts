import type { ReportDesign, ReportInput } from '../../src/report/reportInput.ts';
import { regularRing, SAMPLES } from '../draw/sampleDrawings.ts';

/** A design with made-up but possible scores; a part of them may be replaced. */
export function sampleDesign(
  id: string,
  elements: ReportDesign['elements'],
  scores: Partial<ReportDesign['scores']> = {},
): ReportDesign {
  const correction = scores.correction ?? { worst: 0.009, rms: 0.004 };
  return {
    id,
    family: 'rings',
    rank: 1,
    distanceM: 0.02,
    elements,
    scores: {
      gain: 1,
      correction,
      lobe: { ratio: 0.04 },
      snr: { required: 1.2e5, time_s: 3.2e-5 },
      area_m2: 1.67e-8,
      radius_m: 205.6e-6,
      areaOverFloor: 1.31,
      shop: { fits: true, notes: ['The narrowest ring is 1.3 µm wide.'] },
      ...scores,
    },
    meetsTarget: correction.worst <= 0.01,
  };
}

export const SAMPLE_REPORT: ReportInput = {
  title: 'Road-dust monitor',
  briefText: 'title: Road-dust monitor\nlight:\n  wavelength: 635 nm\n',
  defaults: ['light.drift: 0 nm'],
  warnings: [],
  designs: [
    sampleDesign('rings-1', SAMPLES.annulus.elements),
    sampleDesign('zones-2', SAMPLES.zones.elements, { gain: 5.998, correction: { worst: 0.03, rms: 0.01 } }),
    {
      ...sampleDesign('disc-3', [{ weight: 1, rings: [regularRing(112.7e-6, 64)] }]),
      family: 'disc',
      rank: 2,
    },
  ],
  wavelengthMediumM: 635e-9,
  offsetM: 10e-6,
  targetCorrection: 0.01,
  evaluations: 20012,
  ending: 'The search ended because its candidates were spent: 19520 of 20000 candidates were tried.',
  hints: ['target.lobe: 2 of 7 designs lie at 10 %, a higher limit may lead further'],
  seed: 7,
  candidates: 20000,
  version: '0.1.0',
};
