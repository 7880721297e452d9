import { existsSync } from 'node:fs';
import { basename, dirname, isAbsolute, join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { presetsFolder } from '../../src/base/presetsFolder.ts';

describe('presetsFolder', () => {
  it('is the folder presets beside package.json', () => {
    expect(isAbsolute(presetsFolder())).toBe(true);
    expect(basename(presetsFolder())).toBe('presets');
    expect(existsSync(join(dirname(presetsFolder()), 'package.json'))).toBe(true);
  });
});
