import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it, onTestFinished } from 'vitest';
import { presetNames, SHELVES } from '../../src/base/presetFiles.ts';
import { presetsFolder } from '../../src/base/presetsFolder.ts';
import { openBrief } from '../../src/run/openBrief.ts';
import { listBriefs } from '../../src/run/presetShelf.ts';

describe('openBrief', () => {
  it('takes a path, else a name on the shelf', async () => {
    const folder = mkdtempSync(join(tmpdir(), 'rimwright-test-'));
    onTestFinished(() => rmSync(folder, { recursive: true }));
    const { brief, text } = await openBrief('road-dust');
    expect(brief.title).toBe('Road-dust monitor, extinction channel');
    const path = join(folder, 'road-dust');
    writeFileSync(path, text.replace('Road-dust monitor', 'Mine'));
    expect((await openBrief(path)).brief.title).toBe('Mine, extinction channel');
    await expect(openBrief('raod-dust')).rejects.toThrow(
      /^raod-dust: found no such file, expected a brief's path, or one of the briefs on the shelf: .* \(did you mean road-dust\?\)$/,
    );
    await expect(openBrief('../briefs/road-dust')).rejects.toThrow('found no such file');
  });

  it('puts the command line’s search keys in place of the brief’s', async () => {
    const { brief } = await openBrief('nominal-sphere', { seed: 9 });
    expect(brief.search).toEqual({ candidates: 20_000, seed: 9 });
    expect(brief.defaults).toContain('search.candidates: 20000');
    expect(brief.defaults.some((line) => line.startsWith('search.seed'))).toBe(false);
  });
});

describe('the shelf', () => {
  it('has names for every part, and tells what each brief is about', () => {
    for (const shelf of SHELVES) expect(presetNames(shelf, presetsFolder()).length).toBeGreaterThan(2);
    for (const { title, about } of listBriefs(presetsFolder())) {
      expect(title).not.toBe('');
      expect(about).toMatch(/^[A-Z].*\.$/);
    }
    expect(() => presetNames('briefs', '/no/such/folder')).toThrow('cannot read /no/such/folder/briefs');
  });
});
