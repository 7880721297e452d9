/** What JSON can hold. */
type Json = null | boolean | number | string | readonly Json[] | { readonly [key: string]: Json | undefined };

const LONGEST_LINE = 100;

/**
 * JSON to be read by people as well: what fits in a line stands in one, and a ring of coordinates always does. Keys keep
 * their order, so the same value always gives the same text. Ends with a line break.
 *
 * @param value plain data; what JSON cannot hold becomes what `JSON.stringify` makes of it
 */
export function jsonText(value: unknown): string {
  return `${written(JSON.parse(JSON.stringify(value)) as Json, '')}\n`;
}

function written(value: Json, indent: string): string {
  if (typeof value !== 'object' || value === null || isRing(value)) return JSON.stringify(value);
  const line = inOneLine(value);
  if (line.length + indent.length <= LONGEST_LINE) return line;
  const inner = `${indent}  `;
  if (Array.isArray(value)) {
    const items = value.map((item: Json) => inner + written(item, inner));
    return `[\n${items.join(',\n')}\n${indent}]`;
  }
  const entries = Object.entries(value as { [key: string]: Json }).map(
    ([key, item]) => `${inner}${JSON.stringify(key)}: ${written(item, inner)}`,
  );
  return `{\n${entries.join(',\n')}\n${indent}}`;
}

function inOneLine(value: Json): string {
  if (typeof value !== 'object' || value === null || isRing(value)) return JSON.stringify(value);
  if (Array.isArray(value)) return `[${value.map(inOneLine).join(', ')}]`;
  const entries = Object.entries(value as { [key: string]: Json });
  return `{ ${entries.map(([key, item]) => `${JSON.stringify(key)}: ${inOneLine(item)}`).join(', ')} }`;
}

/** A list of numbers, or of lists of numbers. */
function isRing(value: Json): boolean {
  const isNumbers = (items: Json) => Array.isArray(items) && items.every((item) => typeof item === 'number');
  return isNumbers(value) || (Array.isArray(value) && value.every(isNumbers));
}
