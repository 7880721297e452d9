import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { Crew } from '../../src/crew/crew.ts';
import type { ExploreJob } from '../../src/crew/explore.ts';
import type { FinishJob } from '../../src/crew/finish.ts';
import type { Orders } from '../../src/crew/messages.ts';
import { Workshop } from '../../src/crew/workshop.ts';
import { constantIndex } from '../../src/optics/indexModel.ts';
import { presetTask } from '../score/presetTasks.ts';
import { builtWorker } from './builtWorker.ts';

const ORDERS: Orders = { task: await presetTask('offset-range'), families: ['disc', 'rings', 'fourier'] };

const job = (variant: string, stream: number, budget = 80): ExploreJob => ({
  kind: 'explore',
  variant,
  aim: { measure: 'area', correction: 0.01 },
  budget,
  seed: 1,
  stream,
  method: 'evolve',
});

const JOBS = ['disc', 'rings-1', 'rings-2', 'fourier-square-3-fold-6', 'rings-3'].map((id, i) => job(id, i));
const FINISH: FinishJob = {
  kind: 'finish',
  candidates: [
    { variant: 'disc', vector: [3] },
    { variant: 'rings-2', vector: [0.98, 2.09, 11, 11.2] },
  ],
};

const fixture = (name: string) => fileURLToPath(new URL(`./workers/${name}`, import.meta.url));

/** What a promise is rejected with. */
async function failureOf(promise: Promise<unknown>): Promise<RimwrightError> {
  const error = await promise.then(
    () => null,
    (reason: unknown) => reason,
  );
  expect(error).toBeInstanceOf(RimwrightError);
  return error as RimwrightError;
}

describe('Crew', () => {
  it('does the same with one worker, with two, and without any', async () => {
    const workshop = new Workshop(ORDERS);
    const expected = await Promise.all([...JOBS, FINISH].map((one) => workshop.do(one)));
    for (const size of [1, 2]) {
      const crew = await Crew.start(size, ORDERS, builtWorker());
      const results = await Promise.all([...JOBS.map((one) => crew.do(one)), crew.do(FINISH)]);
      await crew.dismiss();
      expect(results).toEqual(expected);
    }
  });

  it('hands on what a worker met as an error of ours, and goes on working', async () => {
    const crew = await Crew.start(1, ORDERS, builtWorker());
    // A disc of negative phase has no radius. Whatever is thrown keeps its code and words on the way.
    const impossible: ExploreJob = { ...job('disc', 0), method: 'refine', from: [-1] };
    const here = await failureOf((async () => new Workshop(ORDERS).do(impossible))());
    const there = await failureOf(crew.do(impossible));
    expect([there.code, there.message, there.problems]).toEqual([here.code, here.message, here.problems]);
    expect([there.code, there.message]).toEqual(['machine', 'an outline is not finite: disc at [-1]']);
    const broken: ExploreJob = { ...job('disc', 0), method: 'refine', from: [Number.NaN] };
    const { code, message } = await failureOf(crew.do(broken));
    expect([code, message]).toEqual(['machine', 'a candidate is not finite: disc at [NaN]']);
    const unknown = await failureOf(crew.do(job('no-such-variant', 0)));
    expect(unknown.code).toBe('machine');
    const { evaluations } = await crew.do(job('disc', 0));
    expect(evaluations).toBeGreaterThan(10);
    await crew.dismiss();
  });

  it('hands on the problems of an input error as they are', async () => {
    const problem = { file: 'my.yaml', line: 3, key: 'light', found: '5', expected: 'a length' };
    const crew = await Crew.start(1, { problem } as unknown as Orders, fixture('refuses.mjs'));
    const { code, message, problems } = await failureOf(crew.do(job('disc', 0)));
    expect([code, message, problems]).toEqual(['input', 'refused', [problem]]);
    await crew.dismiss();
  });

  it('rejects what is under way and what waits when it is dismissed, and everything after', async () => {
    const crew = await Crew.start(1, ORDERS, builtWorker());
    const failures = [0, 1, 2].map((stream) =>
      failureOf(crew.do(job('fourier-square-3-fold-6', stream, 1_000_000))),
    );
    await crew.dismiss();
    for (const { code, message } of await Promise.all(failures)) {
      expect(code).toBe('machine');
      expect(message).toBe('the search was stopped');
    }
    expect((await failureOf(crew.do(job('disc', 0)))).message).toBe('the search was stopped');
    // A second time it does no harm.
    await crew.dismiss();
  });

  it('replaces workers that end, and has their jobs done again: the results are the same', async () => {
    const workshop = new Workshop(ORDERS);
    const jobs = [...JOBS, ...JOBS.map((one) => ({ ...one, stream: one.stream + 10 }))];
    const expected = await Promise.all(jobs.map((one) => workshop.do(one)));
    const crew = await Crew.start(2, ORDERS, fixture('mortal.mjs'));
    expect(await Promise.all(jobs.map((one) => crew.do(one)))).toEqual(expected);
    await crew.dismiss();
  });

  it('names the job that one worker after the other ends over, and goes on with others', async () => {
    const crew = await Crew.start(1, ORDERS, fixture('picky.mjs'));
    const [bad, good] = [crew.do(job('rings-1', 5)), crew.do(job('disc', 6))];
    const { code, message } = await failureOf(bad);
    expect([code, message]).toEqual([
      'machine',
      'a worker failed, and so did 2 in its place (evolve rings-1, stream 5): it ended with exit code 9',
    ]);
    expect(await good).toEqual('disc');
    await crew.dismiss();
  });

  it.each([
    ['with a fault', 7],
    ['as if all were well', 0],
  ])('tells of a worker that ends %s', async (_, exitCode) => {
    const orders = { exitCode } as unknown as Orders;
    const crew = await Crew.start(2, orders, fixture('exits.mjs'));
    const failures = await Promise.all([0, 1, 2].map((stream) => failureOf(crew.do(job('disc', stream)))));
    for (const { code, message } of failures) {
      expect(code).toBe('machine');
      expect(message).toContain(`exit code ${exitCode}`);
    }
    await crew.dismiss();
  });

  it('tells of a worker that throws', async () => {
    const crew = await Crew.start(1, ORDERS, fixture('throws.mjs'));
    const { code, message } = await failureOf(crew.do(job('disc', 0)));
    expect(code).toBe('machine');
    expect(message).toContain('out of paper');
    await crew.dismiss();
  });

  it('tells of a worker that cannot start', async () => {
    const crew = await Crew.start(1, ORDERS, fixture('no-such-file.mjs'));
    const { code, message } = await failureOf(crew.do(job('disc', 0)));
    expect(code).toBe('machine');
    expect(message).toContain('no-such-file');
    await crew.dismiss();
  });

  it('tells of orders that a worker cannot follow', async () => {
    const medium = { ...constantIndex(1), rangeM: [4e-7, 5e-7] as [number, number] };
    const crew = await Crew.start(1, { ...ORDERS, task: { ...ORDERS.task, medium } }, builtWorker());
    const { message } = await failureOf(crew.do(job('disc', 0)));
    expect(message).toContain('400 nm to 500 nm');
    await crew.dismiss();
  });
});
