import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../../src/base/errors.ts';
import { drawSvg } from '../../../src/draw/svg.ts';
import { ringArea } from '../../../src/outline/area.ts';
import { readSvg } from '../../../src/outline/files/readSvg.ts';
import { SAMPLES } from '../../draw/sampleDrawings.ts';

/** A drawing whose user unit is a millimetre. */
function sheet(content: string): string {
  return `<svg xmlns="http://www.w3.org/2000/svg" width="20mm" height="20mm" viewBox="-10 -10 20 20">${content}</svg>`;
}

const elementsOf = (content: string) => readSvg(sheet(content), 'a.svg', null).elements;

/** In mm². */
const areaOf = (content: string) =>
  1e6 * elementsOf(content)[0].rings.reduce((sum, ring) => sum + ringArea(ring), 0);

/** Areas in closed form. */
const SHAPES: [name: string, area: number, content: string][] = [
  ['a circle', Math.PI * 0.25, '<circle cx="0.1" cy="-0.2" r="0.5"/>'],
  ['an ellipse', Math.PI * 0.5 * 0.2, '<ellipse cx="0.1" cy="-0.2" rx="0.5" ry="0.2"/>'],
  ['a rectangle', 2, '<rect x="1" y="1" width="2" height="1"/>'],
  [
    'a rectangle with round corners',
    2 - (4 - Math.PI) * 0.04,
    '<rect x="1" y="1" width="2" height="1" rx="0.2"/>',
  ],
  ['a polygon', 0.5, '<polygon points="0,0 1,0 0,1"/>'],
  ['a polyline that comes back', 0.5, '<polyline points="0,0 1,0 0,1 0,0"/>'],
  ['lines that form a chain', 0.5, '<line x1="0" y1="0" x2="1" y2="0"/><path d="M0 1 0 0M1 0 0 1"/>'],
  ['relative path data', 1, '<path d="m1 1h1v1h-1z"/>'],
  ['arcs of a circle', Math.PI / 4, '<path d="M-.5 0A.5.5 0 1 1 .5 0A.5.5 0 1 1-.5 0Z"/>'],
  [
    'an arc of a tilted ellipse',
    (Math.PI * 1 * 0.5) / 2,
    '<path d="M-1 0A1 .5 0 0 1 1 0Z" transform="rotate(30)"/>',
  ],
  // Below a parabola with the control points (−1, 1), (0, −1), (1, 1): 4/3 (Archimedes).
  ['a quadratic curve', 4 / 3, '<path d="M-1 1Q0-1 1 1Z"/>'],
  // ∮ (x dy − y dx)/2 along the cubic with control points (0, 0), (0, 1), (1, 1), (1, 0) is 3/5.
  ['a cubic curve', 0.6, '<path d="M0 0C0 1 1 1 1 0Z"/>'],
  ['a hole by evenodd', 0.75, '<path fill-rule="evenodd" d="M0 0H1V1H0ZM.25.25H.75V.75H.25Z"/>'],
  ['a hole that runs the other way', 0.75, '<path d="M0 0H1V1H0ZM.25.25V.75H.75V.25Z"/>'],
  ['no hole by nonzero', 1, '<path d="M0 0H1V1H0ZM.25.25H.75V.75H.25Z"/>'],
  ['a hole by lines without filling', 0.75, '<path style="fill:none" d="M0 0H1V1H0ZM.25.25H.75V.75H.25Z"/>'],
  [
    'one shape inside another',
    0.75,
    '<rect width="1" height="1"/><rect x="0.25" y="0.25" width="0.5" height="0.5"/>',
  ],
  [
    'nested transforms',
    6 * Math.PI,
    '<g transform="translate(1,2) scale(2)"><g transform="rotate(20 3 4) skewX(10)"><ellipse rx="1" ry="1.5" transform="matrix(1 0 0 1 -1 0)"/></g></g>',
  ],
];

describe('readSvg', () => {
  it.each(SHAPES)('keeps the area of %s', (_, area, content) => {
    expect(Math.abs(areaOf(content) / area - 1)).toBeLessThan(1e-7);
  });

  it('turns y over', () => {
    const [{ rings }] = elementsOf('<polygon points="1,2 3,2 1,5"/>');
    expect(Math.min(...rings[0].filter((_, i) => i % 2 === 1))).toBeCloseTo(-5e-3, 12);
    expect(ringArea(rings[0])).toBeGreaterThan(0);
  });

  it.each([
    ['width="20mm" height="20mm" viewBox="-10 -10 20 20"', null, 1e-3, ''],
    ['width="2cm" viewBox="0 0 200 100"', null, 1e-4, ''],
    ['width="1in" height="2in" viewBox="0 0 1 2"', null, 0.0254, ''],
    ['width="96" height="96px" viewBox="0 0 1 1"', null, 0.0254, '1/96 in'],
    ['width="96" height="96px" viewBox="0 0 1 1"', 'mm', 1e-3, ''],
    ['width="20mm" height="20mm"', null, 0.0254 / 96, '1/96 in'],
    ['width="100%" viewBox="0 0 1 1"', 'um', 1e-6, ''],
  ] as const)('takes the unit from %s, or %s from outside', (size, unit, unitM, note) => {
    const text = `<svg ${size}><rect width="1" height="1"/></svg>`;
    const { elements, notes } = readSvg(text, 'a.svg', unit);
    expect(ringArea(elements[0].rings[0]) / unitM ** 2).toBeCloseTo(1, 9);
    expect(notes.join()).toContain(note);
    expect(notes).toHaveLength(note === '' ? 0 : 1);
  });

  it('passes over what is not shown', () => {
    const content =
      '<defs><circle r="1"/></defs><g display="none"><use href="#a"/></g><circle r="2" style="display:none"/><text>hi</text><circle visibility="hidden" r="3"/><metadata><x:y/></metadata><rect width="1" height="1"/>';
    expect(areaOf(content)).toBeCloseTo(1, 9);
  });

  it('takes the origin from a group that is marked', () => {
    const [{ rings }] = elementsOf(
      '<g transform="translate(5 5)"><g data-origin="axis" transform="scale(1 -1)"><rect x="0.5" width="1" height="1"/></g></g>',
    );
    expect(Array.from(rings[0], (value) => Math.round(value * 1e7))).toEqual([
      5000, 0, 15000, 0, 15000, 10000, 5000, 10000,
    ]);
  });

  it.each(Object.entries(SAMPLES))('reads our own sheet of the %s back, point for point', (_, drawing) => {
    const { elements, notes } = readSvg(drawSvg(drawing), 'a.svg', null);
    expect(notes).toEqual([]);
    expect(elements.map(({ weight }) => weight)).toEqual(drawing.elements.map(({ weight }) => weight));
    drawing.elements.forEach(({ rings }, e) => {
      rings.forEach((ring, r) => {
        const read = elements[e].rings[r];
        expect(read).toHaveLength(ring.length);
        for (let i = 0; i < ring.length; i++) expect(Math.abs(read[i] - ring[i])).toBeLessThan(1e-13);
      });
    });
  });

  it('reads long lists of points in a moment, and refuses what is too long', () => {
    const points = (count: number) =>
      Array.from({ length: count }, (_, k) => {
        const angle = (2 * Math.PI * k) / count;
        return `${Math.cos(angle).toFixed(9)},${Math.sin(angle).toFixed(9)}`;
      }).join(' ');
    expect(elementsOf(`<polygon points="${points(20_000)}"/>`)[0].rings[0]).toHaveLength(40_000);
    const squares = Array.from({ length: 5001 }, (_, k) => `M${k} 0h.1v.1z`).join('');
    expect(() => elementsOf(`<path d="${squares}"/>`)).toThrow(
      'found 5001 rings, expected at most 5000 rings',
    );
  });

  it('never throws anything but its own errors, whatever is changed in a file', () => {
    const text = sheet(SHAPES.map(([, , content]) => content).join('\n'));
    const changes = fc.array(
      fc.tuple(
        fc.nat(text.length),
        fc.nat(3),
        fc.constantFrom('', '<', '>', '"', '9', '-', 'e', 'Z', 'A', '&x;', ' ', '\0', '<g>', '1e999'),
      ),
      { minLength: 1, maxLength: 4 },
    );
    fc.assert(
      fc.property(changes, (list) => {
        let changed = text;
        for (const [at, cut, word] of list) changed = changed.slice(0, at) + word + changed.slice(at + cut);
        expectOwnErrors(changed);
      }),
      { numRuns: 300 },
    );
    fc.assert(fc.property(fc.string({ unit: 'binary' }), expectOwnErrors));
    fc.assert(
      fc.property(fc.string(), (data) => expectOwnErrors(sheet(`<path d='${data.replace(/[<&']/g, '')}'/>`))),
    );
  });
});

function expectOwnErrors(text: string): void {
  try {
    readSvg(text, 'a.svg', null);
  } catch (error) {
    expect(error).toBeInstanceOf(RimwrightError);
    expect((error as RimwrightError).code).toBe('input');
  }
}
