import fc from 'fast-check';
import { beforeAll, describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import type { Dimension, Units } from '../../src/base/quantity.ts';
import { formatQuantity, loadUnits, quantityInWords } from '../../src/base/quantity.ts';

// Factors between units are those of the SI brochure (BIPM 2019): prefixes, the degree as π/180 rad.
let units: Units;
beforeAll(async () => {
  units = await loadUnits();
});

describe('Units.parse', () => {
  it.each<[string, Dimension, number]>([
    ['635 nm', 'length', 6.35e-7],
    ['532nm', 'length', 5.32e-7],
    ['10 µm', 'length', 1e-5], // U+00B5, the micro sign
    ['10 μm', 'length', 1e-5], // U+03BC, the Greek letter
    ['1e3 um', 'length', 1e-3],
    ['.5 mm', 'length', 5e-4],
    ['  2. cm ', 'length', 0.02],
    ['-3 m', 'length', -3],
    ['0.1 nm', 'length', 1e-10],
    ['5 W/cm^2', 'irradiance', 5e4],
    ['5 W/cm²', 'irradiance', 5e4],
    ['3 mW / mm^2', 'irradiance', 3e3],
    ['0.42 A/W', 'responsivity', 0.42],
    ['2 pA', 'current', 2e-12],
    ['180 deg', 'angle', Math.PI],
    ['90°', 'angle', Math.PI / 2],
    ['0.5 rad', 'angle', 0.5],
    ['1 ms', 'time', 1e-3],
    ['1 %', 'ratio', 0.01],
    ['0.3 %', 'ratio', 0.003],
    ['0.01', 'ratio', 0.01],
    ['1e-2', 'ratio', 0.01],
  ])('reads %s', (text, dimension, value) => {
    expect(units.parse(text, dimension)).toBe(value);
  });

  it.each<[string, Dimension]>([
    ['5', 'length'],
    ['', 'length'],
    ['mm', 'length'],
    ['5 kg', 'length'],
    ['5 mm^2', 'length'],
    ['2 + 3 mm', 'length'],
    ['2 * 3 mm', 'length'],
    ['5 mm mm', 'length'],
    ['1,5 mm', 'length'],
    ['1e400 m', 'length'],
    ['Infinity m', 'length'],
    ['NaN m', 'length'],
    ['0x10 m', 'length'],
    ['5 constructor', 'length'],
    ['5 __proto__', 'length'],
    ['5 W', 'irradiance'],
    ['30', 'angle'],
    ['5 mm', 'ratio'],
    ['5 %', 'length'],
    [`${'9'.repeat(200)} m`, 'length'],
  ])('refuses %s as a %s', (text, dimension) => {
    expect(units.read(text, dimension)).toBeNull();
    expect(() => units.parse(text, dimension)).toThrow(RimwrightError);
  });

  it('names the option, what came and what is expected', () => {
    expect(() => units.parse('20', 'length', '--distance')).toThrow(
      '--distance: found "20", expected a length with its unit, such as 20 mm',
    );
    expect(quantityInWords('length', '635 nm')).toBe('a length with its unit, such as 635 nm');
  });

  it('gives decimal quantities to the last digit, and throws nothing but its own error', () => {
    const powers = { nm: -9, um: -6, mm: -3, m: 0, km: 3 };
    const unit = fc.constantFrom(...(Object.keys(powers) as (keyof typeof powers)[]));
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 1e9 }), fc.nat(12), unit, (digits, places, name) => {
        const value = units.read(`${digits}e-${places} ${name}`, 'length');
        expect(value).toBe(Number(`${digits}e${powers[name] - places}`));
      }),
    );
    fc.assert(
      fc.property(fc.string(), fc.string(), (number, text) => {
        for (const sample of [number, `1 ${text}`, `${number} mm`]) {
          const value = units.read(sample, 'length');
          expect(value === null || Number.isFinite(value)).toBe(true);
        }
      }),
      { numRuns: 2000 },
    );
  });
});

describe('Units.range', () => {
  it('reads A to B, and one quantity as both ends', () => {
    expect(units.range('50 um to 2 mm', 'length')).toEqual([5e-5, 2e-3]);
    expect(units.range('20 mm', 'length')).toEqual([0.02, 0.02]);
  });

  it.each(['2 mm to 50 um', '1 to 4 um', '1 um to', 'to 4 um', '1 um to 2 um to 4 um', '1 um - 4 um'])(
    'refuses %s',
    (text) => {
      expect(() => units.range(text, 'length')).toThrow(RimwrightError);
    },
  );
});

describe('formatQuantity', () => {
  it.each<[number, Dimension, string]>([
    [6.35e-7, 'length', '635 nm'],
    [6.06e-5, 'length', '60.6 µm'],
    [2e-3, 'length', '2 mm'],
    [9.99999e-4, 'length', '1 mm'],
    [10, 'length', '10 m'],
    [1e-10, 'length', '0.1 nm'],
    [-5e-6, 'length', '-5 µm'],
    [0, 'length', '0 mm'],
    [Math.PI / 6, 'angle', '30 deg'],
    [5e4, 'irradiance', '5 W/cm²'],
    [0.42, 'responsivity', '0.42 A/W'],
    [2e-12, 'current', '2 pA'],
    [1e-3, 'time', '1 ms'],
    [7200, 'time', '7200 s'],
    [0.01, 'ratio', '1 %'],
    [-0.15649, 'ratio', '-15.65 %'],
  ])('writes %d as a %s', (value, dimension, text) => {
    expect(formatQuantity(value, dimension)).toBe(text);
  });

  it('keeps as many digits as asked', () => {
    expect(formatQuantity(1.23456e-3, 'length', 2)).toBe('1.2 mm');
    expect(formatQuantity(1.23456e-3, 'length', 6)).toBe('1.23456 mm');
  });

  it('writes what it can read again', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-10, max: 1e3, noNaN: true }), (metres) => {
        const again = units.parse(formatQuantity(metres, 'length', 6), 'length');
        expect(Math.abs(again / metres - 1)).toBeLessThan(5.1e-6);
      }),
    );
  });
});
