import type { Problem } from '../base/errors.ts';
import type { YamlSource } from '../base/yamlFile.ts';

/** Where a value stands in a YAML file: names of keys, and numbers of list items from 0. */
export type Path = readonly (string | number)[];

const MOST_LISTED = 50;

/** Collects the mistakes of one brief, and the defaults that it leans on. */
export interface Report {
  /** One for each key with a mistake, at most 50. */
  readonly problems: Problem[];
  /** `light.drift: 0 nm` */
  readonly defaults: string[];
  /** Notes a mistake; `found` is what stands at `path` unless given. */
  refuse(path: Path, expected: string, found?: string): void;
  /** Notes mistakes of another file that the brief names. */
  adopt(problems: readonly Problem[]): void;
  /** Whether a mistake was noted at `path` or inside it. */
  hasMistake(path: Path): boolean;
  /** Notes that a key was left out, and what stands for it, in the brief's notation. */
  noteDefault(path: Path, value: unknown): void;
}

export function openReport({ file, value, lineOf }: YamlSource): Report {
  const problems: Problem[] = [];
  const defaults: string[] = [];
  return {
    problems,
    defaults,
    refuse(path, expected, found = inWords(valueAt(value, path))) {
      const key = keyOf(path);
      // The first mistake of a key explains the others, and nobody reads more than some dozens.
      if (problems.length === MOST_LISTED || problems.some((problem) => problem.key === key)) return;
      problems.push({ file, line: lineOf(path), key, found, expected });
    },
    adopt(others) {
      problems.push(...others.slice(0, MOST_LISTED - problems.length));
    },
    hasMistake(path) {
      const start = keyOf(path);
      return problems.some(
        ({ key = '' }) => key.startsWith(start) && /^($|[.[])/.test(key.slice(start.length)),
      );
    },
    noteDefault(path, value) {
      defaults.push(`${keyOf(path)}: ${Array.isArray(value) ? `[${value.join(', ')}]` : value}`);
    },
  };
}

/** `particles[1].diameter` */
function keyOf(path: Path): string {
  const parts = path.map((part) => (typeof part === 'number' ? `[${part}]` : `.${printable(part)}`));
  return parts.join('').replace(/^\./, '');
}

/** A value of the brief as an error quotes it. */
function inWords(value: unknown): string {
  if (value === undefined || value === null) return 'nothing';
  if (Array.isArray(value)) return value.length === 0 ? 'an empty list' : `a list of ${value.length}`;
  if (typeof value === 'object') return 'a mapping';
  return typeof value === 'string' ? JSON.stringify(shortened(value)) : String(value);
}

function valueAt(value: unknown, path: Path): unknown {
  return path.reduce<unknown>(
    (outer, part) =>
      typeof outer === 'object' && outer !== null && Object.hasOwn(outer, part)
        ? (outer as Record<string | number, unknown>)[part]
        : undefined,
    value,
  );
}

/** A message is one line, whatever characters a key holds. */
function printable(name: string): string {
  return /^[\w-]{1,60}$/.test(name) ? name : JSON.stringify(shortened(name));
}

function shortened(text: string): string {
  return text.length > 60 ? `${text.slice(0, 60)}…` : text;
}
