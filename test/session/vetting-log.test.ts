import { describe, expect, it } from 'vitest';
import type { Command } from '../../src/session/commands.ts';
import * as history from '../../src/session/history.ts';
import { vettingLogRows, writeVettingLogCsv, writeVettingLogJson } from '../../src/session/vetting-log.ts';
import { emptySession, numbersOf, stampFrom, targetOf } from './session-arbitrary.ts';

const STAMP = { at: '2026-12-01T09:00:00.000Z', app: '0.1.0' };
const TIMING = {
  kind: 'linear',
  periodDays: 7.31842,
  periodErrorDays: 0.00011,
  epochDays: -1204.6183,
  epochErrorDays: 0.0009,
  durationDays: 0.127,
} as const;

function session(note: string, reasons: readonly string[] = ['flat-bottomed dip']) {
  const commands: Command[] = [
    { kind: 'add targets', targets: [targetOf(1), targetOf(2)] },
    {
      kind: 'make case',
      targetId: 'target 1',
      caseId: 'c',
      origin: { kind: 'search', rank: 1 },
      timing: TIMING,
      numbers: numbersOf({ boxDepth: 0.001, boxDepthError: 5e-5, signalToNoise: 20, sde: 9, eventCount: 11 }),
    },
    {
      kind: 'rule',
      targetId: 'target 1',
      caseId: 'c',
      ruling: { kind: 'worth telescope time', reasons, confidence: 'high', note },
    },
  ];
  const stamp = stampFrom();
  return commands.reduce(
    (current, command) => history.commit(current, command, stamp),
    history.createHistory(emptySession()),
  ).present;
}

/** RFC 4180, written apart from the product. */
function parseCsv(text: string): string[][] {
  const rows: string[][] = [];
  let row: string[] = [];
  let cell = '';
  let quoted = false;
  for (let i = 0; i < text.length; i += 1) {
    const c = text[i]!;
    if (quoted) {
      if (c === '"' && text[i + 1] === '"') {
        cell += '"';
        i += 1;
      } else if (c === '"') quoted = false;
      else cell += c;
    } else if (c === '"') quoted = true;
    else if (c === ',') {
      row.push(cell);
      cell = '';
    } else if (c === '\r' && text[i + 1] === '\n') {
      rows.push([...row, cell]);
      row = [];
      cell = '';
      i += 1;
    } else cell += c;
  }
  return rows;
}

describe('vetting log', () => {
  it('has one row for each case and one for each target without', () => {
    const rows = vettingLogRows(session(''), STAMP);
    expect(rows.map((row) => [row.target, row.case])).toEqual([
      ['T-1', 1],
      ['T-2', 'no case'],
    ]);
    expect(rows[0]).toMatchObject({
      ruling: 'worth telescope time',
      period: '7.318\u00a042(11)',
      period_d: 7.31842,
      time_zero_jd: 2459000,
      time_scale: 'TDB',
      box_depth_ppm: 1000,
      retimed_since: 'no',
      recipe_changed_since: 'no',
      result_key: 'k',
      app_at_ruling: '0.1.0',
      earlier_rulings: 0,
    });
  });

  it('reports the timing that the ruling was given on, and that it changed since', () => {
    const { present } = history.commit(
      history.createHistory(session('')),
      {
        kind: 'time case',
        targetId: 'target 1',
        caseId: 'c',
        timing: { ...TIMING, periodDays: 9 },
        numbers: undefined,
      },
      stampFrom(99),
    );
    expect(vettingLogRows(present, STAMP)[0]).toMatchObject({ period_d: 7.31842, retimed_since: 'yes' });
  });

  it('is CSV that any reader takes apart again', () => {
    const note = 'a "quoted", torn\r\nnote';
    const [names, ...rows] = parseCsv(writeVettingLogCsv(session(note), STAMP));
    expect(rows).toHaveLength(2);
    expect(rows.every((row) => row.length === names!.length)).toBe(true);
    expect(rows[0]![names!.indexOf('note')]).toBe(note);
    expect(rows[0]![names!.indexOf('epoch_d')]).toBe('-1204.6183');
  });

  // OWASP, CSV injection: leading characters that spreadsheets take for a formula.
  it.each(['=1+1', '+1', '-1', '@SUM(A1)', '\t=1', '\r=1', '=HYPERLINK("http://x","y")'])('neutralises %j', (note) => {
    const [names, row] = parseCsv(writeVettingLogCsv(session(note, [note]), STAMP));
    expect(row![names!.indexOf('note')]).toBe(`'${note}`);
    expect(row![names!.indexOf('reasons')]).toBe(`'${note}`);
  });

  it('is JSON with the same rows', () => {
    const log = JSON.parse(writeVettingLogJson(session('n'), STAMP));
    expect(log).toMatchObject({ format: 'candling-vetting-log', version: 1, at: STAMP.at });
    expect(log.rows).toHaveLength(2);
  });
});
