import { drawGrid, drawLeftAxis, drawMarginScale, timeTicks, yTicks } from './axis.ts';
import { drawBins, LARGE_BINS, SMALL_BINS } from './bins-layer.ts';
import { drawDepthCaliper, drawDurationCaliper } from './caliper-layer.ts';
import { type CaseLook, caseLook } from './case-shape.ts';
import type { DensityGrid } from './density-grid.ts';
import type { DrawContext } from './draw-context.ts';
import { crisp, drawLine } from './draw-line.ts';
import { drawTitle } from './draw-text.ts';
import type { FoldScene, HandEphemeris } from './fold-scene.ts';
import { type FoldWork, foldSpan, updateFold } from './fold-work.ts';
import { type Frame, GUTTER_PX, makeFrame, RIGHT_PX } from './frame.ts';
import { boxCurve, curveAt, drawModel, type ModelCurve } from './model-layer.ts';
import { numberLabel } from './number-label.ts';
import { drawPoints } from './points-layer.ts';
import { toPx } from './scale.ts';
import { type Span, wideSpan } from './span.ts';
import type { SurfaceSize } from './surface/plot-surface.ts';
import type { PlotTheme } from './theme.ts';
import { linearTicks, steppedTicks } from './ticks.ts';

const RESIDUAL_LEAST_PX = 240;

/** The scratch space of one mounted fold. */
export interface FoldScratch {
  readonly work: FoldWork;
  readonly grid: DensityGrid;
}

export function foldFrame(
  scene: FoldScene,
  ephemeris: HandEphemeris,
  size: SurfaceSize,
  scratch: FoldScratch,
  frozenY?: Span,
): Frame {
  const xDomain = foldSpan(scene, ephemeris);
  updateFold(scratch.work, scene, ephemeris, xDomain);
  const event = scene.mode === 'event';
  const foot = event ? 38 : 19;
  const residual = hasResiduals(scene, size) ? residualHeight(size.heightPx) + 8 : 0;
  return makeFrame({
    ...size,
    margins: { left: GUTTER_PX, right: RIGHT_PX + 2, top: event ? 30 : 6, bottom: foot + residual },
    xDomain,
    yDomain: frozenY ?? foldExtent(scratch.work, scene),
  });
}

/** Model curve in the x unit of the plot; undefined where nothing is known of the depth. */
export function foldCurve(scene: FoldScene, ephemeris: HandEphemeris, span: Span): ModelCurve | undefined {
  const toX = scene.mode === 'full' ? 1 / (24 * ephemeris.periodDays) : 1;
  if (scene.curve) return scene.mode === 'event' ? scene.curve : undefined;
  if (scene.boxDepthPpm === undefined) return undefined;
  return boxCurve(span[0], span[1], ephemeris.durationDays * 12 * toX, scene.boxDepthPpm);
}

export function drawFold(
  context: DrawContext,
  frame: Frame,
  scene: FoldScene,
  ephemeris: HandEphemeris,
  theme: PlotTheme,
  scratch: FoldScratch,
): void {
  updateFold(scratch.work, scene, ephemeris, frame.x.domain);
  const look = caseLook(scene.caseNumber, theme);
  const curve = foldCurve(scene, ephemeris, frame.x.domain);
  const ticks = yTicks(frame, scene.time.length === 0);
  drawGrid(context, frame, ticks, theme);
  if (scene.mode === 'full') drawFullPhase(context, frame, theme, scratch, look);
  else if (scene.time.length > 0) drawEvent(context, frame, scene, ephemeris, theme, scratch, curve, look);
  drawLeftAxis(context, frame, ticks, theme, frame.bottom - frame.top > 70 ? scene.yTitle : '');
  const lowest = drawResiduals(context, frame, scene, theme, scratch, curve, look);
  drawMarginScale(
    context,
    lowest,
    scene.mode === 'full' ? steppedTicks(frame.x.domain, 0.25, 5) : timeTicks(lowest),
    theme,
  );
  if (scene.mode === 'event')
    drawTitle(context, theme, scene.xTitle, (frame.left + frame.right) / 2, frame.heightPx - 9);
}

function drawEvent(
  context: DrawContext,
  frame: Frame,
  scene: FoldScene,
  ephemeris: HandEphemeris,
  theme: PlotTheme,
  scratch: FoldScratch,
  curve: ModelCurve | undefined,
  look: CaseLook,
): void {
  const { work, grid } = scratch;
  const cloud = { x: work.x, y: scene.flux, from: 0, to: work.x.length, inside: work.inside, outside: 'hide' } as const;
  drawPoints(context, frame, cloud, theme, grid);
  if (curve) drawModel(context, frame, curve, look, theme);
  drawBins(context, frame, work.bins, theme, LARGE_BINS);
  const half = ephemeris.durationDays * 12;
  drawDurationCaliper(context, frame, theme, look.colour, half, durationWords(scene, ephemeris));
  const depth = scene.boxDepthPpm;
  if (depth !== undefined && depth > 0) {
    const label = scene.depthLabel ?? `box depth ${numberLabel(depth)} ppm`;
    drawDepthCaliper(context, frame, theme, look.colour, half, depth, label);
  }
}

function durationWords(scene: FoldScene, ephemeris: HandEphemeris): string {
  // A label of the owner's belongs to its own duration, not to the one being dragged.
  const own = scene.durationLabel !== undefined && ephemeris.durationDays === scene.durationDays;
  return own ? scene.durationLabel! : `duration ${numberLabel(ephemeris.durationDays * 24, 2)} h`;
}

function drawFullPhase(
  context: DrawContext,
  frame: Frame,
  theme: PlotTheme,
  scratch: FoldScratch,
  look: CaseLook,
): void {
  drawBins(context, frame, scratch.work.bins, theme, { ...SMALL_BINS, barColour: theme.point });
  const half = crisp(toPx(frame.x, 0.5));
  drawLine(context, half, 2, half, frame.bottom, { colour: look.colour, dash: [2, 3] });
}

function drawResiduals(
  context: DrawContext,
  frame: Frame,
  scene: FoldScene,
  theme: PlotTheme,
  scratch: FoldScratch,
  curve: ModelCurve | undefined,
  look: CaseLook,
): Frame {
  if (!hasResiduals(scene, frame) || !curve) return frame;
  const { bins } = scratch.work;
  const residual = (i: number) => bins.mean[i]! - curveAt(curve, bins.centre[i]!);
  const lower = residualFrame(frame, bins.count, residual, (i) => bins.points[i]! > 0);
  const ticks = linearTicks(lower.y.domain, 3);
  drawLine(context, frame.left, crisp(frame.bottom + 3), frame.right, crisp(frame.bottom + 3), { colour: theme.line });
  drawGrid(context, lower, ticks, theme);
  const zero = crisp(toPx(lower.y, 0));
  drawLine(context, lower.left, zero, lower.right, zero, { colour: look.colour });
  drawBins(context, lower, bins, theme, { radiusPx: 2.4, rimPx: 0 }, residual);
  drawLeftAxis(context, lower, ticks, theme, 'residual', frame.bottom);
  return lower;
}

function residualFrame(
  frame: Frame,
  count: number,
  residual: (i: number) => number,
  filled: (i: number) => boolean,
): Frame {
  let reach = 0;
  for (let i = 0; i < count; i += 1) if (filled(i)) reach = Math.max(reach, Math.abs(residual(i)));
  const top = frame.bottom + 8;
  return makeFrame({
    widthPx: frame.widthPx,
    heightPx: frame.heightPx,
    margins: { left: frame.left, right: frame.widthPx - frame.right, top, bottom: 38 },
    xDomain: frame.x.domain,
    yDomain: [-reach * 1.3 || -1, reach * 1.3 || 1],
  });
}

function hasResiduals(scene: FoldScene, size: { readonly heightPx: number }): boolean {
  const modelled = scene.curve !== undefined || scene.boxDepthPpm !== undefined;
  return (
    scene.residuals === true &&
    modelled &&
    scene.time.length > 0 &&
    scene.mode === 'event' &&
    size.heightPx >= RESIDUAL_LEAST_PX
  );
}

function residualHeight(heightPx: number): number {
  return Math.round(Math.max(44, (heightPx - 76) / 4));
}

/** The y span that shows the bins and the model well; the cloud of points is cut to it, never the reverse. */
function foldExtent(work: FoldWork, scene: FoldScene): Span {
  const { bins } = work;
  let low = Math.min(0, -(scene.boxDepthPpm ?? 0));
  let high = 0;
  let scatter = 0;
  let filled = 0;
  for (let i = 0; i < bins.count; i += 1) {
    if (bins.points[i]! === 0) continue;
    const error = Number.isFinite(bins.error[i]!) ? bins.error[i]! : 0;
    low = Math.min(low, bins.mean[i]! - error);
    high = Math.max(high, bins.mean[i]! + error);
    scatter += error * Math.sqrt(bins.points[i]!);
    filled += 1;
  }
  if (filled === 0) return [-1, 1];
  const depth = high - low;
  const room = scene.mode === 'full' ? depth * 0.1 : Math.min((2 * scatter) / filled, depth * 0.6) + depth * 0.12;
  return wideSpan(low - room, high + room);
}
