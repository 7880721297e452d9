import { closeSync, openSync, readSync } from 'node:fs';
import { inputError } from '../base/errors.ts';
import { diskFault } from './diskFault.ts';

/**
 * A text file's content. It is read piece by piece up to the limit, so that a pipe or a device does no harm either.
 *
 * @throws RimwrightError `input` where there is no such file, where it is longer than `mostBytes`, or not UTF-8; `machine` where
 *   the disk does not let it be read
 */
export function readTextFile(path: string, mostBytes: number): string {
  const bytes = readFileBytes(path, mostBytes);
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    throw inputError([{ file: path, found: 'bytes that are not UTF-8', expected: 'a text file in UTF-8' }]);
  }
}

/**
 * A file's bytes, as `readTextFile`.
 *
 * @throws RimwrightError `input` where there is no such file, or it is longer than `mostBytes`; `machine` where the disk fails
 */
export function readFileBytes(path: string, mostBytes: number): Buffer {
  const bytes = readBytes(path, mostBytes + 1);
  if (bytes.length <= mostBytes) return bytes;
  const expected = `at most ${mostBytes} bytes`;
  throw inputError([{ file: path, found: `more than ${mostBytes} bytes`, expected }]);
}

function readBytes(path: string, most: number): Buffer {
  const pieces: Buffer[] = [];
  try {
    const file = openSync(path, 'r');
    try {
      for (let length = 0; length < most; ) {
        const piece = Buffer.allocUnsafe(Math.min(65536, most - length));
        const count = readSync(file, piece);
        if (count === 0) break;
        pieces.push(piece.subarray(0, count));
        length += count;
      }
    } finally {
      closeSync(file);
    }
  } catch (error) {
    throw diskFault(error, 'read', path);
  }
  return Buffer.concat(pieces);
}
