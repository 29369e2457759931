import { SEARCH_OBJECTIVES } from '../core/box-search-settings.ts';
import { numberLabel } from '../plot/number-label.ts';
import { searchSettingsOf } from '../store/target-keys.ts';
import { useBench, useCandling } from '../store/use-candling.ts';
import { NumberField } from './NumberField.tsx';
import { Toggle } from './Toggle.tsx';

const HOURS_A_DAY = 24;
const MOST_DURATIONS = 40;

/** What the box search tries; an empty field leaves the choice to the star's density and the length of the series. */
export function SearchFields() {
  const { actions } = useCandling();
  const { target, search } = useBench();
  if (target === undefined) return null;
  const settings = searchSettingsOf(target);
  const own = target.search;
  const { setSearch } = actions;
  return (
    <>
      <div className="form-grid search-fields">
        <span>shortest period</span>
        <NumberField
          label="shortest period in days"
          unit="d"
          value={own.shortestPeriodDays}
          placeholder={search ? numberLabel(search.settings.shortestPeriodDays, 3) : 'chosen'}
          least={0.001}
          onCommit={(shortestPeriodDays) => setSearch({ shortestPeriodDays })}
          onClear={() => setSearch({ shortestPeriodDays: undefined })}
        />
        <span>longest period</span>
        <NumberField
          label="longest period in days"
          unit="d"
          value={own.longestPeriodDays}
          placeholder={search ? numberLabel(search.settings.longestPeriodDays, 2) : 'chosen'}
          least={0.001}
          onCommit={(longestPeriodDays) => setSearch({ longestPeriodDays })}
          onClear={() => setSearch({ longestPeriodDays: undefined })}
        />
        <label htmlFor="search-durations">durations</label>
        <DurationsField />
        <span>oversampling</span>
        <NumberField
          label="oversampling of the period grid"
          value={settings.oversampling}
          least={1}
          onCommit={(oversampling) => setSearch({ oversampling })}
        />
        <span>density of the star</span>
        <NumberField
          label="mean density of the star in grams per cubic centimetre"
          unit="g cm⁻³"
          value={settings.densityCgs === undefined ? undefined : Number(settings.densityCgs.toPrecision(4))}
          placeholder="not known"
          least={1e-5}
          onCommit={(densityCgs) => setSearch({ densityCgs })}
          onClear={() => setSearch({ densityCgs: undefined })}
        />
        <span>ranked by</span>
        <Toggle
          legend="Trial periods are ranked by"
          value={settings.objective}
          options={SEARCH_OBJECTIVES}
          onChoose={(objective) => setSearch({ objective })}
        />
      </div>
      {search && (
        <p className="small search-words">
          Searched: {numberLabel(search.settings.trialCount)} periods from{' '}
          {numberLabel(search.settings.shortestPeriodDays, 3)} to {numberLabel(search.settings.longestPeriodDays, 2)} d,
          spaced as Ofir (2014) for this density. Box least squares: Kovács, Zucker & Mazeh (2002).
        </p>
      )}
    </>
  );
}

/** Hours, separated by blanks or commas; empty leaves the choice to the search. */
function DurationsField() {
  const { actions } = useCandling();
  const { target, search } = useBench();
  const own = target?.search.durationsDays;
  const chosen = search?.settings.durationsDays ?? [];
  const words = (days: readonly number[]) => days.map((value) => numberLabel(value * HOURS_A_DAY, 1)).join(' ');
  const commit = (text: string) => {
    const hours = text
      .split(/[\s,;]+/)
      .filter(Boolean)
      .map(Number);
    if (hours.some((value) => !(value > 0 && value < 1e5)) || hours.length > MOST_DURATIONS) return;
    actions.setSearch({ durationsDays: hours.length === 0 ? undefined : hours.map((value) => value / HOURS_A_DAY) });
  };
  return (
    <span className="number-field">
      <input
        id="search-durations"
        key={words(own ?? [])}
        className="field durations-field"
        defaultValue={own === undefined ? '' : words(own)}
        placeholder={chosen.length === 0 ? 'chosen' : words(chosen)}
        onKeyDown={(event) => event.key === 'Enter' && commit(event.currentTarget.value)}
        onBlur={(event) => commit(event.currentTarget.value)}
      />
      h
    </span>
  );
}
