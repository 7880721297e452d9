import { existsSync, renameSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { inputError } from '../base/errors.ts';
import { packageVersion } from '../base/version.ts';
import { diskFault } from './diskFault.ts';
import { exactJson } from './exactJson.ts';
import type { JobMemory } from './journal.ts';
import { Journal } from './journal.ts';
import type { OpenedBrief } from './openBrief.ts';
import { claimResultsFolder, fillResultsFolder, UNFINISHED, unfinishedFolders } from './resultsFolder.ts';
import { slug } from './slug.ts';
import type { TextFile } from './writeWhole.ts';

const CHECKPOINT = 'checkpoint';

/** What `unfinished/` is called while it goes. */
const ENDED = '.ended.tmp';

/** What a checkpoint is of: enough to go on without the brief's file. */
interface RunHeader<Asked> {
  rimwright: string;
  /** The command that began it. */
  command: string;
  opened: OpenedBrief;
  /** What the command was asked besides. */
  asked: Asked;
}

/** A command's long work in a results folder, with its checkpoint. */
export class SearchRun<Asked = null> {
  readonly folder: string;
  readonly opened: OpenedBrief;
  readonly asked: Asked;
  readonly #journal: Journal;

  private constructor(folder: string, journal: Journal) {
    this.folder = folder;
    this.#journal = journal;
    const { opened, asked } = journal.header as RunHeader<Asked>;
    this.opened = opened;
    this.asked = asked;
  }

  /**
   * Begins a run in a new results folder.
   *
   * @param parent a folder that exists
   * @param asked plain data
   * @throws RimwrightError as `diskFault`, where it cannot be written; nothing is left behind
   */
  static begin<Asked>(parent: string, command: string, opened: OpenedBrief, asked: Asked): SearchRun<Asked> {
    const header: RunHeader<Asked> = { rimwright: packageVersion(), command, opened, asked };
    const folder = claimResultsFolder(parent, folderName(command, opened), (unfinished) =>
      Journal.begin(join(unfinished, CHECKPOINT), header),
    );
    return SearchRun.resume(folder, command);
  }

  /**
   * Goes on with a run.
   *
   * @param folder the results folder
   * @throws RimwrightError `input` where there is nothing that this command, in this version, can go on with
   */
  static resume<Asked>(folder: string, command: string): SearchRun<Asked> {
    const refused = (found: string, expected = `the results folder of a ${command} that has not ended`) =>
      inputError([{ file: folder, found, expected }]);
    if (!existsSync(folder)) throw refused('no such folder');
    if (!existsSync(checkpointIn(folder))) {
      const ended = existsSync(join(folder, 'run.json'));
      throw refused(ended ? 'one that has ended' : 'no checkpoint in it');
    }
    const journal = Journal.open(checkpointIn(folder));
    if (journal === null) throw refused('a damaged checkpoint');
    const { rimwright, command: by } = journal.header as RunHeader<Asked>;
    if (by !== command) throw refused(`a checkpoint of ${by}`, `one of ${command}`);
    if (rimwright !== packageVersion()) {
      throw refused(`a checkpoint of version ${rimwright}`, `one of this version, ${packageVersion()}`);
    }
    return new SearchRun(folder, journal);
  }

  /** Folders of runs that were asked the very same and have not ended. */
  static unfinished<Asked>(parent: string, command: string, opened: OpenedBrief, asked: Asked): string[] {
    const { brief } = opened;
    const wanted = exactJson({ command, brief, asked });
    return unfinishedFolders(parent, folderName(command, opened)).filter((folder) => {
      if (!existsSync(checkpointIn(folder))) return false;
      const header = Journal.headerOf(checkpointIn(folder)) as RunHeader<Asked> | null;
      if (header === null) return false;
      return (
        exactJson({ command: header.command, brief: header.opened.brief, asked: header.asked }) === wanted
      );
    });
  }

  /** What has been done of one search of the run; `scope` is a word. */
  memory(scope: string): JobMemory {
    return this.#journal.memory(scope);
  }

  /** How many jobs have been done. */
  get size(): number {
    return this.#journal.size;
  }

  /**
   * Writes the results.
   *
   * @param ended where not, the checkpoint stays
   * @throws RimwrightError `machine` where the disk fails; the checkpoint stays
   */
  write(files: readonly TextFile[], ended: boolean): void {
    fillResultsFolder(this.folder, files);
    if (!ended) return;
    this.#journal.close();
    try {
      // In one step: half-removed it would look like a search that has not ended.
      renameSync(join(this.folder, UNFINISHED), join(this.folder, ENDED));
      rmSync(join(this.folder, ENDED), { recursive: true, force: true });
    } catch (error) {
      throw diskFault(error, 'write', this.folder);
    }
  }

  /** Takes away a run that nothing came of. */
  discard(): void {
    this.#journal.close();
    rmSync(this.folder, { recursive: true, force: true });
  }
}

function folderName(command: string, { brief }: OpenedBrief): string {
  return slug(command === 'search' ? brief.title : `${brief.title} ${command}`);
}

function checkpointIn(folder: string): string {
  return join(folder, UNFINISHED, CHECKPOINT);
}
