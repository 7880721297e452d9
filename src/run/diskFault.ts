import { inputError, RimwrightError } from '../base/errors.ts';

const MACHINE_WORDS: Record<string, string> = {
  ENOSPC: 'the disk is full',
  EDQUOT: 'the disk quota is used up',
  EACCES: 'no permission',
  EPERM: 'no permission',
  EROFS: 'the disk is read-only',
  EMFILE: 'too many files are open',
  EFBIG: 'a file may not grow any further',
};

/** Places that a user chose badly: another name helps. */
const INPUT_WORDS: Record<string, string> = {
  EEXIST: 'something of that name already',
  ENOTDIR: 'a file where a folder is needed',
  EISDIR: 'a folder where a file is needed',
  ENAMETOOLONG: 'too long a name',
};

/** What a failed access to the disk means: `input` where another path would help, else `machine`. */
export function diskFault(error: unknown, action: 'read' | 'write', path: string): RimwrightError {
  if (error instanceof RimwrightError) return error;
  const { code = '', message } = error as NodeJS.ErrnoException;
  const expected = action === 'read' ? 'a file that can be read' : 'a place that can be written';
  if (code === 'ENOENT') {
    const found = action === 'read' ? 'no such file' : 'no such folder';
    return inputError([{ file: path, found, expected }]);
  }
  if (code in INPUT_WORDS) return inputError([{ file: path, found: INPUT_WORDS[code], expected }]);
  return new RimwrightError('machine', `cannot ${action} ${path}: ${MACHINE_WORDS[code] ?? message}`);
}
