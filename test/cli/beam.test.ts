import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { presetText } from '../../src/base/presetFiles.ts';
import { presetsFolder } from '../../src/base/presetsFolder.ts';
import { mieCoefficients } from '../../src/optics/mieCoefficients.ts';
import { polygonRule, quadratureReading } from '../reading/beamQuadrature.ts';
import { square } from '../reading/setup.ts';
import { folderWith, runCli, runHere } from './runCli.ts';

const BRIEF = `title: Focused
light: { wavelength: 635 nm, beam: { waist: 100 um, focus: -5 mm } }
medium: 1.0
particles: [{ diameter: 2 um, index: 1.59 }]
detector: { distance: 20 mm, radius: 20 um to 0.4 mm }
target: { correction: 1 % }
`;
/** Half a side of 200 µm. */
const HALF_M = 100e-6;
const OUTLINE = 'x_mm,y_mm\n-0.1,-0.1\n0.1,-0.1\n0.1,0.1\n-0.1,0.1\n';

async function read(...args: string[]) {
  const folder = folderWith({ 'brief.yaml': BRIEF, 'square.csv': OUTLINE });
  const files = [join(folder, 'brief.yaml'), '--outline', join(folder, 'square.csv')];
  return runHere(['reading', ...files, '--json', ...args]);
}

describe('rimwright in a focused beam', () => {
  it.each([
    ['on the axis', [], [0, 0]],
    ['beside it', ['--position', '40 um, -30 um'], [40e-6, -30e-6]],
  ] as const)(
    'reads as direct quadrature over the plane does (beamQuadrature): %s',
    async (_name, args, [x, y]) => {
      const { code, stdout } = await read(...args);
      expect(code).toBe(0);
      const [reading] = JSON.parse(stdout).readings;
      const k = (2 * Math.PI) / 635e-9;
      const set = {
        wavenumber: k,
        waistM: 100e-6,
        focusM: -5e-3,
        planeM: 0.02,
        place: [x, y, 0] as const,
        sphere: mieCoefficients(k * 1e-6, [1.59, 0]),
      };
      const quadrature = quadratureReading(set, polygonRule(square(HALF_M), 40, 40));
      expect(Math.abs(reading.reading_m2 - quadrature) / reading.extinction_m2).toBeLessThan(1e-4);
      // w² = w0²(1 + (5 mm/z_R)²) at the particle (Kogelnik & Li 1966, eq. 20).
      const w2 = 1e-8 * (1 + (5e-3 / ((k * 1e-8) / 2)) ** 2);
      expect(reading.local_irradiance).toBeCloseTo(Math.exp((-2 * (x * x + y * y)) / w2), 9);
    },
  );

  it('reads the exact fields', async () => {
    const { code, stdout } = await read('--exact');
    expect([code, JSON.parse(stdout).fields]).toEqual([0, 'exact']);
  });

  it('reads rough edges as the closed estimate has it', async () => {
    const { code, stdout } = await read('--rough', '0.5 um, 5 um', '--position', '40 um, -30 um');
    expect(code).toBe(0);
    const [{ first }] = JSON.parse(stdout).rough.readings;
    expect(first.spread / first.estimate.spread).toBeGreaterThan(0.6);
    expect(first.spread / first.estimate.spread).toBeLessThan(1.6);
    expect(Math.abs(first.mean - first.estimate.mean)).toBeLessThan(first.estimate.spread);
  });

  it('reads a second line and a source of an angular size', async () => {
    const light = 'also: [{ wavelength: 532 nm, share: 40 % }], sourceAngle: 1 mrad, beam:';
    const folder = folderWith({ 'brief.yaml': BRIEF.replace('beam:', light), 'square.csv': OUTLINE });
    const files = [join(folder, 'brief.yaml'), '--outline', join(folder, 'square.csv')];
    const { code, stdout } = await runHere(['reading', ...files, '--json']);
    expect(code).toBe(0);
    expect(JSON.parse(stdout).readings[0].local_irradiance).toBeCloseTo(1, 12);
  });

  it('searches the brief of the shelf', async () => {
    const { text: whole } = presetText('briefs', 'tight-focus', presetsFolder());
    const folder = folderWith({ 'tight-focus.yaml': `${whole}families: [disc]\n` });
    const brief = join(folder, 'tight-focus.yaml');
    const args = ['search', brief, '--candidates', '100', '--workers', '1', '--quiet', '--out', folder];
    const { code } = await runCli(args, folder);
    expect(code).toBe(0);
    const text = readFileSync(join(folder, 'latex-beads-in-a-focused-beam', 'front.json'), 'utf8');
    const { designs } = JSON.parse(text);
    expect(designs.length).toBeGreaterThan(0);
    for (const { fields, otherFields } of designs) {
      expect(fields).toBe('far');
      expect(otherFields.difference).toBeLessThan(1e-3);
    }
  });
});
