/** Stands for a value that JSON has no word for. */
const MARK = '$exact';

/**
 * JSON that gives back the very same value, which plain JSON does not: infinities, NaN, −0 and Float64Arrays are kept. (Every
 * other finite double survives JSON exactly.) The value must be plain data without a key `$exact` of its own.
 */
export function exactJson(value: unknown): string {
  return JSON.stringify(value, (_, item: unknown) => {
    if (typeof item === 'number' && (!Number.isFinite(item) || Object.is(item, -0))) {
      return { [MARK]: Object.is(item, -0) ? '-0' : String(item) };
    }
    return item instanceof Float64Array ? { [MARK]: Array.from(item) } : item;
  });
}

/**
 * The value that `exactJson` wrote.
 *
 * @throws SyntaxError where the text is no JSON
 */
export function fromExactJson(text: string): unknown {
  return JSON.parse(text, (_, item: unknown) => {
    if (typeof item !== 'object' || item === null || !(MARK in item)) return item;
    const kept = item[MARK];
    return Array.isArray(kept) ? Float64Array.from(kept as number[]) : Number(kept);
  });
}
