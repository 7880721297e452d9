import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';

/** Folders of src in the order of design.md, section 7: each may import from those before it, and from itself. */
const FOLDERS = [
  'base',
  'numeric',
  'optics',
  'outline',
  'reading',
  'shop',
  'score',
  'metrology',
  'search',
  'crew',
  'run',
  'draw',
  'report',
  'cli',
];

/** Files that may be longer than 300 lines, and why. */
const LONG_FILES: Record<string, string> = {};

const SRC = fileURLToPath(new URL('../src', import.meta.url));

interface Import {
  /** As written. */
  from: string;
  /** Path within src, for imports of our own. */
  file: string | null;
  isTypeOnly: boolean;
}

interface SourceFile {
  path: string;
  folder: string;
  text: string;
  imports: Import[];
}

function readSources(): SourceFile[] {
  return readdirSync(SRC, { recursive: true, encoding: 'utf8' })
    .map((path) => path.replaceAll('\\', '/'))
    .filter((path) => path.endsWith('.ts'))
    .sort()
    .map((path) => {
      const text = readFileSync(join(SRC, path), 'utf8');
      return {
        path,
        folder: path.includes('/') ? path.split('/')[0] : '',
        text,
        imports: importsOf(text, path),
      };
    });
}

/** Imports and re-exports, those at run time (`import('…')`) included. */
function importsOf(text: string, path: string): Import[] {
  const statement = /^(?:import|export)\s+(type\s+)?(?:[^'"`;]*?\sfrom\s+)?'([^']+)'/gm;
  const call = /\bimport\(\s*(['"`])([^'"`]+)\1/g;
  const found = [...text.matchAll(statement), ...text.matchAll(call)];
  return found.map(([whole, type, from]) => ({
    from,
    file: from.startsWith('.') ? relative(SRC, join(SRC, dirname(path), from)).replaceAll('\\', '/') : null,
    isTypeOnly: whole.startsWith('import type') || (whole.startsWith('export') && type?.trim() === 'type'),
  }));
}

/** Code without comments and without what stands in quotes. */
function codeOf(text: string): string {
  return text
    .replace(/\/\*[\s\S]*?\*\//g, '')
    .replace(/(?<![:'"`])\/\/.*$/gm, '')
    .replace(/'(?:[^'\\\n]|\\.)*'/g, "''");
}

const sources = readSources();
const byPath = new Map(sources.map((source) => [source.path, source]));

describe('imports of src', () => {
  it('are found at all', () => {
    expect(sources.length).toBeGreaterThan(100);
    const judge = byPath.get('score/judge.ts');
    expect(judge?.imports.map(({ file }) => file)).toContain('outline/shape.ts');
    // One import a statement: none is overlooked.
    for (const { path, text, imports } of sources) {
      const statements = codeOf(text).match(/^import\b/gm) ?? [];
      expect(imports.length, path).toBeGreaterThanOrEqual(statements.length);
    }
  });

  it('name files that are there, with their ending', () => {
    for (const { path, imports } of sources) {
      for (const { file, from } of imports) {
        if (file === null) continue;
        expect(from, path).toMatch(/\.ts$/);
        expect(existsSync(join(SRC, file)), `${path}: ${from}`).toBe(true);
      }
    }
  });

  it('run one way between folders, types included', () => {
    const upward: string[] = [];
    for (const { path, folder, imports } of sources) {
      if (folder === '') continue;
      expect(FOLDERS, path).toContain(folder);
      for (const { file } of imports) {
        if (file === null) continue;
        const other = file.includes('/') ? file.split('/')[0] : '';
        const isAbove = FOLDERS.includes(other) && FOLDERS.indexOf(other) <= FOLDERS.indexOf(folder);
        if (!isAbove) upward.push(`${path} imports ${file}`);
      }
    }
    expect(upward).toEqual([]);
  });

  it('make no circles between files', () => {
    const state = new Map<string, 'open' | 'done'>();
    const circles: string[] = [];
    const visit = (path: string, trail: readonly string[]) => {
      if (state.get(path) === 'done') return;
      if (state.get(path) === 'open') {
        circles.push([...trail.slice(trail.indexOf(path)), path].join(' → '));
        return;
      }
      state.set(path, 'open');
      for (const { file } of byPath.get(path)?.imports ?? [])
        if (file !== null) visit(file, [...trail, path]);
      state.set(path, 'done');
    };
    for (const { path } of sources) visit(path, []);
    expect(circles).toEqual([]);
  });

  it('meet each third-party package in one file', () => {
    const filesOf = new Map<string, Set<string>>();
    for (const { path, imports } of sources) {
      for (const { from, file } of imports) {
        if (file !== null || from.startsWith('node:')) continue;
        const name = from
          .split('/')
          .slice(0, from.startsWith('@') ? 2 : 1)
          .join('/');
        filesOf.set(name, (filesOf.get(name) ?? new Set()).add(path));
      }
    }
    expect(filesOf.size).toBeGreaterThan(5);
    const shared = [...filesOf]
      .filter(([, files]) => files.size > 1)
      .map(([name, files]) => `${name}: ${[...files].join(', ')}`);
    expect(shared).toEqual([]);
    // Every dependency is used, and nothing else is.
    const { dependencies } = JSON.parse(readFileSync(join(SRC, '../package.json'), 'utf8'));
    expect([...filesOf.keys()].sort()).toEqual(Object.keys(dependencies).sort());
  });
});

describe('code of src', () => {
  it.each([
    ['random numbers without a seed', /\bMath\s*\.\s*random\b/],
    ['text run as code', /\beval\s*\(|\bnew\s+Function\b|\bFunction\s*\(/],
    ['the exit of the process outside of cli', /\bprocess\s*\.\s*exit\b/],
  ])('has no %s', (what, pattern) => {
    const found = sources
      .filter(({ folder, text }) => !(what.includes('cli') && folder === 'cli') && pattern.test(codeOf(text)))
      .map(({ path }) => path);
    expect(found).toEqual([]);
  });

  it('is in files of at most 300 lines, but for a few with a reason', () => {
    const long = sources.filter(({ text }) => text.split('\n').length > 301).map(({ path }) => path);
    expect(long).toEqual(Object.keys(LONG_FILES).sort());
  });

  it('has an index that only re-exports', () => {
    const index = byPath.get('index.ts');
    expect(index).toBeDefined();
    const rest = codeOf(index?.text ?? '').replace(
      /export\s+(?:type\s+)?(?:\{[^}]*\}|\*)\s+from\s+''\s*;/g,
      '',
    );
    expect(rest.trim()).toBe('');
  });
});
