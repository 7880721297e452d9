import { inputError } from '../base/errors.ts';
import { loadUnits } from '../base/quantity.ts';
import type { NamedColumns } from '../run/readPowersCsv.ts';
import { READING_UNITS } from '../run/readPowersCsv.ts';

/** `--without`, `--with` and `--column-unit`: all of them, or none. */
export function namedColumns(options: {
  without?: string;
  with?: string;
  columnUnit?: string;
}): NamedColumns | null {
  const given = [options.without, options.with, options.columnUnit];
  if (given.every((text) => text === undefined)) return null;
  const [without, other, unit] = given;
  if (without === undefined || other === undefined || unit === undefined) {
    const missing = ['--without', '--with', '--column-unit'].filter((_, i) => given[i] === undefined);
    throw refused(missing[0], 'nothing', '--without COLUMN --with COLUMN --column-unit uW, all three');
  }
  const plain = unit.replace(/[µμ]/, 'u');
  if (READING_UNITS.includes(plain)) return { without, with: other, unit: plain };
  throw refused('--column-unit', JSON.stringify(unit), `one of ${READING_UNITS.join(', ')}`);
}

/** `--omit outliers`, or `--omit "12, 17"` for lines of the data file. */
export function readOmitted(text: string | undefined): ReadonlySet<number> | 'outliers' {
  if (text === undefined) return new Set();
  if (text.trim() === 'outliers') return 'outliers';
  const lines = text.split(',').map((part) => part.trim());
  if (lines.every((line) => /^[1-9]\d{0,6}$/.test(line))) return new Set(lines.map(Number));
  throw refused(
    '--omit',
    JSON.stringify(text.slice(0, 60)),
    'outliers, or lines of the data such as "12, 17"',
  );
}

/** `--saturation "2 mW"`, or as a current, in watts; null where it is left out. */
export async function readSaturation(
  text: string | undefined,
  responsivityAW: number,
): Promise<number | null> {
  if (text === undefined) return null;
  const units = await loadUnits();
  const current = units.read(text, 'current');
  const powerW = current === null ? units.read(text, 'power') : current / responsivityAW;
  if (powerW !== null && powerW > 0) return powerW;
  throw refused('--saturation', JSON.stringify(text.slice(0, 60)), 'a power or a current, such as 2 mW');
}

function refused(key: string, found: string, expected: string) {
  return inputError([{ key, found, expected }]);
}
