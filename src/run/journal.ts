import { createHash } from 'node:crypto';
import {
  closeSync,
  constants,
  fdatasyncSync,
  fstatSync,
  ftruncateSync,
  openSync,
  readSync,
  writeFileSync,
} from 'node:fs';
import type { Job, ResultOf } from '../crew/messages.ts';
import { diskFault } from './diskFault.ts';
import { exactJson, fromExactJson } from './exactJson.ts';
import { writeFlushed } from './writeWhole.ts';

/** Results of jobs that have been done before. */
export interface JobMemory {
  /** Seconds that were spent until the last of them came. */
  readonly seconds: number;
  recall<J extends Job>(job: J): ResultOf<J> | undefined;
  /** @param seconds spent until now, those before an interruption counted in */
  keep(job: Job, result: ResultOf<Job>, seconds: number): void;
}

/** Where the rest of a line stands in the file. */
interface Place {
  at: number;
  length: number;
}

/** Milliseconds from one wait for the disk to the next: what a power cut may cost. A killed process costs nothing. */
const SYNC_INTERVAL = 1000;

const HEADER = 'header';

const PIECE_BYTES = 1 << 20;

/**
 * The checkpoint of a search: a file to which one line is added whenever a job is done. A search is a fixed sequence of jobs
 * whose results depend on nothing but the job, so whoever starts it again and takes from here what is done ends with the
 * same bytes. In memory stays only where each result stands.
 *
 * A line holds a checksum, a scope (one of several searches), the job's hash, the seconds spent so far, and the result. The
 * first line holds the header. A line cut short by the end of a process is taken off when the file is opened again; a damaged
 * one is passed over, and its job is done again.
 */
export class Journal {
  readonly header: unknown;
  readonly #path: string;
  readonly #file: number;
  readonly #places: Map<string, Place>;
  readonly #seconds: Map<string, number>;
  #synced = 0;

  private constructor(path: string, file: number, header: unknown, read: Read) {
    this.#path = path;
    this.#file = file;
    this.header = header;
    this.#places = read.places;
    this.#seconds = read.seconds;
  }

  /**
   * Writes a new journal that has only a header, which is plain data.
   *
   * @throws what the disk says
   */
  static begin(path: string, header: unknown): void {
    writeFlushed(path, lineText(HEADER, '', 0, header));
  }

  /**
   * Opens a journal to go on with it.
   *
   * @returns null where the file does not begin as a journal does
   * @throws RimwrightError as `diskFault`
   */
  static open(path: string): Journal | null {
    try {
      const file = openSync(path, constants.O_RDWR | constants.O_APPEND);
      const read = readLines(file);
      const header = read.places.get(placeName(HEADER, ''));
      if (header === undefined) {
        closeSync(file);
        return null;
      }
      ftruncateSync(file, read.end);
      return new Journal(path, file, valueAt(file, header), read);
    } catch (error) {
      throw diskFault(error, 'write', path);
    }
  }

  /**
   * The header of a journal that somebody else may be writing to.
   *
   * @returns null where the file does not begin as a journal does
   * @throws RimwrightError as `diskFault`
   */
  static headerOf(path: string): unknown {
    try {
      const file = openSync(path, 'r');
      try {
        const header = readLines(file, 1).places.get(placeName(HEADER, ''));
        return header === undefined ? null : valueAt(file, header);
      } finally {
        closeSync(file);
      }
    } catch (error) {
      throw diskFault(error, 'read', path);
    }
  }

  /** How many results it holds. */
  get size(): number {
    return this.#places.size - 1;
  }

  /** The results of one search; a scope is a word. */
  memory(scope: string): JobMemory {
    const journal = this;
    return {
      get seconds() {
        return journal.#seconds.get(scope) ?? 0;
      },
      recall<J extends Job>(job: J): ResultOf<J> | undefined {
        const place = journal.#places.get(placeName(scope, hashOf(job)));
        return place && (valueAt(journal.#file, place) as ResultOf<J>);
      },
      keep: (job, result, seconds) => journal.#append(scope, hashOf(job), seconds, result),
    };
  }

  close(): void {
    closeSync(this.#file);
  }

  #append(scope: string, key: string, seconds: number, value: unknown): void {
    try {
      const line = Buffer.from(lineText(scope, key, seconds, value));
      const at = fstatSync(this.#file).size;
      writeFileSync(this.#file, line);
      const now = performance.now();
      if (now - this.#synced > SYNC_INTERVAL) {
        fdatasyncSync(this.#file);
        this.#synced = now;
      }
      this.#places.set(placeName(scope, key), { at, length: line.length - 1 });
      this.#seconds.set(scope, seconds);
    } catch (error) {
      throw diskFault(error, 'write', this.#path);
    }
  }
}

interface Read {
  places: Map<string, Place>;
  seconds: Map<string, number>;
}

/** Finds every sound line among the first `most` of a file, and where the last whole one ends. */
function readLines(file: number, most = Number.POSITIVE_INFINITY): Read & { end: number } {
  const places = new Map<string, Place>();
  const seconds = new Map<string, number>();
  let end = 0;
  let rest = Buffer.alloc(0);
  const piece = Buffer.alloc(PIECE_BYTES);
  let lines = 0;
  for (let from = 0; lines < most; ) {
    const count = readSync(file, piece, 0, PIECE_BYTES, from);
    if (count === 0) break;
    from += count;
    rest = Buffer.concat([rest, piece.subarray(0, count)]);
    for (let stop = rest.indexOf('\n'); stop >= 0 && lines < most; stop = rest.indexOf('\n')) {
      lines++;
      const place = { at: end, length: stop };
      const line = /^([0-9a-f]{16}) ((\S+) (\S*) ([\d.]+) .*)$/s.exec(rest.toString('utf8', 0, stop));
      if (line !== null && checksum(line[2]) === line[1]) {
        places.set(placeName(line[3], line[4]), place);
        seconds.set(line[3], Number(line[5]));
      }
      end += stop + 1;
      rest = rest.subarray(stop + 1);
    }
  }
  return { places, seconds, end };
}

function valueAt(file: number, { at, length }: Place): unknown {
  const bytes = Buffer.alloc(length);
  readSync(file, bytes, 0, length, at);
  const [, json] = /^\S+ \S+ \S* \S+ (.*)$/s.exec(bytes.toString('utf8')) as RegExpExecArray;
  return fromExactJson(json);
}

function lineText(scope: string, key: string, seconds: number, value: unknown): string {
  const rest = `${scope} ${key} ${seconds.toFixed(3)} ${exactJson(value)}`;
  return `${checksum(rest)} ${rest}\n`;
}

function placeName(scope: string, key: string): string {
  return `${scope} ${key}`;
}

function hashOf(job: Job): string {
  return createHash('sha256').update(JSON.stringify(job)).digest('hex').slice(0, 32);
}

function checksum(text: string): string {
  return createHash('sha256').update(text).digest('hex').slice(0, 16);
}
