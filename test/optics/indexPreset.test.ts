import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { readIndexPreset } from '../../src/optics/indexPreset.ts';

const HEAD = 'title: T\nsource: S\nnotes: N\n';

function problems(text: string): string[] {
  try {
    readIndexPreset(text, 'x.yaml');
  } catch (error) {
    if (error instanceof RimwrightError && error.code === 'input') return error.message.split('\n');
    throw error;
  }
  return [];
}

describe('readIndexPreset', () => {
  it('converts the units of the file to those of the program', () => {
    const air = `${HEAD}formula: ciddor\ntemperatureC: 20\npressurePa: 101325\nrelativeHumidityPercent: 50\nco2Ppm: 450\nrangeNm: [300, 1700]\n`;
    expect(readIndexPreset(air, 'x.yaml')).toEqual({
      title: 'T',
      source: 'S',
      notes: 'N',
      model: {
        formula: 'ciddor',
        rangeM: [3e-7, 1.7e-6],
        temperatureK: 293.15,
        pressurePa: 101325,
        relativeHumidity: 0.5,
        co2Ppm: 450,
      },
    });
    const table = `${HEAD}formula: tabulated\nwavelengthNm: [400, 635]\nn: [1.5, 1.6]\nk: [0, 0.1]\n`;
    expect(readIndexPreset(table, 'x.yaml').model).toEqual({
      formula: 'tabulated',
      rangeM: [4e-7, 6.35e-7],
      wavelengthM: [4e-7, 6.35e-7],
      n: [1.5, 1.6],
      k: [0, 0.1],
    });
  });

  it('names every mistake once, with its line', () => {
    expect(
      problems(
        'title: T\nsource: " "\nnotes: N\nformula: constant\nn: fast\nrangeNm: [800, 400]\nabsorption: 1\n',
      ),
    ).toEqual([
      'x.yaml:2: source: found " ", expected a text',
      'x.yaml:6: rangeNm: found [800,400], expected the shortest and the longest vacuum wavelength',
      'x.yaml:5: n: found "fast", expected a number from 0.01 to 100',
      'x.yaml:1: k: found nothing, expected a number from 0 to 100',
      'x.yaml:7: absorption: found an unknown key, expected only title, source, notes, formula, rangeNm, n, k',
    ]);
  });

  it('refuses formulas it does not know and files without keys', () => {
    expect(problems(`${HEAD}formula: guess\n`)[0]).toContain(
      'expected one of constant, sellmeier, cauchy, ciddor',
    );
    expect(problems('just a sentence\n')).toEqual([
      'x.yaml:1: found "just a sentence", expected keys with values',
    ]);
    expect(problems('')).toEqual(['x.yaml:1: found null, expected keys with values']);
  });

  it('keeps formulas within what they stand for', () => {
    const water = (range: string, density: string) =>
      problems(`${HEAD}formula: iapws-r9-97\ntemperatureC: 20\ndensityKgM3: ${density}\nrangeNm: ${range}\n`);
    expect(water('[200, 1100]', '998')).toEqual([]);
    expect(water('[200, 1200]', '998')).toHaveLength(1);
    expect(water('[200, 1100]', '.nan')).toHaveLength(1);
    expect(water('[200, 1100]', '1061')).toHaveLength(1);
  });

  it('refuses lists that do not belong together and tables out of order', () => {
    const glass = (c: string) =>
      problems(
        `${HEAD}formula: sellmeier\nwavelengthIn: air\nrelativeTo: air\nb: [1, 2]\ncUm2: ${c}\nrangeNm: [400, 800]\n`,
      );
    expect(glass('[0.1, 0.2]')).toEqual([]);
    expect(glass('[0.1]')).toEqual(['x.yaml:8: cUm2: found 1 numbers, expected 2 numbers']);
    const table = (nm: string) =>
      problems(`${HEAD}formula: tabulated\nwavelengthNm: ${nm}\nn: [1, 1, 1]\nk: [0, 0, 0]\n`);
    expect(table('[400, 500, 600]')).toEqual([]);
    expect(table('[400, 600, 500]')).toHaveLength(1);
    expect(table('[400, 500, 500]')).toHaveLength(1);
  });
});
