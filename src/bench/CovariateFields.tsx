import type { CovariateRegression, Recipe } from '../core/recipe.ts';
import { useBench } from '../store/use-candling.ts';
import { Toggle } from './Toggle.tsx';

/** Columns of the file that the flux is regressed on; shown where the file has any. */
export function CovariateFields(props: {
  readonly recipe: Recipe;
  readonly onSet: (change: Pick<Recipe, 'covariates'>) => void;
}) {
  const { recipe, onSet } = props;
  const { lightCurve } = useBench();
  const names = Object.keys(lightCurve?.lightCurve.covariates ?? {});
  if (names.length === 0) return null;
  const { names: chosen, per }: CovariateRegression = recipe.covariates ?? { names: [], per: 'segment' };
  const set = (next: CovariateRegression) => onSet({ covariates: next.names.length === 0 ? undefined : next });
  return (
    <>
      <span>regress on</span>
      <div className="choices">
        {names.map((name) => (
          <label key={name} className="check">
            <input
              type="checkbox"
              checked={chosen.includes(name)}
              onChange={(event) =>
                set({ per, names: event.target.checked ? [...chosen, name] : chosen.filter((other) => other !== name) })
              }
            />{' '}
            {name}
          </label>
        ))}
        {chosen.length > 0 && (
          <Toggle
            legend="One set of coefficients for each"
            value={per}
            options={['series', 'segment', 'night']}
            onChoose={(scope) => set({ names: chosen, per: scope })}
          />
        )}
      </div>
    </>
  );
}
