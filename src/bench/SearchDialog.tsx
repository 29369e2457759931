import type { BoxSearchSettings } from '../core/box-search-settings.ts';
import { numberLabel } from '../plot/number-label.ts';
import { searchSettingsOf } from '../store/target-keys.ts';
import { useBench, useCandling } from '../store/use-candling.ts';
import { NumberField } from './NumberField.tsx';
import { SheetDialog } from './SheetDialog.tsx';

/** What the box search tries; an empty field leaves the choice to the star's density and the length of the series. */
export function SearchDialog({ onLeave }: { readonly onLeave: () => void }) {
  const { document } = useCandling();
  const { target, search } = useBench();
  if (target === undefined) return null;
  const settings = searchSettingsOf(target);
  const own = target.search;
  const set = (change: Partial<BoxSearchSettings>) =>
    document.getState().run({ kind: 'set search', targetId: target.id, search: { ...own, ...change } });
  return (
    <SheetDialog title={`Search of ${target.label}`} onLeave={onLeave}>
      <div className="form-grid">
        <span>shortest period</span>
        <NumberField
          label="shortest period in days"
          unit="d"
          value={own.shortestPeriodDays}
          placeholder="chosen"
          least={0.02}
          onCommit={(shortestPeriodDays) => set({ shortestPeriodDays })}
          onClear={() => set({ shortestPeriodDays: undefined })}
        />
        <span>longest period</span>
        <NumberField
          label="longest period in days"
          unit="d"
          value={own.longestPeriodDays}
          placeholder="chosen"
          least={0.02}
          onCommit={(longestPeriodDays) => set({ longestPeriodDays })}
          onClear={() => set({ longestPeriodDays: undefined })}
        />
        <span>oversampling</span>
        <NumberField
          label="oversampling of the period grid"
          value={settings.oversampling}
          least={1}
          onCommit={(oversampling) => set({ oversampling })}
        />
        <span>density of the star</span>
        <NumberField
          label="mean density of the star in grams per cubic centimetre"
          unit="g cm⁻³"
          value={settings.densityCgs === undefined ? undefined : Number(settings.densityCgs.toPrecision(4))}
          placeholder="not known"
          least={1e-5}
          onCommit={(densityCgs) => set({ densityCgs })}
          onClear={() => set({ densityCgs: undefined })}
        />
      </div>
      {search && (
        <p className="small">
          Searched: {numberLabel(search.settings.trialCount)} periods from{' '}
          {numberLabel(search.settings.shortestPeriodDays, 3)} to {numberLabel(search.settings.longestPeriodDays, 2)} d,
          spaced as Ofir (2014) for this density; durations{' '}
          {search.settings.durationsDays.map((days) => numberLabel(days * 24, 1)).join(', ')} h. Box least squares:
          Kovács, Zucker & Mazeh (2002).
        </p>
      )}
    </SheetDialog>
  );
}
