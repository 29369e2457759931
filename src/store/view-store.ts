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

export interface ViewState {
  readonly theme: Theme;
  readonly targetId: string | undefined;
  readonly caseId: string | undefined;
  /** What the fold shows while no case is selected. */
  readonly trial: Ephemeris | undefined;
  /** Rank (1 is the strongest) of the search peak that the trial was taken from. */
  readonly trialRank: number | undefined;
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
>;

const FRESH: ViewState = {
  theme: 'system',
  targetId: undefined,
  caseId: undefined,
  trial: undefined,
  trialRank: undefined,
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
  const { periodogramHidden } = view;
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
  };
}

/** View of another target: nothing of the last one's zoom, trial or drafts stays. */
export const FRESH_TARGET_VIEW = {
  caseId: undefined,
  trial: undefined,
  trialRank: undefined,
  stripSpan: undefined,
  markDraft: undefined,
  selectedMarkId: undefined,
  rulingDraft: undefined,
} as const satisfies Partial<ViewState>;
