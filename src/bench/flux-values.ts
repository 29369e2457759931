import type { PreparedSeries } from '../contract/prepare-contract.ts';
import type { FluxView } from '../store/view-store.ts';

/** What the strip draws of a prepared series in one view, in ppm from the level outside events (or in sigma). */
export interface FluxValues {
  readonly time: Float64Array;
  readonly values: Float64Array;
  readonly trend: Float64Array | undefined;
  readonly dropped: { readonly time: Float64Array; readonly values: Float64Array };
  readonly unit: string;
}

/** Relative flux to the number that is shown: ppm, or sigma for a series normalised to its own scatter. */
export function shownScale(series: Pick<PreparedSeries, 'fluxUnit'>): {
  readonly factor: number;
  readonly unit: string;
} {
  return series.fluxUnit === 'sigma' ? { factor: 1, unit: 'σ' } : { factor: 1e6, unit: 'ppm' };
}

export function fluxValues(series: PreparedSeries, view: FluxView): FluxValues {
  const { factor, unit } = shownScale(series);
  const shown = (flux: Float64Array) => flux.map((value) => (value - 1) * factor);
  const prepared = view === 'prepared';
  return {
    time: series.time,
    values: shown(prepared ? series.flux : series.raw),
    trend: view === 'trend' ? shown(series.trend) : undefined,
    // Left-out points have no trend of their own: with the trend taken away they would stand in a wrong place.
    dropped: prepared
      ? { time: new Float64Array(), values: new Float64Array() }
      : { time: series.dropped.time, values: shown(series.dropped.raw) },
    unit,
  };
}
