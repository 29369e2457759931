import type { PrepareWorker } from '../../src/contract/prepare-contract.ts';
import { createCheckpoint } from '../checkpoint.ts';
import { createRunningJobs } from '../running-jobs.ts';
import { transferArrays } from '../transfer-arrays.ts';
import { findCommonModes } from './common-modes.ts';
import { measureDepthLoss } from './depth-loss.ts';
import { prepareSeries } from './prepare.ts';

/** The preparing worker without its thread. */
export function createPrepareService(): PrepareWorker {
  const jobs = createRunningJobs();
  return {
    prepare: (job) =>
      jobs.run(job.jobId, async (isCancelled) =>
        transferArrays(await prepareSeries(job, createCheckpoint(isCancelled))),
      ),
    findCommonModes: (job) =>
      jobs.run(job.jobId, async (isCancelled) =>
        transferArrays(await findCommonModes(job, createCheckpoint(isCancelled))),
      ),
    measureDepthLoss: (job) =>
      jobs.run(job.jobId, (isCancelled) => measureDepthLoss(job, createCheckpoint(isCancelled))),
    cancel: async (jobId) => jobs.cancel(jobId),
  };
}
