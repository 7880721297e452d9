import { shortDecimal } from './plainDecimal.ts';
import { markupText, plainText } from './plainText.ts';

/** A table of numbers as a picture. */
export interface HeatMap {
  title: string;
  /** What the numbers are: `time`. */
  quantity: string;
  across: { title: string; values: readonly string[] };
  up: { title: string; values: readonly string[] };
  /** For each value of `across` those of `up`: above 0, or null where there is none. */
  numbers: readonly (readonly (number | null)[])[];
  /** A number in words: `325 µs`. */
  textOf: (value: number) => string;
}

const CELL = { width: 96, height: 48 };
const LEFT = 130;
const TOP = 56;
const BOTTOM = 92;
const RIGHT = 24;

/** Widths of letters of the title and of other text, on the safe side. */
const TITLE_LETTER = 9;
const LETTER = 7.5;

/** From the smallest to the largest number: light enough for dark letters throughout. */
const FROM = [222, 241, 247];
const TO = [247, 196, 140];

/**
 * A heat map as SVG, each cell with its number; colours go with the logarithm. Cells without a number are hatched. The same
 * input always gives the same text.
 */
export function drawHeatMap(map: HeatMap): string {
  const { across, up, numbers } = map;
  const note = `${map.quantity}; hatched: none meets the target`;
  const letters = Math.max(TITLE_LETTER * plainText(map.title).length, LETTER * note.length);
  const width = Math.max(LEFT + across.values.length * CELL.width, RIGHT + Math.ceil(letters)) + RIGHT;
  const height = TOP + up.values.length * CELL.height + BOTTOM;
  const present = numbers.flat().filter((value) => value !== null);
  const range: [number, number] = [Math.min(...present), Math.max(...present)];
  const bottom = TOP + up.values.length * CELL.height;
  const cells = numbers.flatMap((column, i) =>
    column.map((value, j) =>
      cellMarkup(map, value, range, LEFT + i * CELL.width, bottom - (j + 1) * CELL.height),
    ),
  );
  const centre = LEFT + (across.values.length * CELL.width) / 2;
  const middle = TOP + (up.values.length * CELL.height) / 2;
  return [
    `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 ${width} ${height}" width="${width}" height="${height}" font-family="sans-serif" font-size="13" role="img">`,
    `<title>${markupText(map.title)}</title>`,
    '<defs><pattern id="none" width="8" height="8" patternUnits="userSpaceOnUse"><path d="M0 8L8 0" stroke="#888" stroke-width="1"/></pattern></defs>',
    `<rect width="${width}" height="${height}" fill="#fff"/>`,
    text(RIGHT, 28, markupText(map.title), 'start', 'font-size="16"'),
    ...cells,
    ...across.values.map((value, i) => text(LEFT + (i + 0.5) * CELL.width, bottom + 20, markupText(value))),
    text(centre, bottom + 42, markupText(across.title)),
    ...up.values.map((value, j) =>
      text(LEFT - 10, bottom - (j + 0.5) * CELL.height + 5, markupText(value), 'end'),
    ),
    text(20, middle, markupText(up.title), 'middle', `transform="rotate(-90 20 ${middle})"`),
    text(RIGHT, height - 18, markupText(note), 'start', 'fill="#555"'),
    '</svg>',
    '',
  ].join('\n');
}

function cellMarkup(
  { textOf }: HeatMap,
  value: number | null,
  range: [number, number],
  x: number,
  y: number,
): string {
  const fill = value === null ? 'url(#none)' : colourOf(value, range);
  const box = `<rect x="${x}" y="${y}" width="${CELL.width}" height="${CELL.height}" fill="${fill}" stroke="#fff"/>`;
  if (value === null) return box;
  return `${box}${text(x + CELL.width / 2, y + CELL.height / 2 + 5, markupText(textOf(value)))}`;
}

function colourOf(value: number, [low, high]: [number, number]): string {
  const share = high > low ? Math.log(value / low) / Math.log(high / low) : 0;
  const parts = FROM.map((from, i) => Math.round(from + share * (TO[i] - from)));
  return `rgb(${parts.join(',')})`;
}

function text(x: number, y: number, content: string, anchor = 'middle', more = ''): string {
  return `<text x="${shortDecimal(x)}" y="${shortDecimal(y)}" text-anchor="${anchor}"${more && ` ${more}`}>${content}</text>`;
}
