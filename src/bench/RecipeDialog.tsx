import type { ReactNode } from 'react';
import type { Recipe } from '../core/recipe.ts';
import { numberLabel } from '../plot/number-label.ts';
import { useBench, useCandling } from '../store/use-candling.ts';
import { NumberField } from './NumberField.tsx';
import { SheetDialog } from './SheetDialog.tsx';

/** How the selected target's flux is prepared; every change is one undoable step and takes effect at once. */
export function RecipeDialog({ onLeave }: { readonly onLeave: () => void }) {
  const { document, files } = useCandling();
  const { target, lightCurve, prepared } = useBench();
  if (target === undefined) return null;
  const { recipe } = target;
  const set = (change: Partial<Recipe>) =>
    document.getState().run({ kind: 'set recipe', targetId: target.id, recipe: { ...recipe, ...change } });
  const { clip, detrend } = recipe;
  return (
    <SheetDialog title={`Recipe of ${target.label}`} onLeave={onLeave}>
      <div className="form-grid">
        <label htmlFor="recipe-column">flux column</label>
        <select
          id="recipe-column"
          className="field"
          value={prepared?.fluxColumn ?? recipe.fluxColumn ?? ''}
          onChange={(event) => set({ fluxColumn: event.target.value })}
        >
          {lightCurve?.lightCurve.fluxColumns.map(({ name, meaning, unit }) => (
            <option key={name} value={name}>
              {name} ({meaning === 'unknown' ? 'meaning not stated' : meaning}, {unit})
            </option>
          ))}
        </select>
        <span>quality mask</span>
        <Choices
          legend="Quality mask"
          value={recipe.qualityMask === 0 ? 'keep all' : recipe.qualityMask === -1 ? 'leave out flagged' : 'these bits'}
          options={['leave out flagged', 'keep all', 'these bits']}
          onChoose={(name) => set({ qualityMask: name === 'keep all' ? 0 : name === 'leave out flagged' ? -1 : 1 })}
        >
          {recipe.qualityMask > 0 && (
            <NumberField
              label="sum of the bits that leave a point out"
              value={recipe.qualityMask}
              least={1}
              whole
              onCommit={(qualityMask) => set({ qualityMask })}
            />
          )}
        </Choices>
        <span>sigma clip</span>
        <Choices
          legend="Sigma clip"
          value={clip.kind === 'none' ? 'none' : clip.side}
          options={['none', 'high', 'low', 'both']}
          onChoose={(name) =>
            set({
              clip:
                name === 'none'
                  ? { kind: 'none' }
                  : { kind: 'sigma', side: name, sigma: clip.kind === 'sigma' ? clip.sigma : 4 },
            })
          }
        >
          {clip.kind === 'sigma' && (
            <NumberField
              label="clip at so many sigma"
              unit="σ"
              value={clip.sigma}
              least={1}
              onCommit={(sigma) => set({ clip: { ...clip, sigma } })}
            />
          )}
        </Choices>
        <span>detrend</span>
        <Choices
          legend="Detrend"
          value={detrend.kind}
          options={['none', 'biweight']}
          onChoose={(kind) => set({ detrend: kind === 'none' ? { kind } : { kind, windowDays: DEFAULT_WINDOW_DAYS } })}
        >
          {detrend.kind === 'biweight' && (
            <NumberField
              label="width of the sliding window in days"
              unit="d"
              value={detrend.windowDays}
              least={0.01}
              onCommit={(windowDays) => set({ detrend: { ...detrend, windowDays } })}
            />
          )}
        </Choices>
        <span>events of cases</span>
        <Choices
          legend="Events of cases"
          value={recipe.protectCases ? 'kept out of the trend' : 'in the trend'}
          options={['in the trend', 'kept out of the trend']}
          onChoose={(name) => set({ protectCases: name === 'kept out of the trend' })}
        />
      </div>
      {prepared && (
        <p className="small">
          {numberLabel(prepared.time.length)} points kept, {numberLabel(prepared.dropped.time.length)} left out,{' '}
          {numberLabel(prepared.missing)} without flux; scatter {numberLabel(prepared.scatter * 1e6)} ppm; errors{' '}
          {prepared.errorOrigin === 'given' ? 'as in the file' : 'estimated from the point-to-point scatter'}. A window
          shorter than three durations eats into the dips.
        </p>
      )}
      <div className="sheet-actions">
        <button type="button" className="button" onClick={() => void files.reviseColumns(target)}>
          Columns of the file
        </button>
      </div>
    </SheetDialog>
  );
}

const DEFAULT_WINDOW_DAYS = 1.5;

function Choices<T extends string>(props: {
  readonly legend: string;
  readonly value: T;
  readonly options: readonly T[];
  readonly onChoose: (option: T) => void;
  readonly children?: ReactNode;
}) {
  const { legend, value, options, onChoose, children } = props;
  return (
    <div className="choices">
      <fieldset className="toggle">
        <legend className="visually-hidden">{legend}</legend>
        {options.map((option) => (
          <button key={option} type="button" aria-pressed={option === value} onClick={() => onChoose(option)}>
            {option}
          </button>
        ))}
      </fieldset>
      {children}
    </div>
  );
}
