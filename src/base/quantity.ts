import { inputError, RimwrightError } from './errors.ts';

/** What a quantity measures, each with the SI unit of its number (`ratio` is a bare number, angles are radians). */
const SI_UNIT = {
  length: 'm',
  area: 'm^2',
  angle: 'rad',
  irradiance: 'W/m^2',
  responsivity: 'A/W',
  current: 'A',
  power: 'W',
  time: 's',
  temperature: 'K',
  viscosity: 'Pa s',
  ratio: '',
} as const;

export type Dimension = keyof typeof SI_UNIT;

/** How errors name a quantity of each dimension, with an example. */
const IN_WORDS: Record<Dimension, [name: string, example: string]> = {
  length: ['a length with its unit', '20 mm'],
  area: ['an area with its unit', '12.3 um^2'],
  angle: ['an angle with its unit', '30 deg'],
  irradiance: ['an irradiance with its unit', '5 W/cm^2'],
  responsivity: ['a responsivity with its unit', '0.42 A/W'],
  current: ['a current with its unit', '2 pA'],
  power: ['a power with its unit', '2 mW'],
  time: ['a time with its unit', '1 ms'],
  temperature: ['a temperature with its unit', '20 degC'],
  viscosity: ['a viscosity with its unit', '1.2 mPa s'],
  ratio: ['a ratio', '1 % or 0.01'],
};

/** Reads quantities written as text, such as `635 nm`, `.5 mm`, `10 µm`, `5 W/cm^2`, `30 deg`, `20 degC`, `1 %`. */
export interface Units {
  /** The quantity in SI units, or null where the text is no finite quantity of that dimension. */
  read(text: string, dimension: Dimension): number | null;
  /** `A to B` in SI units as written, also where A exceeds B; a single quantity gives [A, A]; null as for `read`. */
  readRange(text: string, dimension: Dimension): [number, number] | null;
  /** As `read`; throws an `input` error that names `key` instead of giving null. */
  parse(text: string, dimension: Dimension, key?: string): number;
  /** As `readRange`; throws an `input` error that names `key` instead of giving null, and where A exceeds B. */
  range(text: string, dimension: Dimension, key?: string): [number, number];
}

/** `a length with its unit, such as 20 mm`: what an error says is expected. */
export function quantityInWords(dimension: Dimension, example = IN_WORDS[dimension][1]): string {
  return `${IN_WORDS[dimension][0]}, such as ${example}`;
}

const QUANTITY = /^([+-]?(?:\d+\.?\d*|\.\d+))(?:[eE]([+-]?\d+))?\s*(.*)$/;
const UNIT = /^[A-Za-z]+(?:\^-?\d)?(?:(?:\s*[*/]\s*|\s+)[A-Za-z]+(?:\^-?\d)?)*$/;
/** 0 °C in kelvin. */
const CELSIUS_ZERO_K = 273.15;
const LONGEST_TEXT = 100;

/**
 * Loads the table of units. It takes a quarter of a second, so only callers that read quantities should ask for it.
 *
 * @throws RimwrightError `machine` where the installed library cannot be loaded
 */
export async function loadUnits(): Promise<Units> {
  const factorOf = await loadFactors();

  function read(text: string, dimension: Dimension): number | null {
    if (text.length > LONGEST_TEXT) return null;
    const match = QUANTITY.exec(text.trim());
    if (match === null) return null;
    const [, mantissa, exponent = '0', unit] = match;
    // The one unit whose zero is elsewhere, so that no factor turns it into SI.
    if (dimension === 'temperature' && /^(?:deg|°)C$/.test(unit))
      return Number(`${mantissa}e${exponent}`) + CELSIUS_ZERO_K;
    const factor = factorOf(unit, dimension);
    if (factor === null) return null;
    const value = timesFactor(mantissa, Number(exponent), factor);
    return Number.isFinite(value) ? value : null;
  }

  function readRange(text: string, dimension: Dimension): [number, number] | null {
    const ends = text.trim().split(/\s+to\s+/);
    if (ends.length > 2) return null;
    const low = read(ends[0], dimension);
    const high = read(ends[ends.length - 1], dimension);
    return low === null || high === null ? null : [low, high];
  }

  return {
    read,
    readRange,
    parse(text, dimension, key) {
      return read(text, dimension) ?? refuse(text, quantityInWords(dimension), key);
    },
    range(text, dimension, key) {
      const ends = readRange(text, dimension) ?? refuse(text, quantityInWords(dimension), key);
      return ends[0] <= ends[1] ? ends : refuse(text, 'the smaller value first', key);
    },
  };
}

function refuse(text: string, expected: string, key: string | undefined): never {
  throw inputError([{ found: JSON.stringify(text), expected, ...(key === undefined ? {} : { key }) }]);
}

/** Opens mathjs and gives the factor of a unit to SI, or null for units it does not know or of another dimension. */
async function loadFactors(): Promise<(unit: string, dimension: Dimension) => number | null> {
  // The whole package takes a second to load; its bundled build a quarter of one.
  const { default: math } = await import('mathjs/lib/browser/math.js').catch((cause: unknown) => {
    throw new RimwrightError('machine', `the table of units (mathjs) cannot be loaded: ${String(cause)}`);
  });
  return (unit, dimension) => {
    if (dimension === 'ratio') return unit === '' ? 1 : unit === '%' ? 0.01 : null;
    const plain = unit.replace(/[µμ]/g, 'u').replace(/²/g, '^2').replace(/°$/, 'deg');
    if (!UNIT.test(plain)) return null;
    try {
      const known = math.unit(1, plain);
      return known.equalBase(math.unit(SI_UNIT[dimension])) ? known.toNumber(SI_UNIT[dimension]) : null;
    } catch {
      return null; // mathjs throws for a unit that it does not know
    }
  };
}

/** mantissa · 10^exponent · factor, correctly rounded where the factor is a power of ten: 635 nm is 6.35e-7 to the last digit. */
function timesFactor(mantissa: string, exponent: number, factor: number): number {
  const power = Math.round(Math.log10(factor));
  const isPowerOfTen = Math.abs(factor / Number(`1e${power}`) - 1) < 1e-14;
  return isPowerOfTen
    ? Number(`${mantissa}e${exponent + power}`)
    : Number(`${mantissa}e${exponent}`) * factor;
}

/** Units that tables use, smallest first. */
const TABLE_UNITS: Record<Dimension, [unit: string, factor: number][]> = {
  length: [
    ['nm', 1e-9],
    ['µm', 1e-6],
    ['mm', 1e-3],
    ['m', 1],
  ],
  area: [
    ['nm²', 1e-18],
    ['µm²', 1e-12],
    ['mm²', 1e-6],
  ],
  angle: [['deg', Math.PI / 180]],
  irradiance: [['W/cm²', 1e4]],
  responsivity: [['A/W', 1]],
  current: [
    ['pA', 1e-12],
    ['nA', 1e-9],
    ['µA', 1e-6],
    ['mA', 1e-3],
    ['A', 1],
  ],
  power: [
    ['nW', 1e-9],
    ['µW', 1e-6],
    ['mW', 1e-3],
    ['W', 1],
  ],
  time: [
    ['ns', 1e-9],
    ['µs', 1e-6],
    ['ms', 1e-3],
    ['s', 1],
  ],
  temperature: [['K', 1]],
  viscosity: [
    ['µPa s', 1e-6],
    ['mPa s', 1e-3],
    ['Pa s', 1],
  ],
  ratio: [['%', 0.01]],
};

/**
 * A quantity for people: `635 nm`, `60.6 µm`, `1 %`, `1 ms`.
 *
 * @param value in SI units; what is not finite is written as it is
 * @param digits significant digits, 1 to 15; trailing zeros are left out
 */
export function formatQuantity(value: number, dimension: Dimension, digits = 4): string {
  const units = TABLE_UNITS[dimension];
  if (value === 0) return `0 ${units[Math.floor(units.length / 2)][0]}`;
  let text = String(value);
  for (const [unit, factor] of units) {
    const rounded = Number((value / factor).toPrecision(digits));
    text = `${rounded} ${unit}`;
    if (Math.abs(rounded) < 1000) break;
  }
  return text;
}
