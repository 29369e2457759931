import type { Frame } from '../frame.ts';
import { highestNear } from '../periodogram-layer.ts';
import { type PeriodogramScene, samePeriod, wholePeriodSpan } from '../periodogram-scene.ts';
import { toPx, toValue } from '../scale.ts';
import type { Span } from '../span.ts';
import { expSpan, logSpan, panSpan, zoomSpan } from '../zoom.ts';
import { DRAG_PX, type KeyInput, type PlotInput, type PointerInput, type Step, unhandled } from './plot-input.ts';

export type PeriodogramIntent =
  | { readonly kind: 'pick'; readonly periodDays: number }
  | { readonly kind: 'cursor'; readonly periodDays: number | undefined; readonly value: number | undefined };

export interface PeriodogramGesture {
  /** Zoom of these periods; another search starts from the whole again. */
  readonly zoom: { readonly of: Float64Array; readonly view: Span } | undefined;
  readonly cursor: { readonly periodDays: number; readonly value: number | undefined } | undefined;
  /** The peak that the keys stand on. */
  readonly keyPeriodDays: number | undefined;
  readonly drag: { readonly xPx: number; readonly view: Span; readonly started: boolean } | undefined;
}

export const IDLE_PERIODOGRAM: PeriodogramGesture = {
  zoom: undefined,
  cursor: undefined,
  keyPeriodDays: undefined,
  drag: undefined,
};

type PeriodogramStep = Step<PeriodogramGesture, PeriodogramIntent>;

/** A click means the highest value this near. */
const SNAP_PX = 3;

export function periodView(gesture: PeriodogramGesture, scene: PeriodogramScene): Span {
  return gesture.zoom?.of === scene.periods ? gesture.zoom.view : wholePeriodSpan(scene);
}

export function stepPeriodogram(
  gesture: PeriodogramGesture,
  input: PlotInput,
  frame: Frame,
  scene: PeriodogramScene,
): PeriodogramStep {
  switch (input.kind) {
    case 'pointer':
      return stepPointer(gesture, input, frame, scene);
    case 'wheel': {
      const whole = logSpan(wholePeriodSpan(scene));
      const panned = panSpan(logSpan(periodView(gesture, scene)), whole, input.panPx / frame.x.slope);
      return zoomed(
        gesture,
        scene,
        expSpan(zoomSpan(panned, whole, Math.log(toValue(frame.x, input.xPx)), input.factor)),
      );
    }
    case 'double':
      return zoomed(gesture, scene, wholePeriodSpan(scene));
    case 'key':
      return stepKey(gesture, input, scene);
  }
}

function stepPointer(
  gesture: PeriodogramGesture,
  input: PointerInput,
  frame: Frame,
  scene: PeriodogramScene,
): PeriodogramStep {
  const { drag } = gesture;
  const { xPx } = input;
  switch (input.phase) {
    case 'down':
      return {
        gesture: { ...gesture, drag: { xPx, view: periodView(gesture, scene), started: false } },
        intents: [],
        handled: true,
      };
    case 'move':
      return drag ? dragged(gesture, drag, xPx, frame, scene) : hover(gesture, xPx, frame, scene);
    case 'up':
      return released(gesture, input, frame, scene);
    case 'cancel':
      return drag
        ? {
            ...zoomed(gesture, scene, drag.view),
            gesture: { ...zoomed(gesture, scene, drag.view).gesture, drag: undefined },
          }
        : unhandled(gesture);
    case 'leave':
      return { gesture: { ...gesture, cursor: undefined }, intents: [noCursor], handled: true };
  }
}

const noCursor = { kind: 'cursor', periodDays: undefined, value: undefined } as const;

function dragged(
  gesture: PeriodogramGesture,
  drag: NonNullable<PeriodogramGesture['drag']>,
  xPx: number,
  frame: Frame,
  scene: PeriodogramScene,
): PeriodogramStep {
  if (!drag.started && Math.abs(xPx - drag.xPx) < DRAG_PX) return { gesture, intents: [], handled: true };
  const panned = panSpan(logSpan(drag.view), logSpan(wholePeriodSpan(scene)), (drag.xPx - xPx) / frame.x.slope);
  return zoomed({ ...gesture, cursor: undefined, drag: { ...drag, started: true } }, scene, expSpan(panned));
}

function released(
  gesture: PeriodogramGesture,
  input: PointerInput,
  frame: Frame,
  scene: PeriodogramScene,
): PeriodogramStep {
  const rest = { ...gesture, drag: undefined };
  if (!gesture.drag || gesture.drag.started) return { gesture: rest, intents: [], handled: true };
  const periodDays = pickAt(frame, scene, input.xPx, input.yPx);
  return { gesture: rest, intents: periodDays === undefined ? [] : [{ kind: 'pick', periodDays }], handled: true };
}

/** A peak's shape under the pointer is that peak; else the highest value near; else, between samples, the place itself. */
function pickAt(frame: Frame, scene: PeriodogramScene, xPx: number, yPx: number): number | undefined {
  if (xPx < frame.left - SNAP_PX || xPx > frame.right + SNAP_PX || scene.periods.length === 0) return undefined;
  const peak = scene.peaks.find(
    (other) =>
      Math.hypot(toPx(frame.x, other.periodDays) - xPx, Math.max(12, toPx(frame.y, other.value) - 9) - yPx) <= 8,
  );
  if (peak) return peak.periodDays;
  const index = highestNear(frame, scene.periods, scene.values, xPx, SNAP_PX);
  return index === undefined ? toValue(frame.x, xPx) : scene.periods[index];
}

function hover(gesture: PeriodogramGesture, xPx: number, frame: Frame, scene: PeriodogramScene): PeriodogramStep {
  if (xPx < frame.left || xPx > frame.right) {
    return { gesture: { ...gesture, cursor: undefined }, intents: gesture.cursor ? [noCursor] : [], handled: true };
  }
  const index = highestNear(frame, scene.periods, scene.values, xPx, SNAP_PX);
  const cursor =
    index === undefined
      ? { periodDays: toValue(frame.x, xPx), value: undefined }
      : { periodDays: scene.periods[index]!, value: scene.values[index]! };
  return { gesture: { ...gesture, cursor }, intents: [{ kind: 'cursor', ...cursor }], handled: true };
}

function stepKey(gesture: PeriodogramGesture, input: KeyInput, scene: PeriodogramScene): PeriodogramStep {
  if (input.alt || input.ctrl) return unhandled(gesture);
  const peaks = scene.peaks.map((peak) => peak.periodDays).sort((a, b) => a - b);
  const at = gesture.keyPeriodDays ?? scene.selectedPeriodDays;
  switch (input.key) {
    case 'ArrowLeft':
      return toPeak(
        gesture,
        scene,
        peaks.findLast((period) => at === undefined || (period < at && !samePeriod(period, at))),
      );
    case 'ArrowRight':
      return toPeak(
        gesture,
        scene,
        peaks.find((period) => at === undefined || (period > at && !samePeriod(period, at))),
      );
    case 'Home':
      return toPeak(gesture, scene, peaks[0]);
    case 'End':
      return toPeak(gesture, scene, peaks.at(-1));
    case '+':
    case '=':
      return zoomByKey(gesture, scene, at, 1.5);
    case '-':
      return zoomByKey(gesture, scene, at, 1 / 1.5);
    case 'Enter':
      return gesture.keyPeriodDays === undefined
        ? unhandled(gesture)
        : { gesture, intents: [{ kind: 'pick', periodDays: gesture.keyPeriodDays }], handled: true };
    case 'Escape':
      return gesture.keyPeriodDays === undefined
        ? unhandled(gesture)
        : { gesture: { ...gesture, keyPeriodDays: undefined }, intents: [noCursor], handled: true };
    default:
      return unhandled(gesture);
  }
}

function toPeak(gesture: PeriodogramGesture, scene: PeriodogramScene, periodDays: number | undefined): PeriodogramStep {
  const peak = scene.peaks.find((other) => other.periodDays === periodDays);
  if (!peak) return { gesture, intents: [], handled: true };
  const next = { ...gesture, keyPeriodDays: peak.periodDays };
  return {
    gesture: next,
    intents: [{ kind: 'cursor', periodDays: peak.periodDays, value: peak.value }],
    handled: true,
  };
}

function zoomByKey(
  gesture: PeriodogramGesture,
  scene: PeriodogramScene,
  at: number | undefined,
  factor: number,
): PeriodogramStep {
  const view = logSpan(periodView(gesture, scene));
  const about = at === undefined ? (view[0] + view[1]) / 2 : Math.log(at);
  return zoomed(gesture, scene, expSpan(zoomSpan(view, logSpan(wholePeriodSpan(scene)), about, factor)));
}

function zoomed(gesture: PeriodogramGesture, scene: PeriodogramScene, view: Span): PeriodogramStep {
  return { gesture: { ...gesture, zoom: { of: scene.periods, view } }, intents: [], handled: true };
}
