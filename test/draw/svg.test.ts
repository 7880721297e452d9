import { describe, expect, it } from 'vitest';
import { drawSvg } from '../../src/draw/svg.ts';
import { allNodes, readMarkup } from './markupReader.ts';
import { boundingBox, type Points, ringInMm, signedArea } from './measurePoints.ts';
import { SAMPLES } from './sampleDrawings.ts';

/** Reads `M x y L x y … Z M …` into rings, refusing anything else. */
function readPath(data: string): Points[] {
  expect(data).toMatch(/^(M -?[\d.]+ -?[\d.]+( L -?[\d.]+ -?[\d.]+)+ Z ?)+$/);
  return [...data.matchAll(/M ([^Z]+) Z/g)].map(([, ring]) =>
    ring.split(' L ').map((pair) => {
      const [x, y] = pair.split(' ').map(Number);
      return { x, y };
    }),
  );
}

describe('SVG, read back by a small reader of its own', () => {
  it.each(Object.entries(SAMPLES))('keeps area and box of the %s at true size', (_, drawing) => {
    const nodes = allNodes(readMarkup(drawSvg(drawing)));
    const group = nodes.find(({ attributes }) => attributes.id === 'true-size');
    expect(group?.attributes.transform).toMatch(/^translate\([\d.]+ [\d.]+\) scale\(1 -1\)$/);
    const paths = nodes.filter(({ name }) => name === 'path');
    expect(group?.children).toEqual(paths);
    expect(paths).toHaveLength(drawing.elements.length);
    drawing.elements.forEach((element, e) => {
      const { attributes } = paths[e];
      expect(attributes['data-element']).toBe(String(e + 1));
      expect(Number(attributes['data-weight'])).toBe(element.weight);
      expect(attributes['fill-rule']).toBe('evenodd');
      const read = readPath(attributes.d);
      const given = element.rings.map(ringInMm);
      const area = (rings: Points[]) => rings.reduce((sum, ring) => sum + signedArea(ring), 0);
      expect(Math.abs(area(read) / area(given) - 1)).toBeLessThan(1e-6);
      boundingBox(given).forEach((side, k) => {
        expect(Math.abs(boundingBox(read)[k] - side)).toBeLessThan(1e-6 * Math.abs(side));
      });
    });
  });

  it('has a sheet whose user unit is one millimetre and that holds the outline', () => {
    const { attributes } = readMarkup(drawSvg(SAMPLES.star));
    const [x, y, width, height] = attributes.viewBox.split(' ').map(Number);
    expect([x, y]).toEqual([0, 0]);
    expect(attributes.width).toBe(`${width}mm`);
    expect(attributes.height).toBe(`${height}mm`);
    const large = {
      ...SAMPLES.star,
      elements: [{ weight: 1, rings: [SAMPLES.star.elements[0].rings[0].map((v) => 50 * v)] }],
    };
    const sheet = readMarkup(drawSvg(large));
    expect(Number.parseFloat(sheet.attributes.width)).toBeGreaterThan(200);
    expect(drawSvg(large)).toContain('Reduced 1 : 3');
  });

  it('shows the same paths enlarged, each with a hatch and a label of its own', () => {
    const nodes = allNodes(readMarkup(drawSvg(SAMPLES.zones)));
    const uses = nodes.filter(({ name }) => name === 'use');
    expect(uses.map(({ attributes }) => attributes.href)).toEqual(['#element-1', '#element-2', '#element-3']);
    const ids = new Set(nodes.map(({ attributes }) => attributes.id));
    const fills = uses.map(({ attributes }) => attributes.fill);
    expect(new Set(fills).size).toBe(3);
    for (const fill of fills) expect(ids).toContain(/^url\(#(.*)\)$/.exec(fill)?.[1]);
    const texts = nodes.filter(({ name }) => name === 'text').map(({ text }) => text);
    expect(texts).toEqual(
      expect.arrayContaining([
        '1: weight +1',
        '2: weight −1',
        '3: weight +0.5',
        '100 µm',
        'Design',
        '0f3a9c',
      ]),
    );
  });

  it('draws the scale bar as long as it says', () => {
    const { children } = readMarkup(drawSvg(SAMPLES.zones));
    const view = children.find(({ attributes }) => attributes.id === 'enlarged-view');
    const nodes = view ? allNodes(view) : [];
    const bar = nodes.find(({ attributes }) => attributes.class === 'scale-bar')?.children[2].attributes;
    const scale = Number(/scale\(([\d.]+) /.exec(nodes[2].attributes.transform)?.[1]);
    expect((Number(bar?.x2) - Number(bar?.x1)) / scale).toBeCloseTo(0.1, 9);
  });

  it('escapes everything and holds no script', () => {
    const title = `<script>alert("x")</script> & 'quotes' \u0000\u0007]]>`;
    const source = drawSvg({ ...SAMPLES.disc, title, notes: [title], hash: '"><script>' });
    const nodes = allNodes(readMarkup(source));
    expect(nodes.map(({ name }) => name)).not.toContain('script');
    expect(nodes.find(({ name }) => name === 'title')?.text).toBe(
      `<script>alert("x")</script> & 'quotes' ]]>`,
    );
    expect(source).not.toMatch(/on\w+="|javascript:|[^\n\P{Cc}]/u);
  });

  it('gives the same text each time', () => {
    expect(drawSvg(SAMPLES.zones)).toBe(drawSvg(SAMPLES.zones));
  });
});
