/** The jobs of one worker that are under way, so that a cancel can reach them by id. */
export interface RunningJobs {
  /** Runs `work`, which may ask whether its job was cancelled. */
  run<T>(jobId: string, work: (isCancelled: () => boolean) => Promise<T>): Promise<T>;
  cancel(jobId: string): void;
}

export function createRunningJobs(): RunningJobs {
  const running = new Map<string, { cancelled: boolean }>();
  return {
    run: async (jobId, work) => {
      const job = { cancelled: false };
      running.set(jobId, job);
      try {
        return await work(() => job.cancelled);
      } finally {
        running.delete(jobId);
      }
    },
    cancel: (jobId) => {
      const job = running.get(jobId);
      if (job !== undefined) job.cancelled = true;
    },
  };
}
