import { readdirSync, readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { mieCoefficients } from '../../src/optics/mieCoefficients.ts';
import { readAmplitudeCsv } from '../../src/optics/readAmplitudeCsv.ts';
import { steps, tableOf } from './tableOf.ts';

const BROKEN = new URL('../broken/amplitudes/', import.meta.url);
const EXPECTED: Record<string, string[]> = JSON.parse(readFileSync(new URL('expected.json', BROKEN), 'utf8'));
const HEADER = 'angle_deg,s1_re,s1_im,s2_re,s2_im';
const SPHERE = mieCoefficients(3, [1.33, 0]);

function messageFor(text: string, file: string): string {
  try {
    readAmplitudeCsv(text, file);
  } catch (error) {
    if (error instanceof RimwrightError && error.code === 'input') return error.message;
    throw error;
  }
  return 'no mistake found';
}

describe('readAmplitudeCsv', () => {
  it('reads degrees as radians and keeps the numbers', () => {
    const rows = Array.from({ length: 8 }, (_, i) => `${i}e1, 2 ,-1.5,2,-1.5`);
    const { angles, values, misfit } = readAmplitudeCsv([HEADER, ...rows].join('\n'), 'a.csv');
    expect(angles[7]).toBe((70 * Math.PI) / 180);
    expect([...values.subarray(28)]).toEqual([2, -1.5, 2, -1.5]);
    expect(misfit).toBeLessThan(1e-14);
  });

  it('lets a byte order mark, CR LF, spaces and empty last lines pass', () => {
    const plain = tableOf(SPHERE, steps(3, 30));
    const dressed = `\uFEFF${plain.replace(/\n/g, ' \r\n').replace(/,/g, ' , ')}\r\n \r\n`;
    expect(readAmplitudeCsv(dressed, 'a.csv')).toEqual(readAmplitudeCsv(plain, 'a.csv'));
  });

  it('says how far rows are from their neighbours: a wrong digit far behind the point is seen', () => {
    const clean = readAmplitudeCsv(tableOf(SPHERE, steps(1, 60)), 'a.csv');
    expect(clean.misfit).toBeLessThan(1e-9);
    const rounded = readAmplitudeCsv(tableOf(SPHERE, steps(1, 60), 5), 'a.csv');
    expect(rounded.misfit).toBeGreaterThan(1e-6);
    expect(rounded.misfit).toBeLessThan(5e-5);
  });

  it('takes steps that are unequal', () => {
    const angles = [...steps(0.5, 10), ...steps(1, 40).filter((angle) => angle > 10)];
    expect(readAmplitudeCsv(tableOf(SPHERE, angles), 'a.csv').misfit).toBeLessThan(1e-8);
  });

  it('takes 100 000 rows, and not one more', () => {
    const rows = (count: number) => Array.from({ length: count }, (_, i) => `${(i * 180) / count},1,0,1,0`);
    expect(readAmplitudeCsv([HEADER, ...rows(100_000)].join('\n'), 'a.csv').angles).toHaveLength(100_000);
    const message = messageFor([HEADER, ...rows(100_001)].join('\n'), 'a.csv');
    expect(message).toBe('a.csv: found 100001 rows, expected 8 to 100000 rows');
  });

  it('lists ten mistakes of a file that is wrong throughout', () => {
    expect(messageFor(`${HEADER}\n${'a,b\n'.repeat(500)}`, 'a.csv').split('\n')).toHaveLength(10);
  });

  it.each(Object.entries(EXPECTED))('refuses broken/amplitudes/%s', (file, messages) => {
    expect(messageFor(readFileSync(new URL(file, BROKEN), 'utf8'), file)).toBe(messages.join('\n'));
  });

  it('has an expected message for each broken table', () => {
    const files = readdirSync(BROKEN).filter((file) => file.endsWith('.csv'));
    expect(files.sort()).toEqual(Object.keys(EXPECTED).sort());
  });

  it('throws nothing but its own error, whatever the text', () => {
    const cell = fc.oneof(fc.integer({ min: 0, max: 9 }).map(String), fc.double().map(String), fc.string());
    const row = fc.array(cell, { minLength: 4, maxLength: 6 }).map((cells) => cells.join(','));
    const numbers = fc
      .array(fc.tuple(...Array.from({ length: 4 }, () => fc.double({ noNaN: true }))), { minLength: 8 })
      .map((rows) => rows.map((values, i) => [i, ...values].join(',')));
    const text = fc.oneof(
      fc.string(),
      fc.array(row, { minLength: 8 }).map((rows) => [HEADER, ...rows].join('\n')),
      numbers.map((rows) => [HEADER, ...rows].join('\n')),
    );
    fc.assert(
      fc.property(text, (sample) => {
        messageFor(sample, 'random.csv');
      }),
      { numRuns: 2000 },
    );
  });
});
