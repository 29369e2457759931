import type { PrepareWorker } from '../../src/contract/prepare-contract.ts';
import { createCheckpoint } from '../checkpoint.ts';
import { createRunningJobs } from '../running-jobs.ts';
import { transferArrays } from '../transfer-arrays.ts';
import { prepareSeries } from './prepare.ts';

/** The preparing worker without its thread. */
export function createPrepareService(): PrepareWorker {
  const jobs = createRunningJobs();
  return {
    prepare: (job) =>
      jobs.run(job.jobId, async (isCancelled) =>
        transferArrays(await prepareSeries(job, createCheckpoint(isCancelled))),
      ),
    cancel: async (jobId) => jobs.cancel(jobId),
  };
}
