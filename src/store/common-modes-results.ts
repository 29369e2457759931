import type { CommonModes, ModeStar } from '../contract/prepare-contract.ts';
import { DEFAULT_RECIPE, type Recipe } from '../core/recipe.ts';
import { stableKey } from '../core/stable-key.ts';
import type { Jobs } from '../jobs/jobs.ts';
import type { ModeSet, SessionDocument, Target } from '../session/document.ts';
import { fileResult, type ResultsStore } from './results-store.ts';
import type { RunOnce } from './run-once.ts';
import { modesKey } from './target-keys.ts';
import type { TargetResults } from './target-results.ts';

/** More stars than this hardly sharpen the modes, and every one is read and kept in memory at once. */
const MOST_STARS = 200;

/** Modes are found in flux that nothing but the file's own flags has touched. */
const PLAIN: Recipe = {
  ...DEFAULT_RECIPE,
  clip: { kind: 'none' },
  detrend: { kind: 'none' },
  maskFlares: false,
  splitAtDrops: false,
};

/** The stars of a docket, evenly picked where there are many, with what is masked of each: its cases' events. */
export function modeSetOf(document: SessionDocument): ModeSet {
  const step = Math.max(1, document.targets.length / MOST_STARS);
  const picked = document.targets.filter((_, index) => Math.floor(index / step) !== Math.floor((index - 1) / step));
  const stars = picked.map(({ id, cases }) => ({
    targetId: id,
    masked: cases.flatMap(({ timing }) => (timing.kind === 'linear' ? [ephemerisFields(timing)] : [])),
  }));
  return { id: stableKey({ stars }), stars };
}

function ephemerisFields({ periodDays, epochDays, durationDays }: ModeSet['stars'][number]['masked'][number]) {
  return { periodDays, epochDays, durationDays };
}

/** Finds the common modes that a target's recipe takes out, once for each set and count. */
export function createCommonModes(deps: {
  readonly jobs: Jobs;
  readonly results: ResultsStore;
  readonly runs: RunOnce;
  readonly document: () => SessionDocument | undefined;
  readonly targetResults: () => TargetResults;
}): (target: Target, failureKey: string) => Promise<CommonModes | undefined> {
  const { jobs, results, runs, document } = deps;

  async function gatherStars({ stars }: ModeSet): Promise<ModeStar[]> {
    const gathered: ModeStar[] = [];
    for (const { targetId, masked } of stars) {
      const target = document()?.targets.find(({ id }) => id === targetId);
      if (target === undefined) continue;
      const plain: Target = { ...target, recipe: { ...PLAIN, fluxColumn: target.recipe.fluxColumn } };
      const series = await deps.targetResults().prepared(plain, 'sweep');
      if (series !== undefined) gathered.push({ time: series.time, flux: series.raw, masked });
    }
    return gathered;
  }

  return async (target, failureKey) => {
    const set = document()?.modeSets.find(({ id }) => id === target.modeSet);
    if (set === undefined) {
      fileResult(results, 'failures', failureKey, 'The common modes of the docket are not found yet: see the recipe.');
      return undefined;
    }
    const modeCount = target.recipe.commonModes;
    const key = modesKey(target);
    const known = results.getState().modes.get(key);
    if (known !== undefined) return known;
    return runs.once(key, async () => {
      const stars = await gatherStars(set);
      const modes = await runs.settle(key, jobs.findCommonModes({ key, stars, modeCount }), failureKey);
      if (modes !== undefined) fileResult(results, 'modes', key, modes);
      return modes;
    });
  };
}
