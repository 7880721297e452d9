import type { Shelf } from '../base/presetFiles.ts';
import type { Dimension } from '../base/quantity.ts';

/**
 * What a value of a brief may be, as plain data. Help, the brief's JSON Schema and written briefs are made of it, so that
 * none of them says anything that the checks do not.
 */
export type Holds =
  /** `isRange`: also `A to B`. Limits and example are in the brief's notation. */
  | { kind: 'quantity'; dimension: Dimension; isRange: boolean; from: string; to: string; example: string }
  | { kind: 'tolerance'; dimension: Dimension; largest: string; example: string }
  /** `isList`: a list of them, each once. */
  | { kind: 'words'; words: readonly string[]; isList: boolean }
  | { kind: 'number'; what: string; from: number; to: number; isWhole: boolean; example: number }
  | { kind: 'true or false' }
  | { kind: 'text'; longest: number }
  | { kind: 'file'; example: string }
  /** `k`: largest imaginary part, 0 for real ones alone. */
  | { kind: 'index'; n: readonly [from: number, to: number]; k: number }
  | { kind: 'shelf'; shelf: Shelf; example: string }
  | { kind: 'either'; of: readonly Holds[] }
  /** No plain value. */
  | { kind: 'nothing' };

/** How help calls a quantity of each dimension. */
const NAMES: Record<Dimension, string> = {
  length: 'a length',
  area: 'an area',
  angle: 'an angle',
  irradiance: 'an irradiance',
  responsivity: 'a responsivity',
  current: 'a current',
  power: 'a power',
  time: 'a time',
  temperature: 'a temperature',
  viscosity: 'a viscosity',
  ratio: 'a ratio',
};

/** `a length with its unit, from 0 nm to 4 um` */
export function holdsInWords(holds: Holds): string {
  switch (holds.kind) {
    case 'quantity': {
      const unit = holds.dimension === 'ratio' ? ' in % or as a number' : ' with its unit';
      const ends = `from ${holds.from} to ${holds.to}`;
      const range = holds.isRange ? `, or two of them as a range, such as ${holds.example}` : '';
      return `${NAMES[holds.dimension]}${unit}, ${ends}${range}`;
    }
    case 'tolerance': {
      const { largest, example } = holds;
      return `none, or limits either way such as ${example}, or a standard deviation such as ${example} rms, up to ${largest}`;
    }
    case 'words': {
      const { words, isList } = holds;
      return isList ? `a list of any of ${words.join(', ')}` : words.join(' or ');
    }
    case 'number':
      return `${holds.what} from ${holds.from} to ${holds.to}`;
    case 'true or false':
      return 'true or false';
    case 'text':
      return `one line of text, up to ${holds.longest} characters`;
    case 'file':
      return `the path of a file, such as ${holds.example}`;
    case 'index': {
      const { n, k } = holds;
      const [from, to] = n;
      if (k === 0) return `a real index from ${from} to ${to}`;
      return `an index such as 1.59 or 1.5 + 0.1i, real part ${from} to ${to}, imaginary part 0 to ${k}`;
    }
    case 'shelf':
      return `a name of rimwright presets ${holds.shelf}, such as ${holds.example}`;
    case 'either':
      return holds.of.map(holdsInWords).join(', or ');
    case 'nothing':
      return '';
  }
}

/** A value in the brief's notation that the checks take, null where there is none. */
export function exampleOf(holds: Holds): string | null {
  switch (holds.kind) {
    case 'quantity':
    case 'tolerance':
    case 'file':
    case 'shelf':
      return holds.example;
    case 'words':
      return holds.isList ? `[${holds.words.slice(0, 2).join(', ')}]` : holds.words[0];
    case 'number':
      return String(holds.example);
    case 'true or false':
      return 'true';
    case 'text':
      return 'Road-dust monitor';
    case 'index':
      return '1.59';
    case 'either': {
      // What is more than one word says more: 30 deg rather than none.
      const examples = holds.of.toSorted((a, b) => Number(a.kind === 'words') - Number(b.kind === 'words'));
      return examples.map(exampleOf).find((example) => example !== null) ?? null;
    }
    case 'nothing':
      return null;
  }
}
