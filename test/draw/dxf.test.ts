import dxfParser from 'dxf-parser';
import { describe, expect, it } from 'vitest';
import { drawDxf } from '../../src/draw/dxf.ts';
import { boundingBox, type Points, ringInMm, signedArea } from './measurePoints.ts';
import { regularRing, SAMPLES } from './sampleDrawings.ts';

// Its types promise named exports, yet what the module exports is the class itself.
const DxfParser = dxfParser as unknown as typeof dxfParser.DxfParser;

interface Polyline {
  layer: string;
  vertices: Points;
  shape: boolean;
}

/** Reads a DXF text by an independent parser. */
function readDxf(text: string) {
  const dxf = new DxfParser().parseSync(text);
  if (dxf === null) throw new Error('no DXF');
  const ofType = (type: string) => dxf.entities.filter((entity) => entity.type === type);
  return {
    header: dxf.header,
    layers: Object.keys(dxf.tables.layer.layers),
    polylines: ofType('LWPOLYLINE') as unknown as Polyline[],
    circles: ofType('CIRCLE') as unknown as { layer: string; radius: number }[],
    lines: ofType('LINE') as unknown as { layer: string; vertices: Points }[],
    texts: ofType('TEXT') as unknown as { layer: string; text: string }[],
  };
}

describe('DXF, read back by dxf-parser', () => {
  it.each(Object.entries(SAMPLES))('keeps area, box and every point of the %s', (_, drawing) => {
    const { polylines } = readDxf(drawDxf(drawing));
    const rings = drawing.elements.flatMap((element) => element.rings.map(ringInMm));
    expect(polylines).toHaveLength(rings.length);
    rings.forEach((ring, k) => {
      const { vertices, shape } = polylines[k];
      expect(shape, 'closed').toBe(true);
      expect(Math.abs(signedArea(vertices) / signedArea(ring) - 1)).toBeLessThan(1e-6);
      expect(vertices).toHaveLength(ring.length);
      const worst = Math.max(
        ...ring.map(({ x, y }, v) => Math.max(Math.abs(vertices[v].x - x), Math.abs(vertices[v].y - y))),
      );
      expect(worst).toBeLessThan(1e-9);
    });
    const read = boundingBox(polylines.map(({ vertices }) => vertices));
    boundingBox(rings).forEach((side, k) => {
      expect(Math.abs(read[k] - side)).toBeLessThan(1e-6 * Math.abs(side));
    });
  });

  it('sets millimetres and metric measurement', () => {
    const { header } = readDxf(drawDxf(SAMPLES.disc));
    expect(header.$INSUNITS).toBe(4);
    expect(header.$MEASUREMENT).toBe(1);
  });

  it('gives each element a layer, holes their own, and keeps cross and notes apart from what is cut', () => {
    const { layers, polylines, lines, texts } = readDxf(drawDxf(SAMPLES.zones));
    expect(layers).toEqual([
      '0',
      'ELEMENT_1',
      'ELEMENT_2',
      'ELEMENT_2_HOLES',
      'ELEMENT_3',
      'ELEMENT_3_HOLES',
      'CENTRE',
      'NOTES',
    ]);
    expect(polylines.map(({ layer }) => layer)).toEqual([
      'ELEMENT_1',
      'ELEMENT_2',
      'ELEMENT_2_HOLES',
      'ELEMENT_3',
      'ELEMENT_3_HOLES',
    ]);
    expect(new Set(lines.map(({ layer }) => layer))).toEqual(new Set(['CENTRE']));
    for (const { vertices } of lines) {
      expect(vertices[0].x + vertices[1].x).toBe(0);
      expect(vertices[0].y + vertices[1].y).toBe(0);
    }
    expect(new Set(texts.map(({ layer }) => layer))).toEqual(new Set(['NOTES']));
    const notes = texts.map(({ text }) => text);
    expect(notes).toContain('ELEMENT_2: weight −1, open area 0.0395 mm²');
    expect(notes).toContain('Distance particle to mask: 20 mm');
    expect(notes).toContain('Design 0f3a9c');
  });

  it('gives the same text each time, without date or exponent', () => {
    const text = drawDxf(SAMPLES.disc);
    expect(drawDxf(SAMPLES.disc)).toBe(text);
    expect(text).not.toMatch(/^-?[\d.]+e-?\d+$/im);
    expect(text).not.toMatch(/\$TD|20\d\d-\d\d/);
  });

  it('draws exact arcs as bulges, and circles as circles', () => {
    const half = Math.tan(Math.PI / 8);
    const rings = [regularRing(1e-3, 64), regularRing(5e-4, 64, -1)];
    const circle = Float64Array.of(1e-3, 0, 1, -1e-3, 0, 1);
    const quarter = Float64Array.of(5e-4, 0, 0, 0, 0, -half, 0, 5e-4, 0);
    const { polylines, circles } = readDxf(
      drawDxf({ ...SAMPLES.disc, elements: [{ weight: 1, rings, curves: [circle, quarter] }] }),
    );
    expect(circles).toMatchObject([{ layer: 'ELEMENT_1', center: { x: 0, y: 0 }, radius: 1 }]);
    expect(polylines).toMatchObject([{ layer: 'ELEMENT_1_HOLES', shape: true }]);
    const bulges = polylines[0].vertices as unknown as { bulge?: number }[];
    expect(bulges.map(({ bulge }) => bulge?.toFixed(9))).toEqual([undefined, (-half).toFixed(9), undefined]);
  });

  it('writes weights so that they can be read back', () => {
    const [element] = SAMPLES.disc.elements;
    const weights = [1 / 3, -0.25, 123456789];
    const { texts } = readDxf(
      drawDxf({ ...SAMPLES.disc, elements: weights.map((weight) => ({ ...element, weight })) }),
    );
    const told = texts.map(({ text }) => /^ELEMENT_\d: weight (.*),/.exec(text)?.[1]).filter((text) => text);
    expect(told).toEqual(['+0.3333333333333333', '−0.25', '+123456789']);
  });

  it('writes coordinates below 1e-6 mm in plain decimals', () => {
    const rings = [Float64Array.from([-1e-10, 0, 1e-4, 0, 1e-4, 1e-4])];
    const text = drawDxf({ ...SAMPLES.disc, elements: [{ weight: 1, rings }] });
    expect(readDxf(text).polylines[0].vertices[0].x).toBe(-1e-7);
    expect(text).toContain('\n-0.0000001\n');
  });

  it('lets no title or note break out of its line or hold an escape', () => {
    const text = drawDxf({
      ...SAMPLES.disc,
      title: 'Line\r\n  0\nENDSEC\u0000\u001b \u202edrow \ud800',
      notes: ['50%%d \\U+00B0 ^J', ''],
    });
    const { polylines, texts } = readDxf(text);
    expect(polylines).toHaveLength(1);
    expect(texts[0].text).toBe('Line   0 ENDSEC drow');
    expect(text).toContain('\n50% %d /U+00B0 ^ J\n');
    expect(text).not.toMatch(/[^\n\P{Cc}]/u);
  });

  it('refuses what no shop could cut, naming the place', () => {
    const broken = (ring: Float64Array) => () =>
      drawDxf({ ...SAMPLES.disc, elements: [{ weight: 1, rings: [regularRing(1, 5), ring] }] });
    expect(broken(Float64Array.from([0, 0, 1, 1]))).toThrow('elements[0].rings[1]: found 4 numbers');
    expect(broken(Float64Array.from([0, 0, 1, Number.NaN, 0, 1]))).toThrow('elements[0].rings[1]: found NaN');
    expect(broken(Float64Array.from([0, 0, 1, 1, 2, 2]))).toThrow('a ring without area');
    expect(() => drawDxf({ ...SAMPLES.disc, elements: [] })).toThrow('elements: found none');
  });
});
