import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { presetsFolder } from '../../src/base/presetsFolder.ts';
import { constantIndex } from '../../src/optics/indexModel.ts';
import { isTabled } from '../../src/optics/particle.ts';
import { loadIndexModel } from '../../src/optics/shelf.ts';
import type { Brief } from '../../src/run/brief.ts';
import { briefToJson } from '../../src/run/briefJson.ts';
import { readBrief } from '../../src/run/readBrief.ts';
import { loadShop } from '../../src/shop/shelf.ts';

const BROKEN = new URL('../broken/briefs/', import.meta.url);
const EXPECTED: Record<string, string[]> = JSON.parse(readFileSync(new URL('expected.json', BROKEN), 'utf8'));
const BRIEFS = new URL('../../presets/briefs/', import.meta.url);

const MINIMAL = `
light: { wavelength: 635 nm }
particles: [{ diameter: 2 um, index: 1.59 }]
detector: { distance: 20 mm, radius: 20 um to 0.4 mm }
target: { correction: 1 % }
`;

async function messageFor(text: string, file: string): Promise<string> {
  try {
    await readBrief(text, file);
  } catch (error) {
    if (error instanceof RimwrightError && error.code === 'input') return error.message;
    throw error;
  }
  return 'no mistake found';
}

/** A brief with one more line in one of its sections. */
function minimalWith(section: string, line: string): string {
  const added = MINIMAL.replace(`${section}: {`, `${section}: { ${line},`);
  return added === MINIMAL ? `${MINIMAL}${section}: { ${line} }\n` : added;
}

describe('readBrief', () => {
  it('fills what a brief leaves out, and says so', async () => {
    const brief = await readBrief(MINIMAL, 'folder/shortest.yaml');
    // These are the defaults of design.md, section 5, and of the handbook.
    const expected: Brief = {
      title: 'shortest',
      task: {
        light: {
          wavelengthM: 6.35e-7,
          linewidthM: 0,
          shape: 'gaussian',
          also: [],
          driftM: 0,
          polarizationRad: null,
          sourceAngleRad: 0,
          irradianceWm2: 5e4,
          intensityNoisePerHz: 0,
        },
        medium: loadIndexModel('media', 'air', presetsFolder()),
        particles: [{ diameterM: 2e-6, index: constantIndex(1.59), material: '1.59' }],
        placement: { offsetM: 0, depthM: 0, spreadM: 0, crossing: null },
        detector: {
          distanceM: [0.02, 0.02],
          radiusM: [2e-5, 4e-4],
          responsivityAW: 0.42,
          noiseCurrentA: 2e-12,
          elements: 'several',
          gapM: 1e-5,
          balanced: false,
          commonModeLeak: 0,
        },
        target: { correction: 0.01, gain: 'one', lobe: null, timeS: null },
        shop: null,
      },
      families: ['disc', 'rings', 'ramp', 'fourier', 'polygon', 'sectors', 'grid', 'splitter'],
      tolerances: {
        edge: 'shop',
        kerf: 'shop',
        place: { law: 'rms', size: 2e-6 },
        distance: { law: 'limits', size: 2e-5 },
        tilt: { law: 'rms', size: (0.2 * Math.PI) / 180 },
        wavelength: { law: 'limits', size: 2e-10 },
        index: { law: 'limits', size: 0.002 },
        size: { law: 'rms', size: 0.01 },
        averagingS: 1,
      },
      search: { candidates: 20_000, seed: 1 },
      mediumName: 'air',
      shopName: 'none',
      uncertainties: {
        averagingS: 1e-3,
        irradiance: 0.01,
        responsivity: 0.01,
        gain: 0,
        lightDrift: 1e-6,
        nonlinearity: 1e-3,
        distanceM: 2e-5,
        wavelengthM: 1e-10,
      },
      uncertaintyDefaults: [
        'uncertainties.averaging: 1 ms',
        'uncertainties.irradiance: 1 %',
        'uncertainties.responsivity: 1 %',
        'uncertainties.gain: 0 %',
        'uncertainties.lightDrift: 0.0001 %',
        'uncertainties.nonlinearity: 0.1 %',
        'uncertainties.distance: 20 um',
        'uncertainties.wavelength: 0.1 nm',
      ],
      defaults: [
        'title: shortest',
        'light.linewidth: 0 nm',
        'light.shape: gaussian',
        'light.also: none',
        'light.drift: 0 nm',
        'light.polarization: none',
        'light.sourceAngle: 0 mrad',
        'light.irradiance: 5 W/cm^2',
        'light.beam: flat',
        'light.intensityNoise: none',
        'medium: air',
        'placement.offset: 0 um',
        'placement.depth: 0 mm',
        'placement.spread: 0 um',
        'placement.crossing: none',
        'detector.responsivity: 0.42 A/W',
        'detector.noiseCurrent: 2 pA',
        'detector.elements: several',
        'detector.gap: 10 um',
        'detector.balanced: false',
        'detector.commonModeRejection: none',
        'target.gain: one',
        'target.lobe: none',
        'target.time: none',
        'shop: none',
        'families: [disc, rings, ramp, fourier, polygon, sectors, grid, splitter]',
        'search.candidates: 20000',
        'search.seed: 1',
        'particles[0].count: 1',
      ],
      toleranceDefaults: [
        'tolerances.edge: shop',
        'tolerances.kerf: shop',
        'tolerances.place: 2 um rms',
        'tolerances.distance: 20 um',
        'tolerances.tilt: 0.2 deg rms',
        'tolerances.wavelength: 0.2 nm',
        'tolerances.index: 0.002',
        'tolerances.size: 1 % rms',
        'tolerances.averaging: 1 s',
      ],
    };
    expect(brief).toEqual(expected);
  });

  it('reads its own defaults as a brief would write them, and then leans on none', async () => {
    const {
      defaults: others,
      uncertaintyDefaults,
      toleranceDefaults,
      ...first
    } = await readBrief(MINIMAL, 'a.yaml');
    const defaults = [...others, ...uncertaintyDefaults, ...toleranceDefaults];
    const sections = new Map<string, string[]>();
    let text = MINIMAL.replace('index: 1.59', 'index: 1.59, count: 1');
    for (const line of defaults.filter((line) => !line.startsWith('particles'))) {
      const [, section, key] = /^(?:(\w+)\.)?(\w+: .*)$/.exec(line) ?? [];
      if (section === undefined) text += `${key}\n`;
      else sections.set(section, [...(sections.get(section) ?? []), key]);
    }
    for (const [section, keys] of sections) {
      const added = text.replace(`${section}: {`, `${section}: { ${keys.join(', ')},`);
      text = added === text ? `${text}${section}: { ${keys.join(', ')} }\n` : added;
    }
    expect(await readBrief(text, 'a.yaml')).toEqual({
      ...first,
      ...{ defaults: [], uncertaintyDefaults: [], toleranceDefaults: [] },
    });
  });

  it('reads the complete example', async () => {
    const text = readFileSync(new URL('road-dust.yaml', BRIEFS), 'utf8');
    const { title, task, families, search, mediumName, shopName } = await readBrief(text, 'road-dust.yaml');
    expect(title).toBe('Road-dust monitor, extinction channel');
    expect(task.light).toEqual({
      wavelengthM: 6.35e-7,
      linewidthM: 1e-9,
      shape: 'gaussian',
      also: [],
      driftM: 1e-9,
      polarizationRad: null,
      sourceAngleRad: 0,
      irradianceWm2: 5e4,
      intensityNoisePerHz: 1e-15,
    });
    expect(task.particles.map(({ diameterM }) => diameterM)).toEqual([1e-6, 2e-6, 4e-6, 2e-6]);
    expect(task.particles.map(({ material }) => material)).toEqual([
      ...Array(3).fill('polystyrene'),
      '1.5 + 0.1i',
    ]);
    expect(task.particles[3].index).toEqual(constantIndex(1.5, 0.1));
    expect(task.placement).toEqual({ offsetM: 1e-5, depthM: 0, spreadM: 0, crossing: null });
    expect(task.detector.distanceM).toEqual([0.01, 0.06]);
    expect(task.detector.radiusM).toEqual([5e-5, 2e-3]);
    expect(task.target).toEqual({ correction: 0.01, gain: 'free', lobe: 0.1, timeS: 1e-3 });
    expect(task.shop).toEqual(loadShop('photomask', presetsFolder()));
    expect({ families: families.length, ...search }).toEqual({ families: 6, candidates: 20_000, seed: 1 });
    expect([mediumName, shopName]).toEqual(['air', 'photomask']);
  });

  it.each(readdirSync(BRIEFS))('reads the example %s, which has a title', async (file) => {
    const brief = await readBrief(readFileSync(new URL(file, BRIEFS), 'utf8'), file);
    expect(brief.defaults.filter((line) => line.startsWith('title'))).toEqual([]);
    expect(brief.task.particles.length).toBeGreaterThan(0);
  });

  it('reads what a brief may write in more than one way', async () => {
    const flight = await readBrief(minimalWith('placement', 'crossing: { span: 400 um }'), 'a.yaml');
    expect(flight.task.placement.crossing).toEqual({ spanM: 4e-4, headingRad: 0 });
    expect(flight.defaults).toContain('placement.crossing.heading: 0 deg');

    const angle = await readBrief(minimalWith('light', 'polarization: 90 deg'), 'a.yaml');
    expect(angle.task.light.polarizationRad).toBe(Math.PI / 2);

    const also =
      'also: [{ wavelength: 488 nm, share: 40 % }, { wavelength: 532 nm, share: 0.1, linewidth: 2 nm }]';
    const lines = await readBrief(
      minimalWith('light', `shape: lorentzian, ${also}, sourceAngle: 2 mrad`),
      'a.yaml',
    );
    expect(lines.task.light).toMatchObject({ shape: 'lorentzian', sourceAngleRad: 0.002 });
    expect(lines.task.light.also).toEqual([
      { wavelengthM: 488e-9, share: 0.4, linewidthM: 0 },
      { wavelengthM: 532e-9, share: 0.1, linewidthM: 2e-9 },
    ]);
    expect(lines.defaults).toContain('light.also[0].linewidth: 0 nm');
    expect(lines.defaults).not.toContain('light.also[1].linewidth: 0 nm');

    const water = await readBrief(`${MINIMAL}medium: 1.332\n`, 'a.yaml');
    expect(water.task.medium).toEqual(constantIndex(1.332));
    expect(water.mediumName).toBe('1.332');

    const ratio = await readBrief(MINIMAL.replace('1 %', '0.01'), 'a.yaml');
    expect(ratio.task.target.correction).toBe(0.01);

    const sizes = await readBrief(MINIMAL.replace('2 um', '1 um to 10 um, count: 5'), 'a.yaml');
    const diameters = sizes.task.particles.map(({ diameterM }) => diameterM);
    expect(diameters[0]).toBe(1e-6);
    expect(diameters[4]).toBe(1e-5);
    for (let i = 1; i < 5; i++) expect(diameters[i] / diameters[i - 1]).toBeCloseTo(10 ** 0.25, 12);
  });

  it('reads spheres with a core', async () => {
    const text = MINIMAL.replace('index: 1.59', 'material: water, core: { share: 60 %, index: 1.5 + 0.1i }');
    const [particle] = (await readBrief(text, 'a.yaml')).task.particles;
    expect(particle).toEqual({
      diameterM: 2e-6,
      index: loadIndexModel('materials', 'water', presetsFolder()),
      material: '1.5 + 0.1i in a shell of water',
      core: { share: 0.6, index: constantIndex(1.5, 0.1) },
    });
  });

  it('reads distributions of sizes, log-normal and counted, each with its shares', async () => {
    const folder = fileURLToPath(BROKEN);
    const entries = [
      '{ distribution: { median: 2 um, gsd: 1.6 }, index: 1.59 }',
      '{ distribution: counts.csv, index: 1.33, core: { share: 0.5, index: 1.59 } }',
    ];
    const text = MINIMAL.replace('{ diameter: 2 um, index: 1.59 }', entries.join(', '));
    const { task, defaults } = await readBrief(text, `${folder}a.yaml`);
    expect(defaults.filter((line) => line.startsWith('particles'))).toEqual(['particles[0].count: 9']);
    const populations = task.particles.map(({ population }) => population);
    expect(populations.map((one) => one?.of)).toEqual([...Array(9).fill(0), 1, 1, 1]);
    expect(task.particles.slice(9).map(({ diameterM }) => diameterM)).toEqual([5e-7, 1e-6, 2e-6]);
    expect(populations[10]?.share).toBeCloseTo(340 / 550, 12);
    expect(task.particles[4].diameterM).toBeCloseTo(2e-6, 12);
    expect(task.particles[10].core?.share).toBe(0.5);
  });

  it('reads tables of amplitudes beside the brief, or in the folder given, and sends them whole', async () => {
    const folder = fileURLToPath(BROKEN);
    const entry = 'diameter: 2 um, amplitudes: thirty-degrees.csv, extinction: 8.508 um^2';
    const text = MINIMAL.replace('diameter: 2 um, index: 1.59', entry);
    const brief = await readBrief(text, `${folder}a.yaml`);
    const [particle] = brief.task.particles;
    expect(particle).toMatchObject({ diameterM: 2e-6, material: 'thirty-degrees.csv' });
    expect(isTabled(particle) && particle.amplitudes.angles.length).toBe(31);
    expect(structuredClone(brief)).toEqual(brief);
    expect((await readBrief(text, 'a.yaml', presetsFolder(), folder)).task).toEqual(brief.task);
    const [told] = briefToJson(brief).task.particles;
    expect(told).toMatchObject({ amplitudes: { rows: 31 } });
    expect(JSON.parse(JSON.stringify(told))).toEqual(told);
  });

  it('can be sent to a worker', async () => {
    const text = readFileSync(new URL('spray-droplets.yaml', BRIEFS), 'utf8');
    const brief = await readBrief(text, 'a.yaml');
    expect(structuredClone(brief)).toEqual(brief);
    expect(JSON.parse(JSON.stringify(brief))).toEqual(brief);
  });

  it('keeps spheres to what Mie series can compute', async () => {
    // Size parameter π · d · n / λ from 0.001 to 20 000: at 635 nm in an index of 1, d from 0.2021 nm to 4.0425 mm.
    const sphere = (diameter: string) =>
      messageFor(`${MINIMAL.replace('2 um', diameter)}medium: 1.0\n`, 'a.yaml');
    expect(await sphere('0.203 nm')).toBe('no mistake found');
    expect(await sphere('0.202 nm')).toContain('size parameter');
    expect(await sphere('4.04 mm')).toBe('no mistake found');
    expect(await sphere('4.05 mm')).toContain('size parameter');
  });
});

describe('readBrief refuses', () => {
  it.each(Object.entries(EXPECTED))('broken/briefs/%s', async (file, messages) => {
    const text = readFileSync(new URL(file, BROKEN), 'utf8');
    // By its whole path, since some briefs name files beside them.
    const folder = fileURLToPath(BROKEN);
    const message = await messageFor(text, `${folder}${file}`);
    expect(message.replaceAll(folder, '')).toBe(messages.map(withShelf).join('\n'));
  });

  it('each broken brief for a reason that stands beside it', () => {
    const files = readdirSync(BROKEN).filter((file) => file.endsWith('.yaml'));
    expect(files.sort()).toEqual(Object.keys(EXPECTED));
  });

  it('a text beyond 1 MB', async () => {
    const message = await messageFor(`${MINIMAL}# ${'x'.repeat(1_000_000)}`, 'a.yaml');
    expect(message).toMatch(/^a.yaml: found 10\d+ bytes, expected at most 1000000 bytes$/);
  });

  it('a flood of unknown keys, of which it lists fifty', async () => {
    const flood = Array.from({ length: 2_000 }, (_, i) => `k${i}: 1\n`).join('');
    expect((await messageFor(MINIMAL + flood, 'a.yaml')).split('\n')).toHaveLength(50);
  });

  it('a file name that cannot serve as a title', async () => {
    expect(await messageFor(MINIMAL, 'a\nb.yaml')).toContain(
      'title: found nothing, expected one line of text',
    );
  });

  it('keys that are no words, in one line each', async () => {
    const message = await messageFor(`${MINIMAL}"two\\nlines": 1\n__proto__: 1\nconstructor: 1\n`, 'a.yaml');
    expect(message.split('\n').map((line) => line.slice(0, 24))).toEqual([
      'a.yaml:6: "two\\nlines": ',
      'a.yaml:7: __proto__: fou',
      'a.yaml:8: constructor: f',
    ]);
  });
});

describe('readBrief throws nothing but its own error', () => {
  const scalar = fc.oneof(
    fc.constantFrom(
      '635 nm',
      '1 um to 4 um',
      '1 %',
      'none',
      'air',
      'polystyrene',
      '1.5 + 0.1i',
      'free',
      '-1 mm',
    ),
    fc.double(),
    fc.integer(),
    fc.string(),
    fc.constant(null),
    fc.boolean(),
  );

  it('whatever the text', async () => {
    const text = fc.oneof(fc.string(), fc.string({ unit: 'binary' }));
    await fc.assert(
      fc.asyncProperty(text, async (sample) => {
        expect(await messageFor(sample, 'random.yaml')).not.toBe('no mistake found');
      }),
      { numRuns: 300 },
    );
  });

  it('whatever stands at a key', async () => {
    const paths = ['title', 'medium', 'shop', 'families', 'particles', 'light', 'placement'].concat(
      ['light.wavelength', 'light.drift', 'light.intensityNoise', 'placement.depth', 'placement.crossing'],
      ['detector.distance', 'detector.radius', 'target.correction', 'target.lobe', 'search.seed'],
      [
        'particles.0',
        'particles.0.diameter',
        'particles.0.index',
        'particles.0.material',
        'particles.0.count',
      ],
    );
    const value = fc.oneof(scalar, fc.array(scalar, { maxLength: 3 }), fc.dictionary(fc.string(), scalar));
    const base = {
      light: { wavelength: '635 nm' },
      particles: [{ diameter: '2 um', index: 1.59 }],
      placement: {},
      detector: { distance: '20 mm', radius: '20 um to 0.4 mm' },
      target: { correction: '1 %' },
      search: {},
    };
    await fc.assert(
      fc.asyncProperty(fc.constantFrom(...paths), value, async (path, replacement) => {
        const brief: Record<string, unknown> = structuredClone(base);
        const keys = path.split('.');
        let place = brief;
        for (const key of keys.slice(0, -1)) place = place[key] as Record<string, unknown>;
        place[keys[keys.length - 1]] = replacement;
        await messageFor(JSON.stringify(brief), 'random.yaml'); // JSON is YAML
      }),
      { numRuns: 300 },
    );
  });
});

/** Expected messages do not repeat the names on the shelf, which may grow. */
function withShelf(message: string): string {
  return message.replace(/\{(media|materials|shops)\}/, (_match, kind) =>
    readdirSync(`${presetsFolder()}/${kind}`)
      .map((file) => file.replace(/\.yaml$/, ''))
      .sort()
      .join(', '),
  );
}
