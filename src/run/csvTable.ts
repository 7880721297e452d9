import type { Problem } from '../base/errors.ts';
import { inputError } from '../base/errors.ts';

/** A table as it stands in a CSV file. */
export interface CsvTable {
  header: string[];
  /** As many cells each as the header has; the line that each begins in. */
  rows: { line: number; cells: string[] }[];
}

const MOST_ROWS = 100_000;
const MOST_LISTED = 10;

/**
 * Reads CSV (RFC 4180): commas, cells in double quotes where they hold commas, quotes or line breaks. A byte order mark, CR LF,
 * spaces around cells and empty lines are let through.
 *
 * @param text the file's content
 * @param file its name, for messages
 * @throws RimwrightError `input` for quotes that do not close, rows of another length than the header (the first ten are listed),
 *   no rows or more than 100 000
 */
export function readCsvTable(text: string, file: string): CsvTable {
  const [first, ...rest] = readRows(text.replace(/^\uFEFF/, ''), file);
  if (first === undefined || rest.length === 0 || rest.length > MOST_ROWS) {
    const found = first === undefined ? 'an empty file' : `${rest.length} rows`;
    throw inputError([{ file, found, expected: `a header and 1 to ${MOST_ROWS} rows` }]);
  }
  const { cells: header } = first;
  if (header.length === 1 && /[;\t]/.test(header[0])) {
    const found = `a header without commas, ${quote(header[0])}`;
    throw inputError([{ file, line: first.line, found, expected: 'cells separated by commas' }]);
  }
  const problems: Problem[] = rest
    .filter(({ cells }) => cells.length !== header.length)
    .map(({ line, cells }) => ({
      file,
      line,
      found: `${cells.length} ${cells.length === 1 ? 'cell' : 'cells'}`,
      expected: `${header.length}, one for each column of the header`,
    }));
  if (problems.length > 0) throw inputError(problems.slice(0, MOST_LISTED));
  return { header, rows: rest };
}

function readRows(text: string, file: string): CsvTable['rows'] {
  const rows: CsvTable['rows'] = [];
  // One cell, in quotes or plain, and what ends it.
  const cell = /[ \t]*(?:"([^"]*(?:""[^"]*)*)"[ \t]*|([^",\r\n]*))(,|\r\n|\n|\r|$)/y;
  let line = 1;
  let row: { line: number; cells: string[] } = { line, cells: [] };
  while (cell.lastIndex <= text.length) {
    const match = cell.exec(text);
    if (match === null) {
      const expected = 'a cell, in double quotes that open and close where it holds quotes or commas';
      throw inputError([{ file, line, found: `column ${row.cells.length + 1}: a stray quote`, expected }]);
    }
    const [whole, quoted, plain, end] = match;
    row.cells.push(quoted === undefined ? plain.trim() : quoted.replaceAll('""', '"'));
    line += (whole.match(/\r\n|\n|\r/g) ?? []).length;
    if (end === ',') continue;
    const isEmpty = row.cells.length === 1 && row.cells[0] === '';
    if (!isEmpty) rows.push(row);
    row = { line, cells: [] };
    if (end === '') break;
  }
  return rows;
}

function quote(text: string): string {
  return JSON.stringify(text.length > 60 ? `${text.slice(0, 60)}…` : text);
}
