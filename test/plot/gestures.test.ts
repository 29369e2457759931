import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { phaseOf } from '../../src/core/ephemeris.ts';
import { laneY } from '../../src/plot/events-layer.ts';
import type { FoldScene } from '../../src/plot/fold-scene.ts';
import { type Frame, makeFrame } from '../../src/plot/frame.ts';
import {
  type FoldGesture,
  type FoldIntent,
  IDLE_FOLD,
  pulledEphemeris,
  stepFold,
} from '../../src/plot/interactions/fold-gesture.ts';
import { IDLE_OVERVIEW, type OverviewIntent, stepOverview } from '../../src/plot/interactions/overview-gesture.ts';
import {
  IDLE_PERIODOGRAM,
  type PeriodogramIntent,
  periodView,
  stepPeriodogram,
} from '../../src/plot/interactions/periodogram-gesture.ts';
import type { KeyInput, PlotInput, PointerInput, Step } from '../../src/plot/interactions/plot-input.ts';
import { IDLE_STRIP, type StripIntent, stepStrip } from '../../src/plot/interactions/strip-gesture.ts';
import type { OverviewScene } from '../../src/plot/overview-scene.ts';
import type { PeriodogramScene } from '../../src/plot/periodogram-scene.ts';
import { toPx } from '../../src/plot/scale.ts';
import type { Span } from '../../src/plot/span.ts';
import type { StripScene } from '../../src/plot/strip-scene.ts';

const pointer = (
  phase: PointerInput['phase'],
  xPx: number,
  yPx: number,
  held: Partial<PointerInput> = {},
): PointerInput => ({
  kind: 'pointer',
  phase,
  xPx,
  yPx,
  shift: false,
  alt: false,
  ctrl: false,
  ...held,
});
const key = (name: string, held: Partial<KeyInput> = {}): KeyInput => ({
  kind: 'key',
  key: name,
  shift: false,
  alt: false,
  ctrl: false,
  ...held,
});

/** Runs inputs through a reducer and collects what it asks for. */
function play<G, I>(idle: G, inputs: readonly PlotInput[], step: (gesture: G, input: PlotInput) => Step<G, I>) {
  const intents: I[] = [];
  let gesture = idle;
  let handled = false;
  for (const input of inputs) {
    const next = step(gesture, input);
    gesture = next.gesture;
    handled = next.handled;
    intents.push(...next.intents);
  }
  return { gesture, intents, handled };
}

const margins = { left: 58, right: 12, top: 26, bottom: 22 };

describe('the strip', () => {
  // 100 days over 700 px: seven pixels a day.
  const time = Float64Array.from({ length: 1001 }, (_, i) => i * 0.1);
  const scene: StripScene = {
    series: { time, values: time.map((t) => Math.sin(t)) },
    yTitle: 'ppm',
    marks: [
      { id: 'm', kind: 'flare', start: 20, end: 30, selected: false },
      { id: 's', kind: 'dip', start: 60, end: 70, selected: true },
    ],
    lanes: [
      {
        caseNumber: 4,
        selected: true,
        durationDays: 1,
        events: [0, 1, 2].map((cycle) => ({ cycle, timeDays: 10 + 40 * cycle, hasData: true })),
      },
    ],
    view: [0, 100],
    fullSpan: [0, 100],
    tool: 'pan',
    themeKey: '',
    label: '',
  };
  const frameOf = (view: Span): Frame =>
    makeFrame({ widthPx: 770, heightPx: 182, margins, xDomain: view, yDomain: [-2, 2] });
  const run = (inputs: readonly PlotInput[], changes: Partial<StripScene> = {}) => {
    const shown = { ...scene, ...changes };
    return play(IDLE_STRIP, inputs, (gesture, input) => stepStrip(gesture, input, frameOf(shown.view), shown));
  };
  const x = (t: number, view: Span = [0, 100]) => toPx(frameOf(view).x, t);
  const only = (intents: readonly StripIntent[], kind: StripIntent['kind']) =>
    intents.filter((intent) => intent.kind === kind);

  it('zooms about the pointer', () => {
    const { intents } = run([{ kind: 'wheel', xPx: x(40), factor: 2, panPx: 0 }]);
    expect(intents).toEqual([{ kind: 'view', view: [expect.closeTo(20, 9), expect.closeTo(70, 9)] }]);
  });
  it('pans with the pointer and takes it back on Escape', () => {
    const view: Span = [20, 40];
    const drag = [pointer('down', x(35, view), 100), pointer('move', x(30, view), 100)];
    expect(run(drag, { view }).intents).toEqual([
      { kind: 'view', view: [expect.closeTo(25, 9), expect.closeTo(45, 9)] },
    ]);
    expect(run([...drag, key('Escape')], { view }).intents.at(-1)).toEqual({ kind: 'view', view });
  });
  it('fits on a double click', () => {
    expect(run([{ kind: 'double', xPx: x(5), yPx: 100 }], { view: [0, 10] }).intents).toEqual([
      { kind: 'view', view: [0, 100] },
    ]);
  });
  it.each([
    ['shift', {}, { shift: true }],
    ['the mark tool', { tool: 'mark' }, {}],
  ] as const)('brushes with %s, backwards too', (_, changes, held) => {
    const inputs = [
      pointer('down', x(50), 100, held),
      pointer('move', x(45), 100),
      pointer('move', x(40), 100),
      pointer('up', x(40), 100),
    ];
    const { intents, gesture } = run(inputs, changes);
    expect(only(intents, 'brush')).toEqual([
      { kind: 'brush', start: expect.closeTo(40, 9), end: expect.closeTo(50, 9) },
    ]);
    expect(only(intents, 'brush preview')).toHaveLength(2);
    expect(gesture.drag).toBeUndefined();
  });
  it('brushes nothing on a click, nor after Escape', () => {
    expect(run([pointer('down', x(50), 100), pointer('up', x(50), 100)], { tool: 'mark' }).intents).toEqual([]);
    const escaped = run(
      [pointer('down', x(50), 100), pointer('move', x(40), 100), key('Escape'), pointer('up', x(40), 100)],
      { tool: 'mark' },
    );
    expect(only(escaped.intents, 'brush')).toEqual([]);
  });
  it('tells a click on a mark from a drag that begins on it', () => {
    expect(run([pointer('down', x(25), 100), pointer('up', x(25) + 1, 100)]).intents).toEqual([
      { kind: 'mark click', id: 'm' },
    ]);
    const dragged = run([
      pointer('down', x(25), 100),
      pointer('move', x(25) + 30, 100),
      pointer('up', x(25) + 30, 100),
    ]);
    expect(only(dragged.intents, 'mark click')).toEqual([]);
  });
  it('moves the selected mark by its middle and resizes it by its sides, past one another', () => {
    const move = run([pointer('down', x(65), 100), pointer('move', x(75), 100), pointer('up', x(75), 100)]).intents;
    expect(move.at(-1)).toEqual({
      kind: 'mark drag',
      id: 's',
      start: expect.closeTo(70, 9),
      end: expect.closeTo(80, 9),
      phase: 'commit',
    });
    const flip = run([pointer('down', x(60), 100), pointer('move', x(90), 100), pointer('up', x(90), 100)]).intents;
    expect(flip.at(-1)).toEqual({
      kind: 'mark drag',
      id: 's',
      start: expect.closeTo(70, 9),
      end: expect.closeTo(90, 9),
      phase: 'commit',
    });
    expect(flip[0]).toMatchObject({ phase: 'preview' });
  });
  it('never moves a mark out of the data, and gives it back on Escape', () => {
    const far = run([pointer('down', x(65), 100), pointer('move', x(65) + 5000, 100)]).intents;
    expect(far.at(-1)).toMatchObject({ start: expect.closeTo(90, 9), end: expect.closeTo(100, 9) });
    const back = run([pointer('down', x(65), 100), pointer('move', x(80), 100), key('Escape')]).intents;
    expect(back.at(-1)).toEqual({ kind: 'mark drag', id: 's', start: 60, end: 70, phase: 'cancel' });
  });
  it('names the event under a click in a lane', () => {
    expect(run([pointer('down', x(50) + 3, laneY(0)), pointer('up', x(50) + 3, laneY(0))]).intents).toEqual([
      { kind: 'event click', caseNumber: 4, cycle: 1 },
    ]);
  });
  it('reads the nearest point and forgets it outside', () => {
    const near = run([pointer('move', x(33.3) + 0.2, toPx(frameOf([0, 100]).y, Math.sin(33.3)))]).intents[0];
    expect(near).toEqual({ kind: 'cursor', time: time[333], value: Math.sin(time[333]!) });
    expect(run([pointer('move', x(33), 100), pointer('leave', -5, 100)]).intents.at(-1)).toEqual({
      kind: 'cursor',
      time: undefined,
      value: undefined,
    });
  });
  it('walks by keys: samples, events, ends, zoom; leaves other keys alone', () => {
    expect(run([key('ArrowRight')], { cursorTime: 50 }).intents[0]).toMatchObject({ time: expect.closeTo(50.1, 6) });
    expect(run([key('ArrowRight', { shift: true })], { cursorTime: 12 }).intents[0]).toMatchObject({ time: 50 });
    expect(run([key('ArrowLeft', { shift: true })], { cursorTime: 12 }).intents[0]).toMatchObject({ time: 10 });
    expect(run([key('End')], { view: [0, 10] }).intents).toEqual([
      { kind: 'cursor', time: 100, value: expect.any(Number) },
      { kind: 'view', view: [90, 100] },
    ]);
    expect(run([key('+')], { cursorTime: 50 }).intents[0]).toMatchObject({ kind: 'view' });
    expect(run([key('h')]).handled).toBe(false);
    expect(run([key('ArrowRight', { ctrl: true })]).handled).toBe(false);
    expect(run([key('Escape')]).handled).toBe(false);
  });
  it('marks by keys alone', () => {
    const { intents } = run([key('Enter'), key('ArrowRight', { shift: true }), key('Enter')], {
      tool: 'mark',
      cursorTime: 20,
    });
    expect(only(intents, 'brush')).toEqual([{ kind: 'brush', start: 20, end: 50 }]);
  });
});

describe('the fold', () => {
  const time = Float64Array.from({ length: 5001 }, (_, i) => 1000 + i * 0.02);
  const scene: FoldScene = {
    time,
    flux: time.map(() => 0),
    periodDays: 7,
    epochDays: 1010,
    durationDays: 0.125,
    mode: 'event',
    halfWidthHours: 7,
    caseNumber: 1,
    yTitle: '',
    xTitle: '',
    themeKey: '',
    label: '',
  };
  // 14 hours over 700 px.
  const frame = makeFrame({
    widthPx: 770,
    heightPx: 300,
    margins: { left: 58, right: 12, top: 30, bottom: 38 },
    xDomain: [-7, 7],
    yDomain: [-1, 1],
  });
  const run = (inputs: readonly PlotInput[], changes: Partial<FoldScene> = {}) =>
    play<FoldGesture, FoldIntent>(IDLE_FOLD, inputs, (gesture, input) =>
      stepFold(gesture, input, frame, { ...scene, ...changes }, () => undefined),
    );
  const pull = (px: number, held: Partial<PointerInput> = {}) => [
    pointer('down', 600, 150, held),
    pointer('move', 600 + px, 150, held),
  ];

  it('carries a point with the pointer when the epoch is pulled', () => {
    const { intents } = run([...pull(100), pointer('up', 700, 150)]);
    expect(intents.map((intent) => 'phase' in intent && intent.phase)).toEqual(['preview', 'commit']);
    // 100 px are two hours: what stood at -2 h now stands at 0.
    expect(intents[1]).toMatchObject({ kind: 'ephemeris', periodDays: 7, epochDays: expect.closeTo(1010 - 2 / 24, 9) });
  });
  it('turns about the first event when the period is pulled, the last event following the pointer', () => {
    fc.assert(
      fc.property(fc.double({ min: -0.05, max: 0.05, noNaN: true }), (pulledDays) => {
        const now = pulledEphemeris(scene, 'period', pulledDays, [1000, 1100]);
        const [first, last] = [1003, 1101];
        const offset = (t: number) => phaseOf(t, now.periodDays, now.epochDays) * now.periodDays;
        expect(offset(first)).toBeCloseTo(0, 7);
        expect(offset(last)).toBeCloseTo(pulledDays, 7);
      }),
    );
    for (const held of [{ alt: true }, { ctrl: true }])
      expect(run(pull(50, held)).intents[0]).toMatchObject({ epochDays: expect.closeTo(1010 + (1 / 24 / 14) * -1, 6) });
    expect(run(pull(50), { tool: 'period' }).intents[0]).not.toMatchObject({ periodDays: 7 });
  });
  it('gives the old ephemeris back on Escape', () => {
    expect(run([...pull(80), key('Escape')]).intents.at(-1)).toEqual({
      kind: 'ephemeris',
      periodDays: 7,
      epochDays: 1010,
      phase: 'cancel',
    });
  });
  it('asks for nothing on a click', () => {
    expect(run([pointer('down', 600, 150), pointer('move', 601, 150), pointer('up', 601, 150)]).intents).toEqual([]);
  });
  it('drags a foot of the caliper: twice as much duration, never none', () => {
    const foot = toPx(frame.x, 1.5);
    const drag = (to: number) =>
      run([pointer('down', foot, 14), pointer('move', to, 14), pointer('up', to, 14)]).intents.at(-1);
    expect(drag(foot + 50)).toEqual({
      kind: 'duration',
      durationDays: expect.closeTo(0.125 + 2 / 24, 9),
      phase: 'commit',
    });
    expect(drag(foot - 600)).toMatchObject({ durationDays: expect.closeTo(7e-4, 9) });
    const left = run([pointer('down', toPx(frame.x, -1.5), 14), pointer('move', toPx(frame.x, -2.5), 14)]).intents.at(
      -1,
    );
    expect(left).toMatchObject({ durationDays: expect.closeTo(0.125 + 2 / 24, 9), phase: 'preview' });
  });
  it('can be worked by keys', () => {
    expect(run([key('ArrowRight')]).intents[0]).toMatchObject({ kind: 'cursor', x: expect.closeTo(0.04, 9) });
    expect(run([key('ArrowRight', { shift: true })]).intents[0]).toMatchObject({
      kind: 'ephemeris',
      periodDays: 7,
      phase: 'commit',
    });
    expect(run([key('ArrowLeft', { ctrl: true })]).intents[0]).toMatchObject({ kind: 'ephemeris', phase: 'commit' });
    expect(run([key('ArrowRight', { alt: true })]).handled).toBe(false);
  });
  it('asks for another width, never under the event', () => {
    expect(run([{ kind: 'wheel', xPx: 400, factor: 2, panPx: 0 }]).intents).toEqual([
      { kind: 'half width', hours: 3.5 },
    ]);
    expect(run([{ kind: 'wheel', xPx: 400, factor: 1e6, panPx: 0 }]).intents).toEqual([
      { kind: 'half width', hours: 2.25 },
    ]);
  });
});

describe('the overview', () => {
  const scene: OverviewScene = {
    series: { time: Float64Array.of(0, 100), values: Float64Array.of(0, 1) },
    view: [20, 40],
    fullSpan: [0, 100],
    title: 'raw',
    themeKey: '',
    label: '',
  };
  const frame = makeFrame({
    widthPx: 770,
    heightPx: 38,
    margins: { ...margins, top: 3, bottom: 3 },
    xDomain: [0, 100],
    yDomain: [0, 1],
  });
  const x = (t: number) => toPx(frame.x, t);
  const last = (inputs: readonly PlotInput[], view: Span = scene.view) =>
    play<typeof IDLE_OVERVIEW, OverviewIntent>(IDLE_OVERVIEW, inputs, (gesture, input) =>
      stepOverview(gesture, input, frame, { ...scene, view }),
    ).intents.at(-1)?.view;
  const near = (a: number, b: number) => [expect.closeTo(a, 6), expect.closeTo(b, 6)];

  it('moves the window, stopping at the ends', () => {
    expect(last([pointer('down', x(30), 10), pointer('move', x(50), 10)])).toEqual(near(40, 60));
    expect(last([pointer('down', x(30), 10), pointer('move', x(-90), 10)])).toEqual(near(0, 20));
  });
  it('resizes by an edge and jumps to a press outside', () => {
    expect(last([pointer('down', x(40), 10), pointer('move', x(70), 10)])).toEqual(near(20, 70));
    expect(last([pointer('down', x(80), 10)])).toEqual(near(70, 90));
  });
  it('draws a new window while everything is shown', () => {
    expect(last([pointer('down', x(60), 10), pointer('move', x(50), 10)], [0, 100])).toEqual(near(50, 60));
  });
});

describe('the periodogram', () => {
  const periods = Float64Array.from({ length: 8000 }, (_, i) => 0.5 * 80 ** (i / 7999));
  const values = periods.map(() => 2);
  values[4000] = 18;
  values[6000] = 9;
  const peaks = [
    { periodDays: periods[4000]!, value: 18, label: 'a', caseNumber: 1 },
    { periodDays: periods[6000]!, value: 9, label: 'b' },
  ];
  const scene: PeriodogramScene = { periods, values, yTitle: 'SDE', peaks, themeKey: '', label: '' };
  const frame = makeFrame({ widthPx: 770, heightPx: 160, margins, xDomain: [0.5, 40], yDomain: [0, 18], xKind: 'log' });
  const run = (inputs: readonly PlotInput[], changes: Partial<PeriodogramScene> = {}) =>
    play<typeof IDLE_PERIODOGRAM, PeriodogramIntent>(IDLE_PERIODOGRAM, inputs, (gesture, input) =>
      stepPeriodogram(gesture, input, frame, { ...scene, ...changes }),
    );

  it('picks the highest value within three pixels of a click', () => {
    const at = toPx(frame.x, periods[4000]!) + 2;
    expect(run([pointer('down', at, 120), pointer('up', at, 120)]).intents).toEqual([
      { kind: 'pick', periodDays: periods[4000] },
    ]);
  });
  it('pans instead when dragged, and goes back to all on a double click', () => {
    const zoomed = [{ kind: 'wheel', xPx: 400, factor: 4, panPx: 0 } as const];
    const dragged = run([...zoomed, pointer('down', 400, 100), pointer('move', 300, 100), pointer('up', 300, 100)]);
    expect(dragged.intents.filter((intent) => intent.kind === 'pick')).toEqual([]);
    const view = periodView(dragged.gesture, scene);
    expect(view[1] / view[0]).toBeCloseTo(80 ** 0.25, 6);
    const fitted = run([...zoomed, { kind: 'double', xPx: 300, yPx: 100 }]).gesture;
    expect(periodView(fitted, scene)).toEqual([periods[0], periods[7999]]);
  });
  it('forgets its zoom with another search', () => {
    const { gesture } = run([{ kind: 'wheel', xPx: 400, factor: 4, panPx: 0 }]);
    const other = { ...scene, periods: Float64Array.of(1, 2, 3), values: Float64Array.of(1, 2, 1) };
    expect(periodView(gesture, other)).toEqual([1, 3]);
  });
  it('steps between peaks by key and picks with Enter', () => {
    const { intents } = run([key('ArrowRight'), key('ArrowRight'), key('Enter')]);
    expect(intents.at(-1)).toEqual({ kind: 'pick', periodDays: periods[6000] });
    expect(run([key('ArrowLeft'), key('Enter')], { selectedPeriodDays: periods[6000] }).intents.at(-1)).toEqual({
      kind: 'pick',
      periodDays: periods[4000],
    });
    expect(run([key('Enter')]).handled).toBe(false);
  });
  it('stands still without data', () => {
    const nothing = { periods: new Float64Array(0), values: new Float64Array(0), peaks: [] };
    expect(
      run([pointer('down', 300, 100), pointer('up', 300, 100), key('ArrowRight'), key('Enter')], nothing).intents,
    ).toEqual([]);
  });
});
