import { failed, type Outcome } from '../contract/outcome.ts';
import type { RunningTask, TaskPriority } from './jobs.ts';

/** One worker as the pool sees it: a way to call it, to be told of its death, and to end it. */
export interface PoolWorker<Api> {
  readonly api: Api;
  onCrash(listener: (reason: string) => void): void;
  terminate(): void;
}

export interface PoolOptions<Api> {
  readonly size: number;
  readonly spawn: () => PoolWorker<Api>;
  /** Asks a worker to stop a job; it may be too busy to hear. */
  readonly askToCancel: (api: Api, jobId: string) => void;
  /** A worker that has not answered a cancel by then is ended and replaced. */
  readonly cancelGraceMs?: number;
}

export type PoolJob<Api, T> = (api: Api, jobId: string, workerNumber: number) => Promise<Outcome<T>>;

export interface WorkerPool<Api> {
  readonly size: number;
  /** `worker` pins the job to one worker of the pool: its series may be there already. */
  run<T>(job: PoolJob<Api, T>, options?: { priority?: TaskPriority; worker?: number }): RunningTask<T>;
  dispose(): void;
}

const CANCEL_GRACE_MS = 250;
const ORDER: Readonly<Record<TaskPriority, number>> = { now: 0, ahead: 1, sweep: 2 };
const CRASHED = 'A worker stopped unexpectedly. It was replaced; start the job again.';

interface Task<Api> {
  readonly id: string;
  readonly priority: number;
  readonly worker: number | undefined;
  readonly run: (api: Api, workerNumber: number) => Promise<Outcome<unknown>>;
  readonly end: (outcome: Outcome<unknown>) => void;
}

interface Seat<Api> {
  worker: PoolWorker<Api> | undefined;
  task: Task<Api> | undefined;
}

/**
 * Workers that are spawned when first needed and take one job at a time. Every job ends exactly once: done,
 * cancelled or failed, also when its worker crashes, hangs or the pool is disposed of.
 */
export function createWorkerPool<Api>(options: PoolOptions<Api>): WorkerPool<Api> {
  const { size, spawn, askToCancel, cancelGraceMs = CANCEL_GRACE_MS } = options;
  const seats: Seat<Api>[] = Array.from({ length: size }, () => ({ worker: undefined, task: undefined }));
  let queue: Task<Api>[] = [];
  let nextId = 0;
  let disposed = false;

  function workerAt(seat: Seat<Api>): PoolWorker<Api> {
    if (seat.worker !== undefined) return seat.worker;
    const worker = spawn();
    seat.worker = worker;
    worker.onCrash((reason) => {
      if (seat.worker === worker) endWorker(seat, failed(CRASHED, reason));
    });
    return worker;
  }

  /** Ends a seat's worker and whatever it was doing; the next job gets a fresh one. */
  function endWorker(seat: Seat<Api>, outcome: Outcome<never>): void {
    seat.worker?.terminate();
    seat.worker = undefined;
    const { task } = seat;
    seat.task = undefined;
    task?.end(outcome);
    fill();
  }

  function fill(): void {
    if (disposed) return;
    for (const [number, seat] of seats.entries()) {
      if (seat.task !== undefined) continue;
      const task = queue.find(({ worker }) => worker === undefined || worker === number);
      if (task === undefined) continue;
      queue = queue.filter((other) => other !== task);
      start(seat, number, task);
    }
  }

  function start(seat: Seat<Api>, number: number, task: Task<Api>): void {
    seat.task = task;
    const finish = (outcome: Outcome<unknown>) => {
      if (seat.task !== task) return;
      seat.task = undefined;
      task.end(outcome);
      fill();
    };
    let answer: Promise<Outcome<unknown>>;
    try {
      answer = task.run(workerAt(seat).api, number);
    } catch (cause) {
      finish(failed(CRASHED, String(cause)));
      return;
    }
    answer.then(finish, (cause) => finish(failed(CRASHED, String(cause))));
  }

  function cancel(task: Task<Api>): void {
    if (queue.includes(task)) {
      queue = queue.filter((other) => other !== task);
      task.end({ kind: 'cancelled' });
      return;
    }
    const seat = seats.find((candidate) => candidate.task === task);
    if (seat?.worker === undefined) return;
    askToCancel(seat.worker.api, task.id);
    setTimeout(() => {
      if (seat.task === task) endWorker(seat, { kind: 'cancelled' });
    }, cancelGraceMs);
  }

  return {
    size,
    run(job, { priority = 'now', worker } = {}) {
      nextId += 1;
      const id = `job ${nextId}`;
      const { promise, resolve } = withResolvers<Outcome<unknown>>();
      const run = (api: Api, workerNumber: number) => job(api, id, workerNumber);
      const task: Task<Api> = { id, priority: ORDER[priority], worker, run, end: resolve };
      if (disposed) resolve({ kind: 'cancelled' });
      else {
        const after = queue.findLastIndex((other) => other.priority <= task.priority) + 1;
        queue = queue.toSpliced(after, 0, task);
        fill();
      }
      return { promise: promise as Promise<Outcome<never>>, cancel: () => cancel(task) };
    },
    dispose() {
      disposed = true;
      for (const task of queue) task.end({ kind: 'cancelled' });
      queue = [];
      for (const seat of seats) endWorker(seat, { kind: 'cancelled' });
    },
  };
}

function withResolvers<T>(): { promise: Promise<T>; resolve: (value: T) => void } {
  let resolve!: (value: T) => void;
  const promise = new Promise<T>((settle) => {
    resolve = settle;
  });
  return { promise, resolve };
}
