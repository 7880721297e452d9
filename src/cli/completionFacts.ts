import { presetNames, SHELVES } from '../base/presetFiles.ts';
import { presetsFolder } from '../base/presetsFolder.ts';
import { allKeys, loadBriefKeys } from '../run/briefKeys.ts';
import type { Command } from './commander.ts';

/** Shells for which there is a script. */
export const SHELLS = ['bash', 'zsh', 'fish'] as const;
export type Shell = (typeof SHELLS)[number];

/** What a shell can complete of one command. */
export interface CompletedCommand {
  name: string;
  summary: string;
  options: { long: string; about: string; takesValue: boolean }[];
  /** Words that an argument may be; files may be too. */
  names: string[];
}

/** Every command as it is declared, with what its arguments can name. */
export async function completedCommands(program: Command): Promise<CompletedCommand[]> {
  const folder = presetsFolder();
  const commands = program.commands.map((command) => command.name());
  const keys = allKeys(await loadBriefKeys()).map(({ path }) => path.join('.'));
  const namesOf: Record<string, readonly string[]> = {
    brief: presetNames('briefs', folder),
    shelf: SHELVES,
    name: SHELVES.flatMap((shelf) => presetNames(shelf, folder)),
    // No shell keeps a name of two words together.
    topic: [...commands, 'brief', ...keys.filter((key) => !key.includes(' '))],
    shell: SHELLS,
  };
  return program.commands.map((command) => ({
    name: command.name(),
    summary: command.summary(),
    options: [
      ...command.options.map(({ long, description, required, optional }) => ({
        long: long ?? '',
        about: description,
        takesValue: required || optional,
      })),
      { long: '--help', about: 'explain the command', takesValue: false },
    ],
    names: [...new Set(command.registeredArguments.flatMap((argument) => namesOf[argument.name()] ?? []))],
  }));
}
