import { regressOn } from './regress.ts';
import { regressionGroups } from './regression-groups.ts';
import { pick, segmentsAmong, weightsOf } from './series-points.ts';
import type { ExplainStep } from './systematics-input.ts';

/** What the recipe's columns of the file explain. */
export const explainByCovariates: ExplainStep = ({ lightCurve, recipe }, { points, isSubtracted }, flux) => {
  if (recipe.covariates === undefined || recipe.covariates.names.length === 0) return undefined;
  const { names, per } = recipe.covariates;
  const { time, sourceIndex, isProtected } = points;
  const columns = names.map((name) => pick(lightCurve.covariates[name]!, sourceIndex));
  const segments = segmentsAmong(lightCurve.segmentStarts, sourceIndex);
  const known = columns.map((column) => column.some(Number.isFinite));
  const groups = regressionGroups(time, segments, per);
  const used = columns.filter((_, c) => known[c]);
  const result = regressOn(flux, used, weightsOf(isProtected), groups, isSubtracted);
  const regressed = groups.length - result.groupsLeft;
  const usedNames = names.filter((_, c) => known[c]);
  const empty = names.filter((_, c) => !known[c]);
  const repeating = usedNames.filter((_, c) => regressed > 0 && result.repeats[c] === regressed);
  const missing = time.reduce((sum, _t, i) => sum + (used.every((column) => Number.isFinite(column[i]!)) ? 0 : 1), 0);
  return {
    explained: result.explained.map((value) => 1 + value),
    warnings: [
      ...empty.map((name) => `"${name}" has no values here and was left out of the regression.`),
      ...repeating.map(
        (name) => `"${name}" does not vary or repeats other columns, and was left out of the regression.`,
      ),
      ...(result.groupsLeft > 0
        ? [
            `${result.groupsLeft} of ${groups.length} ${words(per)} have too few points to be regressed on ${names.length} columns, and were left as they are.`,
          ]
        : []),
      ...(missing > 0 ? [`${missing} points miss a column of the regression: they were corrected by the others.`] : []),
    ],
  };
};

const words = (per: 'series' | 'segment' | 'night'): string => (per === 'series' ? 'series' : `${per}s`);
