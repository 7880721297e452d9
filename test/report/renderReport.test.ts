import { describe, expect, it } from 'vitest';
import { renderReport } from '../../src/report/renderReport.ts';
import type { ReportInput } from '../../src/report/reportInput.ts';
import { allNodes, type MarkupNode, readMarkup } from '../draw/markupReader.ts';
import { regularRing } from '../draw/sampleDrawings.ts';
import { SAMPLE_REPORT, sampleDesign } from './sampleReport.ts';

const nodesOf = (input: ReportInput) => allNodes(readMarkup(renderReport(input)));
const named = (nodes: readonly MarkupNode[], ...names: string[]) =>
  nodes.filter(({ name }) => names.includes(name));
const wordsOf = (node: MarkupNode) =>
  allNodes(node)
    .map(({ text }) => text)
    .join(' ')
    .replace(/\s+/g, ' ');
const hasClass = (name: string) => (node: MarkupNode) =>
  node.attributes.class?.split(' ').includes(name) ?? false;

describe('report', () => {
  const source = renderReport(SAMPLE_REPORT);
  const nodes = allNodes(readMarkup(source));

  it('is one file that asks nothing of the network and runs nothing', () => {
    expect(named(nodes, 'script', 'link', 'img', 'iframe', 'object')).toEqual([]);
    expect(source).not.toMatch(/https?:|@import|src=|\son\w+=/);
    expect(source).not.toMatch(/url\((?!#)/);
  });

  it('is the same text each time', () => {
    expect(renderReport(SAMPLE_REPORT)).toBe(source);
  });

  it('has each id once, and every link and reference leads to one', () => {
    const ids = nodes.flatMap(({ attributes }) => attributes.id ?? []);
    expect(new Set(ids).size).toBe(ids.length);
    const hrefs = named(nodes, 'a').map(({ attributes }) => attributes.href.slice(1));
    const labels = nodes.flatMap(({ attributes }) => attributes['aria-labelledby']?.split(' ') ?? []);
    const fills = nodes.flatMap(({ attributes }) => /^url\(#(.*)\)$/.exec(attributes.fill ?? '')?.[1] ?? []);
    expect(fills.length).toBeGreaterThan(4);
    for (const target of [...hrefs, ...labels, ...fills]) expect(ids).toContain(target);
  });

  it('has headings that never skip a level', () => {
    const levels = named(nodes, 'h1', 'h2', 'h3', 'h4').map(({ name }) => Number(name[1]));
    expect(levels[0]).toBe(1);
    levels.slice(1).forEach((level, k) => {
      expect(level).toBeLessThanOrEqual(levels[k] + 1);
      expect(level).toBeGreaterThan(1);
    });
  });

  it('has a table with scoped headings and the numbers in their units', () => {
    const headings = named(nodes, 'th');
    for (const { attributes } of headings) expect(['col', 'row']).toContain(attributes.scope);
    const [first] = named(nodes, 'tbody')[0].children;
    expect(first.children.map(wordsOf).map((words) => words.trim())).toEqual([
      'rings-1',
      '1',
      'rings',
      '20',
      '206',
      '1.000',
      '0.9',
      '0.4',
      '0.04',
      '1.2 × 10⁵',
      '32 µs',
      '1.31',
      '–',
      'yes',
      'yes',
    ]);
    expect(headings.filter(({ attributes }) => attributes.scope === 'col')).toHaveLength(
      first.children.length,
    );
  });

  it('names every picture', () => {
    for (const svg of named(nodes, 'svg')) {
      if (svg.attributes['aria-hidden'] === 'true') continue;
      const title = svg.children.find(({ name }) => name === 'title');
      expect(title?.text).toMatch(/\w/);
      expect(svg.attributes['aria-labelledby']).toContain(title?.attributes.id);
    }
  });

  it('plots each design once, as a link to its section', () => {
    const plot = nodes.find(({ name, attributes }) => name === 'figure' && attributes.class === 'scatter');
    const links = named(plot ? allNodes(plot) : [], 'a');
    expect(links.map(({ attributes }) => attributes.href)).toEqual(['#design-1', '#design-2', '#design-3']);
    expect(links.map((link) => link.children.filter(hasClass('good')).length)).toEqual([1, 0, 1]);
    expect(links[1].attributes['aria-label']).toBe(
      'zones-2, rings: worst correction 3 %, time for one measurement 32 µs, does not meet the target',
    );
  });

  it('plots against area over gain where a time is missing, and says how many could not be plotted', () => {
    const designs = [
      sampleDesign('a', SAMPLE_REPORT.designs[0].elements, { snr: { required: 1e5, time_s: null } }),
      sampleDesign('b', SAMPLE_REPORT.designs[0].elements, { correction: { worst: Number.NaN, rms: 0 } }),
    ];
    const html = renderReport({ ...SAMPLE_REPORT, designs });
    expect(html).toContain('Worst correction against area over gain');
    expect(html).toContain('for want of a finite positive value: 1.');
  });

  it('draws outline, Fresnel circles and offset disc to one scale', () => {
    const [article] = named(nodes, 'article');
    const inside = allNodes(article);
    // ρ = √(m λ z), λz = 635 nm · 20 mm: the first zone ends at 112.694 µm, outside this ring.
    expect(inside.filter(hasClass('zone'))).toHaveLength(0);
    expect(inside.filter(hasClass('offset'))[0].attributes.r).toBe('10');
    const circles = allNodes(named(nodes, 'article')[1]).filter(hasClass('zone'));
    expect(circles.map(({ attributes }) => Number(attributes.r).toFixed(2))).toEqual([
      '112.69',
      '159.37',
      '195.19',
    ]);
    const path = named(inside, 'path')[0].attributes.d;
    expect(path).toMatch(/^M95 -7L/);
    expect(path).not.toMatch(/\.\d{3}/);
  });

  it('says what must be said of lasers, shops and trust', () => {
    const words = wordsOf(readMarkup(source));
    expect(words).toMatch(/local codes.*laser safety officer/);
    expect(words).toMatch(/cutting and etching to the shop and its licensed practice/);
    expect(words).toMatch(/Rimwright certifies nothing/);
    for (const part of [
      '0.1.0',
      '20012',
      'because its candidates were spent: 19520 of 20000',
      'target.lobe: 2 of 7 designs lie at 10 %, a higher limit may lead further',
      'light.drift: 0 nm',
      'The narrowest ring is 1.3 µm wide.',
    ]) {
      expect(words).toContain(part);
    }
  });

  it('escapes every text that comes from outside', () => {
    const evil = `"><script>alert('x')</script>&amp;\u0000`;
    const design = sampleDesign(evil, SAMPLE_REPORT.designs[0].elements, {
      shop: { fits: null, notes: [evil] },
    });
    const html = nodesOf({
      ...SAMPLE_REPORT,
      title: evil,
      briefText: `a: ${evil}\n  b: ${evil}`,
      defaults: [evil],
      warnings: [evil],
      version: evil,
      designs: [{ ...design, family: evil }],
    });
    expect(named(html, 'script')).toEqual([]);
    expect(named(html, 'h1')[0].text).toBe(`"><script>alert('x')</script>&amp;`);
    expect(named(html, 'pre')[0].text).toBe(
      `a: ${named(html, 'h1')[0].text}\n  b: ${named(html, 'h1')[0].text}`,
    );
  });

  it('stands without any design', () => {
    expect(renderReport({ ...SAMPLE_REPORT, designs: [] })).toContain('The run found no design.');
  });

  it('stays below 2 MB for 100 designs of 500 vertices', () => {
    const elements = [{ weight: 1, rings: [regularRing(1.98765e-3, 500)] }];
    const designs = Array.from({ length: 100 }, (_, k) => sampleDesign(`disc-${k}`, elements));
    expect(Buffer.byteLength(renderReport({ ...SAMPLE_REPORT, designs }))).toBeLessThan(2e6);
  });
});
