import {
  existsSync,
  lstatSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  symlinkSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import fc from 'fast-check';
import { describe, expect, it, onTestFinished } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { diskFault } from '../../src/run/diskFault.ts';
import {
  claimResultsFolder,
  fillResultsFolder,
  prepareFolder,
  unfinishedFolders,
} from '../../src/run/resultsFolder.ts';
import { slug } from '../../src/run/slug.ts';
import { writeWhole } from '../../src/run/writeWhole.ts';

function folder(): string {
  const made = mkdtempSync(join(tmpdir(), 'rimwright-test-'));
  onTestFinished(() => rmSync(made, { recursive: true, force: true }));
  return made;
}

function faultOf(write: () => unknown): RimwrightError {
  try {
    write();
  } catch (error) {
    if (error instanceof RimwrightError) return error;
    throw error;
  }
  throw new Error('nothing was thrown');
}

describe('slug', () => {
  it.each([
    ['Road-dust monitor, extinction channel', 'road-dust-monitor-extinction-channel'],
    ['Grüße aus Ñandú: 2 µm', 'gru-e-aus-nandu-2-m'],
    ['../../etc/passwd', 'etc-passwd'],
    ['..', 'untitled'],
    ['', 'untitled'],
    ['💡', 'untitled'],
    ['a\u202Eb\u0000c', 'a-b-c'],
    ['x'.repeat(200), 'x'.repeat(60)],
    [`${'x'.repeat(59)} y`, 'x'.repeat(59)],
  ])('%j is %s', (title, expected) => {
    expect(slug(title)).toBe(expected);
  });

  it('is a harmless name for any title', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 300 }), (title) => {
        expect(slug(title)).toMatch(/^[a-z0-9]+(-[a-z0-9]+)*$/);
        expect(slug(title).length).toBeLessThanOrEqual(60);
      }),
    );
  });
});

describe('writeWhole', () => {
  it('writes all files, and leaves nothing else behind', () => {
    const place = folder();
    writeWhole(
      [
        { path: join(place, 'a'), text: 'one' },
        { path: join(place, 'b'), text: 'two' },
      ],
      false,
    );
    expect(readdirSync(place)).toEqual(['a', 'b']);
    writeWhole([{ path: join(place, 'a'), text: 'three' }], true);
    expect(readFileSync(join(place, 'a'), 'utf8')).toBe('three');
  });

  it('writes none where one is in the way', () => {
    const place = folder();
    writeFileSync(join(place, 'b'), 'mine');
    const files = [
      { path: join(place, 'a'), text: '1' },
      { path: join(place, 'b'), text: '2' },
    ];
    expect(faultOf(() => writeWhole(files, false)).code).toBe('input');
    expect(readdirSync(place)).toEqual(['b']);
    expect(readFileSync(join(place, 'b'), 'utf8')).toBe('mine');
  });

  it('leaves no draft where a file cannot take its place', () => {
    const place = folder();
    mkdirSync(join(place, 'taken'));
    const error = faultOf(() => writeWhole([{ path: join(place, 'taken'), text: '1' }], true));
    expect(error.message).toContain('taken: found a folder where a file is needed');
    expect(readdirSync(place)).toEqual(['taken']);
    const nowhere = faultOf(() => writeWhole([{ path: join(place, 'no/such/file'), text: '1' }], true));
    expect(nowhere.message).toContain('found no such folder');
  });

  it('replaces a link, not what it points to', () => {
    const place = folder();
    writeFileSync(join(place, 'precious'), 'mine');
    symlinkSync(join(place, 'precious'), join(place, 'link'));
    expect(faultOf(() => writeWhole([{ path: join(place, 'link'), text: '1' }], false)).code).toBe('input');
    writeWhole([{ path: join(place, 'link'), text: 'new' }], true);
    expect(readFileSync(join(place, 'precious'), 'utf8')).toBe('mine');
    expect(lstatSync(join(place, 'link')).isSymbolicLink()).toBe(false);
  });
});

describe('results folders', () => {
  const FILES = [
    { path: 'front.json', text: '{}' },
    { path: 'drawings/a.svg', text: '<svg/>' },
  ];

  it('take the next free name, files and broken links counted as taken', () => {
    const parent = folder();
    expect(claimResultsFolder(parent, 'run', () => {})).toBe(join(parent, 'run'));
    writeFileSync(join(parent, 'run-2'), 'a file');
    mkdirSync(join(parent, 'run-3'));
    symlinkSync('/no/such/place', join(parent, 'run-4'));
    expect(claimResultsFolder(parent, 'run', () => {})).toBe(join(parent, 'run-5'));
    expect(readdirSync(parent)).toEqual(['run', 'run-2', 'run-3', 'run-4', 'run-5']);
    expect(readdirSync(join(parent, 'run'))).toEqual(['unfinished']);
    expect(unfinishedFolders(parent, 'run')).toEqual([join(parent, 'run')]);
  });

  it('leave nothing behind where they cannot be prepared', () => {
    const parent = folder();
    const full = Object.assign(new Error('full'), { code: 'ENOSPC' });
    const claim = () =>
      claimResultsFolder(parent, 'run', () => {
        throw full;
      });
    expect(faultOf(claim).message).toBe(`cannot write ${parent}: the disk is full`);
    expect(readdirSync(parent)).toEqual([]);
  });

  it('are filled in place of the results of an interruption, and nothing else in them is touched', () => {
    const run = claimResultsFolder(folder(), 'run', () => {});
    fillResultsFolder(run, [...FILES, { path: 'drawings/old.svg', text: 'old' }]);
    writeFileSync(join(run, 'my notes'), 'mine');
    fillResultsFolder(run, [{ path: 'front.json', text: '{"a":1}' }, FILES[1]]);
    expect(readdirSync(run).sort()).toEqual(['drawings', 'front.json', 'my notes', 'unfinished']);
    expect(readdirSync(join(run, 'drawings'))).toEqual(['a.svg']);
    expect(readFileSync(join(run, 'front.json'), 'utf8')).toBe('{"a":1}');
    expect(readdirSync(join(run, 'unfinished'))).toEqual([]);
  });

  it('stay as they were where writing fails half-way', () => {
    const run = claimResultsFolder(folder(), 'run', () => {});
    fillResultsFolder(run, FILES);
    const bad = [
      { path: 'front.json', text: 'new' },
      { path: 'front.json/inside-a-file', text: 'x' },
    ];
    expect(faultOf(() => fillResultsFolder(run, bad)).code).toBe('input');
    expect(readFileSync(join(run, 'front.json'), 'utf8')).toBe('{}');
    expect(readdirSync(join(run, 'unfinished'))).toEqual([]);
  });
});

describe('prepareFolder', () => {
  it('makes what is missing and refuses a file', () => {
    const place = folder();
    prepareFolder(join(place, 'a/b'));
    expect(existsSync(join(place, 'a/b'))).toBe(true);
    writeFileSync(join(place, 'file'), '');
    expect(faultOf(() => prepareFolder(join(place, 'file'))).code).toBe('input');
    expect(faultOf(() => prepareFolder(join(place, 'file/deeper'))).code).toBe('input');
  });
});

describe('diskFault', () => {
  // A full disk cannot be had in a test; its error can.
  it.each([
    ['ENOSPC', 'machine', 'cannot write x: the disk is full'],
    ['EACCES', 'machine', 'cannot write x: no permission'],
    ['EROFS', 'machine', 'cannot write x: the disk is read-only'],
    ['EIO', 'machine', 'cannot write x: EIO happened'],
    ['ENOTDIR', 'input', 'x: found a file where a folder is needed, expected a place that can be written'],
  ])('%s is a fault of kind %s', (code, kind, message) => {
    const error = diskFault(Object.assign(new Error(`${code} happened`), { code }), 'write', 'x');
    expect([error.code, error.message]).toEqual([kind, message]);
  });

  it('hands on what has been told already', () => {
    const told = new RimwrightError('machine', 'told');
    expect(diskFault(told, 'read', 'x')).toBe(told);
  });
});
