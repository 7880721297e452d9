import { packageVersion } from '../base/version.ts';
import { Command, CommanderError } from './commander.ts';
import { declareFiles } from './declareFiles.ts';
import { declareHelping } from './declareHelping.ts';
import { declareMeasuring } from './declareMeasuring.ts';
import { declareReading } from './declareReading.ts';
import { declareSearching } from './declareSearching.ts';
import { EXIT, reportError } from './exit.ts';
import type { Done } from './optionTexts.ts';

// Only the command that runs loads what it works with, so that --help is there at once.

/** Runs one command line and gives its exit code; nothing is thrown. */
export async function runProgram(args: readonly string[]): Promise<number> {
  let code: number = EXIT.done;
  try {
    const program = buildProgram((result) => {
      code = result;
    });
    await program.parseAsync(args, { from: 'user' });
    return code;
  } catch (error) {
    // Commander has already said on standard error what it could not use.
    if (error instanceof CommanderError) return error.exitCode === 0 ? EXIT.done : EXIT.input;
    return reportError(error);
  }
}

function buildProgram(done: Done): Command {
  const program = new Command('rimwright')
    .description(
      'Searches detector outlines that read the true extinction cross-section of a single particle, and hands the chosen one to the shop.',
    )
    .version(packageVersion())
    .exitOverride()
    .configureHelp({ helpWidth: 80 })
    .configureOutput({ outputError: (text, write) => write(text) })
    .showHelpAfterError('(--help shows how)')
    .addHelpText(
      'after',
      `
A first run:
  $ rimwright presets briefs                       briefs on the shelf
  $ rimwright presets briefs road-dust > my.yaml   one of them, to be changed
  $ rimwright search my.yaml                       writes results/...

Exit codes: 0 done, 1 no design meets the target, 2 bad input, 3 a fault of the
machine. Results go to standard output, progress and notes to standard error.`,
    );

  declareSearching(program, done);
  declareReading(program, done);
  declareMeasuring(program, done);
  declareFiles(program, done);
  declareHelping(program, done);
  return program;
}
