import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { beforeAll, describe, expect, it } from 'vitest';
import { presetNames, presetText } from '../../src/base/presetFiles.ts';
import { presetsFolder } from '../../src/base/presetsFolder.ts';
import { parseYaml } from '../../src/base/yamlFile.ts';
import { briefJsonSchema } from '../../src/run/briefJsonSchema.ts';
import { allKeys, defaultOf, loadBriefKeys, plainValueOf } from '../../src/run/briefKeys.ts';
import { openReport } from '../../src/run/briefReport.ts';
import { exampleOf } from '../../src/run/holds.ts';
import { keyExamples } from '../../src/run/keyExample.ts';
import type { Keys } from '../../src/run/readMapping.ts';
import { readMapping } from '../../src/run/readMapping.ts';
import type { Schema } from '../jsonSchema.ts';
import { misfits } from '../jsonSchema.ts';

const BROKEN = fileURLToPath(new URL('../broken/briefs/', import.meta.url));
const EXPECTED: Record<string, string[]> = JSON.parse(readFileSync(`${BROKEN}expected.json`, 'utf8'));

let schema: Schema;
let keys: Keys;
beforeAll(async () => {
  schema = JSON.parse(JSON.stringify(await briefJsonSchema()));
  keys = await loadBriefKeys();
});

/** The mistakes of single keys, but for the limits of quantities, which no schema can know. */
function mistakesOfKeys(text: string, file: string): string[] {
  const source = parseYaml(text, file);
  const report = openReport(source);
  readMapping(source.value, [], keys, report);
  const ofLimits = /^(none, or )?(an? )?values? (from|up to) |^the smaller value first/;
  return report.problems.filter(({ expected }) => !ofLimits.test(expected)).map(({ key = '' }) => key);
}

function readable(text: string): unknown {
  try {
    return parseYaml(text, 'brief.yaml').value;
  } catch {
    return undefined;
  }
}

describe('the JSON Schema of briefs', () => {
  it.each(presetNames('briefs', presetsFolder()))('takes %s', (name) => {
    const { text, file } = presetText('briefs', name, presetsFolder());
    expect(misfits(parseYaml(text, file).value, schema)).toEqual([]);
  });

  it('refuses unknown keys, missing keys and wrong types, and not what only all of it tells', () => {
    const texts = Object.keys(EXPECTED).map((file) => ({ file, text: readFileSync(BROKEN + file, 'utf8') }));
    const briefs = texts.filter(({ text }) => readable(text) !== undefined);
    const refused = briefs.filter(({ text }) => misfits(readable(text), schema).length > 0);
    const names = refused.map(({ file }) => file);
    const wrong = briefs.filter(({ file, text }) => mistakesOfKeys(text, file).length > 0);
    expect(names).toEqual(expect.arrayContaining(wrong.map(({ file }) => file)));
    expect(names.length).toBeGreaterThan(50);
    expect(names).not.toContain('particle-with-both.yaml');
    expect(names).not.toContain('wavelength-too-short.yaml');
  });

  it('says of each key what it means, and the default that the checks use', () => {
    const { light } = schema.properties as Record<string, { properties: Record<string, Schema> }>;
    expect(light.properties.linewidth).toMatchObject({
      description: 'full width of the line at half maximum: a length with its unit, from 0 nm to 4 um',
      default: '0 nm',
      type: 'string',
    });
    expect(schema.required).toEqual(['light', 'particles', 'detector', 'target']);
  });
});

describe('what is said of the keys', () => {
  it('is one line each', () => {
    for (const { path, key } of allKeys(keys)) {
      expect([path, key.about]).toEqual([path, expect.stringMatching(/^\S.{2,100}$/)]);
    }
  });

  it('gives examples, defaults and limits that the checks and the schema take', () => {
    const { properties } = schema as { properties: Record<string, Schema> };
    for (const { path, key, holders } of allKeys(keys)) {
      const plain = plainValueOf(key);
      if (plain === null) continue;
      const { holds } = plain.rule;
      const limits = holds.kind === 'quantity' ? [holds.from, holds.to] : [];
      const use = defaultOf(key);
      const values = [exampleOf(holds), ...limits].map((text) => readable(`a: ${text}`) as { a: unknown });
      for (const value of [...values.map(({ a }) => a), ...(use === undefined ? [] : [use])]) {
        expect([path, value, Object.keys(plain.rule.check(value))]).toEqual([path, value, ['value']]);
        if (holders.length === 0) expect([path, misfits(value, properties[path[0]])]).toEqual([path, []]);
      }
    }
  });

  it('gives examples of whole entries that can be read', () => {
    for (const { path, key } of allKeys(keys)) {
      for (const example of keyExamples(key)) {
        const text = `a: ${example}`;
        const source = parseYaml(text, 'brief.yaml');
        const report = openReport(source);
        readMapping(source.value, [], { a: key }, report);
        expect([path, report.problems]).toEqual([path, []]);
      }
    }
  });
});
