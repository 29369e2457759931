import type { PrepareJob } from '../../src/contract/prepare-contract.ts';
import { contains, type Interval } from '../../src/core/interval.ts';
import { modeAt } from './common-modes.ts';
import { findDrops } from './find-drops.ts';
import { findFlares } from './find-flares.ts';
import { type Group, regressOn } from './regress.ts';
import { regressionGroups } from './regression-groups.ts';

/** What is known of a series before its trend. */
export interface CleanSeries {
  readonly flares: readonly Interval[];
  /** 1 where a point lies in a flare or its tail. */
  readonly isFlare: Uint8Array;
  /** First points after sudden drops. */
  readonly drops: readonly number[];
  /** Starts of pieces: segments of the file and drops. */
  readonly splits: readonly number[];
  /** What covariates and common modes explain, near 1 (0 where the unit is sigma); length n. */
  readonly explained: Float64Array | undefined;
}

/**
 * Flares and sudden drops are found, and what chosen covariates and the docket's common modes explain.
 *
 * @param sourceIndex of each point in the light curve
 * @returns a sentence where the recipe asks for what is not there
 */
export function cleanSeries(
  { lightCurve, recipe, commonModes }: PrepareJob,
  time: Float64Array,
  raw: Float64Array,
  sourceIndex: Int32Array,
  isProtected: Uint8Array,
): CleanSeries | string {
  const flares = recipe.maskFlares ? findFlares(time, raw, isProtected) : [];
  const isFlare = Uint8Array.from(time, (at) => (flares.some((flare) => contains(flare, at)) ? 1 : 0));
  const drops = recipe.splitAtDrops ? findDrops(time, raw) : [];
  const segments = segmentsAmong(lightCurve.segmentStarts, sourceIndex);
  const splits = [...new Set([...segments, ...drops])].sort((a, b) => a - b);
  const hasWeight = isProtected.map((own, i) => (own === 0 && isFlare[i] === 0 ? 1 : 0));
  const missing = recipe.covariates?.names.find((name) => lightCurve.covariates[name] === undefined);
  if (missing !== undefined) return `The recipe regresses on "${missing}", which this light curve does not have.`;
  if (recipe.commonModes > 0 && commonModes === undefined) return 'The common modes of the docket are not at hand.';
  const covariates = (recipe.covariates?.names ?? []).map((name) => pick(lightCurve.covariates[name]!, sourceIndex));
  const modes = commonModes?.modes.slice(0, recipe.commonModes).map((mode) => modeAt(commonModes, mode, time)) ?? [];
  const explained = [
    explain(raw, covariates, hasWeight, regressionGroups(time, segments, recipe.covariates?.per ?? 'series')),
    explain(raw, modes, hasWeight, [{ first: 0, end: time.length }]),
  ].filter((one) => one !== undefined);
  return { flares, isFlare, drops, splits, explained: addUp(explained) };
}

function explain(raw: Float64Array, columns: readonly Float64Array[], hasWeight: Uint8Array, groups: readonly Group[]) {
  return columns.length === 0 ? undefined : regressOn(raw, columns, hasWeight, groups);
}

function addUp(parts: readonly Float64Array[]): Float64Array | undefined {
  const [first, second] = parts;
  return second === undefined ? first : first!.map((value, i) => value + second[i]!);
}

/** Where the file's segments begin among the points that are kept. */
function segmentsAmong(segmentStarts: Int32Array, sourceIndex: Int32Array): number[] {
  return [...segmentStarts].map((start) => sourceIndex.findIndex((index) => index >= start)).filter((i) => i > 0);
}

function pick(values: Float64Array, indices: Int32Array): Float64Array {
  return Float64Array.from(indices, (index) => values[index]!);
}
