import type { Recipe } from '../core/recipe.ts';
import { numberLabel } from '../plot/number-label.ts';
import type { Target } from '../session/document.ts';
import { useBench, useCandling } from '../store/use-candling.ts';
import { CovariateFields } from './CovariateFields.tsx';
import { DetrendFields } from './DetrendFields.tsx';
import { NumberField } from './NumberField.tsx';
import { SheetDialog } from './SheetDialog.tsx';
import { Toggle } from './Toggle.tsx';

/** How the selected target's flux is prepared; every change is one undoable step and takes effect at once. */
export function RecipeDialog({ onLeave }: { readonly onLeave: () => void }) {
  const { document, files } = useCandling();
  const { target } = useBench();
  if (target === undefined) return null;
  const { recipe } = target;
  const set = (change: Partial<Recipe>) =>
    document.getState().run({ kind: 'set recipe', targetId: target.id, recipe: { ...recipe, ...change } });
  return (
    <SheetDialog title={`Recipe of ${target.label}`} onLeave={onLeave}>
      <div className="form-grid">
        <ColumnField target={target} onChoose={(fluxColumn) => set({ fluxColumn })} />
        <MaskField recipe={recipe} onSet={set} />
        <span>flares</span>
        <Toggle
          legend="Flares"
          value={recipe.maskFlares ? 'left out with their tails' : 'kept'}
          options={['left out with their tails', 'kept']}
          onChoose={(choice) => set({ maskFlares: choice !== 'kept' })}
        />
        <span>sudden drops</span>
        <Toggle
          legend="Sudden drops of sensitivity"
          value={recipe.splitAtDrops ? 'split the series' : 'not looked for'}
          options={['split the series', 'not looked for']}
          onChoose={(choice) => set({ splitAtDrops: choice === 'split the series' })}
        />
        <CovariateFields recipe={recipe} onSet={set} />
        <CommonModesField recipe={recipe} onSet={set} />
        <ClipField recipe={recipe} onSet={set} />
        <span>detrend</span>
        <DetrendFields detrend={recipe.detrend} onSet={(detrend) => set({ detrend })} />
        <span>events of cases</span>
        <Toggle
          legend="Events of cases"
          value={recipe.protectCases ? 'kept out of the trend' : 'in the trend'}
          options={['in the trend', 'kept out of the trend']}
          onChoose={(choice) => set({ protectCases: choice === 'kept out of the trend' })}
        />
      </div>
      <PreparedWords />
      <div className="sheet-actions">
        <button type="button" className="button" onClick={() => void files.reviseColumns(target)}>
          Columns of the file
        </button>
        <span className="spread" />
        <GiveToAll recipe={recipe} />
      </div>
    </SheetDialog>
  );
}

interface FieldProps {
  readonly recipe: Recipe;
  readonly onSet: (change: Partial<Recipe>) => void;
}

function ColumnField({ target, onChoose }: { readonly target: Target; readonly onChoose: (name: string) => void }) {
  const { lightCurve, prepared } = useBench();
  return (
    <>
      <label htmlFor="recipe-column">flux column</label>
      <select
        id="recipe-column"
        className="field"
        value={prepared?.fluxColumn ?? target.recipe.fluxColumn ?? ''}
        onChange={(event) => onChoose(event.target.value)}
      >
        {lightCurve?.lightCurve.fluxColumns.map(({ name, meaning, unit }) => (
          <option key={name} value={name}>
            {name} ({meaning === 'unknown' ? 'meaning not stated' : meaning}, {unit})
          </option>
        ))}
      </select>
    </>
  );
}

function MaskField({ recipe, onSet }: FieldProps) {
  const { qualityMask } = recipe;
  return (
    <>
      <span>quality mask</span>
      <div className="choices">
        <Toggle
          legend="Quality mask"
          value={qualityMask === 0 ? 'keep all' : qualityMask === -1 ? 'leave out flagged' : 'these bits'}
          options={['leave out flagged', 'keep all', 'these bits']}
          onChoose={(choice) =>
            onSet({ qualityMask: choice === 'keep all' ? 0 : choice === 'leave out flagged' ? -1 : 1 })
          }
        />
        {qualityMask > 0 && (
          <NumberField
            label="sum of the bits that leave a point out"
            value={qualityMask}
            least={1}
            whole
            onCommit={(bits) => onSet({ qualityMask: bits })}
          />
        )}
      </div>
    </>
  );
}

function ClipField({ recipe: { clip }, onSet }: FieldProps) {
  return (
    <>
      <span>sigma clip</span>
      <div className="choices">
        <Toggle
          legend="Sigma clip"
          value={clip.kind === 'none' ? 'none' : clip.side}
          options={['none', 'high', 'low', 'both']}
          onChoose={(side) =>
            onSet({
              clip:
                side === 'none'
                  ? { kind: 'none' }
                  : { kind: 'sigma', side, sigma: clip.kind === 'sigma' ? clip.sigma : 4 },
            })
          }
        />
        {clip.kind === 'sigma' && (
          <NumberField
            label="clip at so many sigma"
            unit="σ"
            value={clip.sigma}
            least={1}
            onCommit={(sigma) => onSet({ clip: { ...clip, sigma } })}
          />
        )}
      </div>
    </>
  );
}

function CommonModesField({ recipe, onSet }: FieldProps) {
  const { actions, document } = useCandling();
  const { target } = useBench();
  const set = document.getState().document?.modeSets.find(({ id }) => id === target?.modeSet);
  const choose = (commonModes: number) => {
    if (commonModes > 0 && set === undefined) actions.findModeSet();
    onSet({ commonModes });
  };
  return (
    <>
      <span>common modes</span>
      <div className="choices">
        <Toggle
          legend="Modes common to the docket that are taken out"
          value={String(recipe.commonModes)}
          options={['0', '1', '2', '3', '4']}
          words={{ '0': 'none' }}
          onChoose={(count) => choose(Number(count))}
        />
        {set && (
          <button type="button" className="link small" onClick={() => actions.findModeSet()}>
            of {set.stars.length} stars: find them again from the docket as it is now
          </button>
        )}
      </div>
    </>
  );
}

function PreparedWords() {
  const { prepared } = useBench();
  if (prepared === undefined) return null;
  const { time, dropped, missing, scatter, errorOrigin, flares, drops } = prepared;
  const found = [
    flares.length > 0
      ? `${numberLabel(flares.length)} ${flares.length === 1 ? 'flare' : 'flares'} left out`
      : undefined,
    drops.length > 0
      ? `split at ${numberLabel(drops.length)} sudden ${drops.length === 1 ? 'drop' : 'drops'}`
      : undefined,
  ].filter((words) => words !== undefined);
  return (
    <p className="small">
      {numberLabel(time.length)} points kept, {numberLabel(dropped.time.length)} left out, {numberLabel(missing)}{' '}
      without flux; scatter {numberLabel(scatter * 1e6)} ppm; errors{' '}
      {errorOrigin === 'given' ? 'as in the file' : 'estimated from the point-to-point scatter'}
      {found.length > 0 && `; ${found.join(', ')}`}. A window shorter than three durations eats into the dips.
    </p>
  );
}

function GiveToAll({ recipe }: { readonly recipe: Recipe }) {
  const { document } = useCandling();
  const targets = document.getState().document?.targets ?? [];
  if (targets.length < 2) return null;
  const targetIds = targets.map(({ id }) => id);
  return (
    <button
      type="button"
      className="button"
      onClick={() => document.getState().run({ kind: 'set recipes', targetIds, recipe })}
    >
      Give this recipe to all {numberLabel(targets.length)} targets
    </button>
  );
}
