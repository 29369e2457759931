import type { OnProgress, Outcome } from '../contract/outcome.ts';
import type { RunningTask } from '../jobs/jobs.ts';
import { fileResult, type ResultsStore, withEntry, withoutEntry } from './results-store.ts';

/** Runs each job once for its key, shows its progress, and files the sentence of one that fails under its key. */
export interface RunOnce {
  /** Whoever asks while it runs waits for the same answer. */
  once<T>(key: string, run: () => Promise<T>): Promise<T>;
  isUnderway(key: string): boolean;
  /** The value of a task; undefined when it failed (the sentence is filed under `failureKey`) or was cancelled. */
  settle<T>(key: string, task: RunningTask<T>, failureKey?: string): Promise<T | undefined>;
  /** Shows a job's progress under its title until it ends. */
  progressOf(key: string, title: string, unit: string): OnProgress;
  cancel(key: string): void;
  /** The analyst cancelled it: it is not started again by itself. */
  cancelByHand(key: string): void;
  /** Forgets that a job of this key was cancelled or failed. */
  forgive(key: string): void;
  cancelAllBut(keep: (key: string) => boolean): void;
}

const MOST_RUNNING = 64;

export function createRunOnce(results: ResultsStore, now: () => number): RunOnce {
  const underway = new Map<string, Promise<unknown>>();
  const cancels = new Map<string, () => void>();

  function cancelByHand(key: string): void {
    results.setState({ cancelledKeys: new Set(results.getState().cancelledKeys).add(key) });
    cancels.get(key)?.();
  }

  return {
    once<T>(key: string, run: () => Promise<T>): Promise<T> {
      const waiting = underway.get(key);
      if (waiting !== undefined) return waiting as Promise<T>;
      const promise = run().finally(() => {
        underway.delete(key);
        cancels.delete(key);
        if (results.getState().running.has(key))
          results.setState({ running: withoutEntry(results.getState().running, key) });
      });
      underway.set(key, promise);
      return promise;
    },
    isUnderway: (key) => underway.has(key),
    async settle<T>(key: string, task: RunningTask<T>, failureKey = key) {
      cancels.set(key, task.cancel);
      const outcome: Outcome<T> = await task.promise;
      if (outcome.kind === 'failed') fileResult(results, 'failures', failureKey, outcome.error.sentence);
      return outcome.kind === 'done' ? outcome.value : undefined;
    },
    progressOf(key, title, unit) {
      const startedAt = now();
      return (progress) => {
        // A worker's last words may come after its job has ended here.
        if (!underway.has(key)) return;
        const job = { title, unit, progress, startedAt, cancel: () => cancelByHand(key) };
        results.setState({ running: withEntry(results.getState().running, key, job, MOST_RUNNING) });
      };
    },
    cancel: (key) => cancels.get(key)?.(),
    cancelByHand,
    forgive(key) {
      const cancelledKeys = new Set(results.getState().cancelledKeys);
      cancelledKeys.delete(key);
      results.setState({ cancelledKeys, failures: withoutEntry(results.getState().failures, key) });
    },
    cancelAllBut(keep) {
      for (const [key, cancel] of cancels) if (!keep(key)) cancel();
    },
  };
}
