/**
 * A number in plain decimal notation, without exponent, trailing zeros or minus zero: many readers of drawings do not
 * take `1e-7`.
 *
 * @param value finite, |value| < 1e21
 * @param digits decimals kept, 0 to 20
 */
export function plainDecimal(value: number, digits: number): string {
  const fixed = value.toFixed(digits);
  const text = digits > 0 ? fixed.replace(/\.?0+$/, '') : fixed;
  return text === '-0' ? '0' : text;
}

/** A number to six significant digits in plain decimal notation: for pictures, at any scale. |value| from 1e-14 to 1e21, or 0. */
export function shortDecimal(value: number): string {
  const digits = value === 0 ? 0 : 5 - Math.floor(Math.log10(Math.abs(value)));
  return plainDecimal(value, Math.min(20, Math.max(0, digits)));
}
