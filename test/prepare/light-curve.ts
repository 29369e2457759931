import type { PreparedSeries, PrepareJob } from '../../src/contract/prepare-contract.ts';
import type { FluxColumn, LightCurve } from '../../src/core/light-curve.ts';
import { DEFAULT_RECIPE, type Recipe } from '../../src/core/recipe.ts';
import { createCheckpoint } from '../../workers/checkpoint.ts';
import { prepareSeries } from '../../workers/prepare/prepare.ts';
import { expectDone } from '../search/search-box.ts';

export const PLAIN: Recipe = {
  ...DEFAULT_RECIPE,
  clip: { kind: 'none' },
  detrend: { kind: 'none' },
  maskFlares: false,
  splitAtDrops: false,
};

export function makeColumn(flux: ArrayLike<number>, rest: Partial<FluxColumn> = {}): FluxColumn {
  return {
    name: 'flux',
    flux: Float64Array.from(flux),
    error: undefined,
    meaning: 'unknown',
    unit: 'relative',
    ...rest,
  };
}

export function makeLightCurve(columns: readonly FluxColumn[], rest: Partial<LightCurve> = {}): LightCurve {
  const n = columns[0]!.flux.length;
  return {
    time: Float64Array.from({ length: n }, (_, i) => i / 48),
    timeReference: { zeroJd: undefined, scale: 'unknown', frame: 'unknown' },
    exposureDays: undefined,
    stamp: 'unknown',
    passband: 'unknown',
    fluxColumns: columns,
    quality: new Int32Array(n),
    hasQuality: false,
    covariates: {},
    segmentStarts: Int32Array.of(0),
    ...rest,
  };
}

export function makeJob(lightCurve: LightCurve, recipe: Partial<Recipe>, rest: Partial<PrepareJob> = {}): PrepareJob {
  return {
    jobId: 'j',
    key: 'k',
    lightCurve,
    recipe: { ...PLAIN, ...recipe },
    excluded: [],
    protectedEvents: [],
    protectedIntervals: [],
    instrumentSpans: [],
    commonModes: undefined,
    ...rest,
  };
}

export const runPrepare = (job: PrepareJob) =>
  prepareSeries(
    job,
    createCheckpoint(() => false),
  );
export const prepare = async (job: PrepareJob): Promise<PreparedSeries> => expectDone(await runPrepare(job));

export async function sentenceOf(job: PrepareJob): Promise<string> {
  const outcome = await runPrepare(job);
  return outcome.kind === 'failed' ? outcome.error.sentence : outcome.kind;
}
