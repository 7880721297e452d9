import { format } from 'd3-format';

const prefixed = format('.3~s');
const threeDigits = format('.3~r');
const scientific = format('.2~e');
const SUPERSCRIPT = '⁰¹²³⁴⁵⁶⁷⁸⁹';

/** How tables write a value that is missing or not finite. */
const NO_VALUE = '–';

/** Three significant digits with an SI prefix: `60.6 µm`, `3.2 ms`. Only for units without a power. */
export function quantityText(value: number | null, unit: string): string {
  if (value === null || !Number.isFinite(value)) return NO_VALUE;
  const [, digits, prefix] = /^(.*?)([a-zA-Zµ]?)$/.exec(prefixed(value)) ?? [];
  return `${digits} ${prefix}${unit}`;
}

/** Three significant digits: `0.0123`, `9400`, and `1.2 × 10¹¹` or `10¹¹` outside 0.001 to 100 000. */
export function countText(value: number | null): string {
  if (value === null || !Number.isFinite(value)) return NO_VALUE;
  const size = Math.abs(value);
  if (size === 0 || (size >= 1e-3 && size < 1e5)) return threeDigits(value);
  const [mantissa, exponent] = scientific(value).split('e');
  const raised = [...exponent]
    .map((character) => SUPERSCRIPT[Number(character)] ?? (character === '+' ? '' : '⁻'))
    .join('');
  return mantissa === '1' ? `10${raised}` : `${mantissa} × 10${raised}`;
}

/** A time: `3.2 ms`, and plain seconds from one second on. */
export function timeText(seconds: number | null): string {
  return seconds !== null && Math.abs(seconds) >= 1 && Number.isFinite(seconds)
    ? `${countText(seconds)} s`
    : quantityText(seconds, 's');
}

/** A ratio as a percentage: `0.9 %`. */
export function percentText(ratio: number | null): string {
  return ratio === null || !Number.isFinite(ratio) ? NO_VALUE : `${countText(100 * ratio)} %`;
}

/** An area in mm² or, below 0.001 mm², in µm²: `0.0266 mm²`. */
export function areaText(areaM2: number): string {
  return Math.abs(areaM2) < 1e-9 ? `${countText(areaM2 * 1e12)} µm²` : `${countText(areaM2 * 1e6)} mm²`;
}

/** A weight with its sign: `+1`, `−0.5`. */
export function weightText(weight: number): string {
  return weight > 0 ? `+${countText(weight)}` : countText(weight);
}
