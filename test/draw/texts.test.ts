import { describe, expect, it } from 'vitest';
import { plainDecimal, shortDecimal } from '../../src/draw/plainDecimal.ts';
import { markupText, plainText, wrapText } from '../../src/draw/plainText.ts';
import {
  areaText,
  countText,
  percentText,
  quantityText,
  timeText,
  weightText,
} from '../../src/draw/quantityText.ts';
import { roundDown } from '../../src/draw/roundDown.ts';

describe('plainDecimal', () => {
  it('never shows an exponent, a trailing zero or minus zero', () => {
    expect([1e-7, -1e-7, -1e-12, 0.1 + 0.2, 100, 1e20].map((value) => plainDecimal(value, 10))).toEqual([
      '0.0000001',
      '-0.0000001',
      '0',
      '0.3',
      '100',
      '100000000000000000000',
    ]);
    expect(plainDecimal(1230, 0)).toBe('1230');
  });

  it('keeps six digits at any scale where asked to', () => {
    expect([1.23456789e-9, -0.000625, 84.0000001, 1234567, 0].map(shortDecimal)).toEqual([
      '0.00000000123457',
      '-0.000625',
      '84',
      '1234567',
      '0',
    ]);
  });
});

describe('texts', () => {
  it('removes what turns, hides or breaks, and keeps other scripts', () => {
    expect(plainText('a\r\nb\tc\u0007\u202e\ufeff\u2028d')).toBe('a b c d');
    expect(plainText('Grün 粒子 👩‍🔬')).toBe('Grün 粒子 👩‍🔬');
    expect(markupText(`<a href='x'>&"`)).toBe('&#60;a href=&#39;x&#39;&#62;&#38;&#34;');
  });

  it('wraps at spaces and cuts what is too long for a line', () => {
    expect(wrapText('one two three', 7)).toEqual(['one two', 'three']);
    expect(wrapText('abcdefghij k', 4)).toEqual(['abcd', 'efgh', 'ij k']);
    expect(wrapText('', 4)).toEqual([]);
  });

  it('writes quantities with three digits and their unit', () => {
    expect(quantityText(60.6e-6, 'm')).toBe('60.6 µm');
    expect(quantityText(0.02, 'm')).toBe('20 mm');
    expect(quantityText(null, 'm')).toBe('–');
    expect([3.2e-3, 1, 1234, Infinity].map(timeText)).toEqual(['3.2 ms', '1 s', '1230 s', '–']);
    expect([0, 0.9, 9400, 1.234e11, 1e12, 2e-5, -3, Number.NaN].map(countText)).toEqual([
      '0',
      '0.9',
      '9400',
      '1.23 × 10¹¹',
      '10¹²',
      '2 × 10⁻⁵',
      '−3',
      '–',
    ]);
    expect(percentText(0.009)).toBe('0.9 %');
    expect([1.67e-8, 2e-10].map(areaText)).toEqual(['0.0167 mm²', '200 µm²']);
    expect([1, -0.5, 0].map(weightText)).toEqual(['+1', '−0.5', '0']);
  });
});

describe('roundDown', () => {
  it('gives 1, 2, 5 and their powers of ten', () => {
    expect([1, 1.99, 2, 4.9, 9.99, 10, 0.3, 0.0999, 0.005, 3400].map((value) => roundDown(value))).toEqual([
      1, 1, 2, 2, 5, 10, 0.2, 0.05, 0.005, 2000,
    ]);
    expect(roundDown(35, [1, 3, 8])).toBe(30);
  });
});
