import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { folderWith, runHere, SQUARE } from './runCli.ts';

const PLAIN = {
  light: '{ wavelength: 635 nm }',
  particles: '[{ diameter: 1 um to 2 um, count: 2, material: polystyrene }]',
  placement: '{ offset: 0 um }',
};

/** Runs `response` against a brief that differs from a plain one in some of its keys. */
async function respond(changes: Partial<typeof PLAIN>, ...args: string[]) {
  const keys = Object.entries({ ...PLAIN, ...changes }).map(([key, value]) => `${key}: ${value}\n`);
  const rest =
    'medium: air\ndetector: { distance: 20 mm, radius: 20 um to 2 mm }\ntarget: { correction: 3 % }\n';
  const folder = folderWith({ 'brief.yaml': keys.join('') + rest, 'square.csv': SQUARE });
  const files = [join(folder, 'brief.yaml'), '--outline', join(folder, 'square.csv')];
  const outcome = await runHere(['response', ...files, ...args]);
  return { ...outcome, files };
}

const ONE = ['--from', '1 um', '--to', '2 um', '--count', '2', '--json'];

interface Point {
  diameter_m: number;
  extinction_m2: number;
  reading_m2: number;
  correction: { least: number; most: number };
}

const pointsOf = ({ stdout }: { stdout: string }): Point[] => JSON.parse(stdout).points;

/** What `reading` says of a brief's own spheres of one diameter, as a response would put it. */
async function readHere(files: readonly string[], diameterM: number) {
  const { readings } = JSON.parse((await runHere(['reading', ...files, '--json'])).stdout);
  return readings.filter(
    (one: { particle: { diameter_m: number } }) => Math.abs(one.particle.diameter_m / diameterM - 1) < 1e-9,
  );
}

describe('rimwright response in other briefs', () => {
  it('reads several lines as the sum of their shares', async () => {
    const also = 'also: [{ wavelength: 488 nm, share: 40 % }]';
    const both = pointsOf(await respond({ light: `{ wavelength: 635 nm, ${also} }` }, ...ONE));
    const red = pointsOf(await respond({}, ...ONE));
    const blue = pointsOf(await respond({ light: '{ wavelength: 488 nm }' }, ...ONE));
    for (const [i, point] of both.entries()) {
      const share = (key: 'extinction_m2' | 'reading_m2') => 0.6 * red[i][key] + 0.4 * blue[i][key];
      expect(point.extinction_m2 / share('extinction_m2')).toBeCloseTo(1, 7);
      expect(point.reading_m2 / share('reading_m2')).toBeCloseTo(1, 5);
    }
  });

  it('refuses a material whose index is not known at every line', async () => {
    const light = '{ wavelength: 635 nm, also: [{ wavelength: 1.5 um, share: 10 % }] }';
    const particles = '[{ diameter: 1 um, index: 1.5 }]';
    const { code, stdout, stderr } = await respond({ light, particles }, ...ONE);
    expect([code, stdout]).toEqual([2, '']);
    expect(stderr).toMatch(/--material: found polystyrene in light of 635 nm to 1.5 µm, expected light from/);
  });

  it('calibrates with layered particles and with distributions, as scores do', async () => {
    const layered = '{ diameter: 2 um, core: { share: 60 %, index: 1.59 }, material: water }';
    const many = '{ distribution: { median: 1 um, gsd: 1.3 }, count: 5, material: polystyrene }';
    for (const particle of [layered, many]) {
      const outcome = await respond({ particles: `[${particle}]` }, ...ONE);
      const read = JSON.parse((await runHere(['reading', ...outcome.files, '--json'])).stdout);
      expect(JSON.parse(outcome.stdout).gain).toBe(read.design.scores.gain);
      // The reference spheres are of one material and one size whatever the brief's particles are.
      expect(pointsOf(outcome)).toEqual(pointsOf(await respond({}, ...ONE)));
    }
  });

  it('moves each reference sphere as far as the brief’s own of that size', async () => {
    for (const spread of ['20 um', '{ diffusing for: 2 s, temperature: 20 degC }']) {
      const outcome = await respond({ placement: `{ spread: ${spread} }` }, ...ONE);
      for (const { diameter_m, correction } of pointsOf(outcome)) {
        const [own] = await readHere(outcome.files, diameter_m);
        expect(own.spread_m).toBeGreaterThan(1e-6);
        expect(correction.least).toBeCloseTo(own.correction, 6);
      }
    }
    const still = pointsOf(await respond({}, ...ONE));
    const moved = pointsOf(await respond({ placement: '{ spread: 20 um }' }, ...ONE));
    expect(Math.abs(moved[0].correction.least - still[0].correction.least)).toBeGreaterThan(0.01);
  });

  it.each([
    [
      { placement: '{ spread: { diffusing for: 1 ms, temperature: 20 degC } }' },
      ['--from', '0.8 nm'],
      '--from: found 0.8 nm to 10 µm, expected diameters from 1 nm to 10 mm',
    ],
    [
      { light: '{ wavelength: 635 nm, beam: { waist: 10 um } }' },
      [],
      '--to: found 10 µm, expected smaller spheres: of light.beam.waist they ask at least 25 um, five radii',
    ],
  ])('refuses spheres that the brief’s light or motion cannot take: %j', async (changes, args, message) => {
    const { code, stdout, stderr } = await respond(changes, ...args);
    expect([code, stdout]).toEqual([2, '']);
    expect(stderr).toContain(message);
  });

  it('warns of what the smallest and the largest sphere bring', async () => {
    const slow = '{ spread: { diffusing for: 1 s, temperature: 20 degC } }';
    const args = ['--from', '1 um', '--to', '50 um', '--count', '2', '--json'];
    const { warnings } = JSON.parse((await respond({ placement: slow }, ...args)).stdout);
    expect(warnings).toHaveLength(2);
    expect(warnings[0]).toContain('particles of 50 µm');
    expect(warnings[1]).toMatch(/^Diffusion moves particles of 1 µm/);
  });
});
