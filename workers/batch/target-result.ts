import type { BoxSearchSettings } from '../../src/core/box-search-settings.ts';
import type { Timing } from '../../src/core/ephemeris.ts';
import type { StarParameters } from '../../src/core/light-curve.ts';
import type { Recipe } from '../../src/core/recipe.ts';
import type { CaseNumbers, FileRecord, InstrumentTable } from '../../src/session/document.ts';

/** What an analyst asks of a sweep; the rest is chosen by the search. */
export interface SweepSettings {
  readonly search: Partial<Pick<BoxSearchSettings, 'shortestPeriodDays' | 'longestPeriodDays' | 'oversampling'>>;
  /** Most rounds of the search, each with the signals of the earlier ones masked; 1 to 5. */
  readonly rounds: number;
  /** A signal becomes a case from this S/N on, as the search's objective has it ... */
  readonly leastSignalToNoise: number;
  /** ... and with at least this many events that have data. */
  readonly leastEvents: number;
}

/** One file to analyse: everything that its result depends on. */
export interface FileJob {
  readonly fileName: string;
  readonly bytes: ArrayBuffer;
  /** From a stars table; what it says goes before what the file says. */
  readonly star: StarParameters | undefined;
  readonly instrumentTable: InstrumentTable | undefined;
  readonly options: SweepSettings;
}

/** The strongest signal of one round, over the thresholds. */
export interface SweptSignal {
  readonly round: number;
  readonly timing: Extract<Timing, { kind: 'linear' }>;
  readonly numbers: CaseNumbers;
}

/** What a sweep found in one file: plain data, equal for equal jobs. */
export interface TargetResult {
  readonly label: string;
  readonly file: FileRecord;
  readonly star: StarParameters;
  readonly recipe: Recipe;
  readonly search: SweepSettings['search'];
  readonly signals: readonly SweptSignal[];
  readonly roundsSearched: number;
  /** Why there was no further round, a sentence. */
  readonly ending: string;
}
