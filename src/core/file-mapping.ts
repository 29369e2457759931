import type { FluxMeaning, FluxUnit, StampConvention, TimeReference } from './light-curve.ts';

export type ColumnRole = 'time' | 'flux' | 'flux error' | 'quality' | 'covariate' | 'ignore';

/** What one column of a file is taken for. */
export interface ColumnAssignment {
  readonly column: string;
  readonly role: ColumnRole;
  /** For a 'flux error': the flux column it belongs to. */
  readonly errorOf?: string | undefined;
  /** For a 'flux': what it means. */
  readonly meaning?: FluxMeaning | undefined;
  readonly unit?: FluxUnit | undefined;
  /** Why the reader took it so, for the analyst: "named time, ascending". */
  readonly reason: string;
}

/** How the whole file is understood: guessed by the reader, shown, correctable, and kept in the session. */
export interface FileMapping {
  readonly columns: readonly ColumnAssignment[];
  readonly timeUnit: 'day' | 'second';
  readonly timeReference: TimeReference;
  readonly timeReason: string;
  readonly exposureDays: number | undefined;
  readonly stamp: StampConvention;
  readonly passband: string;
}
