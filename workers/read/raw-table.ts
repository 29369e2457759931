import type { StampConvention, StarParameters, TimeFrame, TimeScale } from '../../src/core/light-curve.ts';

/** A table as a file holds it, before anything is taken for time or flux. */
export interface RawTable {
  readonly columns: readonly RawColumn[];
  readonly facts: FileFacts;
  /** Sentences for the analyst: rows or columns that were left out, and why. */
  readonly warnings: readonly string[];
}

export interface RawColumn {
  readonly name: string;
  readonly unit: string | undefined;
  /** What the file says of the column besides its name. */
  readonly comment: string | undefined;
  /** Length of the table; NaN where missing, all NaN for a column of text. */
  readonly values: Float64Array;
  /** For a column that holds words. */
  readonly texts: readonly string[] | undefined;
}

/** What a file says of all its rows. Undefined or 'unknown' where it says nothing. */
export interface FileFacts {
  readonly object: string | undefined;
  readonly passband: string;
  readonly exposureDays: number | undefined;
  readonly stamp: StampConvention;
  readonly timeUnit: 'day' | 'second' | undefined;
  readonly zeroJd: number | undefined;
  readonly scale: TimeScale;
  readonly frame: TimeFrame;
  readonly star: StarParameters;
}

export const NO_FACTS: FileFacts = {
  object: undefined,
  passband: 'unknown',
  exposureDays: undefined,
  stamp: 'unknown',
  timeUnit: undefined,
  zeroJd: undefined,
  scale: 'unknown',
  frame: 'unknown',
  star: {},
};

/** An expected failure of a reader: its message is the sentence for the analyst. */
export class Unreadable extends Error {}
