import { describe, expect, it } from 'vitest';
import { shownRows } from '../../src/docket/docket-rows.ts';
import { smallFoldPoints } from '../../src/docket/small-fold-path.ts';
import type { Command } from '../../src/session/commands.ts';
import * as history from '../../src/session/history.ts';
import type { TargetSummary } from '../../src/store/results-store.ts';
import { emptySession, stampFrom, targetOf } from '../session/session-arbitrary.ts';

const commands: Command[] = [
  { kind: 'add targets', targets: [targetOf(1), targetOf(2), targetOf(3)] },
  {
    kind: 'make case',
    targetId: 'target 1',
    caseId: 'c',
    origin: { kind: 'hand' },
    timing: { kind: 'linear', periodDays: 2.5, epochDays: 0, durationDays: 0.1 },
    numbers: { key: 'k', boxDepth: 0.01, boxDepthError: 0.001, signalToNoise: 30, sde: undefined, eventCount: 4 },
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
  key: 'x',
  periodDays,
  signalToNoise,
  smallFold: [],
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

describe('small fold', () => {
  it('leaves missing bins out and draws the deepest lowest', () => {
    const points = smallFoldPoints([0, Number.NaN, -0.01, 0], 40, 20);
    expect(points).toHaveLength(3);
    expect(points[1]!.y).toBeGreaterThan(points[0]!.y);
  });
});
