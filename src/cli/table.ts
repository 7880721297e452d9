import Table from 'cli-table3';
import { coloursFor } from './colour.ts';

/** One column of a table. */
export interface Column<Row> {
  /** Lines of the heading; the last one stands nearest to the cells. */
  title: readonly string[];
  cell: (row: Row) => string;
  align?: 'left' | 'right';
  /** Gives way where the table would be wider than a terminal: its cells are cut, with `…` at the cut. */
  flexible?: boolean;
}

/** Columns of a terminal that tables and notes keep to. */
export const TERMINAL_WIDTH = 80;
const GAP = 2;
const LEAST_FLEXIBLE = 6;

/** No lines but a rule under the heading. */
const CHARACTERS = {
  ...{ top: '', 'top-mid': '', 'top-left': '', 'top-right': '' },
  ...{ bottom: '', 'bottom-mid': '', 'bottom-left': '', 'bottom-right': '' },
  ...{ left: '', right: '', middle: '' },
  ...{ mid: '─', 'mid-mid': '', 'left-mid': '', 'right-mid': '' },
};

/** A table for standard output, at most 80 columns wide as long as the columns that are not flexible fit. */
export function table<Row>(columns: readonly Column<Row>[], rows: readonly Row[]): string {
  const { bold } = coloursFor(process.stdout);
  const cells = rows.map((row) => columns.map(({ cell }) => cell(row)));
  const widths = columns.map(({ title }, c) =>
    Math.max(...[...title, ...cells.map((line) => line[c])].map(({ length }) => length)),
  );
  const excess = widths.reduce((sum, width) => sum + width + GAP, -GAP) - TERMINAL_WIDTH;
  const height = Math.max(...columns.map(({ title }) => title.length));
  const drawn = new Table({
    head: columns.map(({ title }) =>
      [...Array(height - title.length).fill(''), ...title].map(bold).join('\n'),
    ),
    colAligns: columns.map(({ align = 'right' }) => align),
    colWidths: columns.map(({ flexible = false }, c) => {
      const width = flexible && excess > 0 ? Math.max(LEAST_FLEXIBLE, widths[c] - excess) : widths[c];
      return width + GAP;
    }),
    chars: CHARACTERS,
    style: { head: [], border: [], compact: true, 'padding-left': 0, 'padding-right': GAP },
  });
  drawn.push(...cells);
  const lines = drawn.toString().split('\n');
  return lines.map((line) => line.replace(/─+$/, (rule) => rule.slice(GAP)).trimEnd()).join('\n');
}
