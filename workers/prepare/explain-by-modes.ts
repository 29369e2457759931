import { modeAt } from './common-modes.ts';
import { regressOn } from './regress.ts';
import { regressionGroups } from './regression-groups.ts';
import { segmentsAmong, weightsOf } from './series-points.ts';
import type { ExplainStep } from './systematics-input.ts';

/** What the docket's common modes explain, a set of coefficients for each segment of the file: a star then lies elsewhere on the detector. */
export const explainByModes: ExplainStep = ({ lightCurve, recipe, commonModes }, { points, isSubtracted }, flux) => {
  if (recipe.commonModes === 0 || commonModes === undefined) return undefined;
  const { time, sourceIndex, isProtected } = points;
  const columns = commonModes.modes.slice(0, recipe.commonModes).map((mode) => modeAt(commonModes, mode, time));
  const groups = regressionGroups(time, segmentsAmong(lightCurve.segmentStarts, sourceIndex), 'segment');
  const { explained } = regressOn(flux, columns, weightsOf(isProtected), groups, isSubtracted);
  const outside = columns[0]?.reduce((sum, value) => sum + (Number.isNaN(value) ? 1 : 0), 0) ?? 0;
  const fewer = columns.length < recipe.commonModes;
  return {
    explained: explained.map((value) => 1 + value),
    warnings: [
      ...(outside > 0 ? [`${outside} points lie at times without common modes and were left as they are.`] : []),
      ...(fewer
        ? [
            `The docket has ${columns.length} common ${columns.length === 1 ? 'mode' : 'modes'}, ${recipe.commonModes} were asked for.`,
          ]
        : []),
    ],
  };
};
