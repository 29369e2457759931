import type { Frame } from '../frame.ts';
import type { OverviewScene } from '../overview-scene.ts';
import { toPx, toValue } from '../scale.ts';
import type { Span } from '../span.ts';
import { clampSpan, panSpan, zoomSpan } from '../zoom.ts';
import {
  DRAG_PX,
  GRIP_PX,
  type KeyInput,
  type PlotInput,
  type PointerInput,
  type Step,
  unhandled,
} from './plot-input.ts';

export interface OverviewIntent {
  readonly kind: 'view';
  readonly view: Span;
}

/** The part of the window that is held: all of it, one edge, or a new window drawn from where the press began. */
type Hold = 'window' | 'start' | 'end' | 'new';

export interface OverviewGesture {
  readonly drag: { readonly hold: Hold; readonly xPx: number; readonly view: Span } | undefined;
}

export const IDLE_OVERVIEW: OverviewGesture = { drag: undefined };

type OverviewStep = Step<OverviewGesture, OverviewIntent>;

export function stepOverview(
  gesture: OverviewGesture,
  input: PlotInput,
  frame: Frame,
  scene: OverviewScene,
): OverviewStep {
  const { view, fullSpan } = scene;
  switch (input.kind) {
    case 'pointer':
      return stepPointer(gesture, input, frame, scene);
    case 'wheel': {
      const panned = panSpan(view, fullSpan, input.panPx / frame.x.slope);
      return toView(gesture, zoomSpan(panned, fullSpan, toValue(frame.x, input.xPx), input.factor));
    }
    case 'double':
      return toView(gesture, fullSpan);
    case 'key':
      return stepKey(gesture, input, scene);
  }
}

export function overviewPointerStyle(
  gesture: OverviewGesture,
  xPx: number,
  frame: Frame,
  scene: OverviewScene,
): string {
  const hold = gesture.drag?.hold ?? holdAt(frame, scene, xPx);
  if (hold === 'start' || hold === 'end') return 'ew-resize';
  if (hold === 'window') return gesture.drag ? 'grabbing' : 'grab';
  return 'crosshair';
}

function stepPointer(gesture: OverviewGesture, input: PointerInput, frame: Frame, scene: OverviewScene): OverviewStep {
  const { drag } = gesture;
  switch (input.phase) {
    case 'down':
      return pressed(input, frame, scene);
    case 'move':
      return drag ? dragged(gesture, drag, input, frame, scene) : unhandled(gesture);
    case 'cancel':
      return { gesture: IDLE_OVERVIEW, intents: drag ? [{ kind: 'view', view: drag.view }] : [], handled: true };
    default:
      return { gesture: IDLE_OVERVIEW, intents: [], handled: true };
  }
}

/** A press beside the window brings its middle there and holds it. */
function pressed(input: PointerInput, frame: Frame, scene: OverviewScene): OverviewStep {
  const { view, fullSpan } = scene;
  const hold = holdAt(frame, scene, input.xPx);
  if (hold !== undefined) return { gesture: { drag: { hold, xPx: input.xPx, view } }, intents: [], handled: true };
  const at = toValue(frame.x, input.xPx);
  const half = (view[1] - view[0]) / 2;
  const moved = clampSpan([at - half, at + half], fullSpan);
  return {
    gesture: { drag: { hold: 'window', xPx: input.xPx, view: moved } },
    intents: [{ kind: 'view', view: moved }],
    handled: true,
  };
}

function dragged(
  gesture: OverviewGesture,
  drag: NonNullable<OverviewGesture['drag']>,
  input: PointerInput,
  frame: Frame,
  scene: OverviewScene,
): OverviewStep {
  const { fullSpan } = scene;
  const by = (input.xPx - drag.xPx) / frame.x.slope;
  const at = Math.min(Math.max(toValue(frame.x, input.xPx), fullSpan[0]), fullSpan[1]);
  switch (drag.hold) {
    case 'window':
      return toView(gesture, panSpan(drag.view, fullSpan, by));
    case 'start':
      return toView(gesture, clampSpan(ordered(at, drag.view[1]), fullSpan));
    case 'end':
      return toView(gesture, clampSpan(ordered(drag.view[0], at), fullSpan));
    case 'new':
      if (Math.abs(input.xPx - drag.xPx) < DRAG_PX) return { gesture, intents: [], handled: true };
      return toView(gesture, clampSpan(ordered(toValue(frame.x, drag.xPx), at), fullSpan));
  }
}

function holdAt(frame: Frame, scene: OverviewScene, xPx: number): Hold | undefined {
  const { view, fullSpan } = scene;
  // While everything is shown there is nothing to move: a drag draws the new window.
  if (view[0] <= fullSpan[0] && view[1] >= fullSpan[1]) return 'new';
  const left = toPx(frame.x, view[0]);
  const right = toPx(frame.x, view[1]);
  const inner = Math.min(GRIP_PX, (right - left) / 3);
  if (xPx >= left - GRIP_PX && xPx <= left + inner) return 'start';
  if (xPx >= right - inner && xPx <= right + GRIP_PX) return 'end';
  return xPx > left && xPx < right ? 'window' : undefined;
}

function stepKey(gesture: OverviewGesture, input: KeyInput, scene: OverviewScene): OverviewStep {
  const { view, fullSpan } = scene;
  const width = view[1] - view[0];
  const middle = (view[0] + view[1]) / 2;
  if (input.alt || input.ctrl) return unhandled(gesture);
  switch (input.key) {
    case 'ArrowLeft':
      return toView(gesture, panSpan(view, fullSpan, -width * (input.shift ? 1 : 0.1)));
    case 'ArrowRight':
      return toView(gesture, panSpan(view, fullSpan, width * (input.shift ? 1 : 0.1)));
    case 'Home':
      return toView(gesture, clampSpan([fullSpan[0], fullSpan[0] + width], fullSpan));
    case 'End':
      return toView(gesture, clampSpan([fullSpan[1] - width, fullSpan[1]], fullSpan));
    case '+':
    case '=':
      return toView(gesture, zoomSpan(view, fullSpan, middle, 1.5));
    case '-':
      return toView(gesture, zoomSpan(view, fullSpan, middle, 1 / 1.5));
    case 'Escape':
      return gesture.drag
        ? { gesture: IDLE_OVERVIEW, intents: [{ kind: 'view', view: gesture.drag.view }], handled: true }
        : unhandled(gesture);
    default:
      return unhandled(gesture);
  }
}

function ordered(a: number, b: number): Span {
  return a <= b ? [a, b] : [b, a];
}

function toView(gesture: OverviewGesture, view: Span): OverviewStep {
  return { gesture, intents: [{ kind: 'view', view }], handled: true };
}
