import { LANE_PX, type LaneEvent, laneY } from '../events-layer.ts';
import { type Frame, insidePlot } from '../frame.ts';
import { markBand, type PlotMark } from '../marks-layer.ts';
import { toPx, toValue } from '../scale.ts';
import type { StripScene } from '../strip-scene.ts';
import { visibleRange } from '../visible-range.ts';
import { GRIP_PX } from './plot-input.ts';

/** What lies under the pointer. */
export type StripHit =
  | { readonly kind: 'grip'; readonly mark: PlotMark; readonly grip: MarkGrip }
  | { readonly kind: 'event'; readonly caseNumber: number | undefined; readonly event: LaneEvent }
  | { readonly kind: 'mark'; readonly mark: PlotMark }
  | undefined;

export type MarkGrip = 'start' | 'end' | 'body';

const REACH_PX = 4;

/** The measured point nearest to the pointer within a few columns, else the bare time under it. */
export function pointNear(
  frame: Frame,
  scene: StripScene,
  xPx: number,
  yPx: number,
): { time: number; value: number | undefined } {
  const { time, values } = scene.series;
  const { from, to } = visibleRange(time, [toValue(frame.x, xPx - REACH_PX), toValue(frame.x, xPx + REACH_PX)]);
  let best: number | undefined;
  let bestDistance = Number.POSITIVE_INFINITY;
  for (let i = from; i < to; i += 1) {
    const distance = Math.hypot(toPx(frame.x, time[i]!) - xPx, toPx(frame.y, values[i]!) - yPx);
    if (distance < bestDistance) [best, bestDistance] = [i, distance];
  }
  return best === undefined
    ? { time: toValue(frame.x, xPx), value: undefined }
    : { time: time[best]!, value: values[best]! };
}

/** Grips of the selected mark before events, events before marks. */
export function hitAt(frame: Frame, scene: StripScene, xPx: number, yPx: number): StripHit {
  const inside = insidePlot(frame, xPx, yPx);
  const near = (mark: PlotMark, reach: number) =>
    xPx >= markBand(frame, mark).left - reach && xPx <= markBand(frame, mark).right + reach;
  const selected = scene.marks.find((mark) => mark.selected && inside && near(mark, GRIP_PX));
  if (selected) return { kind: 'grip', mark: selected, grip: gripAt(frame, selected, xPx) };
  const event = eventAt(frame, scene, xPx, yPx);
  if (event) return event;
  const mark = inside ? scene.marks.find((other) => near(other, 2)) : undefined;
  return mark && { kind: 'mark', mark };
}

function gripAt(frame: Frame, mark: PlotMark, xPx: number): MarkGrip {
  const { left, right } = markBand(frame, mark);
  // A narrow band keeps a middle to be moved by: its sides are grasped from outside.
  const inner = Math.min(GRIP_PX, (right - left) / 3);
  if (xPx <= left + inner) return 'start';
  return xPx >= right - inner ? 'end' : 'body';
}

function eventAt(frame: Frame, scene: StripScene, xPx: number, yPx: number): StripHit {
  const index = scene.lanes.findIndex((_, i) => Math.abs(laneY(i) - yPx) <= LANE_PX / 2);
  const lane = scene.lanes[index];
  if (!lane || xPx < frame.left - 4) return undefined;
  const distance = (event: LaneEvent) => Math.abs(toPx(frame.x, event.timeDays) - xPx);
  const event = lane.events.reduce<LaneEvent | undefined>(
    (best, other) => (best && distance(best) <= distance(other) ? best : other),
    undefined,
  );
  return event && distance(event) <= 8 ? { kind: 'event', caseNumber: lane.caseNumber, event } : undefined;
}
