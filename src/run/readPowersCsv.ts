import type { Problem } from '../base/errors.ts';
import { inputError } from '../base/errors.ts';
import { nearestName } from '../base/nearestName.ts';
import type { PowerReading } from '../metrology/powerReading.ts';
import { readCsvTable } from './csvTable.ts';

/** Columns that the user names, in place of those that a header declares by itself. */
export interface NamedColumns {
  without: string;
  with: string;
  /** One of `READING_UNITS`. */
  unit: string;
}

export interface PowersFile {
  readings: PowerReading[];
  /** Columns that were not used. */
  unused: string[];
}

const POWERS: Record<string, number> = { W: 1, mW: 1e-3, uW: 1e-6, nW: 1e-9, pW: 1e-12 };
const CURRENTS: Record<string, number> = { A: 1, mA: 1e-3, uA: 1e-6, nA: 1e-9, pA: 1e-12 };
const TIMES: Record<string, number> = { s: 1, ms: 1e-3, us: 1e-6, ns: 1e-9 };
const LENGTHS: Record<string, number> = { m: 1, mm: 1e-3, um: 1e-6, nm: 1e-9 };

export const READING_UNITS: readonly string[] = [...Object.keys(POWERS), ...Object.keys(CURRENTS)];

/** What columns may be called, before their unit. */
const UNITS_OF: Record<string, Record<string, number>> = {
  power_without: POWERS,
  power_with: POWERS,
  current_without: CURRENTS,
  current_with: CURRENTS,
  time: TIMES,
  reference_diameter: LENGTHS,
  reference_uncertainty: LENGTHS,
};

const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;
const DIAMETERS_M = [1e-11, 1e-2] as const;

/** A column with the factor that turns its numbers into SI units. */
interface Column {
  name: string;
  at: number;
  factor: number;
}

/**
 * Reads measured powers: a header such as `power_without_uW,power_with_uW,time_ms,label,reference_diameter_um`, then one particle
 * a row. Powers come in W, mW, uW, nW or pW, or as `current_…` in A, mA, uA, nA or pA; times in s, ms, us, ns; lengths in m, mm,
 * um, nm. All but the two powers may be left out; `reference_uncertainty_…` is a standard uncertainty. Cells that are no number stay
 * in their row as a mistake of it.
 *
 * @param responsivityAW turns currents into powers
 * @throws RimwrightError `input` as `readCsvTable`, for a missing power, and for names that are nearly right or there twice
 */
export function readPowersCsv(
  text: string,
  file: string,
  responsivityAW: number,
  named: NamedColumns | null = null,
): PowersFile {
  const { header, rows } = readCsvTable(text, file);
  const columns = named === null ? declaredPowers(header, file) : namedPowers(header, file, named);
  const isCurrent = named === null ? columns.without.name.startsWith('current') : named.unit in CURRENTS;
  const scale = isCurrent ? 1 / responsivityAW : 1;
  const time = findColumn(header, 'time');
  const diameter = findColumn(header, 'reference_diameter');
  const uncertainty = findColumn(header, 'reference_uncertainty');
  const label = header.indexOf('label');
  const used = [columns.without, columns.with, time, diameter, uncertainty].flatMap((one) => one?.at ?? []);
  const unused = header.filter((_, i) => i !== label && !used.includes(i));
  refuseSlips(unused, header, file, named);
  const readings = rows.map(({ line, cells }): PowerReading => {
    const mistakes: string[] = [];
    const number = ({ name, at, factor }: Column) => {
      if (NUMBER.test(cells[at])) return Number(cells[at]) * factor;
      mistakes.push(cells[at] === '' ? `${name} is empty` : `${name} is not a number: ${quote(cells[at])}`);
      return Number.NaN;
    };
    const optional = (column: Column | undefined, isGood: (value: number) => boolean, expected: string) => {
      if (column === undefined || cells[column.at] === '') return null;
      const value = number(column);
      if (!Number.isNaN(value) && !isGood(value)) mistakes.push(`${column.name} is not ${expected}`);
      return value;
    };
    const withoutW = number(columns.without) * scale;
    const withW = number(columns.with) * scale;
    const averagingS = optional(time, (value) => value > 0, 'above 0');
    const isDiameter = (value: number) => value >= DIAMETERS_M[0] && value <= DIAMETERS_M[1];
    const diameterM = optional(diameter, isDiameter, 'from 0.01 nm to 10 mm');
    const standardUncertaintyM = optional(uncertainty, (value) => value >= 0, '0 or more') ?? 0;
    return {
      line,
      label: label < 0 ? '' : cells[label],
      withoutW,
      withW,
      averagingS,
      reference: diameterM === null ? null : { diameterM, standardUncertaintyM },
      mistakes,
    };
  });
  return { readings, unused };
}

/** The column `name_unit`, if there is one. */
function findColumn(header: readonly string[], name: string): Column | undefined {
  for (const [unit, factor] of Object.entries(UNITS_OF[name])) {
    const at = header.findIndex((title) => title.replace(/[µμ]/g, 'u') === `${name}_${unit}`);
    if (at >= 0) return { name: header[at], at, factor };
  }
  return undefined;
}

function declaredPowers(header: readonly string[], file: string): { without: Column; with: Column } {
  const pairs = (['power', 'current'] as const).map((what) => ({
    without: findColumn(header, `${what}_without`),
    with: findColumn(header, `${what}_with`),
  }));
  for (const { without, with: other } of pairs) {
    if (without !== undefined && other !== undefined) return { without, with: other };
  }
  const found = `the columns ${header.slice(0, 12).map(quote).join(', ')}`;
  const expected =
    'power_without_uW and power_with_uW (or W, mW, nW; or current_… in A, mA, uA, nA), ' +
    'or --without COLUMN --with COLUMN --column-unit uW';
  throw inputError([{ file, line: 1, found, expected }]);
}

function namedPowers(
  header: readonly string[],
  file: string,
  { without, with: other, unit }: NamedColumns,
): { without: Column; with: Column } {
  const factor = POWERS[unit] ?? CURRENTS[unit];
  const [first, second] = [
    ['--without', without],
    ['--with', other],
  ].map(([key, name]): Column => {
    const at = header.indexOf(name);
    if (at >= 0) return { name, at, factor };
    const nearest = nearestName(name, header);
    const hint = nearest === undefined ? '' : ` (did you mean ${nearest}?)`;
    const expected = `one of the columns ${header.slice(0, 12).join(', ')}${hint}`;
    throw inputError([{ file, line: 1, key, found: quote(name), expected }]);
  });
  if (first.at !== second.at) return { without: first, with: second };
  throw inputError([{ key: '--with', found: quote(other), expected: 'another column than --without' }]);
}

/** Names that are there twice, or that one letter keeps from being used. */
function refuseSlips(
  unused: readonly string[],
  header: readonly string[],
  file: string,
  named: NamedColumns | null,
): void {
  const known = Object.entries(UNITS_OF).flatMap(([name, units]) =>
    Object.keys(units).map((unit) => `${name}_${unit}`),
  );
  const problems: Problem[] = [];
  header.forEach((title, i) => {
    if (title !== '' && header.indexOf(title) < i) {
      problems.push({ file, line: 1, found: `${quote(title)} twice`, expected: 'each column once' });
    }
  });
  for (const title of named === null ? unused : []) {
    const nearest = nearestName(title, [...known, 'label']);
    if (nearest === undefined || known.includes(title)) continue;
    problems.push({
      file,
      line: 1,
      found: quote(title),
      expected: `another name, or ${nearest} if that is meant`,
    });
  }
  if (problems.length > 0) throw inputError(problems);
}

function quote(text: string): string {
  return JSON.stringify(text.length > 40 ? `${text.slice(0, 40)}…` : text);
}
