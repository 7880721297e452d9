import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { presetsFolder } from '../../src/base/presetsFolder.ts';
import { refractiveIndex } from '../../src/optics/indexModel.ts';
import { listIndexModels, loadIndexModel } from '../../src/optics/shelf.ts';

const KINDS = ['media', 'materials'] as const;
const everything = KINDS.flatMap((kind) =>
  listIndexModels(kind, presetsFolder()).map((entry) => ({ kind, ...entry })),
);

function refusal(action: () => unknown): RimwrightError {
  try {
    action();
  } catch (error) {
    if (error instanceof RimwrightError) return error;
    throw error;
  }
  throw new Error('nothing was refused');
}

describe('the shelf', () => {
  it('holds the usual media and materials', () => {
    const names = everything.map(({ kind, name }) => `${kind}/${name}`);
    for (const name of ['air', 'dry-air', 'vacuum', 'water', 'water-25C'])
      expect(names).toContain(`media/${name}`);
    for (const name of [
      'polystyrene',
      'fused-silica',
      'crown-glass-bk7',
      'water',
      'mineral-dust',
      'soot',
      'oil',
    ]) {
      expect(names).toContain(`materials/${name}`);
    }
  });

  it.each(everything)(
    '$kind/$name has a finite index over its whole range, and names its source',
    (entry) => {
      expect(entry.title).not.toBe('');
      expect(entry.source).toMatch(/\(\d{4}\)|from memory|definition|data sheet/i);
      expect(loadIndexModel(entry.kind, entry.name, presetsFolder())).toEqual(entry.model);
      expect(entry.rangeM).toEqual(entry.model.rangeM);
      const [min, max] = entry.rangeM;
      for (let j = 0; j <= 500; j++) {
        const [n, k] = refractiveIndex(entry.model, min * (max / min) ** (j / 500));
        expect(n).toBeGreaterThanOrEqual(1);
        expect(n).toBeLessThan(2.5);
        expect(k).toBeGreaterThanOrEqual(0);
        expect(k).toBeLessThan(1);
      }
      // A medium must be transparent: the reading's formulas know no absorbing surroundings.
      if (entry.kind === 'media') expect(refractiveIndex(entry.model, Math.sqrt(min * max))[1]).toBe(0);
    },
  );

  it('gives well-known indices at the sodium line (589.3 nm)', () => {
    const at = (kind: 'media' | 'materials', name: string) =>
      refractiveIndex(loadIndexModel(kind, name, presetsFolder()), 589.3e-9)[0];
    // Handbook values, from memory; those of solids and liquids are relative to air.
    expect(at('media', 'vacuum')).toBe(1);
    expect(at('media', 'air')).toBeCloseTo(1.000272, 6);
    expect(at('media', 'water') / at('media', 'air')).toBeCloseTo(1.33299, 5);
    expect(Math.abs(at('media', 'ethanol') - 1.3614)).toBeLessThan(5e-4);
    expect(Math.abs(at('materials', 'pmma') - 1.491)).toBeLessThan(1e-3);
    expect(Math.abs(at('materials', 'sodium-chloride') / at('media', 'air') - 1.5443)).toBeLessThan(3e-4);
  });

  it('lists what there is, and the nearest, where a name is unknown', () => {
    const error = refusal(() => loadIndexModel('media', 'watr', presetsFolder()));
    expect(error.code).toBe('input');
    expect(error.message).toBe(
      'found "watr", expected one of the media on the shelf: air, dry-air, ethanol, vacuum, water, water-25C (did you mean water?)',
    );
    expect(refusal(() => loadIndexModel('media', 'polystyrene', presetsFolder())).message).not.toContain(
      'did you mean',
    );
  });

  it('opens nothing outside the shelf', () => {
    const tricks = [
      '../materials/soot',
      '../../package.json',
      './air',
      'air.yaml',
      'media/air',
      '',
      '..',
      'air\0',
      '/etc/passwd',
    ];
    for (const name of tricks) {
      const error = refusal(() => loadIndexModel('media', name, presetsFolder()));
      expect(error.code).toBe('input');
      expect(error.message).toContain('on the shelf: air,');
    }
  });
});

describe('a shelf of one’s own', () => {
  const folder = mkdtempSync(join(tmpdir(), 'shelf-'));
  afterAll(() => rmSync(folder, { recursive: true }));

  it('names the file and line of a mistake, and the folder that is missing', () => {
    mkdirSync(join(folder, 'media'));
    writeFileSync(
      join(folder, 'media', 'fog.yaml'),
      'title: Fog\nformula: constant\nn: 1\nk: 0\nrangeNm: [400, 800]\nnotes: N\n',
    );
    writeFileSync(join(folder, 'media', 'README.md'), 'not a preset');
    const error = refusal(() => loadIndexModel('media', 'fog', folder));
    expect(error.code).toBe('input');
    expect(error.message).toContain('fog.yaml:1: source: found nothing, expected a text');
    expect(refusal(() => listIndexModels('materials', folder)).code).toBe('machine');
  });
});
