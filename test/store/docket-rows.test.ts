import { describe, expect, it } from 'vitest';
import { miniaturePoints } from '../../src/docket/miniature-points.ts';
import type { Command } from '../../src/session/commands.ts';
import * as history from '../../src/session/history.ts';
import { shownRows } from '../../src/store/docket-rows.ts';
import type { TargetSummary } from '../../src/store/results-store.ts';
import { failedSummary } from '../../src/store/summarise-target.ts';
import { emptySession, numbersOf, stampFrom, targetOf } from '../session/session-arbitrary.ts';

const commands: Command[] = [
  { kind: 'add targets', targets: [targetOf(1), targetOf(2), targetOf(3)] },
  {
    kind: 'make case',
    targetId: 'target 1',
    caseId: 'c',
    origin: { kind: 'hand' },
    timing: { kind: 'linear', periodDays: 2.5, epochDays: 0, durationDays: 0.1 },
    numbers: numbersOf({ signalToNoise: 30, eventCount: 4 }),
  },
  {
    kind: 'rule',
    targetId: 'target 1',
    caseId: 'c',
    ruling: { kind: 'stellar mimic', reasons: [], confidence: 'low', note: '' },
  },
];
const stamp = stampFrom();
const { present } = commands.reduce(
  (current, command) => history.commit(current, command, stamp),
  history.createHistory(emptySession()),
);
const summary = (periodDays: number, signalToNoise: number): TargetSummary => ({
  ...failedSummary('x', ''),
  failure: undefined,
  periodDays,
  signalToNoise,
});
const summaries = new Map([
  ['target 1', summary(5, 8)],
  ['target 2', summary(14, 11)],
]);
const found = (filter: string) => shownRows(present, summaries, filter).map(({ target }) => target.label);

describe('rows of the docket', () => {
  it('let the first case speak before the search', () => {
    const [first, second, third] = shownRows(present, summaries, '');
    expect(first).toMatchObject({ periodDays: 2.5, signalToNoise: 30, standing: 'stellar mimic' });
    expect(second).toMatchObject({ periodDays: 14, signalToNoise: 11, standing: undefined });
    expect(third).toMatchObject({ periodDays: undefined, smallFold: undefined });
  });

  it.each([
    ['', ['T-1', 'T-2', 'T-3']],
    ['t-2', ['T-2']],
    ['unruled', ['T-2', 'T-3']],
    ['stellar mimic', ['T-1']],
    ['mimic', ['T-1']],
    ['S/N > 10', ['T-1', 'T-2']],
    ['S/N>10 unruled', ['T-2']],
    ['period < 3', ['T-1']],
    ['nothing like it', []],
  ])('are filtered by "%s"', (filter, labels) => expect(found(filter)).toEqual(labels));
});

describe('order of the docket', () => {
  const ordered = (by: 'label' | 'period' | 'S/N' | 'docket', descending: boolean) =>
    shownRows(present, summaries, '', { by, descending }).map(({ target }) => target.label);

  it('puts targets without the value last, both ways', () => {
    expect(ordered('period', false)).toEqual(['T-1', 'T-2', 'T-3']);
    expect(ordered('period', true)).toEqual(['T-2', 'T-1', 'T-3']);
    expect(ordered('S/N', true)).toEqual(['T-1', 'T-2', 'T-3']);
  });

  it('is the docket’s own unless asked', () => {
    expect(ordered('docket', false)).toEqual(['T-1', 'T-2', 'T-3']);
    expect(ordered('label', true)).toEqual(['T-3', 'T-2', 'T-1']);
  });
});

describe('small fold', () => {
  it('leaves missing bins out and draws the deepest lowest', () => {
    const points = miniaturePoints([0, Number.NaN, -0.01, 0], 40, 20);
    expect(points).toHaveLength(3);
    expect(points[1]!.y).toBeGreaterThan(points[0]!.y);
  });
});
