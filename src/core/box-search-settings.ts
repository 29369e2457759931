import type { Ephemeris } from './ephemeris.ts';

/**
 * What a trial period is ranked by: box depth over its error from white noise alone, or from white and correlated
 * noise together (Pont, Zucker & Queloz 2006). The box kept at a period is that of the highest white-noise S/N.
 */
export type SearchObjective = 'white noise S/N' | 'correlated noise S/N';
export const SEARCH_OBJECTIVES: readonly SearchObjective[] = ['white noise S/N', 'correlated noise S/N'];

/** The strongest signal of an earlier round, with what was measured of it there. */
export interface MaskedSignal extends Ephemeris {
  readonly boxDepth?: number | undefined;
  readonly signalToNoise?: number | undefined;
  readonly sde?: number | undefined;
}

/** How a box search is run. What is undefined is chosen by the search from the series and the star. */
export interface BoxSearchSettings {
  /** Undefined: from the star's density (or its absence) and the span; see the grid's docstring. */
  readonly shortestPeriodDays: number | undefined;
  readonly longestPeriodDays: number | undefined;
  /** Steps per frequency resolution element, Ofir (2014) OS. */
  readonly oversampling: number;
  /** Mean stellar density in g cm^-3; undefined where unknown. */
  readonly densityCgs: number | undefined;
  /** Box durations tried, in days; undefined: chosen from density, cadence and span. */
  readonly durationsDays: readonly number[] | undefined;
  readonly objective: SearchObjective;
  /** Signals of earlier rounds: points in their events are left out. Their number plus one is the round. */
  readonly masked: readonly MaskedSignal[];
}

export const MOST_ROUNDS = 5;

export const DEFAULT_BOX_SEARCH: BoxSearchSettings = {
  shortestPeriodDays: undefined,
  longestPeriodDays: undefined,
  oversampling: 3,
  densityCgs: undefined,
  durationsDays: undefined,
  // On spotted stars and in red noise, white noise alone ranks what detrending left over planets.
  objective: 'correlated noise S/N',
  masked: [],
};

/** The S/N that a signal is ranked by. */
export function rankedSignalToNoise(
  peak: { readonly signalToNoise: number; readonly correlatedSignalToNoise: number },
  objective: SearchObjective,
): number {
  return objective === 'white noise S/N' ? peak.signalToNoise : peak.correlatedSignalToNoise;
}
