import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applyCommand } from '../../src/session/apply-command.ts';
import type { Command } from '../../src/session/commands.ts';
import type { SessionDocument } from '../../src/session/document.ts';
import * as history from '../../src/session/history.ts';
import { refusalOf } from '../../src/session/refusal.ts';
import { anyCommand, emptySession, stampFrom, targetOf } from './session-arbitrary.ts';

function freeze<T>(value: T): T {
  if (value !== null && typeof value === 'object') {
    Object.freeze(value);
    for (const member of Object.values(value)) freeze(member);
  }
  return value;
}

const decided = ({ journal: _, app: __, ...rest }: SessionDocument) => rest;
const commands = fc.array(anyCommand, { maxLength: 30 });
const run = (start: history.History, list: readonly Command[]) => {
  const stamp = stampFrom();
  return list.reduce((current, command) => history.commit(current, command, stamp), start);
};
const withTarget = () => applyCommand(emptySession(), { kind: 'add targets', targets: [targetOf(1)] }, stampFrom(1000));
const timing = { kind: 'linear', periodDays: 3, epochDays: 1, durationDays: 0.1 } as const;
const makeCase = (caseId: string): Command => ({
  kind: 'make case',
  targetId: 'target 1',
  caseId,
  origin: { kind: 'hand' },
  timing,
  numbers: undefined,
});
const rule = (kind: 'cannot decide' | 'stellar mimic'): Command => ({
  kind: 'rule',
  targetId: 'target 1',
  caseId: 'c',
  ruling: { kind, reasons: ['a'], confidence: 'low', note: '' },
});

describe('history of a session', () => {
  it('comes back to the start when everything is undone, and forth again', () => {
    fc.assert(
      fc.property(commands, (list) => {
        const start = history.createHistory(freeze(emptySession()));
        const end = run(start, list);
        const stamp = stampFrom(5000);
        let back = end;
        for (let i = 0; i < list.length; i += 1) back = history.undo(back, stamp);
        expect(decided(back.present)).toEqual(decided(start.present));
        let forth = back;
        for (let i = 0; i < list.length; i += 1) forth = history.redo(forth, stamp);
        expect(decided(forth.present)).toEqual(decided(end.present));
      }),
    );
  });

  it('never loses a line of the journal', () => {
    const step = fc.oneof(
      anyCommand.map((command) => ({ do: 'commit' as const, command })),
      fc.constantFrom({ do: 'undo' as const }, { do: 'redo' as const }),
    );
    fc.assert(
      fc.property(fc.array(step, { maxLength: 40 }), (steps) => {
        const stamp = stampFrom();
        let current = history.createHistory(emptySession());
        for (const next of steps) {
          const before = current.present.journal;
          if (next.do === 'commit') current = history.commit(current, next.command, stamp);
          else current = next.do === 'undo' ? history.undo(current, stamp) : history.redo(current, stamp);
          expect(current.present.journal.slice(0, before.length)).toEqual(before);
        }
      }),
    );
  });

  it('changes nothing where a command is refused', () => {
    fc.assert(
      fc.property(commands, anyCommand, (list, command) => {
        const { present } = run(history.createHistory(emptySession()), list);
        const after = applyCommand(present, command, stampFrom(9000));
        expect(after === present).toBe(refusalOf(present, command) !== undefined);
      }),
    );
  });

  it('shows a drag at once, keeps it out of the past, and makes one entry of it', () => {
    const stamp = stampFrom();
    let current = history.createHistory(applyCommand(withTarget(), makeCase('c'), stamp));
    for (const periodDays of [3.1, 3.2, 3.3])
      current = history.preview(
        current,
        { kind: 'time case', targetId: 'target 1', caseId: 'c', timing: { ...timing, periodDays }, numbers: undefined },
        stamp,
      );
    expect(history.shownDocument(current).targets[0]!.cases[0]!.timing).toMatchObject({ periodDays: 3.3 });
    expect(current.past).toHaveLength(0);
    expect(history.shownDocument(history.abandonPreview(current)).targets[0]!.cases[0]!.timing).toEqual(timing);
    const settled = history.settle(current, stamp);
    expect(settled.past).toHaveLength(1);
    expect(history.undo(settled, stamp).present.targets[0]!.cases[0]!.timing).toEqual(timing);
  });
});

describe('commands', () => {
  it('freeze with a ruling what it rested on, and supersede without erasing', () => {
    const stamp = stampFrom();
    let document = [makeCase('c'), rule('cannot decide')].reduce(
      (current, command) => applyCommand(current, command, stamp),
      withTarget(),
    );
    document = applyCommand(
      document,
      {
        kind: 'time case',
        targetId: 'target 1',
        caseId: 'c',
        timing: { ...timing, periodDays: 6 },
        numbers: undefined,
      },
      stamp,
    );
    document = applyCommand(document, rule('stellar mimic'), stamp);
    const { rulings } = document.targets[0]!.cases[0]!;
    expect(rulings.map(({ kind }) => kind)).toEqual(['cannot decide', 'stellar mimic']);
    expect(rulings[0]!.timing).toMatchObject({ periodDays: 3 });
    expect(rulings[1]!.timing).toMatchObject({ periodDays: 6 });
    expect(rulings[0]).toMatchObject({ analyst: 'KV', app: '0.1.0', at: '2026-12-01T08:00:00.000Z' });
    expect(document.journal.at(-1)!.what).toBe('ruled stellar mimic, before cannot decide');
  });

  it('end a parking with a ruling', () => {
    const stamp = stampFrom();
    const parked = [
      makeCase('c'),
      { kind: 'park', targetId: 'target 1', caseId: 'c', reason: 'a second season', until: undefined } as const,
    ].reduce((current, command) => applyCommand(current, command, stamp), withTarget());
    expect(parked.targets[0]!.cases[0]!.parked?.reason).toBe('a second season');
    expect(applyCommand(parked, rule('stellar mimic'), stamp).targets[0]!.cases[0]!.parked).toBeUndefined();
  });

  it('never give a case number twice', () => {
    const stamp = stampFrom();
    const document = [
      makeCase('c'),
      makeCase('d'),
      { kind: 'delete case', targetId: 'target 1', caseId: 'd' } as const,
      makeCase('e'),
    ].reduce((current, command) => applyCommand(current, command, stamp), withTarget());
    expect(document.targets[0]!.cases.map(({ number }) => number)).toEqual([1, 3]);
  });

  it('do not delete what a ruling rests on', () => {
    const stamp = stampFrom();
    const document = [makeCase('c'), rule('cannot decide')].reduce(
      (current, command) => applyCommand(current, command, stamp),
      withTarget(),
    );
    expect(refusalOf(document, { kind: 'delete case', targetId: 'target 1', caseId: 'c' })).toContain('has a ruling');
    expect(refusalOf(document, { kind: 'remove target', targetId: 'target 1' })).toContain('stays in the docket');
  });

  it('add the same file once, and number a label that is taken', () => {
    const other = { ...targetOf(2), label: 'T-1' };
    const document = applyCommand(withTarget(), { kind: 'add targets', targets: [targetOf(1), other] }, stampFrom());
    expect(document.targets.map(({ label }) => label)).toEqual(['T-1', 'T-1 (2)']);
  });

  it('describe stars by label, whatever its spaces and capitals, without losing what is known', () => {
    const stamp = stampFrom();
    let document = applyCommand(
      withTarget(),
      { kind: 'describe stars', rows: [{ label: 't - 1', star: { teffK: 5800 } }] },
      stamp,
    );
    document = applyCommand(
      document,
      { kind: 'describe stars', rows: [{ label: 'T-1', star: { radiusSolar: 1.1, teffK: undefined } }] },
      stamp,
    );
    expect(document.targets[0]!.star).toEqual({ teffK: 5800, radiusSolar: 1.1 });
  });
});
