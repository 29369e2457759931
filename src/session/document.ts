import type { BoxSearchSettings } from '../core/box-search-settings.ts';
import type { Ephemeris, Timing } from '../core/ephemeris.ts';
import type { FileMapping } from '../core/file-mapping.ts';
import type { Interval } from '../core/interval.ts';
import type { StarParameters, TimeReference } from '../core/light-curve.ts';
import type { Recipe } from '../core/recipe.ts';

/** Everything an analyst decided, and what it rests on, but for the flux itself. */
export interface SessionDocument {
  readonly format: 'candling-session';
  readonly version: 2;
  readonly id: string;
  readonly name: string;
  /** App version that wrote it. */
  readonly app: string;
  readonly createdAt: string;
  readonly analyst: string;
  readonly targets: readonly Target[];
  /** Tables of times at which the instrument is not trusted; a target names the one that it uses. */
  readonly instrumentTables: readonly InstrumentTable[];
  /** What the docket's common modes were found from, frozen; a target names the set that it uses. */
  readonly modeSets: readonly ModeSet[];
  /** Append-only, oldest first. */
  readonly journal: readonly JournalEntry[];
}

export interface InstrumentTable {
  /** Hash of its spans. */
  readonly id: string;
  readonly fileName: string;
  /** Whether the times are full Julian dates; otherwise they count as the light curves' own times do. */
  readonly isJulian: boolean;
  readonly spans: readonly { readonly start: number; readonly end: number; readonly note: string }[];
}

/** The stars that the common modes are found from, each with the events that are masked for it. */
export interface ModeSet {
  /** Hash of its stars. */
  readonly id: string;
  readonly stars: readonly { readonly targetId: string; readonly masked: readonly Ephemeris[] }[];
}

export interface FileRecord {
  readonly name: string;
  readonly sha256: string;
  readonly bytes: number;
  readonly mapping: FileMapping;
  /** Of the light curve as read: what the times of this target's cases and marks count from. */
  readonly timeReference: TimeReference;
  readonly points: number;
  readonly warnings: readonly string[];
}

export interface Target {
  readonly id: string;
  readonly label: string;
  readonly files: readonly FileRecord[];
  readonly star: StarParameters;
  readonly recipe: Recipe;
  /** What the analyst set of this target's search; the rest is chosen by the search. */
  readonly search: Partial<BoxSearchSettings>;
  /** Ids of the session's tables; undefined: none. */
  readonly instrumentTable: string | undefined;
  readonly modeSet: string | undefined;
  readonly marks: readonly Mark[];
  readonly cases: readonly Case[];
  /** Highest case number ever given here: numbers are not reused after a case is deleted. */
  readonly lastCaseNumber: number;
}

export type MarkKind = 'dip' | 'artefact' | 'flare' | 'exclude';
export const MARK_KINDS: readonly MarkKind[] = ['dip', 'artefact', 'flare', 'exclude'];

export interface Mark {
  readonly id: string;
  readonly kind: MarkKind;
  readonly interval: Interval;
  readonly note: string;
}

/** Numbers a ruling rests on, copied with the key of the inputs that made them. */
export interface CaseNumbers {
  readonly key: string;
  readonly boxDepth: number;
  readonly boxDepthError: number | undefined;
  readonly signalToNoise: number | undefined;
  /** With correlated noise in the error, Pont, Zucker & Queloz (2006). */
  readonly correlatedSignalToNoise: number | undefined;
  readonly sde: number | undefined;
  /** From surrogates of this very series. */
  readonly falseAlarmProbability: number | undefined;
  readonly eventCount: number | undefined;
}

export type CaseOrigin =
  /** Rank among the signals of a round; `relation` where a related peak was promoted ("2P"). */
  | {
      readonly kind: 'search';
      readonly rank: number;
      readonly round?: number | undefined;
      readonly relation?: string | undefined;
    }
  | { readonly kind: 'single event'; readonly rank: number }
  | { readonly kind: 'marks'; readonly markIds: readonly string[] }
  | { readonly kind: 'hand' };

export interface Case {
  readonly id: string;
  /** 1, 2, 3 ... within its target; never reused. */
  readonly number: number;
  readonly origin: CaseOrigin;
  readonly timing: Timing;
  readonly numbers: CaseNumbers | undefined;
  /** Oldest first; the last one stands. Never edited. */
  readonly rulings: readonly Ruling[];
  readonly parked: Parked | undefined;
}

export type RulingKind = 'worth telescope time' | 'stellar mimic' | 'not astrophysical' | 'cannot decide';
export const RULING_KINDS: readonly RulingKind[] = [
  'worth telescope time',
  'stellar mimic',
  'not astrophysical',
  'cannot decide',
];

export type Confidence = 'low' | 'moderate' | 'high';
export const CONFIDENCES: readonly Confidence[] = ['low', 'moderate', 'high'];

export interface Ruling {
  readonly id: string;
  readonly kind: RulingKind;
  readonly reasons: readonly string[];
  readonly confidence: Confidence;
  readonly note: string;
  readonly analyst: string;
  /** ISO 8601, UTC. */
  readonly at: string;
  readonly app: string;
  /** What it rested on, frozen. */
  readonly timing: Timing;
  readonly recipe: Recipe;
  readonly numbers: CaseNumbers | undefined;
}

export interface Parked {
  /** What the case waits for. */
  readonly reason: string;
  /** ISO date (YYYY-MM-DD), or undefined when open-ended. */
  readonly until: string | undefined;
  readonly at: string;
  readonly analyst: string;
}

export interface JournalEntry {
  readonly id: string;
  readonly at: string;
  readonly analyst: string;
  readonly app: string;
  readonly targetId: string | undefined;
  readonly caseId: string | undefined;
  /** A sentence without its subject: "ruled cannot decide". */
  readonly what: string;
}
