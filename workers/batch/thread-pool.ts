import { Worker } from 'node:worker_threads';
import { failed, type Outcome } from '../../src/contract/outcome.ts';
import type { ThreadAnswers, ThreadTask } from './sweep-thread.ts';

type Task<K extends ThreadTask['kind']> = Extract<ThreadTask, { kind: K }>;

/** Threads of a sweep, each with one task at a time; one that dies takes only its own task with it. */
export interface ThreadPool {
  run<K extends ThreadTask['kind']>(task: Task<K>): Promise<ThreadAnswers[K]>;
  close(): Promise<void>;
}

interface Waiting {
  readonly task: ThreadTask;
  readonly settle: (outcome: Outcome<never>) => void;
}

/** @param threadFile the bundled sweep-thread */
export function createThreadPool(threadFile: string, size: number): ThreadPool {
  const waiting: Waiting[] = [];
  const threads = new Set<Worker>();
  const idle: Worker[] = [];
  let isClosed = false;

  function start(): Worker {
    const thread = new Worker(threadFile);
    threads.add(thread);
    // An error ends the thread: who waits for it is told then. Without a listener it would end the sweep.
    thread.on('error', () => undefined);
    thread.once('exit', () => {
      threads.delete(thread);
      if (idle.includes(thread)) idle.splice(idle.indexOf(thread), 1);
    });
    return thread;
  }

  function next(): void {
    if (waiting.length === 0) return;
    const thread = idle.pop() ?? (threads.size < size ? start() : undefined);
    if (thread !== undefined) give(thread, waiting.shift()!);
  }

  function give(thread: Worker, { task, settle }: Waiting): void {
    let why = 'it ended without a word';
    const onMessage = (outcome: Outcome<never>): void => {
      thread.off('exit', onExit).off('error', onError);
      idle.push(thread);
      settle(outcome);
      next();
    };
    const onError = (error: Error): void => {
      why = error.message;
    };
    const onExit = (): void => {
      settle(failed(`${task.fileName} was not swept. Its thread died: ${why}.`));
      if (!isClosed) next();
    };
    thread.once('message', onMessage).once('error', onError).once('exit', onExit).postMessage(task);
  }

  return {
    run: <K extends ThreadTask['kind']>(task: Task<K>) =>
      new Promise<ThreadAnswers[K]>((resolve) => {
        waiting.push({ task, settle: resolve as Waiting['settle'] });
        next();
      }),
    async close() {
      isClosed = true;
      await Promise.all([...threads].map((thread) => thread.terminate()));
    },
  };
}
