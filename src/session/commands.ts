import type { BoxSearchSettings } from '../core/box-search-settings.ts';
import type { Timing } from '../core/ephemeris.ts';
import type { Interval } from '../core/interval.ts';
import type { StarParameters } from '../core/light-curve.ts';
import type { Recipe } from '../core/recipe.ts';
import type {
  CaseNumbers,
  CaseOrigin,
  Confidence,
  FileRecord,
  InstrumentTable,
  MarkKind,
  ModeSet,
  RulingKind,
  Target,
} from './document.ts';

/** Who does it and when: the caller's clock and ids, so that applying a command stays pure. */
export interface CommandStamp {
  readonly at: string;
  readonly analyst: string;
  readonly app: string;
  /** A fresh unique id for each call. */
  readonly newId: () => string;
}

/** Every change a document can undergo. `id` fields of new things are given by the caller. */
export type Command =
  | { readonly kind: 'name session'; readonly name: string }
  | { readonly kind: 'name analyst'; readonly analyst: string }
  | { readonly kind: 'add targets'; readonly targets: readonly Target[] }
  | { readonly kind: 'remove target'; readonly targetId: string }
  | {
      readonly kind: 'describe stars';
      readonly rows: readonly { readonly label: string; readonly star: StarParameters }[];
    }
  | { readonly kind: 'set recipe'; readonly targetId: string; readonly recipe: Recipe }
  | { readonly kind: 'set search'; readonly targetId: string; readonly search: Partial<BoxSearchSettings> }
  /** One recipe for many targets, each keeping its own flux column. */
  | { readonly kind: 'set recipes'; readonly targetIds: readonly string[]; readonly recipe: Recipe }
  /** Every target of the docket uses the table from now on, also those added later. */
  | { readonly kind: 'use instrument table'; readonly table: InstrumentTable }
  | { readonly kind: 'use mode set'; readonly modeSet: ModeSet }
  | { readonly kind: 'remap file'; readonly targetId: string; readonly file: FileRecord; readonly star: StarParameters }
  | { readonly kind: 'add mark'; readonly targetId: string; readonly markId: string; readonly mark: MarkFields }
  | {
      readonly kind: 'edit mark';
      readonly targetId: string;
      readonly markId: string;
      readonly mark: Partial<MarkFields>;
    }
  | { readonly kind: 'delete mark'; readonly targetId: string; readonly markId: string }
  | {
      readonly kind: 'make case';
      readonly targetId: string;
      readonly caseId: string;
      readonly origin: CaseOrigin;
      readonly timing: Timing;
      readonly numbers: CaseNumbers | undefined;
    }
  | {
      readonly kind: 'time case';
      readonly targetId: string;
      readonly caseId: string;
      readonly timing: Timing;
      readonly numbers: CaseNumbers | undefined;
    }
  | { readonly kind: 'delete case'; readonly targetId: string; readonly caseId: string }
  | { readonly kind: 'rule'; readonly targetId: string; readonly caseId: string; readonly ruling: RulingFields }
  | {
      readonly kind: 'park';
      readonly targetId: string;
      readonly caseId: string;
      readonly reason: string;
      readonly until: string | undefined;
    }
  | { readonly kind: 'unpark'; readonly targetId: string; readonly caseId: string };

export interface MarkFields {
  readonly kind: MarkKind;
  readonly interval: Interval;
  readonly note: string;
}

export interface RulingFields {
  readonly kind: RulingKind;
  readonly reasons: readonly string[];
  readonly confidence: Confidence;
  readonly note: string;
}

export type TargetCommand = Extract<Command, { targetId: string }>;
export type CaseCommand = Extract<Command, { kind: 'time case' | 'delete case' | 'rule' | 'park' | 'unpark' }>;
export type MarkCommand = Extract<Command, { kind: 'edit mark' | 'delete mark' }>;

export function needsTarget(command: Command): command is TargetCommand {
  return 'targetId' in command;
}

/** Of a case that must exist already. */
export function needsCase(command: Command): command is CaseCommand {
  return ['time case', 'delete case', 'rule', 'park', 'unpark'].includes(command.kind);
}

/** Of a mark that must exist already. */
export function needsMark(command: Command): command is MarkCommand {
  return command.kind === 'edit mark' || command.kind === 'delete mark';
}

/** What a command is about, as a journal entry keeps it. */
export function subjectOf(command: Command): { targetId: string | undefined; caseId: string | undefined } {
  return {
    targetId: 'targetId' in command ? command.targetId : undefined,
    caseId: 'caseId' in command ? command.caseId : undefined,
  };
}

export function authorOf({ at, analyst, app }: CommandStamp): { at: string; analyst: string; app: string } {
  return { at, analyst, app };
}
