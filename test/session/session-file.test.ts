import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { SessionDocument } from '../../src/session/document.ts';
import * as history from '../../src/session/history.ts';
import { readSession } from '../../src/session/read-session.ts';
import { upgrade } from '../../src/session/upgrade.ts';
import { writeSession } from '../../src/session/write-session.ts';
import { anyCommand, emptySession, stampFrom, targetOf } from './session-arbitrary.ts';

const plain = (document: SessionDocument) => JSON.parse(JSON.stringify(document));

/** A parsed document that a test may spoil. */
type Loose = ReturnType<typeof JSON.parse>;

function sample(): Record<string, never> & { targets: Record<string, unknown>[] } {
  const stamp = stampFrom();
  const timing = { kind: 'linear', periodDays: 3, epochDays: 1, durationDays: 0.1 } as const;
  return plain(
    [
      { kind: 'add targets', targets: [targetOf(1), targetOf(2)] } as const,
      {
        kind: 'make case',
        targetId: 'target 1',
        caseId: 'c',
        origin: { kind: 'hand' },
        timing,
        numbers: undefined,
      } as const,
    ].reduce((current, command) => history.commit(current, command, stamp), history.createHistory(emptySession()))
      .present,
  );
}

function refusal(value: unknown): string {
  const read = readSession(typeof value === 'string' ? value : JSON.stringify(value), 'x.candling.json');
  if (read.kind === 'read') throw new Error('was read');
  return read.sentence;
}

describe('session files', () => {
  it('bring every document back as it was', () => {
    fc.assert(
      fc.property(fc.array(anyCommand, { maxLength: 30 }), (commands) => {
        const stamp = stampFrom();
        const { present } = commands.reduce(
          (current, command) => history.commit(current, command, stamp),
          history.createHistory(emptySession()),
        );
        const read = readSession(writeSession(present), 'x');
        expect(read.kind === 'read' && plain(read.document)).toEqual(plain(present));
      }),
    );
  });

  it('say where JSON breaks', () => expect(refusal('{"format": ')).toContain('It is not JSON'));

  it('are told from other JSON', () => {
    expect(refusal([])).toContain('no Candling session');
    expect(refusal({ format: 'something' })).toContain('no Candling session');
    expect(refusal({ format: 'candling-session' })).toContain('which version');
  });

  it('of a newer version are named so', () =>
    expect(refusal({ ...sample(), version: 3 })).toContain(
      'newer Candling (session format 3); this one reads up to 2',
    ));

  it.each([
    [
      'a period of zero',
      (d: Loose) => (d.targets[0].cases[0].timing.periodDays = 0),
      /targets, 1st, cases, 1st, timing, periodDays: expected >0, found 0/,
    ],
    ['a number in words', (d: Loose) => (d.targets[1].label = 7), /targets, 2nd, label: expected string, found 7/],
    [
      'an unknown kind of mark',
      (d: Loose) => (d.targets[0].marks = [{ id: 'm', kind: 'blob', interval: { start: 0, end: 1 }, note: '' }]),
      /marks, 1st, kind/,
    ],
    [
      'a mark that ends before it starts',
      (d: Loose) => (d.targets[0].marks = [{ id: 'm', kind: 'dip', interval: { start: 2, end: 1 }, note: '' }]),
      /interval/,
    ],
    ['no journal', (d: Loose) => delete d.journal, /journal/],
    ['a torn hash', (d: Loose) => (d.targets[0].files[0].sha256 = 'abc'), /sha256/],
    ['a target without a file', (d: Loose) => (d.targets[0].files = []), /files/],
    ['two targets of one id', (d: Loose) => (d.targets[1].id = d.targets[0].id), /same id/],
    ['a case number beyond the last', (d: Loose) => (d.targets[0].cases[0].number = 9), /higher number/],
    ['a date that is none', (d: Loose) => (d.createdAt = 'yesterday'), /createdAt/],
  ])('with %s are refused with the place', (_, spoil, words) => {
    const document = sample();
    spoil(document);
    expect(refusal(document)).toMatch(words);
    expect(refusal(document)).toMatch(/^x\.candling\.json was not opened\. .* Nothing was changed\.$/);
  });

  it('never throw, whatever the text', () => {
    fc.assert(
      fc.property(fc.oneof(fc.string(), fc.json()), (text) => {
        expect(readSession(text, 'x').kind).toBe('refused');
      }),
    );
  });

  it('of version 1 open with the recipe they were prepared by', () => {
    const old: Loose = sample();
    old.version = 1;
    delete old.instrumentTables;
    delete old.modeSets;
    for (const target of old.targets) {
      const { fluxColumn, qualityMask, clip, detrend, protectCases } = target.recipe;
      target.recipe = { fluxColumn, qualityMask, clip, detrend, protectCases };
    }
    const read = readSession(JSON.stringify(old), 'old.candling.json');
    expect(read.kind === 'read' && read.document).toMatchObject({
      version: 2,
      instrumentTables: [],
      modeSets: [],
      targets: [
        { recipe: { maskFlares: false, splitAtDrops: false, commonModes: 0, detrend: { kind: 'biweight' } } },
        { recipe: { maskFlares: false } },
      ],
    });
  });

  it('are brought up step by step by upgraders', () => {
    const upgraders = {
      1: (d: Record<string, unknown>) => ({ ...d, two: true }),
      2: (d: Record<string, unknown>) => ({ ...d, three: true }),
    };
    expect(upgrade({ version: 1 }, upgraders, 3)).toEqual({ version: 3, two: true, three: true });
    expect(upgrade({ version: 0 }, upgraders, 3)).toEqual({ version: 0 });
  });
});
