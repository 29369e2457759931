import type { FoldScene, HandEphemeris } from '../fold-scene.ts';
import { type Frame, insidePlot } from '../frame.ts';
import { toPx, toValue } from '../scale.ts';
import type { Span } from '../span.ts';
import {
  DRAG_PX,
  GRIP_PX,
  type KeyInput,
  type PlotInput,
  type PointerInput,
  type Step,
  unhandled,
} from './plot-input.ts';
import type { DragPhase } from './strip-gesture.ts';

export type FoldIntent =
  | { readonly kind: 'ephemeris'; readonly periodDays: number; readonly epochDays: number; readonly phase: DragPhase }
  | { readonly kind: 'duration'; readonly durationDays: number; readonly phase: DragPhase }
  | { readonly kind: 'half width'; readonly hours: number }
  | { readonly kind: 'cursor'; readonly x: number | undefined; readonly fluxPpm: number | undefined };

interface FoldDrag {
  readonly kind: 'epoch' | 'period' | 'duration';
  readonly xPx: number;
  /** Which foot of the caliper, for a duration. */
  readonly side: -1 | 1;
  readonly started: boolean;
  readonly from: HandEphemeris;
  readonly now: HandEphemeris;
  /** The y span stays while a hand moves the data. */
  readonly yDomain: Span;
}

export interface FoldGesture {
  readonly cursor: { readonly x: number; readonly fluxPpm: number | undefined } | undefined;
  readonly drag: FoldDrag | undefined;
}

export const IDLE_FOLD: FoldGesture = { cursor: undefined, drag: undefined };

type FoldStep = Step<FoldGesture, FoldIntent>;

/** Gives the value of the point nearest to a pixel; the reducer itself knows nothing of the folded arrays. */
export type PointFinder = (xPx: number, yPx: number) => { readonly x: number; readonly fluxPpm: number } | undefined;

export function ephemerisShown(gesture: FoldGesture, scene: FoldScene): HandEphemeris {
  return gesture.drag?.started ? gesture.drag.now : scene;
}

/**
 * The ephemeris after the data were pulled sideways. A shift moves the epoch against the pull. A change of period
 * turns the fold about the first event in the data, so that the last event follows the pointer.
 *
 * @param pulledDays to the right positive; @param span first and last time of the data
 */
export function pulledEphemeris(
  from: HandEphemeris,
  kind: 'epoch' | 'period',
  pulledDays: number,
  span: Span,
): HandEphemeris {
  const { periodDays, epochDays } = from;
  if (kind === 'epoch') return { ...from, epochDays: epochDays - pulledDays };
  const first = Math.ceil((span[0] - epochDays) / periodDays - 0.5);
  const cycles = Math.max(1, Math.floor((span[1] - epochDays) / periodDays + 0.5) - first);
  const pivot = epochDays + first * periodDays;
  const changed = Math.min(Math.max(periodDays - pulledDays / cycles, periodDays * 0.5), periodDays * 1.5);
  return { ...from, periodDays: changed, epochDays: pivot - first * changed };
}

export function stepFold(
  gesture: FoldGesture,
  input: PlotInput,
  frame: Frame,
  scene: FoldScene,
  find: PointFinder,
): FoldStep {
  switch (input.kind) {
    case 'pointer':
      return stepPointer(gesture, input, frame, scene, find);
    case 'wheel':
      return scene.mode === 'full' || input.factor === 1 ? unhandled(gesture) : widen(gesture, scene, 1 / input.factor);
    case 'double':
      return unhandled(gesture);
    case 'key':
      return stepKey(gesture, input, frame, scene);
  }
}

export function foldPointerStyle(
  gesture: FoldGesture,
  xPx: number,
  yPx: number,
  frame: Frame,
  scene: FoldScene,
): string {
  if (gesture.drag) return gesture.drag.kind === 'duration' ? 'ew-resize' : 'grabbing';
  if (footAt(frame, scene, xPx, yPx) !== undefined) return 'ew-resize';
  return insidePlot(frame, xPx, yPx) ? 'grab' : 'default';
}

function stepPointer(
  gesture: FoldGesture,
  input: PointerInput,
  frame: Frame,
  scene: FoldScene,
  find: PointFinder,
): FoldStep {
  const { drag } = gesture;
  switch (input.phase) {
    case 'down':
      return pressed(gesture, input, frame, scene);
    case 'move':
      return drag ? dragged(gesture, drag, input, frame, scene) : hover(gesture, input, frame, find);
    case 'up':
      return drag ? finished(gesture, drag, 'commit') : unhandled(gesture);
    case 'cancel':
      return drag ? finished(gesture, drag, 'cancel') : unhandled(gesture);
    case 'leave':
      return {
        gesture: { ...gesture, cursor: undefined },
        intents: [{ kind: 'cursor', x: undefined, fluxPpm: undefined }],
        handled: true,
      };
  }
}

function pressed(gesture: FoldGesture, input: PointerInput, frame: Frame, scene: FoldScene): FoldStep {
  const { xPx, yPx } = input;
  const side = footAt(frame, scene, xPx, yPx);
  if (side === undefined && !insidePlot(frame, xPx, yPx)) return unhandled(gesture);
  const byPeriod = input.alt || input.ctrl || scene.tool === 'period';
  const kind = side !== undefined ? 'duration' : byPeriod ? 'period' : 'epoch';
  const { periodDays, epochDays, durationDays } = scene;
  const from = { periodDays, epochDays, durationDays };
  const drag: FoldDrag = { kind, xPx, side: side ?? 1, started: false, from, now: from, yDomain: frame.y.domain };
  return { gesture: { ...gesture, drag }, intents: [], handled: true };
}

function dragged(gesture: FoldGesture, drag: FoldDrag, input: PointerInput, frame: Frame, scene: FoldScene): FoldStep {
  const pulledPx = input.xPx - drag.xPx;
  if (!drag.started && Math.abs(pulledPx) < DRAG_PX) return { gesture, intents: [], handled: true };
  const pulledDays = pulledPx / pxPerDay(frame, scene, drag.from);
  const now =
    drag.kind === 'duration'
      ? resized(drag, pulledDays)
      : pulledEphemeris(drag.from, drag.kind, pulledDays, dataSpan(scene));
  const next: FoldDrag = { ...drag, started: true, now };
  return { gesture: { cursor: undefined, drag: next }, intents: [intentOf(next, 'preview')], handled: true };
}

/** A foot is half a duration from the middle, so the duration changes twice as far as the foot. */
function resized(drag: FoldDrag, pulledDays: number): HandEphemeris {
  const { from, side } = drag;
  const wanted = from.durationDays + 2 * side * pulledDays;
  return { ...from, durationDays: Math.min(Math.max(wanted, from.periodDays * 1e-4), from.periodDays * 0.9) };
}

function finished(gesture: FoldGesture, drag: FoldDrag, phase: 'commit' | 'cancel'): FoldStep {
  const told = phase === 'cancel' ? { ...drag, now: drag.from } : drag;
  return {
    gesture: { ...gesture, drag: undefined },
    intents: drag.started ? [intentOf(told, phase)] : [],
    handled: true,
  };
}

function intentOf(drag: FoldDrag, phase: DragPhase): FoldIntent {
  const { periodDays, epochDays, durationDays } = drag.now;
  return drag.kind === 'duration'
    ? { kind: 'duration', durationDays, phase }
    : { kind: 'ephemeris', periodDays, epochDays, phase };
}

function pxPerDay(frame: Frame, scene: FoldScene, ephemeris: HandEphemeris): number {
  return scene.mode === 'full' ? frame.x.slope / ephemeris.periodDays : frame.x.slope * 24;
}

function dataSpan(scene: FoldScene): Span {
  let first = Number.POSITIVE_INFINITY;
  let last = Number.NEGATIVE_INFINITY;
  for (const time of scene.time) {
    if (time < first) first = time;
    if (time > last) last = time;
  }
  return first <= last ? [first, last] : [scene.epochDays, scene.epochDays];
}

/** Feet can be dragged in event mode only: in full phase they lie too close. */
function footAt(frame: Frame, scene: FoldScene, xPx: number, yPx: number): -1 | 1 | undefined {
  if (scene.mode === 'full' || yPx < 0 || yPx > frame.bottom) return undefined;
  const reach = yPx < frame.top ? GRIP_PX + 2 : GRIP_PX - 1;
  const half = scene.durationDays * 12;
  const left = Math.abs(toPx(frame.x, -half) - xPx);
  const right = Math.abs(toPx(frame.x, half) - xPx);
  if (Math.min(left, right) > reach) return undefined;
  return left < right ? -1 : 1;
}

function hover(gesture: FoldGesture, input: PointerInput, frame: Frame, find: PointFinder): FoldStep {
  const { xPx, yPx } = input;
  if (xPx < frame.left || xPx > frame.right) {
    const gone = gesture.cursor ? [{ kind: 'cursor', x: undefined, fluxPpm: undefined } as const] : [];
    return { gesture: { ...gesture, cursor: undefined }, intents: gone, handled: true };
  }
  const point = find(xPx, yPx);
  const cursor = point ?? { x: toValue(frame.x, xPx), fluxPpm: undefined };
  return { gesture: { ...gesture, cursor }, intents: [{ kind: 'cursor', ...cursor }], handled: true };
}

/** Arrows move the cursor by a pixel, with Shift the epoch, with Ctrl the period, each by what a pixel means. */
function stepKey(gesture: FoldGesture, input: KeyInput, frame: Frame, scene: FoldScene): FoldStep {
  const { drag } = gesture;
  if (input.key === 'Escape') return drag ? finished(gesture, drag, 'cancel') : unhandled(gesture);
  if (input.alt) return unhandled(gesture);
  const way = input.key === 'ArrowLeft' ? -1 : input.key === 'ArrowRight' ? 1 : 0;
  if (way !== 0 && (input.shift || input.ctrl))
    return nudge(gesture, frame, scene, input.ctrl ? 'period' : 'epoch', way);
  if (input.ctrl) return unhandled(gesture);
  if (way !== 0)
    return cursorTo(gesture, frame, (gesture.cursor?.x ?? scene.cursorHours ?? 0) + (2 * way) / frame.x.slope);
  switch (input.key) {
    case 'Home':
      return cursorTo(gesture, frame, frame.x.domain[0]);
    case 'End':
      return cursorTo(gesture, frame, frame.x.domain[1]);
    case '+':
    case '=':
      return scene.mode === 'full' ? unhandled(gesture) : widen(gesture, scene, 1 / 1.5);
    case '-':
      return scene.mode === 'full' ? unhandled(gesture) : widen(gesture, scene, 1.5);
    default:
      return unhandled(gesture);
  }
}

function nudge(gesture: FoldGesture, frame: Frame, scene: FoldScene, kind: 'epoch' | 'period', way: number): FoldStep {
  const { periodDays, epochDays, durationDays } = scene;
  const pulledDays = way / pxPerDay(frame, scene, scene);
  const now = pulledEphemeris({ periodDays, epochDays, durationDays }, kind, pulledDays, dataSpan(scene));
  return {
    gesture,
    intents: [{ kind: 'ephemeris', periodDays: now.periodDays, epochDays: now.epochDays, phase: 'commit' }],
    handled: true,
  };
}

function cursorTo(gesture: FoldGesture, frame: Frame, x: number): FoldStep {
  const inside = Math.min(Math.max(x, frame.x.domain[0]), frame.x.domain[1]);
  const cursor = { x: inside, fluxPpm: undefined };
  return { gesture: { ...gesture, cursor }, intents: [{ kind: 'cursor', ...cursor }], handled: true };
}

/** From a third of the event to half a period either side. */
function widen(gesture: FoldGesture, scene: FoldScene, by: number): FoldStep {
  const least = scene.durationDays * 24 * 0.75;
  const hours = Math.min(Math.max(scene.halfWidthHours * by, least), Math.max(least, scene.periodDays * 12));
  return { gesture, intents: [{ kind: 'half width', hours }], handled: true };
}
