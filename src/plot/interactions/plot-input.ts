/** What an analyst does to a plot, free of DOM events, so that reducers are pure. */
export type PlotInput = PointerInput | WheelInput | DoubleInput | KeyInput;

export interface PointerInput {
  readonly kind: 'pointer';
  /** 'cancel': the browser took the pointer away. 'leave': it left the plot while nothing was dragged. */
  readonly phase: 'down' | 'move' | 'up' | 'cancel' | 'leave';
  readonly xPx: number;
  readonly yPx: number;
  readonly shift: boolean;
  readonly alt: boolean;
  readonly ctrl: boolean;
}

export interface WheelInput {
  readonly kind: 'wheel';
  readonly xPx: number;
  /** Over 1 zooms in. */
  readonly factor: number;
  /** Sideways part of the wheel, to the right positive. */
  readonly panPx: number;
}

export interface DoubleInput {
  readonly kind: 'double';
  readonly xPx: number;
  readonly yPx: number;
}

export interface KeyInput {
  readonly kind: 'key';
  readonly key: string;
  readonly shift: boolean;
  readonly alt: boolean;
  readonly ctrl: boolean;
}

/** What a reducer makes of an input: the gesture that goes on, and what the plot asks of its owner. */
export interface Step<Gesture, Intent> {
  readonly gesture: Gesture;
  readonly intents: readonly Intent[];
  /** False leaves a key to the rest of the page. */
  readonly handled: boolean;
}

/** Under this many pixels a press stays a click. */
export const DRAG_PX = 3;
/** How far from an edge a pointer may be to grasp it. */
export const GRIP_PX = 5;

export function unhandled<Gesture, Intent>(gesture: Gesture): Step<Gesture, Intent> {
  return { gesture, intents: [], handled: false };
}
