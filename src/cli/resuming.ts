import { note } from './notes.ts';

/** The command that goes on with a run, as a user would type it, and that it does so. */
export function resumeLine(folder: string, command = 'search'): string {
  const plain = /^[\w./@%+=:,-]+$/.test(folder);
  return `rimwright ${command} --resume ${plain ? folder : `'${folder.replaceAll("'", "'\\''")}'`} goes on with it.`;
}

/** Says that nothing is lost of a run that did not end. */
export function noteResume(folder: string, command = 'search'): void {
  note(`Its checkpoint is kept: ${resumeLine(folder, command)}`);
}
