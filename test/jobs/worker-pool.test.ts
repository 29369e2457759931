import fc from 'fast-check';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { done, type Outcome } from '../../src/contract/outcome.ts';
import { createWorkerPool, type PoolWorker } from '../../src/jobs/worker-pool.ts';

/** A worker that answers only when the test says so. */
class FakeWorker {
  readonly cancelled: string[] = [];
  terminated = false;
  crash: (reason: string) => void = () => {};
  readonly answers = new Map<string, (outcome: Outcome<string>) => void>();

  work(jobId: string): Promise<Outcome<string>> {
    return new Promise((resolve) => this.answers.set(jobId, resolve));
  }
}

function fakePool(size: number) {
  const workers: FakeWorker[] = [];
  const pool = createWorkerPool<FakeWorker>({
    size,
    spawn: (): PoolWorker<FakeWorker> => {
      const worker = new FakeWorker();
      workers.push(worker);
      return {
        api: worker,
        onCrash: (listener) => {
          worker.crash = listener;
        },
        terminate: () => {
          worker.terminated = true;
        },
      };
    },
    askToCancel: (worker, jobId) => worker.cancelled.push(jobId),
    cancelGraceMs: 250,
  });
  const run = (priority: 'now' | 'ahead' | 'sweep' = 'now') =>
    pool.run((worker: FakeWorker, jobId) => worker.work(jobId), { priority });
  return { pool, workers, run };
}

const answer = (worker: FakeWorker, value: string) => {
  for (const [jobId, resolve] of worker.answers) {
    worker.answers.delete(jobId);
    resolve(done(value));
  }
};

describe('worker pool', () => {
  beforeEach(() => vi.useFakeTimers());
  afterEach(() => vi.useRealTimers());

  it('spawns no worker before it is needed and no more than its size', () => {
    const { workers, run } = fakePool(2);
    expect(workers).toHaveLength(0);
    run();
    expect(workers).toHaveLength(1);
    run();
    run();
    expect(workers).toHaveLength(2);
  });

  it('cancels a waiting job at once and never starts it', async () => {
    const { workers, run } = fakePool(1);
    const first = run();
    const second = run();
    second.cancel();
    expect(await second.promise).toEqual({ kind: 'cancelled' });
    answer(workers[0]!, 'a');
    expect(await first.promise).toEqual(done('a'));
    expect(workers[0]!.answers.size).toBe(0);
  });

  it('asks a running job to stop, and keeps a worker that answers', async () => {
    const { workers, run } = fakePool(1);
    const task = run();
    task.cancel();
    expect(workers[0]!.cancelled).toHaveLength(1);
    for (const resolve of workers[0]!.answers.values()) resolve({ kind: 'cancelled' });
    expect(await task.promise).toEqual({ kind: 'cancelled' });
    await vi.advanceTimersByTimeAsync(1000);
    expect(workers[0]!.terminated).toBe(false);
  });

  it('ends a worker that does not hear a cancel, and gives its next job to a fresh one', async () => {
    const { workers, run } = fakePool(1);
    const deaf = run();
    const next = run();
    deaf.cancel();
    await vi.advanceTimersByTimeAsync(249);
    expect(workers[0]!.terminated).toBe(false);
    await vi.advanceTimersByTimeAsync(1);
    expect(await deaf.promise).toEqual({ kind: 'cancelled' });
    expect(workers[0]!.terminated).toBe(true);
    answer(workers[1]!, 'b');
    expect(await next.promise).toEqual(done('b'));
  });

  it('fails the job of a worker that crashes, and replaces it', async () => {
    const { workers, run } = fakePool(1);
    const lost = run();
    const next = run();
    workers[0]!.crash('out of memory');
    expect(await lost.promise).toMatchObject({ kind: 'failed', error: { detail: 'out of memory' } });
    answer(workers[1]!, 'c');
    expect(await next.promise).toEqual(done('c'));
  });

  it('serves what is on the screen before what is ahead, and the sweep last', async () => {
    const { workers, run } = fakePool(1);
    const order: string[] = [];
    const note = (name: string) => () => order.push(name);
    run().promise.then(note('first'));
    run('sweep').promise.then(note('sweep'));
    run('ahead').promise.then(note('ahead'));
    run('now').promise.then(note('now'));
    for (let i = 0; i < 4; i += 1) {
      answer(workers[0]!, 'x');
      await vi.advanceTimersByTimeAsync(0);
    }
    expect(order).toEqual(['first', 'now', 'ahead', 'sweep']);
  });

  it('ends everything when disposed of', async () => {
    const { pool, workers, run } = fakePool(1);
    const tasks = [run(), run()];
    pool.dispose();
    expect(await Promise.all(tasks.map(({ promise }) => promise))).toEqual([
      { kind: 'cancelled' },
      { kind: 'cancelled' },
    ]);
    expect(workers[0]!.terminated).toBe(true);
    expect(await run().promise).toEqual({ kind: 'cancelled' });
  });

  it('ends every job exactly once, whatever happens to its worker', async () => {
    const step = fc.constantFrom('run', 'answer', 'cancel', 'crash', 'wait');
    await fc.assert(
      fc.asyncProperty(fc.array(step, { maxLength: 40 }), fc.integer({ min: 1, max: 3 }), async (steps, size) => {
        const { pool, workers, run } = fakePool(size);
        const tasks: ReturnType<typeof run>[] = [];
        let ended = 0;
        for (const [i, name] of steps.entries()) {
          const worker = workers[i % Math.max(1, workers.length)];
          if (name === 'run') {
            tasks.push(run());
            tasks.at(-1)!.promise.then(() => {
              ended += 1;
            });
          }
          if (name === 'answer' && worker) answer(worker, 'v');
          if (name === 'cancel') tasks[i % Math.max(1, tasks.length)]?.cancel();
          if (name === 'crash' && worker && !worker.terminated) worker.crash('why not');
          await vi.advanceTimersByTimeAsync(name === 'wait' ? 300 : 0);
        }
        pool.dispose();
        await vi.advanceTimersByTimeAsync(300);
        expect(ended).toBe(tasks.length);
      }),
      { numRuns: 60 },
    );
  });
});
