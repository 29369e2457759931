import type { PrepareJob } from '../../src/contract/prepare-contract.ts';
import { explainByCovariates } from './explain-by-covariates.ts';
import { explainByModes } from './explain-by-modes.ts';
import { explainRecoveries } from './explain-recoveries.ts';
import { applyTrend, joinTrends } from './remove-trend.ts';
import type { Systematics, SystematicsInput } from './systematics-input.ts';

/**
 * One after another: the exponential recovery from each sudden drop, what the chosen covariates explain, and what the
 * docket's common modes explain.
 *
 * @returns a sentence where the recipe asks for what is not there
 */
export function findSystematics(job: PrepareJob, input: SystematicsInput): Systematics | string {
  const { lightCurve, recipe, commonModes } = job;
  const { points, isSubtracted } = input;
  const missing = recipe.covariates?.names.find((name) => lightCurve.covariates[name] === undefined);
  if (missing !== undefined) return `The recipe regresses on "${missing}", which this light curve does not have.`;
  if (recipe.commonModes > 0 && commonModes === undefined) return 'The common modes of the docket are not at hand.';
  const steps = [explainRecoveries, explainByCovariates, explainByModes];
  let explained: Float64Array | undefined;
  const warnings: string[] = [];
  for (const step of steps) {
    const flux = explained === undefined ? points.raw : applyTrend(points.raw, explained, isSubtracted);
    const found = step(job, input, flux);
    if (found?.explained === undefined) continue;
    explained = explained === undefined ? found.explained : joinTrends(explained, found.explained, isSubtracted);
    warnings.push(...found.warnings);
  }
  const low = explained?.findIndex((value) => !isSubtracted && !(value > 0)) ?? -1;
  if (explained === undefined || low < 0) return { explained, warnings };
  return `What covariates and common modes explain falls to ${Number(explained[low]!.toPrecision(3))} of the median flux at time ${points.time[low]}: leave that span or a column out.`;
}
