import { caseLook, drawCaseShape } from './case-shape.ts';
import type { DrawContext } from './draw-context.ts';
import { crisp, drawLine } from './draw-line.ts';
import { drawText, uiFont } from './draw-text.ts';
import type { Frame } from './frame.ts';
import { numberLabel } from './number-label.ts';
import { toPx } from './scale.ts';
import type { PlotTheme } from './theme.ts';

export const LANE_PX = 20;
const FIRST_LANE_PX = 13;
const SHAPE_PX = 3.8;
/** Nearer than this, shapes would run together: ticks stand for them. */
const CLOSE_PX = 10;

export interface LaneEvent {
  readonly cycle: number;
  /** Mid-event time, days. */
  readonly timeDays: number;
  readonly hasData: boolean;
}

export interface Lane {
  /** Undefined for a trial that is no case yet. */
  readonly caseNumber: number | undefined;
  readonly selected: boolean;
  readonly events: readonly LaneEvent[];
  readonly durationDays: number;
}

export function laneY(index: number): number {
  return FIRST_LANE_PX + index * LANE_PX;
}

/** Room over the plot area for so many lanes. */
export function lanesHeight(count: number): number {
  return count === 0 ? 8 : 6 + count * LANE_PX;
}

export function drawLanes(context: DrawContext, frame: Frame, lanes: readonly Lane[], theme: PlotTheme): void {
  lanes.forEach((lane, index) => {
    drawLane(context, frame, lane, laneY(index), theme);
  });
}

function drawLane(context: DrawContext, frame: Frame, lane: Lane, y: number, theme: PlotTheme): void {
  const look = caseLook(lane.caseNumber, theme);
  const events = lane.events.filter((event) => inSight(frame, event));
  const spacing = closestSpacing(frame, events);
  drawLine(context, frame.left, crisp(y), frame.right, crisp(y), { colour: theme.line });
  drawCaseShape(context, theme, look, frame.left - 14, y, SHAPE_PX);
  if (spacing < CLOSE_PX) {
    drawTicks(context, frame, events, y, look.colour);
    return;
  }
  if (lane.selected) drawDropLines(context, frame, events, y, theme);
  for (const event of events)
    drawCaseShape(context, theme, look, toPx(frame.x, event.timeDays), y, SHAPE_PX, !event.hasData);
  drawNumbers(context, frame, events, y, theme);
}

function inSight(frame: Frame, event: LaneEvent): boolean {
  return event.timeDays >= frame.x.domain[0] && event.timeDays <= frame.x.domain[1];
}

function closestSpacing(frame: Frame, events: readonly LaneEvent[]): number {
  let closest = Number.POSITIVE_INFINITY;
  for (let i = 1; i < events.length; i += 1) {
    closest = Math.min(closest, (events[i]!.timeDays - events[i - 1]!.timeDays) * frame.x.slope);
  }
  return closest;
}

function drawDropLines(
  context: DrawContext,
  frame: Frame,
  events: readonly LaneEvent[],
  y: number,
  theme: PlotTheme,
): void {
  for (const event of events) {
    const x = crisp(toPx(frame.x, event.timeDays));
    drawLine(context, x, y, x, frame.bottom, { colour: theme.line2, dash: [2, 3] });
  }
}

/** One tick a pixel at most; short where there are no data. */
function drawTicks(context: DrawContext, frame: Frame, events: readonly LaneEvent[], y: number, colour: string): void {
  let last = Number.NEGATIVE_INFINITY;
  for (const event of events) {
    const x = crisp(toPx(frame.x, event.timeDays));
    if (x === last) continue;
    last = x;
    const half = event.hasData ? 5 : 1.5;
    drawLine(context, x, y - half, x, y + half, { colour });
  }
}

/** Cycle numbers, right of each shape, only as many as do not touch the next. */
function drawNumbers(
  context: DrawContext,
  frame: Frame,
  events: readonly LaneEvent[],
  y: number,
  theme: PlotTheme,
): void {
  const font = uiFont(theme);
  context.font = font;
  events.forEach((event, i) => {
    const label = numberLabel(event.cycle);
    const x = toPx(frame.x, event.timeDays) + 8;
    const next = events[i + 1];
    const room = next ? toPx(frame.x, next.timeDays) - SHAPE_PX - 4 : frame.widthPx;
    if (x + context.measureText(label).width > room) return;
    drawText(context, label, x, y, { colour: theme.tickText, font });
  });
}
