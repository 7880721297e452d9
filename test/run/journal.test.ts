import { mkdtempSync, readFileSync, rmSync, statSync, truncateSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import fc from 'fast-check';
import { describe, expect, it, onTestFinished } from 'vitest';
import type { ExploreJob, ExploreResult } from '../../src/crew/explore.ts';
import type { Brief } from '../../src/run/brief.ts';
import { exactJson, fromExactJson } from '../../src/run/exactJson.ts';
import { Journal } from '../../src/run/journal.ts';
import type { Progress } from '../../src/run/progress.ts';
import { search } from '../../src/run/search.ts';
import { builtWorker } from '../crew/builtWorker.ts';
import { presetBrief } from '../score/presetTasks.ts';

function newJournal(header: unknown = { title: 'a' }): string {
  const folder = mkdtempSync(join(tmpdir(), 'rimwright-test-'));
  onTestFinished(() => rmSync(folder, { recursive: true, force: true }));
  Journal.begin(join(folder, 'journal'), header);
  return join(folder, 'journal');
}

function opened(path: string): Journal {
  const journal = Journal.open(path);
  if (journal === null) throw new Error('no journal');
  onTestFinished(() => journal.close());
  return journal;
}

const job = (stream: number): ExploreJob => ({
  kind: 'explore',
  variant: 'disc',
  aim: { measure: 'area', correction: 0.01 },
  budget: 10,
  seed: 1,
  stream,
  method: 'glance',
});

const result = (evaluations: number): ExploreResult => ({ evaluations, best: null, front: [] });

describe('exactJson', () => {
  it('gives back the very same doubles, whatever they are', () => {
    const double = fc.double({ noDefaultInfinity: false, noNaN: false });
    fc.assert(
      fc.property(fc.array(double), fc.float64Array(), (list, flat) => {
        const value = { list, flat, nested: [{ flat }], text: 'x', none: null };
        // toStrictEqual tells −0 from 0, and arrays from Float64Arrays.
        expect(fromExactJson(exactJson(value))).toStrictEqual(value);
      }),
    );
  });
});

describe('Journal', () => {
  it('remembers results by their jobs and scopes, also when it is opened again', () => {
    const path = newJournal({ title: 'naïve 𝄞', table: Float64Array.of(1, -0) });
    const journal = opened(path);
    journal.memory('front').keep(job(1), result(7), 1.5);
    journal.memory('nearest').keep(job(1), result(8), 0.25);
    for (const one of [journal, opened(path)]) {
      expect(one.header).toStrictEqual({ title: 'naïve 𝄞', table: Float64Array.of(1, -0) });
      expect(one.memory('front').recall(job(1))).toEqual(result(7));
      expect(one.memory('nearest').recall(job(1))).toEqual(result(8));
      expect(one.memory('front').recall(job(2))).toBeUndefined();
      expect(one.memory('front').recall({ ...job(1), budget: 11 })).toBeUndefined();
      expect([one.memory('front').seconds, one.memory('nearest').seconds, one.size]).toEqual([1.5, 0.25, 2]);
      expect(one.memory('other').seconds).toBe(0);
    }
    expect(Journal.headerOf(path)).toEqual(opened(path).header);
  });

  it('is whole up to its last whole line wherever it is cut', () => {
    const path = newJournal();
    const journal = opened(path);
    const header = statSync(path).size;
    const ends = [1, 2, 3].map((k) => {
      journal.memory('front').keep(job(k), result(k), k);
      return statSync(path).size;
    });
    const bytes = readFileSync(path);
    for (let cut = 0; cut <= bytes.length; cut += 13) {
      writeFileSync(path, bytes.subarray(0, cut));
      if (cut < header) {
        expect(Journal.open(path)).toBeNull();
        continue;
      }
      const after = opened(path);
      const whole = ends.filter((end) => end <= cut).length;
      expect(after.size).toBe(whole);
      // What is added next does not run into the torn line.
      after.memory('front').keep(job(9), result(9), 9);
      const again = opened(path);
      expect(again.size).toBe(whole + 1);
      expect(again.memory('front').recall(job(9))).toEqual(result(9));
    }
  });

  it('passes over a damaged line and keeps the others', () => {
    const path = newJournal();
    const journal = opened(path);
    for (const k of [1, 2, 3]) journal.memory('front').keep(job(k), result(100 + k), k);
    writeFileSync(path, readFileSync(path, 'utf8').replace('"evaluations":102', '"evaluations":902'));
    const { recall } = opened(path).memory('front');
    expect([1, 2, 3].map((k) => recall(job(k))?.evaluations)).toEqual([101, undefined, 103]);
  });

  it('reads files longer than a piece', () => {
    const path = newJournal({ text: 'x'.repeat(3_000_000) });
    const journal = opened(path);
    journal.memory('front').keep(job(1), result(5), 1);
    expect(opened(path).memory('front').recall(job(1))).toEqual(result(5));
    truncateSync(path, 2_000_000);
    expect(Journal.open(path)).toBeNull();
  });
});

describe('a search with a journal', () => {
  const briefOf = async (): Promise<Brief> => {
    const brief = await presetBrief('nominal-sphere');
    return { ...brief, families: ['disc', 'rings'], search: { ...brief.search, candidates: 300 } };
  };

  it('does again only what is missing, and ends with the same', async () => {
    const brief = await briefOf();
    const options = { workers: 1, workerEntry: builtWorker() };
    const { seconds, ...whole } = await search(brief, options);
    const path = newJournal();
    const controller = new AbortController();
    let reports = 0;
    const onProgress = () => {
      if (++reports === 6) controller.abort();
    };
    const part = await search(brief, {
      ...options,
      memory: opened(path).memory('front'),
      signal: controller.signal,
      onProgress,
    });
    expect([part.stopped, part.ending.reason]).toEqual([true, 'interrupted']);
    const { size } = opened(path);
    const earlier = opened(path).memory('front').seconds;
    expect(size).toBeGreaterThan(4);
    const seen: Progress[] = [];
    const rest = await search(brief, {
      ...options,
      memory: opened(path).memory('front'),
      onProgress: (progress) => seen.push(progress),
    });
    expect({ ...rest, seconds: 0 }).toEqual({ ...whole, seconds: 0 });
    expect(earlier).toBeGreaterThan(0);
    expect(rest.seconds).toBeGreaterThan(earlier);
    // Nothing can be said of the pace before something new is done.
    expect(seen[0].remainingS).toBeNull();
    expect(seen.at(-2)?.remainingS).toBeGreaterThan(0);
    expect(seen.at(-1)?.phase).toBe('judging');
    // Once more, there is nothing left to do.
    const full = opened(path).size;
    expect(full).toBeGreaterThan(size);
    await search(brief, { ...options, memory: opened(path).memory('front') });
    expect(opened(path).size).toBe(full);
  });

  it('is the same where workers die on the way', async () => {
    const brief = await briefOf();
    const mortal = fileURLToPath(new URL('../crew/workers/mortal.mjs', import.meta.url));
    const [sound, shaken] = await Promise.all(
      [builtWorker(), mortal].map((workerEntry) => search(brief, { workers: 2, workerEntry })),
    );
    expect({ ...shaken, seconds: 0 }).toEqual({ ...sound, seconds: 0 });
  });
});
