import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { judgeOutline } from '../../src/run/judgeOutline.ts';
import { readBrief } from '../../src/run/readBrief.ts';
import { listReadings } from '../../src/run/readings.ts';

/** Two-degree and thirty-degree tables of the sphere of 2 µm, index 1.59, in air at 635 nm stand among the broken briefs. */
const FOLDER = fileURLToPath(new URL('../broken/briefs/', import.meta.url));

async function readingsOf(particles: string, halfWidthM = 1e-4) {
  const text = `
light: { wavelength: 635 nm }
particles: [${particles}]
detector: { distance: 20 mm, radius: 20 um to 0.4 mm }
target: { correction: 1 % }
`;
  const { task } = await readBrief(text, `${FOLDER}a.yaml`);
  const [a, b] = [-halfWidthM, halfWidthM];
  const elements = [{ weight: 1, rings: [Float64Array.of(a, a, b, a, b, b, a, b)] }];
  const given = { id: 'square', family: 'given' as const, distanceM: 0.02, elements, file: 'square.csv' };
  const { judge } = judgeOutline(task, given, null);
  return listReadings(judge, elements, 0.02);
}

const TABLED = '{ diameter: 2 um, amplitudes: thirty-degrees.csv, extinction: 8.508 um^2 }';

describe('readings', () => {
  it('of a table are those of the sphere that it was computed for', async () => {
    const [tabled, sphere] = await readingsOf(`${TABLED}, { diameter: 2 um, index: 1.59 }`);
    expect(tabled.particle).toEqual({ diameter_m: 2e-6, index: null, material: 'thirty-degrees.csv' });
    // Rows hold nine digits.
    expect(tabled.extinction_m2 / sphere.extinction_m2).toBeCloseTo(1, 8);
    expect(tabled.correction).toBeCloseTo(sphere.correction, 5);
  });

  it('of a sphere with a core name both, and are those of one sphere where both are of one index', async () => {
    const core = (index: string) => `{ diameter: 2 um, index: 1.59, core: { share: 50 %, index: ${index} } }`;
    const [coated, alike, sphere] = await readingsOf(
      `${core('1.33')}, ${core('1.59')}, { diameter: 2 um, index: 1.59 }`,
    );
    expect(coated.particle).toEqual({
      diameter_m: 2e-6,
      index: [1.59, 0],
      core: { diameter_m: 1e-6, index: [1.33, 0] },
      material: '1.33 in a shell of 1.59',
    });
    expect(alike.reading_m2 / sphere.reading_m2).toBeCloseTo(1, 10);
    expect(Math.abs(coated.extinction_m2 / sphere.extinction_m2 - 1)).toBeGreaterThan(0.05);
  });

  it('of a table that an outline reaches beyond are refused, and the table and the angle are named', async () => {
    await expect(readingsOf(TABLED, 0.01)).rejects.toThrow(
      /thirty-degrees\.csv: found amplitudes up to 30 deg, expected amplitudes up to \d+\.\d+ deg/,
    );
  });
});
