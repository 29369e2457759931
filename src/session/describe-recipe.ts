import type { Clip, Detrend, Recipe } from '../core/recipe.ts';

/** A recipe in words, for pane heads and the vetting log: what departs from plain flux, in the order it is done. */
export function describeRecipe(recipe: Recipe): string {
  const { fluxColumn, covariates, commonModes, detrend, protectCases } = recipe;
  const trend = describeDetrend(detrend);
  const parts = [
    fluxColumn,
    detrend.kind !== 'none' && protectCases ? `${trend}, events of cases kept out` : trend,
    describeClip(recipe.clip),
    describeMask(recipe.qualityMask),
    recipe.maskFlares ? 'flares left out' : undefined,
    recipe.splitAtDrops ? 'split at sudden drops' : undefined,
    covariates && `regressed on ${covariates.names.join(', ')} per ${covariates.per}`,
    commonModes > 0 ? `${commonModes} common ${commonModes === 1 ? 'mode' : 'modes'} taken out` : undefined,
  ];
  return parts.filter((part) => part !== undefined).join('; ');
}

function describeDetrend(detrend: Detrend): string {
  switch (detrend.kind) {
    case 'none':
      return 'no detrending';
    case 'savitzky-golay':
      return `Savitzky-Golay of degree ${detrend.degree}, window ${detrend.windowDays} d`;
    case 'spline':
      return `spline, time scale ${detrend.knotDays} d`;
    case 'harmonics':
      return `prewhitened by at most ${detrend.count} sines`;
    default:
      return `${detrend.kind}, window ${detrend.windowDays} d`;
  }
}

function describeClip(clip: Clip): string {
  if (clip.kind === 'none') return 'no clipping';
  return `clipped at ${clip.sigma} σ ${clip.side === 'both' ? 'on both sides' : `on the ${clip.side} side`}`;
}

function describeMask(mask: number): string {
  if (mask === 0) return 'flagged points kept';
  return mask === -1 ? 'flagged points left out' : `points with flag bits ${mask} left out`;
}
