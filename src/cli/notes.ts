import { wrapText } from '../draw/plainText.ts';
import { coloursFor } from './colour.ts';
import { TERMINAL_WIDTH } from './table.ts';

/** Says something on standard error, wrapped for a terminal. */
export function note(text: string): void {
  for (const line of wrapText(text, TERMINAL_WIDTH)) process.stderr.write(`${line}\n`);
}

/** Says each warning on standard error. */
export function warn(warnings: readonly string[]): void {
  const { yellow } = coloursFor(process.stderr);
  for (const warning of warnings) {
    const [first, ...others] = wrapText(`Warning: ${warning}.`, TERMINAL_WIDTH);
    process.stderr.write(`${yellow(first.slice(0, 8))}${first.slice(8)}\n`);
    for (const line of others) process.stderr.write(`${line}\n`);
  }
}

/** Prints a result on standard output. */
export function print(text: string): void {
  process.stdout.write(text.endsWith('\n') ? text : `${text}\n`);
}

/**
 * Prints a text on standard output, wrapped for a terminal.
 *
 * @param first what its first line begins with, in place of spaces before the others
 */
export function printWrapped(text: string, first = ''): void {
  const lines = wrapText(text, TERMINAL_WIDTH - first.length);
  print(lines.map((line, i) => (i === 0 ? first : ' '.repeat(first.length)) + line).join('\n'));
}

/** Says which keys a brief left out, and what stands for them. */
export function noteDefaults(defaults: readonly string[]): void {
  if (defaults.length === 0) return;
  const { dim } = coloursFor(process.stderr);
  const lines = wrapText(`Defaults used: ${defaults.join('; ')}.`, TERMINAL_WIDTH);
  for (const line of lines) process.stderr.write(`${dim(line)}\n`);
}
