import type { PlotInput, PointerInput } from './plot-input.ts';

/** One notch of a mouse wheel is about 100 of its units. */
const ZOOM_PER_UNIT = 0.0022;
const UNITS_PER_LINE = 33;

/** Turns the DOM events of a plot into inputs. @param take returns whether the input was used @returns what ends it */
export function listenToPlot(host: HTMLElement, take: (input: PlotInput) => boolean): () => void {
  const ends = new AbortController();
  const { signal } = ends;
  const on = <K extends keyof HTMLElementEventMap>(type: K, listener: (event: HTMLElementEventMap[K]) => void) =>
    host.addEventListener(type, listener, { signal, passive: false });

  on('pointerdown', (event) => {
    if (event.button !== 0) return;
    host.setPointerCapture(event.pointerId);
    take(pointerInput(host, event, 'down'));
  });
  on('pointermove', (event) => take(pointerInput(host, event, 'move')));
  on('pointerup', (event) => take(pointerInput(host, event, 'up')));
  on('pointercancel', (event) => take(pointerInput(host, event, 'cancel')));
  on('pointerleave', (event) => {
    if (!host.hasPointerCapture(event.pointerId)) take(pointerInput(host, event, 'leave'));
  });
  on('dblclick', (event) => take({ kind: 'double', ...placeOf(host, event) }));
  on('wheel', (event) => {
    event.preventDefault();
    take(wheelInput(host, event));
  });
  on('keydown', (event) => {
    const { key, shiftKey, altKey, ctrlKey, metaKey } = event;
    const used = take({ kind: 'key', key, shift: shiftKey, alt: altKey, ctrl: ctrlKey || metaKey });
    if (!used) return;
    event.preventDefault();
    event.stopPropagation();
  });
  return () => ends.abort();
}

function placeOf(host: HTMLElement, event: MouseEvent): { readonly xPx: number; readonly yPx: number } {
  const box = host.getBoundingClientRect();
  return { xPx: event.clientX - box.left, yPx: event.clientY - box.top };
}

function pointerInput(host: HTMLElement, event: PointerEvent, phase: PointerInput['phase']): PointerInput {
  const { shiftKey, altKey, ctrlKey, metaKey } = event;
  return { kind: 'pointer', phase, ...placeOf(host, event), shift: shiftKey, alt: altKey, ctrl: ctrlKey || metaKey };
}

function wheelInput(host: HTMLElement, event: WheelEvent): PlotInput {
  const unit = event.deltaMode === WheelEvent.DOM_DELTA_PIXEL ? 1 : UNITS_PER_LINE;
  const sideways = event.shiftKey && event.deltaX === 0 ? event.deltaY : event.deltaX;
  const upright = event.shiftKey ? 0 : event.deltaY;
  // A pinch on a touch pad arrives as a wheel with Ctrl and small steps.
  const gain = event.ctrlKey ? 4 : 1;
  const zoomUnits = Math.abs(upright) > Math.abs(sideways) ? upright : 0;
  return {
    kind: 'wheel',
    xPx: placeOf(host, event).xPx,
    factor: 2 ** (-zoomUnits * unit * gain * ZOOM_PER_UNIT),
    panPx: zoomUnits === 0 ? sideways * unit : 0,
  };
}
