/**
 * A text as one harmless line: line breaks, tabs and the like become one space; other control characters, marks that
 * turn the writing direction, and what XML does not allow are removed.
 */
export function plainText(text: string): string {
  return text
    .replace(/[\t\n\v\f\r\u0085\u2028\u2029]+/gu, ' ')
    .replace(/[\p{Cc}\p{Cs}\u202A-\u202E\u2066-\u2069\uFEFF\uFFFE\uFFFF]/gu, '');
}

/** `plainText` with the five characters that mean something in XML and HTML written as references: fit for text and for quoted attributes. */
export function markupText(text: string): string {
  return plainText(text).replace(/[&<>"']/g, (character) => `&#${character.charCodeAt(0)};`);
}

/**
 * Breaks a text at spaces into lines of at most `width` characters; a longer word is cut.
 *
 * @param width at least 1
 */
export function wrapText(text: string, width: number): string[] {
  const lines: string[] = [];
  let line = '';
  for (const word of plainText(text).split(/ +/)) {
    let rest = word;
    if (line !== '' && line.length + 1 + rest.length <= width) {
      line += ` ${rest}`;
      continue;
    }
    if (line !== '') lines.push(line);
    for (; rest.length > width; rest = rest.slice(width)) lines.push(rest.slice(0, width));
    line = rest;
  }
  return line === '' ? lines : [...lines, line];
}
