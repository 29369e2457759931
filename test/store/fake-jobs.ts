import { cancelled, done, type Outcome, type Progress } from '../../src/contract/outcome.ts';
import type { BoxSearchResult } from '../../src/contract/search-contract.ts';
import type { CandidatePeriod } from '../../src/contract/single-events-contract.ts';
import type { Jobs, RunningTask } from '../../src/jobs/jobs.ts';
import { createCheckpoint } from '../../workers/checkpoint.ts';
import { prepareSeries } from '../../workers/prepare/prepare.ts';
import { readFile } from '../../workers/read/read-file.ts';

export interface HeldSearch {
  readonly key: string;
  progress(progress: Progress): void;
  finish(): void;
  cancelled: boolean;
}

/**
 * Real reading and preparation, in this thread; searches end when the test says so, with a result of the given key;
 * periods are those that the test sets.
 */
export function createFakeJobs(): { jobs: Jobs; searches: HeldSearch[]; periods: CandidatePeriod[] } {
  const searches: HeldSearch[] = [];
  const periods: CandidatePeriod[] = [];
  const jobs: Jobs = {
    readFile: (fileName, bytes, mapping) => readFile({ jobId: 'r', fileName, bytes, mapping }),
    prepare: (job) => ({
      promise: prepareSeries(
        { jobId: 'p', ...job },
        createCheckpoint(() => false),
      ),
      cancel: () => undefined,
    }),
    searchBox(request, onProgress): RunningTask<BoxSearchResult> {
      let end: (outcome: Outcome<BoxSearchResult>) => void = () => undefined;
      const promise = new Promise<Outcome<BoxSearchResult>>((resolve) => {
        end = resolve;
      });
      const held: HeldSearch = {
        key: request.key,
        progress: onProgress,
        finish: () => end(done(emptyResult(request.key))),
        cancelled: false,
      };
      searches.push(held);
      const cancel = () => {
        held.cancelled = true;
        end(cancelled);
      };
      return { promise, cancel };
    },
    searchSurrogates: notUsed,
    lombScargle: notUsed,
    findSingleEvents: notUsed,
    periodsFromTimes: ({ key }) => ({
      promise: Promise.resolve(done({ key, candidates: [...periods], considered: periods.length, depth: 0.001 })),
      cancel: () => undefined,
    }),
    periodOfSingle: notUsed,
    findCommonModes: notUsed,
    measureDepthLoss: notUsed,
    dispose: () => undefined,
  };
  return { jobs, searches, periods };
}

const notUsed = (): RunningTask<never> => ({ promise: Promise.resolve(cancelled), cancel: () => undefined });

function emptyResult(key: string): BoxSearchResult {
  const none = new Float64Array();
  return {
    key,
    periods: none,
    sde: none,
    signalToNoise: none,
    durationDays: none,
    epochDays: none,
    depth: none,
    objective: none,
    levelledEfficiency: none,
    correlatedNoise: { durationsDays: [], sigma: [] },
    holdBack: undefined,
    peaks: [],
    settings: {
      shortestPeriodDays: 1,
      longestPeriodDays: 2,
      oversampling: 3,
      trialCount: 0,
      durationsDays: [],
      densityCgs: undefined,
      objective: 'white noise S/N',
      round: 1,
      maskedPoints: 0,
    },
  };
}
