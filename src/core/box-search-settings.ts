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
}

export const DEFAULT_BOX_SEARCH: BoxSearchSettings = {
  shortestPeriodDays: undefined,
  longestPeriodDays: undefined,
  oversampling: 3,
  densityCgs: undefined,
  durationsDays: undefined,
};
