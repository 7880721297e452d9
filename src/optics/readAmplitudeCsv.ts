import type { Problem } from '../base/errors.ts';
import { inputError } from '../base/errors.ts';
import type { AmplitudeTable } from './amplitudeTable.ts';
import { LEAST_ROWS, samplingMisfit } from './amplitudeTable.ts';

const HEADER = 'angle_deg,s1_re,s1_im,s2_re,s2_im';
const COLUMNS = 5;
const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;
const MOST_ROWS = 100_000;
const MOST_LISTED = 10;
/** Far beyond any particle, and far from the end of the doubles. */
const LARGEST_AMPLITUDE = 1e30;
/** Closer rows are one row; the most of them over 180° stand 2e-3 apart. */
const LEAST_STEP_DEG = 1e-6;
/** Of |S(0)|: S1 and S2 are one number at 0°. */
const FORWARD_TOLERANCE = 1e-6;
/** Of |S(0)|: the largest misfit of a row. What is interpolated between rows is then right to some 1e-4. */
const SAMPLING_TOLERANCE = 1e-3;

/**
 * Reads a table of amplitudes: the header `angle_deg,s1_re,s1_im,s2_re,s2_im`, then one angle a line, from 0 to some largest one.
 * A byte order mark, CR LF, spaces and empty last lines are let through.
 *
 * @param text the file's content
 * @param file its name, for messages
 * @throws RimwrightError `input`: lines that are not five finite numbers, angles beyond 180° or not ascending by 1e-6° or more
 *   (the first ten are listed), a first angle that is not 0, S1(0) and S2(0) that differ by more than 1e-6 of themselves, no
 *   extinction, fewer than 8 rows or more than 100 000, rows too far apart to interpolate between them within 1e-3 of |S(0)|
 */
export function readAmplitudeCsv(text: string, file: string): AmplitudeTable {
  const lines = text.replace(/^\uFEFF/, '').split(/\r\n|\n|\r/);
  while (lines.length > 1 && lines[lines.length - 1].trim() === '') lines.pop();
  if (lines[0].replace(/\s/g, '') !== HEADER) {
    throw inputError([{ file, line: 1, found: quote(lines[0]), expected: `the header ${HEADER}` }]);
  }
  const rows = lines.length - 1;
  if (rows < LEAST_ROWS || rows > MOST_ROWS) {
    throw inputError([{ file, found: `${rows} rows`, expected: `${LEAST_ROWS} to ${MOST_ROWS} rows` }]);
  }
  const table = readRows(lines, file);
  refuseBadForward(table, file);
  const { row, share } = samplingMisfit(table);
  if (share > SAMPLING_TOLERANCE) throw tooCoarse(table, row, share, file);
  return { ...table, misfit: share };
}

/** Row i stands in line i + 2, after the header. */
const lineOfRow = (row: number) => row + 2;

function readRows(lines: readonly string[], file: string): AmplitudeTable {
  const rows = lines.length - 1;
  const angles = new Float64Array(rows);
  const values = new Float64Array(4 * rows);
  const problems: Problem[] = [];
  let beforeDeg = Number.NEGATIVE_INFINITY;
  for (let row = 0; row < rows && problems.length < MOST_LISTED; row++) {
    const given = lines[row + 1];
    const refuse = (found: string, expected: string) =>
      problems.push({ file, line: lineOfRow(row), found, expected });
    const fields = given.split(',').map((field) => field.trim());
    const numbers = fields.map((field) => (NUMBER.test(field) ? Number(field) : Number.NaN));
    const [angleDeg] = numbers;
    if (fields.length !== COLUMNS || !numbers.every((value) => Math.abs(value) <= LARGEST_AMPLITUDE)) {
      refuse(quote(given), 'five finite numbers such as 0.5,21.1,8.58,21.1,8.58');
      continue;
    }
    if (row === 0 && angleDeg !== 0) refuse(`${angleDeg} deg first`, 'a first angle of 0 deg');
    else if (angleDeg < 0 || angleDeg > 180) refuse(`${angleDeg} deg`, 'an angle from 0 to 180 deg');
    else if (angleDeg < beforeDeg + LEAST_STEP_DEG) {
      refuse(`${angleDeg} deg after ${beforeDeg} deg`, 'angles that ascend by 1e-6 deg or more');
    } else beforeDeg = angleDeg;
    angles[row] = (angleDeg * Math.PI) / 180;
    values.set(numbers.slice(1), 4 * row);
  }
  if (problems.length > 0) throw inputError(problems);
  return { angles, values, misfit: 0 };
}

function refuseBadForward({ values }: AmplitudeTable, file: string): void {
  const line = lineOfRow(0);
  const [re1, im1, re2, im2] = values;
  const apart = Math.hypot(re1 - re2, im1 - im2);
  if (apart > FORWARD_TOLERANCE * Math.hypot(re1, im1)) {
    const found = `S1(0) = (${re1}, ${im1}) and S2(0) = (${re2}, ${im2})`;
    throw inputError([{ file, line, found, expected: 'S1(0) and S2(0) alike within 1e-6' }]);
  }
  if (!(re1 > 0)) {
    const expected = 'Re S(0) above 0: the particle removes light';
    throw inputError([{ file, line, found: `Re S(0) = ${re1}`, expected }]);
  }
}

function tooCoarse({ angles }: AmplitudeTable, row: number, share: number, file: string): Error {
  const angleDeg = Number(((angles[row] * 180) / Math.PI).toPrecision(9));
  const percent = Number((100 * share).toPrecision(2));
  return inputError([
    {
      file,
      line: lineOfRow(row),
      found: `S at ${angleDeg} deg ${percent} % of |S(0)| away from what the rows around it say`,
      expected: '0.1 % at most: finer steps, a dozen to each ripple, and no slips',
    },
  ]);
}

function quote(line: string): string {
  return JSON.stringify(line.length > 60 ? `${line.slice(0, 60)}…` : line);
}
