import type { Recipe } from '../core/recipe.ts';

/** A recipe in words, for pane heads and the vetting log. */
export function describeRecipe({ fluxColumn, qualityMask, clip, detrend, protectCases }: Recipe): string {
  const parts = [
    fluxColumn,
    detrend.kind === 'none'
      ? 'no detrending'
      : `biweight, window ${detrend.windowDays} d${protectCases ? ', events of cases kept out' : ''}`,
    clip.kind === 'none'
      ? 'no clipping'
      : `clipped at ${clip.sigma} σ ${clip.side === 'both' ? 'on both sides' : `on the ${clip.side} side`}`,
    qualityMask === 0
      ? 'flagged points kept'
      : qualityMask === -1
        ? 'flagged points left out'
        : `points with flag bits ${qualityMask} left out`,
  ];
  return parts.filter((part) => part !== undefined).join('; ');
}
