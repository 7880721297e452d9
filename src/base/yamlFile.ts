import type { Document, Pair, ParsedNode, YAMLError } from 'yaml';
import { isAlias, isMap, isScalar, isSeq, Lexer, LineCounter, Parser, parseAllDocuments, visit } from 'yaml';
import type { Problem } from './errors.ts';
import { inputError } from './errors.ts';

/** A YAML text as plain values, with the lines where its keys stand. */
export interface YamlSource {
  /** The file's name as the user gave it, for messages. */
  file: string;
  /** Plain data: objects, arrays, strings, numbers, booleans, null (null for an empty file). */
  value: unknown;
  /** Line (from 1) of the key or list item at `path`; that of its nearest ancestor if there is none. */
  lineOf(path: readonly (string | number)[]): number;
}

/** Longest text accepted, bytes of UTF-8. */
export const MAX_YAML_BYTES = 1_000_000;

const MAX_DEPTH = 50;
const MAX_ALIASES = 20;

/**
 * Reads one YAML 1.2 document.
 *
 * @param text the file's content, at most `MAX_YAML_BYTES`
 * @param file its name, for messages
 * @throws RimwrightError `input`, with one problem for each line that cannot be read: syntax errors, keys given twice,
 *   unknown tags; also for a second document, for too long or too deeply nested a text, and for aliases that are too
 *   many, circular or without an anchor
 */
export function parseYaml(text: string, file: string): YamlSource {
  const bytes = Buffer.byteLength(text);
  if (bytes > MAX_YAML_BYTES) {
    throw inputError([{ file, found: `${bytes} bytes`, expected: `at most ${MAX_YAML_BYTES} bytes` }]);
  }
  refuseDeepNesting(text, file);

  const lines = new LineCounter();
  const lineAt = (offset: number) => Math.max(1, lines.linePos(offset).line);
  const documents = parseAllDocuments(text, { lineCounter: lines, prettyErrors: false, logLevel: 'silent' });
  const problems = documents.flatMap(({ errors, warnings }) =>
    [...errors, ...warnings].map((error) => describe(error, text, file, lineAt(error.pos[0]))),
  );
  if (problems.length > 0) throw inputError(onePerLine(problems));

  const [document, second] = documents;
  if (second !== undefined) {
    const line = lineAt(second.range[0]);
    throw inputError([{ file, line, found: 'a second document', expected: 'one document in a file' }]);
  }
  if (document === undefined) return { file, value: null, lineOf: () => 1 };
  refuseBadAliases(document, file, lineAt);
  return { file, value: document.toJS(), lineOf: (path) => lineAt(offsetOf(document, path)) };
}

/** The library composes nested values by recursion, and thousands of brackets end the process: so this comes first. */
function refuseDeepNesting(text: string, file: string): void {
  const parser = new Parser();
  for (const lexeme of new Lexer().lex(text)) {
    for (const _token of parser.next(lexeme)) {
      // Only the depth of what is still open matters here.
    }
    if (parser.stack.length > MAX_DEPTH) {
      throw inputError([
        { file, found: 'values nested too deeply', expected: `at most ${MAX_DEPTH} levels` },
      ]);
    }
  }
}

/** Aliases of aliases grow a few lines into gigabytes, and an alias inside its own anchor never ends. */
function refuseBadAliases(document: Document.Parsed, file: string, lineAt: (offset: number) => number): void {
  const weights = new Map<unknown, number>();
  const problems: Problem[] = [];
  let expanded = 0;
  visit(document, {
    Alias(_key, alias, path) {
      const found = `*${alias.source}`;
      const line = lineAt(alias.range?.[0] ?? 0);
      const anchor = alias.resolve(document);
      if (anchor === undefined || path.some((ancestor) => ancestor === anchor)) {
        problems.push({ file, line, found, expected: 'an alias of a value that ends before it' });
        return;
      }
      // An alias weighs one, and as much again as the aliases inside its anchor.
      const weight = 1 + (weights.get(anchor) ?? 0);
      for (const ancestor of path) weights.set(ancestor, (weights.get(ancestor) ?? 0) + weight);
      expanded += weight;
    },
  });
  if (problems.length > 0) throw inputError(problems);
  if (expanded > MAX_ALIASES) {
    throw inputError([
      { file, found: `${expanded} aliases`, expected: `at most ${MAX_ALIASES}, counted as expanded` },
    ]);
  }
}

function describe(error: YAMLError, text: string, file: string, line: number): Problem {
  const found = JSON.stringify(text.split('\n')[line - 1]?.trim() ?? '');
  const expected = error.code === 'DUPLICATE_KEY' ? 'each key once' : `valid YAML (${error.message})`;
  return { file, line, found, expected };
}

/** One mistake often draws several complaints about the same line: the first is the useful one. */
function onePerLine(problems: Problem[]): Problem[] {
  const first = new Map<number | undefined, Problem>();
  for (const problem of problems) if (!first.has(problem.line)) first.set(problem.line, problem);
  return [...first.values()].sort((a, b) => (a.line ?? 0) - (b.line ?? 0));
}

/** Where the key or item at `path` starts in the text, or the deepest ancestor of it that exists. */
function offsetOf(document: Document.Parsed, path: readonly (string | number)[]): number {
  let node: ParsedNode | null | undefined = document.contents;
  let offset = node?.range[0] ?? 0;
  for (const part of path) {
    if (isAlias(node)) node = node.resolve(document) as ParsedNode | undefined;
    let start: ParsedNode | undefined;
    if (isMap<ParsedNode, ParsedNode | null>(node)) {
      const pair: Pair<ParsedNode, ParsedNode | null> | undefined = node.items.find(
        ({ key }) => isScalar(key) && String(key.value) === String(part),
      );
      start = pair?.key;
      node = pair?.value;
    } else if (isSeq<ParsedNode>(node)) {
      start = node.items[Number(part)];
      node = start;
    }
    if (start === undefined) break;
    offset = start.range[0];
  }
  return offset;
}
