import { readdirSync, readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { readOutlineCsv } from '../../src/outline/readOutlineCsv.ts';

const BROKEN = new URL('../broken/outlines/', import.meta.url);
const EXPECTED: Record<string, string[]> = JSON.parse(readFileSync(new URL('expected.json', BROKEN), 'utf8'));
const HEADER = 'x_mm,y_mm\n';

function messageFor(text: string, file: string): string {
  try {
    readOutlineCsv(text, file);
  } catch (error) {
    if (error instanceof RimwrightError && error.code === 'input') return error.message;
    throw error;
  }
  return 'no mistake found';
}

describe('readOutlineCsv', () => {
  it('reads millimetres as metres, in the order of the file', () => {
    const points = readOutlineCsv(`${HEADER}0,0\n0.635,0\n0.635,-1.5e-1\n`, 'a.csv');
    expect([...points]).toEqual([0, 0, 6.35e-4, 0, 6.35e-4, -1.5e-4]);
  });

  it('keeps either sense of rotation', () => {
    expect([...readOutlineCsv(`${HEADER}0,0\n0,1000\n1000,0`, 'a.csv')]).toEqual([0, 0, 0, 1, 1, 0]);
  });

  it('lets a byte order mark, CR LF, spaces and empty last lines pass', () => {
    const text = '\uFEFFx_mm, y_mm \r\n 0 , 0\r\n+1,0 \r\n .5,1.\r\n\r\n \r\n';
    expect([...readOutlineCsv(text, 'a.csv')]).toEqual([0, 0, 1e-3, 0, 5e-4, 1e-3]);
  });

  it('lists ten mistakes of a file that is wrong throughout', () => {
    expect(messageFor(HEADER + 'a,b\n'.repeat(500), 'a.csv').split('\n')).toHaveLength(10);
  });

  it('refuses more than 100 000 points', () => {
    const message = messageFor(HEADER + '0,0\n'.repeat(100_001), 'a.csv');
    expect(message).toBe('a.csv: found 100001 points, expected 3 to 100000 points');
  });

  it.each(Object.entries(EXPECTED))('refuses broken/outlines/%s', (file, messages) => {
    expect(messageFor(readFileSync(new URL(file, BROKEN), 'utf8'), file)).toBe(messages.join('\n'));
  });

  it('has an expected message for each broken outline', () => {
    const files = readdirSync(BROKEN).filter((file) => file.endsWith('.csv'));
    expect(files.sort()).toEqual(Object.keys(EXPECTED));
  });

  it('throws nothing but its own error, whatever the text', () => {
    const cell = fc.oneof(fc.integer({ min: -3, max: 3 }).map(String), fc.double().map(String), fc.string());
    const row = fc.array(cell, { maxLength: 3 }).map((cells) => cells.join(','));
    const text = fc.oneof(
      fc.string(),
      fc.array(row).map((rows) => HEADER + rows.join('\n')),
    );
    fc.assert(
      fc.property(text, (sample) => {
        messageFor(sample, 'random.csv');
      }),
      { numRuns: 3000 },
    );
  });
});
