import { type Frame, insidePlot } from '../frame.ts';
import type { PlotMark } from '../marks-layer.ts';
import { toValue } from '../scale.ts';
import type { Span } from '../span.ts';
import type { StripScene } from '../strip-scene.ts';
import { nearestIndex } from '../visible-range.ts';
import { clampSpan, panSpan, zoomSpan } from '../zoom.ts';
import { DRAG_PX, type KeyInput, type PlotInput, type PointerInput, type Step, unhandled } from './plot-input.ts';
import { hitAt, type MarkGrip, pointNear, type StripHit } from './strip-hit.ts';

export type DragPhase = 'preview' | 'commit' | 'cancel';

export type StripIntent =
  | { readonly kind: 'view'; readonly view: Span }
  | { readonly kind: 'cursor'; readonly time: number | undefined; readonly value: number | undefined }
  | { readonly kind: 'brush' | 'brush preview'; readonly start: number; readonly end: number }
  | { readonly kind: 'mark click'; readonly id: string }
  | {
      readonly kind: 'mark drag';
      readonly id: string;
      readonly start: number;
      readonly end: number;
      readonly phase: DragPhase;
    }
  | { readonly kind: 'event click'; readonly caseNumber: number | undefined; readonly cycle: number };

type StripDrag =
  | { readonly kind: 'press'; readonly xPx: number; readonly yPx: number; readonly hit: StripHit; readonly view: Span }
  | { readonly kind: 'pan'; readonly xPx: number; readonly view: Span }
  | { readonly kind: 'brush'; readonly from: number; readonly to: number; readonly byKey: boolean }
  | {
      readonly kind: 'mark';
      readonly mark: PlotMark;
      readonly grip: MarkGrip;
      readonly fromPx: number;
      readonly start: number;
      readonly end: number;
    };

export interface StripGesture {
  readonly cursor: { readonly time: number; readonly value: number | undefined } | undefined;
  readonly drag: StripDrag | undefined;
}

export const IDLE_STRIP: StripGesture = { cursor: undefined, drag: undefined };

type StripStep = Step<StripGesture, StripIntent>;

export function stepStrip(gesture: StripGesture, input: PlotInput, frame: Frame, scene: StripScene): StripStep {
  switch (input.kind) {
    case 'pointer':
      return stepPointer(gesture, input, frame, scene);
    case 'wheel': {
      const panned = panSpan(scene.view, scene.fullSpan, input.panPx / frame.x.slope);
      return toView(gesture, zoomSpan(panned, scene.fullSpan, toValue(frame.x, input.xPx), input.factor));
    }
    case 'double':
      return hitAt(frame, scene, input.xPx, input.yPx) ? unhandled(gesture) : toView(gesture, scene.fullSpan);
    case 'key':
      return stepKey(gesture, input, frame, scene);
  }
}

/** The marks as they look while one is dragged. */
export function marksShown(gesture: StripGesture, scene: StripScene): readonly PlotMark[] {
  const { drag } = gesture;
  if (drag?.kind !== 'mark') return scene.marks;
  const { start, end } = drag;
  return scene.marks.map((mark) => (mark.id === drag.mark.id ? { ...mark, start, end } : mark));
}

export function stripPointerStyle(
  gesture: StripGesture,
  xPx: number,
  yPx: number,
  frame: Frame,
  scene: StripScene,
): string {
  if (gesture.drag?.kind === 'pan') return 'grabbing';
  const hit =
    gesture.drag?.kind === 'mark'
      ? ({ kind: 'grip', grip: gesture.drag.grip } as const)
      : hitAt(frame, scene, xPx, yPx);
  if (hit?.kind === 'grip') return hit.grip === 'body' ? 'move' : 'ew-resize';
  if (hit) return 'pointer';
  return insidePlot(frame, xPx, yPx) ? 'crosshair' : 'default';
}

function stepPointer(gesture: StripGesture, input: PointerInput, frame: Frame, scene: StripScene): StripStep {
  switch (input.phase) {
    case 'down':
      return pressed(gesture, input, frame, scene);
    case 'move':
      return moved(gesture, input, frame, scene);
    case 'up':
      return released(gesture, input, frame);
    case 'cancel':
      return cancelled(gesture);
    case 'leave':
      return { gesture: { ...gesture, cursor: undefined }, intents: [noCursor], handled: true };
  }
}

const noCursor = { kind: 'cursor', time: undefined, value: undefined } as const;

function pressed(gesture: StripGesture, input: PointerInput, frame: Frame, scene: StripScene): StripStep {
  const { xPx, yPx } = input;
  const hit = hitAt(frame, scene, xPx, yPx);
  if (hit?.kind === 'grip' && hit.grip !== 'body')
    return { gesture: { ...gesture, drag: dragOf(hit, xPx) }, intents: [], handled: true };
  const brushing = (input.shift || scene.tool === 'mark') && insidePlot(frame, xPx, yPx);
  const time = toValue(frame.x, xPx);
  const drag: StripDrag = brushing
    ? { kind: 'brush', from: time, to: time, byKey: false }
    : { kind: 'press', xPx, yPx, hit, view: scene.view };
  return { gesture: { ...gesture, drag }, intents: [], handled: true };
}

function dragOf(hit: Extract<StripHit, { kind: 'grip' }>, fromPx: number): StripDrag {
  return { kind: 'mark', mark: hit.mark, grip: hit.grip, fromPx, start: hit.mark.start, end: hit.mark.end };
}

function moved(gesture: StripGesture, input: PointerInput, frame: Frame, scene: StripScene): StripStep {
  const { drag } = gesture;
  switch (drag?.kind) {
    case 'press':
      return Math.abs(input.xPx - drag.xPx) < DRAG_PX
        ? { gesture, intents: [], handled: true }
        : startDrag(gesture, drag, input, frame, scene);
    case 'pan':
      return toView(gesture, panSpan(drag.view, scene.fullSpan, (drag.xPx - input.xPx) / frame.x.slope));
    case 'brush':
      return drag.byKey ? hover(gesture, input, frame, scene) : brushTo(gesture, drag, timeInside(frame, input.xPx));
    case 'mark':
      return dragMark(drag, input, frame, scene);
    default:
      return hover(gesture, input, frame, scene);
  }
}

function startDrag(
  gesture: StripGesture,
  press: Extract<StripDrag, { kind: 'press' }>,
  input: PointerInput,
  frame: Frame,
  scene: StripScene,
): StripStep {
  const { hit, xPx, view } = press;
  const drag: StripDrag = hit?.kind === 'grip' ? dragOf(hit, xPx) : { kind: 'pan', xPx, view };
  return moved({ ...gesture, cursor: undefined, drag }, input, frame, scene);
}

function brushTo(gesture: StripGesture, drag: Extract<StripDrag, { kind: 'brush' }>, to: number): StripStep {
  const next = { ...drag, to };
  const [start, end] = [Math.min(drag.from, to), Math.max(drag.from, to)];
  return { gesture: { ...gesture, drag: next }, intents: [{ kind: 'brush preview', start, end }], handled: true };
}

function dragMark(
  drag: Extract<StripDrag, { kind: 'mark' }>,
  input: PointerInput,
  frame: Frame,
  scene: StripScene,
): StripStep {
  const { mark, grip } = drag;
  const [first, last] = scene.fullSpan;
  const by = (input.xPx - drag.fromPx) / frame.x.slope;
  const moveBy = Math.min(Math.max(by, first - mark.start), last - mark.end);
  const at = (time: number) => Math.min(Math.max(time, first), last);
  const moved =
    grip === 'body'
      ? { start: mark.start + moveBy, end: mark.end + moveBy }
      : grip === 'start'
        ? { start: at(mark.start + by), end: mark.end }
        : { start: mark.start, end: at(mark.end + by) };
  const start = Math.min(moved.start, moved.end);
  const end = Math.max(moved.start, moved.end);
  const intent = { kind: 'mark drag', id: mark.id, start, end, phase: 'preview' } as const;
  return { gesture: { cursor: undefined, drag: { ...drag, start, end } }, intents: [intent], handled: true };
}

function released(gesture: StripGesture, input: PointerInput, frame: Frame): StripStep {
  const { drag } = gesture;
  if (drag?.kind === 'brush' && drag.byKey) return { gesture, intents: [], handled: true };
  const rest = { ...gesture, drag: undefined };
  const intents: StripIntent[] = [];
  if (drag?.kind === 'press') intents.push(...clickIntents(drag.hit));
  if (drag?.kind === 'brush') intents.push(...brushIntents(drag, frame));
  if (drag?.kind === 'mark') {
    const { mark, start, end } = drag;
    // A press on a grip that moved nothing is no change.
    const phase = Math.abs(input.xPx - drag.fromPx) < 1 ? 'cancel' : 'commit';
    intents.push({ kind: 'mark drag', id: mark.id, start, end, phase });
  }
  return { gesture: rest, intents, handled: true };
}

function clickIntents(hit: StripHit): StripIntent[] {
  if (hit?.kind === 'event') return [{ kind: 'event click', caseNumber: hit.caseNumber, cycle: hit.event.cycle }];
  return hit ? [{ kind: 'mark click', id: hit.mark.id }] : [];
}

function brushIntents(drag: Extract<StripDrag, { kind: 'brush' }>, frame: Frame): StripIntent[] {
  const start = Math.min(drag.from, drag.to);
  const end = Math.max(drag.from, drag.to);
  return (end - start) * frame.x.slope < DRAG_PX ? [] : [{ kind: 'brush', start, end }];
}

/** What was begun is taken back: the view as it was, the mark as it was. */
function cancelled(gesture: StripGesture): StripStep {
  const { drag } = gesture;
  if (!drag) return unhandled(gesture);
  const rest = { ...gesture, drag: undefined };
  const intents: StripIntent[] = [];
  if (drag.kind === 'pan') intents.push({ kind: 'view', view: drag.view });
  if (drag.kind === 'mark') {
    const { id, start, end } = drag.mark;
    intents.push({ kind: 'mark drag', id, start, end, phase: 'cancel' });
  }
  return { gesture: rest, intents, handled: true };
}

function toView(gesture: StripGesture, view: Span): StripStep {
  return { gesture, intents: [{ kind: 'view', view }], handled: true };
}

function timeInside(frame: Frame, xPx: number): number {
  return toValue(frame.x, Math.min(Math.max(xPx, frame.left), frame.right));
}

function hover(gesture: StripGesture, input: PointerInput, frame: Frame, scene: StripScene): StripStep {
  if (input.xPx < frame.left || input.xPx > frame.right || input.yPx > frame.bottom) {
    return { gesture: { ...gesture, cursor: undefined }, intents: gesture.cursor ? [noCursor] : [], handled: true };
  }
  return withCursor(gesture, pointNear(frame, scene, input.xPx, input.yPx));
}

function withCursor(gesture: StripGesture, cursor: NonNullable<StripGesture['cursor']>): StripStep {
  return { gesture: { ...gesture, cursor }, intents: [{ kind: 'cursor', ...cursor }], handled: true };
}

function stepKey(gesture: StripGesture, input: KeyInput, frame: Frame, scene: StripScene): StripStep {
  const at = gesture.cursor?.time ?? scene.cursorTime ?? (scene.view[0] + scene.view[1]) / 2;
  if (input.alt || input.ctrl) return unhandled(gesture);
  switch (input.key) {
    case 'ArrowLeft':
    case 'ArrowRight': {
      const way = input.key === 'ArrowLeft' ? -1 : 1;
      return moveCursor(
        gesture,
        scene,
        input.shift ? eventBeside(scene, at, way) : sampleBeside(frame, scene, at, way),
      );
    }
    case 'Home':
      return moveCursor(gesture, scene, scene.fullSpan[0]);
    case 'End':
      return moveCursor(gesture, scene, scene.fullSpan[1]);
    case '+':
    case '=':
      return toView(gesture, zoomSpan(scene.view, scene.fullSpan, at, 1.5));
    case '-':
      return toView(gesture, zoomSpan(scene.view, scene.fullSpan, at, 1 / 1.5));
    case 'Enter':
      return entered(gesture, at, frame, scene);
    case 'Escape':
      return cancelled(gesture);
    default:
      return unhandled(gesture);
  }
}

/** The next sample at least a pixel away, so that a held key crosses a dense series in reasonable time. */
function sampleBeside(frame: Frame, scene: StripScene, at: number, way: -1 | 1): number {
  const { time } = scene.series;
  const target = at + way / frame.x.slope;
  const index = nearestIndex(time, target);
  const beside = index === undefined ? undefined : time[index];
  if (beside === undefined) return target;
  if ((beside - at) * way > 0) return beside;
  const next = time[index! + way];
  return next ?? at;
}

function eventBeside(scene: StripScene, at: number, way: -1 | 1): number {
  const lane = scene.lanes.find((other) => other.selected) ?? scene.lanes[0];
  const times = (lane?.events ?? []).map((event) => event.timeDays).filter((time) => (time - at) * way > 1e-9);
  return times.length === 0 ? at : way < 0 ? Math.max(...times) : Math.min(...times);
}

/** Moves the cursor, the view after it, and the end of a brush begun by key. */
function moveCursor(gesture: StripGesture, scene: StripScene, time: number): StripStep {
  const { series, view, fullSpan } = scene;
  const index = nearestIndex(series.time, time);
  const value = index !== undefined && series.time[index] === time ? series.values[index] : undefined;
  const step = withCursor(gesture, { time, value });
  const { drag } = gesture;
  const brushed = drag?.kind === 'brush' && drag.byKey ? brushTo(step.gesture, drag, time) : undefined;
  const width = view[1] - view[0];
  const outside = time < view[0] || time > view[1];
  const follow: StripIntent[] = outside
    ? [{ kind: 'view', view: clampSpan([time - width / 2, time + width / 2], fullSpan) }]
    : [];
  return {
    gesture: brushed?.gesture ?? step.gesture,
    intents: [...step.intents, ...(brushed?.intents ?? []), ...follow],
    handled: true,
  };
}

/** With the mark tool, Enter sets one end of a new mark and then the other; else it chooses what the cursor is in. */
function entered(gesture: StripGesture, at: number, frame: Frame, scene: StripScene): StripStep {
  const { drag } = gesture;
  if (drag?.kind === 'brush') {
    return {
      gesture: { ...gesture, drag: undefined },
      intents: brushIntents({ ...drag, to: at }, frame),
      handled: true,
    };
  }
  if (scene.tool === 'mark') {
    return {
      gesture: { ...gesture, drag: { kind: 'brush', from: at, to: at, byKey: true } },
      intents: [],
      handled: true,
    };
  }
  const mark = scene.marks.find((other) => at >= other.start && at <= other.end);
  if (mark) return { gesture, intents: [{ kind: 'mark click', id: mark.id }], handled: true };
  const lane = scene.lanes.find((other) => other.selected);
  const event = lane?.events.find((other) => Math.abs(other.timeDays - at) <= lane.durationDays / 2);
  if (!lane || !event) return unhandled(gesture);
  return {
    gesture,
    intents: [{ kind: 'event click', caseNumber: lane.caseNumber, cycle: event.cycle }],
    handled: true,
  };
}
