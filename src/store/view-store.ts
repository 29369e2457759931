import { createStore } from 'zustand/vanilla';
import type { ReadResult } from '../contract/read-contract.ts';
import type { Ephemeris } from '../core/ephemeris.ts';
import type { FileMapping } from '../core/file-mapping.ts';
import type { Interval } from '../core/interval.ts';
import type { Confidence, MarkKind, RulingKind } from '../session/document.ts';

/** What the analyst looks at: remembered between visits, never undone. */

export type Theme = 'system' | 'dark' | 'light';
export type FluxView = 'raw' | 'trend' | 'prepared';
export type Arrangement = 'fold' | 'search';

export interface RulingDraft {
  readonly kind: RulingKind;
  readonly reasons: readonly string[];
  readonly confidence: Confidence;
  readonly note: string;
}

/** A file whose columns the analyst must confirm, with the bytes it came from. */
export interface MappingQuestion {
  readonly fileName: string;
  readonly bytes: ArrayBuffer;
  readonly read: Extract<ReadResult, { kind: 'question' | 'light curve' }>;
  readonly mapping: FileMapping;
  /** Set when an already loaded target's columns are corrected. */
  readonly targetId: string | undefined;
}

export interface Unread {
  readonly fileName: string;
  readonly sentence: string;
}

export type Dialog = 'palette' | 'keys' | 'recipe' | 'park' | 'session' | 'search settings' | 'timing by hand';

export interface MarkDraft {
  /** Undefined while new. */
  readonly markId: string | undefined;
  readonly kind: MarkKind;
  readonly interval: Interval;
  readonly note: string;
}

/** What a box search is drawn as; false-alarm lines belong to the S/N. */
export type PeriodogramValue = 'SDE' | 'levelled' | 'S/N';

/** `rank` 1 is the strongest; `related` counts the peaks under a signal from 0. */
export type TrialSource =
  | { readonly kind: 'peak'; readonly rank: number; readonly related: number | undefined }
  | { readonly kind: 'single event'; readonly rank: number }
  | { readonly kind: 'sine' };

export interface DocketOrder {
  readonly by: 'docket' | 'label' | 'period' | 'S/N';
  readonly descending: boolean;
}

export interface ViewState {
  readonly theme: Theme;
  readonly targetId: string | undefined;
  readonly caseId: string | undefined;
  /** What the fold shows while no case is selected. */
  readonly trial: Ephemeris | undefined;
  /** What the trial was taken from, while it is unchanged. */
  readonly trialSource: TrialSource | undefined;
  /** The period of an alias set that is shown; undefined: the heaviest. */
  readonly aliasPeriodDays: number | undefined;
  readonly periodogram: 'box' | 'sines';
  readonly periodogramValue: PeriodogramValue;
  readonly fluxView: FluxView;
  readonly arrangement: Arrangement;
  /** Undefined shows the whole series. */
  readonly stripSpan: Interval | undefined;
  readonly tool: 'pan' | 'mark';
  readonly markDraft: MarkDraft | undefined;
  readonly selectedMarkId: string | undefined;
  readonly docketHidden: boolean;
  readonly sheetHidden: boolean;
  /** Undefined: by the width of the window. */
  readonly periodogramHidden: boolean | undefined;
  readonly dialog: Dialog | undefined;
  readonly filter: string;
  readonly docketOrder: DocketOrder;
  /** What the docket's miniatures show. */
  readonly miniature: 'fold' | 'strip';
  readonly rulingDraft: RulingDraft | undefined;
  /** Asked one after another. */
  readonly mappingQuestions: readonly MappingQuestion[];
  readonly unread: readonly Unread[];
  /** A sentence at the top of the bench until it is dismissed. */
  readonly notice: { readonly kind: 'notice' | 'error'; readonly sentence: string } | undefined;
}

/** What is kept between visits; the rest starts fresh. */
export type RememberedView = Pick<
  ViewState,
  | 'theme'
  | 'targetId'
  | 'caseId'
  | 'trial'
  | 'fluxView'
  | 'arrangement'
  | 'stripSpan'
  | 'docketHidden'
  | 'sheetHidden'
  | 'periodogramHidden'
  | 'docketOrder'
  | 'miniature'
>;

const FRESH: ViewState = {
  theme: 'system',
  targetId: undefined,
  caseId: undefined,
  trial: undefined,
  trialSource: undefined,
  aliasPeriodDays: undefined,
  periodogram: 'box',
  periodogramValue: 'SDE',
  fluxView: 'prepared',
  arrangement: 'fold',
  stripSpan: undefined,
  tool: 'pan',
  markDraft: undefined,
  selectedMarkId: undefined,
  docketHidden: false,
  sheetHidden: false,
  periodogramHidden: undefined,
  dialog: undefined,
  filter: '',
  docketOrder: { by: 'docket', descending: false },
  miniature: 'fold',
  rulingDraft: undefined,
  mappingQuestions: [],
  unread: [],
  notice: undefined,
};

export type ViewStore = ReturnType<typeof createViewStore>;

export function createViewStore(remembered: Partial<RememberedView> = {}) {
  return createStore<ViewState>()(() => ({ ...FRESH, ...remembered }));
}

export function rememberedView(view: ViewState): RememberedView {
  const { theme, targetId, caseId, trial, fluxView, arrangement, stripSpan, docketHidden, sheetHidden } = view;
  const { periodogramHidden, docketOrder, miniature } = view;
  return {
    theme,
    targetId,
    caseId,
    trial,
    fluxView,
    arrangement,
    stripSpan,
    docketHidden,
    sheetHidden,
    periodogramHidden,
    docketOrder,
    miniature,
  };
}

/** View of another case, or of a trial: nothing that belonged to the last one stays. */
export const FRESH_CASE_VIEW = {
  caseId: undefined,
  trial: undefined,
  trialSource: undefined,
  aliasPeriodDays: undefined,
  rulingDraft: undefined,
} as const satisfies Partial<ViewState>;

/** View of another target: nothing of the last one's zoom, trial or drafts stays. */
export const FRESH_TARGET_VIEW = {
  ...FRESH_CASE_VIEW,
  stripSpan: undefined,
  markDraft: undefined,
  selectedMarkId: undefined,
} as const satisfies Partial<ViewState>;
