import { drawGrid, drawLeftAxis, drawMarginScale, yTicks } from './axis.ts';
import { caseLook, drawCaseShape } from './case-shape.ts';
import { drawRing } from './cursor-layer.ts';
import type { DrawContext } from './draw-context.ts';
import { crisp, drawLine } from './draw-line.ts';
import { drawHaloText, drawTitle, symbolFont, uiFont } from './draw-text.ts';
import { type Frame, GUTTER_PX, makeFrame, RIGHT_PX } from './frame.ts';
import { drawPeriodogram } from './periodogram-layer.ts';
import { toPx } from './scale.ts';
import type { Span } from './span.ts';
import type { SceneBasis } from './surface/mount-plot.ts';
import type { SurfaceSize } from './surface/plot-surface.ts';
import type { PlotTheme } from './theme.ts';
import { logTicks } from './ticks.ts';

export interface PeriodogramPeak {
  readonly periodDays: number;
  readonly value: number;
  readonly label: string;
  /** Undefined: not claimed by a case, drawn hollow. */
  readonly caseNumber?: number | undefined;
}

/** A period that follows from another: "P/2", "2P". */
export interface PeriodogramAlias {
  readonly periodDays: number;
  readonly label: string;
  readonly caseNumber: number | undefined;
}

export interface PeriodogramScene extends SceneBasis {
  /** Days, ascending, length n. */
  readonly periods: Float64Array;
  readonly values: Float64Array;
  readonly yTitle: string;
  readonly xTitle?: string | undefined;
  readonly peaks: readonly PeriodogramPeak[];
  readonly aliases?: readonly PeriodogramAlias[] | undefined;
  readonly selectedPeriodDays?: number | undefined;
  /** A value and its meaning in words. */
  readonly threshold?: { readonly value: number; readonly label: string } | undefined;
  /** What a double click shows; undefined: all periods. */
  readonly view?: Span | undefined;
}

const TALL_PX = 230;
const PEAK_TOP_PX = 24;

/** Both arrays the other way round where a search walked from long to short. */
export function ascendingPeriods(
  periods: Float64Array,
  values: Float64Array,
): { periods: Float64Array; values: Float64Array } {
  if (periods.length < 2 || periods[0]! <= periods[periods.length - 1]!) return { periods, values };
  return { periods: periods.toReversed(), values: values.toReversed() };
}

export function wholePeriodSpan(scene: PeriodogramScene): Span {
  if (scene.view) return scene.view;
  const { periods } = scene;
  const first = periods[0];
  const last = periods[periods.length - 1];
  return first !== undefined && last !== undefined && last > first ? [first, last] : [0.5, 40];
}

export function periodogramFrame(scene: PeriodogramScene, view: Span, size: SurfaceSize): Frame {
  let high = scene.threshold?.value ?? 0;
  let low = 0;
  for (const value of scene.values) {
    if (value > high) high = value;
    if (value < low) low = value;
  }
  const titled = scene.xTitle !== undefined && size.heightPx >= TALL_PX;
  return makeFrame({
    ...size,
    margins: { left: GUTTER_PX, right: RIGHT_PX, top: PEAK_TOP_PX, bottom: titled ? 38 : 22 },
    xDomain: view,
    // Negative values of noise need no room of their own: a tenth of the height at most.
    yDomain: [Math.max(low, -high * 0.1), high > 0 ? high : 1],
    xKind: 'log',
  });
}

export function drawPeriodogramBase(
  context: DrawContext,
  frame: Frame,
  scene: PeriodogramScene,
  theme: PlotTheme,
): void {
  const ticks = yTicks(frame, scene.periods.length === 0);
  drawGrid(context, frame, ticks, theme);
  drawPeriodogram(context, frame, scene.periods, scene.values, theme);
  if (scene.threshold && scene.periods.length > 0) drawThreshold(context, frame, scene.threshold, theme);
  drawLeftAxis(context, frame, ticks, theme, scene.yTitle);
  drawMarginScale(context, frame, logTicks(frame.x.domain, Math.floor((frame.right - frame.left) / 70)), theme);
  if (scene.xTitle !== undefined && frame.heightPx - frame.bottom > 30) {
    drawTitle(context, theme, scene.xTitle, (frame.left + frame.right) / 2, frame.heightPx - 9);
  }
}

function drawThreshold(
  context: DrawContext,
  frame: Frame,
  threshold: { value: number; label: string },
  theme: PlotTheme,
): void {
  const y = crisp(toPx(frame.y, threshold.value));
  drawLine(context, frame.left, y, frame.right, y, { colour: theme.flame, dash: [6, 4] });
  drawHaloText(context, theme, threshold.label, frame.left + 10, y - 9, { colour: theme.flame, font: uiFont(theme) });
}

/** Boxes that labels must not touch. */
interface Taken {
  readonly left: number;
  readonly right: number;
  readonly y: number;
}

/** Aliases, then peaks from the strongest down; a label that would touch a shape or an earlier label is left out. */
export function drawPeaks(
  context: DrawContext,
  frame: Frame,
  scene: PeriodogramScene,
  highlightedPeriodDays: number | undefined,
  theme: PlotTheme,
): void {
  const chosen = (peak: PeriodogramPeak) => samePeriod(peak.periodDays, scene.selectedPeriodDays);
  const peaks = scene.peaks
    .filter((peak) => seen(frame, peak.periodDays))
    .sort((a, b) => Number(chosen(b)) - Number(chosen(a)) || b.value - a.value);
  const aliases = (scene.aliases ?? []).filter((alias) => seen(frame, alias.periodDays));
  for (const alias of aliases) drawAlias(context, frame, alias, theme);
  for (const peak of peaks.toReversed()) drawPeak(context, frame, peak, chosen(peak), theme);
  const picked = scene.periods.length > 0 && !peaks.some(chosen);
  if (scene.selectedPeriodDays !== undefined && picked) drawPicked(context, frame, scene.selectedPeriodDays, theme);
  const taken: Taken[] = peaks.map((peak) => around(toPx(frame.x, peak.periodDays), 7, peakY(frame, peak)));
  for (const alias of aliases) taken.push(around(toPx(frame.x, alias.periodDays), 5, aliasY(frame)));
  for (const peak of peaks) labelPeak(context, frame, peak, chosen(peak), theme, taken);
  for (const alias of aliases) labelAlias(context, frame, alias, theme, taken);
  const lit = peaks.find((peak) => samePeriod(peak.periodDays, highlightedPeriodDays));
  if (lit) drawRing(context, theme, toPx(frame.x, lit.periodDays), peakY(frame, lit), 8);
}

function around(x: number, half: number, y: number): Taken {
  return { left: x - half, right: x + half, y };
}

function isFree(place: Taken, taken: readonly Taken[]): boolean {
  return !taken.some(
    (other) => Math.abs(other.y - place.y) < 10.5 && place.left < other.right && place.right > other.left,
  );
}

/** Equal as far as two readings of one peak are: a part in a million. */
export function samePeriod(a: number, b: number | undefined): boolean {
  return b !== undefined && Math.abs(a - b) <= 1e-6 * Math.abs(b);
}

function seen(frame: Frame, periodDays: number): boolean {
  return periodDays >= frame.x.domain[0] && periodDays <= frame.x.domain[1];
}

function peakY(frame: Frame, peak: PeriodogramPeak): number {
  return Math.max(12, toPx(frame.y, peak.value) - 9);
}

function drawPeak(context: DrawContext, frame: Frame, peak: PeriodogramPeak, chosen: boolean, theme: PlotTheme): void {
  const look = caseLook(peak.caseNumber, theme);
  const x = toPx(frame.x, peak.periodDays);
  const y = peakY(frame, peak);
  const claimed = peak.caseNumber !== undefined;
  if (claimed || chosen)
    drawLine(context, crisp(x), y, crisp(x), frame.bottom, { colour: look.colour, dash: look.dash });
  drawCaseShape(context, theme, look, x, y, claimed ? 4 : 2.8);
  if (chosen) drawRing(context, theme, x, y, 7.5);
}

/** Right of its shape, else left of it, else over it. */
function labelPeak(
  context: DrawContext,
  frame: Frame,
  peak: PeriodogramPeak,
  chosen: boolean,
  theme: PlotTheme,
  taken: Taken[],
): void {
  const font = uiFont(theme, 12, chosen ? 600 : 400);
  context.font = font;
  const half = context.measureText(peak.label).width / 2;
  const x = toPx(frame.x, peak.periodDays);
  const y = peakY(frame, peak);
  const places = [around(x + 10 + half, half, y), around(x - 10 - half, half, y), around(x, half, y - 14)];
  const fits = (place: Taken) => place.left > frame.left + 2 && place.right < frame.widthPx - 2 && place.y > 7;
  const place = places.find((candidate) => fits(candidate) && isFree(candidate, taken));
  if (!place) return;
  taken.push(place);
  drawHaloText(context, theme, peak.label, place.left, place.y, { colour: chosen ? theme.ink : theme.ink2, font });
}

const ALIAS_HEIGHT = 0.45;

function aliasY(frame: Frame): number {
  return frame.bottom - (frame.bottom - frame.top) * ALIAS_HEIGHT;
}

/** Aliases stand hollow at one height: they are derived, not measured. */
function drawAlias(context: DrawContext, frame: Frame, alias: PeriodogramAlias, theme: PlotTheme): void {
  const look = caseLook(alias.caseNumber, theme);
  const x = toPx(frame.x, alias.periodDays);
  drawLine(context, crisp(x), aliasY(frame), crisp(x), frame.bottom, { colour: look.colour, dash: [2, 3] });
  drawCaseShape(context, theme, look, x, aliasY(frame), 2.8, true);
}

function labelAlias(
  context: DrawContext,
  frame: Frame,
  alias: PeriodogramAlias,
  theme: PlotTheme,
  taken: Taken[],
): void {
  const x = toPx(frame.x, alias.periodDays);
  const place = around(x, 12, aliasY(frame) - 11);
  if (!isFree(place, taken)) return;
  taken.push(place);
  drawHaloText(context, theme, alias.label, x, place.y, {
    colour: theme.ink2,
    font: symbolFont(theme),
    align: 'center',
  });
}

/** A period picked off the peaks. */
function drawPicked(context: DrawContext, frame: Frame, periodDays: number, theme: PlotTheme): void {
  if (!seen(frame, periodDays)) return;
  const x = crisp(toPx(frame.x, periodDays));
  drawLine(context, x, frame.top, x, frame.bottom, { colour: theme.flame, dash: [2, 3] });
}
