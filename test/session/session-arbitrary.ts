import fc from 'fast-check';
import { DEFAULT_RECIPE } from '../../src/core/recipe.ts';
import type { Command, CommandStamp } from '../../src/session/commands.ts';
import {
  type CaseNumbers,
  type FileRecord,
  MARK_KINDS,
  RULING_KINDS,
  type SessionDocument,
  type Target,
} from '../../src/session/document.ts';
import { newDocument } from '../../src/session/new-document.ts';

/** Invented targets and commands for property tests. */

export function stampFrom(start = 0): CommandStamp {
  let count = start;
  return {
    at: '2026-12-01T08:00:00.000Z',
    analyst: 'KV',
    app: '0.1.0',
    newId: () => {
      count += 1;
      return `id ${count}`;
    },
  };
}

export function emptySession(): SessionDocument {
  return newDocument({ id: 's', name: 'sitting', analyst: 'KV', app: '0.1.0', at: '2026-12-01T07:00:00.000Z' });
}

export function fileOf(number: number): FileRecord {
  return {
    name: `t${number}.csv`,
    sha256: number.toString(16).padStart(64, '0'),
    bytes: 100,
    points: 50,
    warnings: [],
    timeReference: { zeroJd: 2459000, scale: 'TDB', frame: 'barycentric' },
    mapping: {
      columns: [
        { column: 'time', role: 'time', reason: 'named time' },
        { column: 'flux', role: 'flux', meaning: 'raw', unit: 'relative', reason: 'named flux' },
      ],
      timeUnit: 'day',
      timeReference: { zeroJd: 0, scale: 'TDB', frame: 'barycentric' },
      timeReason: 'its values are Julian dates',
      exposureDays: undefined,
      stamp: 'unknown',
      passband: 'unknown',
    },
  };
}

export function targetOf(number: number): Target {
  return {
    id: `target ${number}`,
    label: `T-${number}`,
    files: [fileOf(number)],
    star: {},
    recipe: DEFAULT_RECIPE,
    search: {},
    instrumentTable: undefined,
    modeSet: undefined,
    marks: [],
    cases: [],
    lastCaseNumber: 0,
  };
}

export function numbersOf(given: Partial<CaseNumbers>): CaseNumbers {
  return {
    key: 'k',
    boxDepth: 0.01,
    boxDepthError: 0.001,
    signalToNoise: undefined,
    correlatedSignalToNoise: undefined,
    sde: undefined,
    falseAlarmProbability: undefined,
    eventCount: undefined,
    ...given,
  };
}

const small = fc.integer({ min: 1, max: 3 });
const targetId = small.map((number) => `target ${number}`);
const caseId = small.map((number) => `case ${number}`);
const markId = small.map((number) => `mark ${number}`);
const days = fc.double({ min: 0.1, max: 50, noNaN: true });
const timing = fc.record({
  kind: fc.constant('linear' as const),
  periodDays: days,
  epochDays: days,
  durationDays: days,
});
const ruling = fc.record({
  kind: fc.constantFrom(...RULING_KINDS),
  reasons: fc.array(fc.string({ maxLength: 8 }), { maxLength: 2 }),
  confidence: fc.constantFrom('low' as const, 'moderate' as const, 'high' as const),
  note: fc.string({ maxLength: 12 }),
});
const mark = fc.record({
  kind: fc.constantFrom(...MARK_KINDS),
  interval: fc.record({ start: days, end: days }),
  note: fc.string({ maxLength: 8 }),
});

const withKind =
  <K extends string>(kind: K) =>
  <T extends object>(rest: T) => ({ kind, ...rest });

/** Any command, many of them refused. */
export const anyCommand: fc.Arbitrary<Command> = fc.oneof(
  fc.record({ targets: fc.array(small.map(targetOf), { maxLength: 3 }) }).map(withKind('add targets')),
  fc.record({ name: fc.string({ minLength: 1, maxLength: 9 }) }).map(withKind('name session')),
  fc.record({ targetId }).map(withKind('remove target')),
  fc.record({ targetId, markId, mark }).map(withKind('add mark')),
  fc.record({ targetId, markId, mark }).map(withKind('edit mark')),
  fc.record({ targetId, markId }).map(withKind('delete mark')),
  fc
    .record({
      targetId,
      caseId,
      timing,
      origin: fc.constant({ kind: 'hand' as const }),
      numbers: fc.constant(undefined),
    })
    .map(withKind('make case')),
  fc.record({ targetId, caseId, timing, numbers: fc.constant(undefined) }).map(withKind('time case')),
  fc.record({ targetId, caseId }).map(withKind('delete case')),
  fc.record({ targetId, caseId, ruling }).map(withKind('rule')),
  fc
    .record({ targetId, caseId, reason: fc.string({ maxLength: 5 }), until: fc.constantFrom(undefined, '2027-01-14') })
    .map(withKind('park')),
  fc.record({ targetId, caseId }).map(withKind('unpark')),
);
