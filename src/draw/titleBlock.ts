import { shortDecimal as n } from './plainDecimal.ts';
import { markupText, wrapText } from './plainText.ts';

/** One thing that a title block states. */
export interface Fact {
  label: string;
  text: string;
}

const LABEL_SIZE = 2.2;
const TEXT_SIZE = 3;
const LINE = 1.4 * TEXT_SIZE;
const PAD = 1.5;
const INK = '#1d2328';
const RULE = `stroke="${INK}" stroke-width="0.2"`;

/** Width of an average letter over its height, on the wide side. */
const LETTER = 0.58;

/**
 * A framed block of facts, two in a row (one that is long has the row to itself), and under it the notes, numbered.
 *
 * @param left, top, width in user units, which are millimetres
 */
export function titleBlock(
  facts: readonly Fact[],
  notes: readonly string[],
  { left, top, width }: { left: number; top: number; width: number },
): { markup: string; bottom: number } {
  const parts: string[] = [];
  let y = top;
  for (const row of rowsOf(facts, width / 2)) {
    const cellWidth = width / row.length;
    const lines = row.map(({ text }) => wrapText(text, letters(cellWidth)));
    const height = LABEL_SIZE + LINE * Math.max(1, ...lines.map(({ length }) => length)) + 2 * PAD;
    row.forEach(({ label }, k) => {
      const x = left + k * cellWidth;
      parts.push(
        `<rect x="${n(x)}" y="${n(y)}" width="${n(cellWidth)}" height="${n(height)}" fill="none" ${RULE}/>`,
        `<text x="${n(x + PAD)}" y="${n(y + PAD + 0.8 * LABEL_SIZE)}" font-size="${LABEL_SIZE}" fill="#4a545c">${markupText(label)}</text>`,
        ...lines[k].map((line, l) => textLine(x + PAD, y + PAD + LABEL_SIZE + LINE * (l + 0.8), line)),
      );
    });
    y += height;
  }
  y += PAD;
  for (const [k, note] of notes.entries()) {
    const mark = `${k + 1}. `;
    for (const [l, line] of wrapText(note, letters(width) - mark.length).entries()) {
      y += LINE;
      parts.push(textLine(left + PAD, y, l === 0 ? mark + line : line));
    }
  }
  return { markup: `<g id="title-block">\n${parts.join('\n')}\n</g>`, bottom: y + PAD };
}

/** Letters that fit into a cell. */
function letters(width: number): number {
  return Math.max(8, Math.floor((width - 2 * PAD) / (LETTER * TEXT_SIZE)));
}

function rowsOf(facts: readonly Fact[], half: number): Fact[][] {
  const rows: Fact[][] = [];
  let open: Fact | null = null;
  for (const fact of facts) {
    if (fact.text.length > letters(half)) {
      if (open) rows.push([open]);
      open = null;
      rows.push([fact]);
    } else if (open) {
      rows.push([open, fact]);
      open = null;
    } else open = fact;
  }
  if (open) rows.push([open]);
  return rows;
}

function textLine(x: number, y: number, content: string): string {
  return `<text x="${n(x)}" y="${n(y)}">${markupText(content)}</text>`;
}
