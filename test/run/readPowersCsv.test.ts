import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { readCsvTable } from '../../src/run/csvTable.ts';
import type { NamedColumns } from '../../src/run/readPowersCsv.ts';
import { readPowersCsv } from '../../src/run/readPowersCsv.ts';

const read = (text: string, named: NamedColumns | null = null) => readPowersCsv(text, 'd.csv', 0.5, named);

function messageOf(text: string, named: NamedColumns | null = null): string {
  try {
    read(text, named);
  } catch (error) {
    if (error instanceof RimwrightError && error.code === 'input') return error.message;
    throw error;
  }
  return 'no mistake found';
}

describe('readPowersCsv', () => {
  it('reads every column that it knows, in SI units', () => {
    const { readings, unused } = read(
      '\uFEFFlabel,power_without_uW,power_with_mW,time_ms,reference_diameter_um,reference_uncertainty_nm,note\r\n' +
        'a, 100 ,0.099,2,1.5,10,x\r\n\r\n"b, ""c""",1e2,+99.5e-3,,,,y\r\n',
    );
    expect(unused).toEqual(['note']);
    expect(readings.map(({ line, label }) => [line, label])).toEqual([
      [2, 'a'],
      [4, 'b, "c"'],
    ]);
    const [first, second] = readings;
    expect(first.withoutW).toBeCloseTo(1e-4, 18);
    expect(first.withW).toBeCloseTo(9.9e-5, 18);
    expect(first.averagingS).toBeCloseTo(2e-3, 15);
    expect(first.reference?.diameterM).toBeCloseTo(1.5e-6, 18);
    expect(first.reference?.standardUncertaintyM).toBeCloseTo(1e-8, 18);
    expect(second).toMatchObject({ averagingS: null, reference: null, mistakes: [] });
  });

  it('turns currents into powers by the responsivity', () => {
    const [row] = read('current_without_uA,current_with_uA\n50,49\n').readings;
    expect([row.withoutW, row.withW].map((power) => Number(power.toPrecision(12)))).toEqual([1e-4, 9.8e-5]);
  });

  it('takes columns of other names where the user names them', () => {
    const text = 'ch1,ch2,power_without_uw\n50,49,1\n';
    const { readings, unused } = read(text, { without: 'ch1', with: 'ch2', unit: 'nA' });
    expect(readings[0].withoutW).toBeCloseTo(1e-7, 18);
    expect(unused).toEqual(['power_without_uw']);
  });

  it.each([
    ['overload,1', ['power_without_uW is not a number: "overload"']],
    [',1', ['power_without_uW is empty']],
    ['"1,5",NaN', ['power_without_uW is not a number: "1,5"', 'power_with_uW is not a number: "NaN"']],
    ['=1+1,0x10', ['power_without_uW is not a number: "=1+1"', 'power_with_uW is not a number: "0x10"']],
    ['Infinity,1e', ['power_without_uW is not a number: "Infinity"', 'power_with_uW is not a number: "1e"']],
  ])('keeps the row %s with its mistakes', (row, mistakes) => {
    expect(read(`power_without_uW,power_with_uW\n${row}\n`).readings[0].mistakes).toEqual(mistakes);
  });

  it.each([
    ['0,,', ['time_ms is not above 0']],
    ['soon,,', ['time_ms is not a number: "soon"']],
    [',2e7,', ['reference_diameter_um is not from 0.01 nm to 10 mm']],
    [',2,-1', ['reference_uncertainty_um is not 0 or more']],
  ])('keeps the row …,%s with its mistakes', (cells, mistakes) => {
    const header = 'power_without_uW,power_with_uW,time_ms,reference_diameter_um,reference_uncertainty_um';
    expect(read(`${header}\n2,1,${cells}\n`).readings[0].mistakes).toEqual(mistakes);
  });

  const EITHER =
    'power_without_uW and power_with_uW (or W, mW, nW; or current_… in A, mA, uA, nA), ' +
    'or --without COLUMN --with COLUMN --column-unit uW';
  it.each([
    ['', 'd.csv: found an empty file, expected a header and 1 to 100000 rows'],
    ['power_without_uW,power_with_uW\n', 'd.csv: found 0 rows, expected a header and 1 to 100000 rows'],
    ['a,b\n1,2\n', `d.csv:1: found the columns "a", "b", expected ${EITHER}`],
    [
      'power_without_uW,current_with_uA\n1,2\n',
      `d.csv:1: found the columns "power_without_uW", "current_with_uA", expected ${EITHER}`,
    ],
    [
      'power_without_uW;power_with_uW\n1;2\n',
      'd.csv:1: found a header without commas, "power_without_uW;power_with_uW", expected cells separated by commas',
    ],
    [
      'power_without_uW,power_with_uW\n1,2,3\n1,2\n4\n',
      'd.csv:2: found 3 cells, expected 2, one for each column of the header\n' +
        'd.csv:4: found 1 cell, expected 2, one for each column of the header',
    ],
    [
      'power_without_uW,power_with_uW\n1,2\n3,"4\n',
      'd.csv:3: found column 2: a stray quote, expected a cell, in double quotes that open and close where it holds quotes or commas',
    ],
    [
      'power_without_uW,power_with_uW\n1,2"5\n',
      'd.csv:2: found column 2: a stray quote, expected a cell, in double quotes that open and close where it holds quotes or commas',
    ],
    [
      'power_without_uW,power_with_uW,tme_ms\n1,2,3\n',
      'd.csv:1: found "tme_ms", expected another name, or time_ms if that is meant',
    ],
    [
      'power_without_uW,power_with_uW,power_with_uW\n1,2,3\n',
      'd.csv:1: found "power_with_uW" twice, expected each column once',
    ],
  ])('refuses %j', (text, message) => {
    expect(messageOf(text)).toBe(message);
  });

  it.each([
    [
      'ch3',
      'ch2',
      'd.csv:1: --without: found "ch3", expected one of the columns ch1, ch2 (did you mean ch1?)',
    ],
    ['ch1', 'ch1', '--with: found "ch1", expected another column than --without'],
  ])('refuses the columns %s and %s', (without, other, message) => {
    expect(messageOf('ch1,ch2\n1,2\n', { without, with: other, unit: 'uW' })).toBe(message);
  });
});

describe('readCsvTable', () => {
  it('keeps the line that each row begins in, over line breaks inside quotes', () => {
    const { header, rows } = readCsvTable('a,b\n1,"x\ny"\n\n2, "z" \n', 'd.csv');
    expect(header).toEqual(['a', 'b']);
    expect(rows).toEqual([
      { line: 2, cells: ['1', 'x\ny'] },
      { line: 5, cells: ['2', 'z'] },
    ]);
  });

  it('reads the last line without its break', () => {
    expect(readCsvTable('a,b\r1,2\r3,', 'd.csv').rows.map(({ cells }) => cells)).toEqual([
      ['1', '2'],
      ['3', ''],
    ]);
  });

  it('refuses more rows than it takes', () => {
    expect(() => readCsvTable(`a\n${'1\n'.repeat(100_001)}`, 'd.csv')).toThrow('found 100001 rows');
  });
});
