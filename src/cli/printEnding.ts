import type { Brief } from '../run/brief.ts';
import type { Ending } from '../run/ending.ts';
import { endingText } from '../run/ending.ts';
import { print, printWrapped } from './notes.ts';

/** Prints why a search ended, how much its front still moved, and what to change in the brief to get further. */
export function printEnding(
  { search }: Brief,
  { ending, evaluations }: { ending: Ending; evaluations: number },
): void {
  print('');
  printWrapped(endingText(ending, evaluations, search.candidates));
  if (ending.hints.length === 0) return;
  print('To get further:');
  for (const hint of ending.hints) printWrapped(hint, '  - ');
}
