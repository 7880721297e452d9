import { describe, expect, it } from 'vitest';
import { inkColor } from '../../src/draw/hatch.ts';
import { designNotes } from '../../src/report/designNotes.ts';
import { logAxis } from '../../src/report/logAxis.ts';
import { markerPath } from '../../src/report/markers.ts';
import { COLORS } from '../../src/report/reportStyle.ts';
import { zoneCircles } from '../../src/report/zoneCircles.ts';
import { regularRing, SAMPLES } from '../draw/sampleDrawings.ts';
import { sampleDesign } from './sampleReport.ts';

/** Relative luminance and contrast as WCAG 2.2 defines them. */
function luminance(color: string): number {
  const [r, g, b] = [1, 3, 5]
    .map((at) => Number.parseInt(color.slice(at, at + 2), 16) / 255)
    .map((part) => (part <= 0.04045 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4));
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}

function contrast(a: string, b: string): number {
  const [dark, light] = [luminance(a), luminance(b)].sort((one, other) => one - other);
  return (light + 0.05) / (dark + 0.05);
}

describe('colours', () => {
  it('keep a contrast of 4.5 (WCAG 2.2, 1.4.3) to both grounds, light and dark', () => {
    const table = new Map(COLORS.map(([name, ...values]) => [name, values]));
    for (const name of ['ink', 'muted', 'link', 'plus', 'minus', 'mark']) {
      for (const ground of ['paper', 'panel']) {
        for (const column of [0, 1]) {
          const ratio = contrast(table.get(name)?.[column] ?? '', table.get(ground)?.[column] ?? '');
          expect(ratio, `${name} on ${ground}`).toBeGreaterThanOrEqual(4.5);
        }
      }
    }
    for (const weight of [1, -1]) expect(contrast(inkColor(weight), '#ffffff')).toBeGreaterThanOrEqual(4.5);
  });
});

describe('zoneCircles', () => {
  it('lie at ρ = √(m λ z) (design, section 2: η = κρ², κ = π/(λz))', () => {
    const { step, radiiM } = zoneCircles(635e-9, 0.02, 200e-6, 10);
    expect(step).toBe(1);
    expect(radiiM).toHaveLength(3);
    radiiM.forEach((radiusM, k) => {
      const kappa = Math.PI / (635e-9 * 0.02);
      expect(kappa * radiusM ** 2).toBeCloseTo((k + 1) * Math.PI, 9);
    });
  });

  it('thin out evenly where there are many', () => {
    const { step, radiiM } = zoneCircles(635e-9, 0.01, 2e-3, 10);
    // (2 mm)² / (635 nm · 10 mm) = 629.9 zones.
    expect(step).toBe(100);
    expect(radiiM).toHaveLength(6);
    expect(radiiM[5] ** 2 / (635e-9 * 0.01)).toBeCloseTo(600, 6);
    expect(zoneCircles(635e-9, 0.02, 1e-4, 10).radiiM).toEqual([]);
  });
});

describe('logAxis', () => {
  it('holds all values, keeps ratios, and has a readable number of ticks over any span', () => {
    for (const decades of [0, 0.1, 0.5, 1, 2, 3, 6, 12]) {
      const { place, ticks } = logAxis([1e-3, 1e-3 * 10 ** decades], [60, 460]);
      expect(place(1e-3)).toBeGreaterThan(60);
      expect(place(1e-3 * 10 ** decades)).toBeLessThan(460);
      expect(place(0.2) - place(0.1)).toBeCloseTo(place(0.04) - place(0.02), 6);
      expect(ticks.length).toBeGreaterThanOrEqual(2);
      expect(ticks.length).toBeLessThanOrEqual(9);
    }
  });
});

describe('markerPath', () => {
  it('gives every family a shape of its own', () => {
    const paths = Array.from({ length: 7 }, (_, k) => markerPath(k, 70));
    expect(new Set(paths).size).toBe(7);
    for (const path of paths) expect(path).toMatch(/^M[-\d.,MLHVAZhvlaz]+$/);
  });
});

describe('designNotes', () => {
  it('says nothing of a plain design but what a measurement is', () => {
    expect(designNotes(sampleDesign('a', SAMPLES.annulus.elements), 0.01)).toEqual([
      'One measurement is two readings, with and without the particle: 32 µs together.',
    ]);
  });

  it('tells of a missed target, gain, weights, lobe and floor', () => {
    // Two elements of the same area with opposite weights.
    const elements = [1, -1].map((weight, k) => ({
      weight,
      rings: [regularRing(1e-4, 32, 1, [k * 3e-4, 0])],
    }));
    const notes = designNotes(
      sampleDesign('b', elements, {
        gain: 2,
        correction: { worst: 0.05, rms: 0.01 },
        lobe: { ratio: 0.2 },
        areaOverFloor: 0.98,
      }),
      0.01,
    ).join(' ');
    for (const part of [
      'Does not meet',
      '5 %, is above the target of 1 %',
      'gain, 2.0000',
      'weighted areas cancel',
      '20 %',
      'below the floor',
    ]) {
      expect(notes).toContain(part);
    }
  });
});
