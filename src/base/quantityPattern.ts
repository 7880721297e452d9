import type { Dimension } from './quantity.ts';

const NUMBER = String.raw`(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?\s*`;
const PREFIX = '(?:da|[QRYZEPTGMkhdcmunpfazyrqµμ])?';
const METRE = `${PREFIX}m`;
const SQUARE = String.raw`(?:\^2|²)`;

/** Units in use, of those that `Units` reads; it knows rarer ones too. */
const UNITS: Record<Dimension, string> = {
  length: `${METRE}|in|inch|inches|mil|ft|angstrom`,
  area: `${METRE}${SQUARE}`,
  angle: `deg|degree|degrees|°|${PREFIX}rad|arcmin|arcsec`,
  irradiance: String.raw`${PREFIX}W(?:\s*/\s*${METRE}${SQUARE}|\s+${METRE}\^-2)`,
  responsivity: String.raw`${PREFIX}A\s*/\s*${PREFIX}W`,
  current: `${PREFIX}A`,
  power: `${PREFIX}W`,
  time: `${PREFIX}s|sec|second|seconds|min|minute|minutes|h|hr|hour|hours|day|days`,
  temperature: `(?:deg|°)C|${PREFIX}K`,
  viscosity: String.raw`${PREFIX}Pa\s*\*?\s*s`,
  ratio: '%?',
};

/**
 * A regular expression (ECMA-262) for a quantity as text, for tools that cannot run `Units`: of a `range` also `A to B`, of a
 * `tolerance` also `A rms`. It looks at no limits, but for
 * the sign.
 */
export function quantityPattern(
  dimension: Dimension,
  form: 'quantity' | 'range' | 'tolerance',
  mayBeNegative: boolean,
): string {
  const quantity = `${mayBeNegative ? '[+-]?' : '\\+?'}${NUMBER}(?:${UNITS[dimension]})`;
  const endings = {
    quantity: '',
    range: String.raw`(?:\s+to\s+${quantity})?`,
    tolerance: String.raw`(?:\s+rms)?`,
  };
  return String.raw`^\s*${quantity}${endings[form]}\s*$`;
}
