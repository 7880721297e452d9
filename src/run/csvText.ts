export type Cell = string | number | boolean;

/** Rows as CSV (RFC 4180); no cell can be taken for a formula. */
export function csvText(rows: readonly (readonly Cell[])[]): string {
  return rows.map((row) => `${row.map(cellText).join(',')}\r\n`).join('');
}

/** Spreadsheets run a text that begins like a formula; a leading apostrophe keeps it a text. */
function cellText(cell: Cell): string {
  if (typeof cell !== 'string') return String(cell);
  const harmless = /^[\s]*[=+\-@|%]|^[\t\r\n]/.test(cell) ? `'${cell}` : cell;
  return /[",\r\n]/.test(harmless) ? `"${harmless.replaceAll('"', '""')}"` : harmless;
}
