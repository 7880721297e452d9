import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { drawGiven, FILE_FORMATS, givenDrawing } from '../../src/cli/designDrawing.ts';
import { constantIndex } from '../../src/optics/indexModel.ts';
import { ringArea } from '../../src/outline/area.ts';
import { readDxf } from '../../src/outline/files/readDxf.ts';
import { readSvg } from '../../src/outline/files/readSvg.ts';
import { orientElement } from '../../src/outline/nesting.ts';
import type { OutlineElement } from '../../src/outline/shape.ts';
import { shapePoints } from '../../src/outline/shapePoints.ts';
import { readDesignFile } from '../../src/run/readDesignFile.ts';
import { REPORT_FINENESS } from '../../src/score/fineness.ts';
import { Judge } from '../../src/score/judge.ts';
import { drawn, someValues, UNIT_M, variantNamed } from '../outline/drawings.ts';
import { circle, dxfText } from '../outline/files/dxfText.ts';

/** One or two variants of every family, with holes and several pieces among them. */
const NAMES = [
  'disc',
  'rings-1',
  'rings-3-open',
  'ramp-saw-5-fold',
  'ramp-peak-4-fold',
  'polygon-star-5',
  'polygon-free-1-fold-9',
  'sectors-hub-3-fold-2',
  'sectors-arc-3-fold-2',
  'fourier-square-3-fold-6',
  'rings-weighted-apart-3',
  'grid-3-by-5',
  'splitter-2',
  'fourier-square-1-fold-6-sines',
];
const DISTANCE_M = 0.02;
/** On the axis, and off it in no direction that the outlines know. */
const PLACES = Float64Array.of(0, 0, 13e-6, -7e-6);

const JUDGE = new Judge(
  {
    light: {
      wavelengthM: 635e-9,
      linewidthM: 0,
      driftM: 0,
      polarizationRad: null,
      irradianceWm2: 5e4,
      intensityNoisePerHz: 0,
    },
    medium: constantIndex(1),
    particles: [{ diameterM: 2e-6, index: constantIndex(1.59), material: '1.59' }],
    placement: { offsetM: 15e-6, depthM: 0, spreadM: 0, crossing: null },
    detector: { distanceM: [0.02, 0.02], radiusM: [2e-5, 4e-4], responsivityAW: 0.42, noiseCurrentA: 2e-12 },
    target: { correction: 0.01, gain: 'one', lobe: null, timeS: null },
    shop: null,
  },
  REPORT_FINENESS,
);

const FOLDER = mkdtempSync(join(tmpdir(), 'rimwright-test-'));
afterAll(() => rmSync(FOLDER, { recursive: true, force: true }));

function outlineNamed(name: string): OutlineElement[] {
  const variant = variantNamed(name);
  const random = randomStream(name.length, 7);
  const elements = shapePoints(drawn(variant, someValues(variant, random, 0), UNIT_M), 720);
  // Only JSON keeps planes and parts of the light, which the last test is about.
  return elements.map(({ distanceM: _, share: __, ...element }) => orientElement(element));
}

const areaOf = (elements: readonly OutlineElement[]) =>
  elements.reduce(
    (sum, { weight, rings }) => sum + weight * rings.reduce((part, ring) => part + ringArea(ring), 0),
    0,
  );

const readingsOf = (elements: readonly OutlineElement[]) =>
  JUDGE.outlineRatios(elements, DISTANCE_M, PLACES).ratios[0];

/** Writes an outline in a format, reads that file, and gives what came back. */
function throughFile(elements: readonly OutlineElement[], format: (typeof FILE_FORMATS)[number], id: string) {
  const given = { id, family: 'given', distanceM: DISTANCE_M, elements, file: '' } as const;
  const content = drawGiven(format, givenDrawing(given, DISTANCE_M, null), given);
  const path = join(FOLDER, `${id}.${format.toUpperCase()}`);
  writeFileSync(path, content);
  return readDesignFile(path);
}

describe('an outline through a file', () => {
  for (const name of NAMES) {
    it.each(FILE_FORMATS)(`keeps its area and its reading: ${name} as %s`, (format) => {
      const elements = outlineNamed(name);
      const back = throughFile(elements, format, name);
      expect(back.elements.map(({ weight, rings }) => [weight, rings.length])).toEqual(
        elements.map(({ weight, rings }) => [weight, rings.length]),
      );
      expect(Math.abs(areaOf(back.elements) / areaOf(elements) - 1)).toBeLessThan(1e-6);
      const readings = readingsOf(elements);
      readingsOf(back.elements).forEach((reading, i) => {
        expect(Math.abs(reading - readings[i])).toBeLessThan(1e-5);
      });
    });
  }

  it.each(FILE_FORMATS)('keeps elements and their weights: %s', (format) => {
    const [inner] = outlineNamed('disc');
    const scaled = (ring: Float64Array, factor: number) => ring.map((value) => factor * value);
    const elements = [
      { weight: 1, rings: inner.rings },
      { weight: -0.3333333333, rings: [scaled(inner.rings[0], 1.4), inner.rings[0].map((v) => 1.2 * v)] },
    ].map(orientElement);
    const back = throughFile(elements, format, `weights-${format}`);
    expect(back.elements.map(({ weight }) => weight)).toEqual([1, -0.3333333333]);
    expect(Math.abs(areaOf(back.elements) / areaOf(elements) - 1)).toBeLessThan(1e-6);
  });

  it.each([0.1, 0.35])('reads curves of %f mm as finely cut ones do', (radiusMm) => {
    // 40 000 sides leave nothing to wish for: a chord is off by 1e-9 of the radius.
    const finely = (rx: number, ry: number) =>
      Float64Array.from({ length: 80_000 }, (_, i) => {
        const angle = (2 * Math.PI * (i >> 1)) / 40_000;
        return 1e-3 * (i % 2 === 0 ? rx * Math.cos(angle) : ry * Math.sin(angle));
      });
    const [rx, ry] = [radiusMm, 0.6 * radiusMm];
    const dxf = dxfText([[0, 'ELLIPSE', 10, 0, 20, 0, 11, rx, 21, 0, 40, 0.6]]);
    const read = [
      readDxf(dxfText([circle(0, 0, rx)]), 'a.dxf', null),
      readDxf(dxf, 'a.dxf', null),
      readSvg(`<svg width="1mm" viewBox="0 0 1 1"><ellipse rx="${rx}" ry="${ry}"/></svg>`, 'a.svg', null),
    ];
    [rx, ry, ry].forEach((height, k) => {
      const readings = readingsOf([{ weight: 1, rings: [finely(rx, height)] }]);
      readingsOf(read[k].elements).forEach((reading, i) => {
        expect(Math.abs(reading - readings[i])).toBeLessThan(1e-6);
      });
    });
  });

  it('keeps planes and parts of the light in JSON', () => {
    const elements = outlineNamed('splitter-2').map((element, e) => ({
      ...element,
      distanceM: 0.02 + 0.01 * e,
      share: 0.5,
    }));
    const { elements: back } = throughFile(elements, 'json', 'splitter');
    expect(back.map(({ distanceM, share }) => [distanceM, share])).toEqual([
      [0.02, 0.5],
      [0.03, 0.5],
    ]);
  });

  it('keeps exact arcs through JSON and DXF', () => {
    for (const name of ['rings-3-open', 'sectors-hub-3-fold-2', 'polygon-star-5']) {
      const elements = outlineNamed(name);
      for (const format of ['json', 'dxf'] as const) {
        const { elements: back } = throughFile(elements, format, `arcs-${name}-${format}`);
        expect(back[0].curves).toHaveLength(elements[0].rings.length);
      }
    }
  });
});
