import { type Bins, binMinutesFor, binPoints, makeBins } from './bin-points.ts';
import { foldHours, foldPhases } from './fold-points.ts';
import type { FoldScene, HandEphemeris } from './fold-scene.ts';
import type { Span } from './span.ts';

const MOST_BINS = 400;
const PHASE_BINS = 150;

/** The fold of one plot in arrays kept between frames, so that a drag allocates nothing. */
export interface FoldWork {
  /** Hours from mid-event, or phase, of each point. */
  x: Float64Array;
  readonly bins: Bins;
  /** Points inside the x span. */
  inside: number;
  key: readonly unknown[];
}

export function makeFoldWork(): FoldWork {
  return { x: new Float64Array(0), bins: makeBins(MOST_BINS), inside: 0, key: [] };
}

/** Hours either side of mid-event in event mode, -0.25 to 0.75 cycles in full mode. */
export function foldSpan(scene: FoldScene, ephemeris: HandEphemeris): Span {
  if (scene.mode === 'full') return [-0.25, 0.75];
  const half = Math.min(scene.halfWidthHours, ephemeris.periodDays * 12);
  return [-half, half];
}

/** Folds and bins anew only when an input differs from the last call's. */
export function updateFold(work: FoldWork, scene: FoldScene, ephemeris: HandEphemeris, span: Span): void {
  const { time, flux, mode } = scene;
  const count = binCount(scene, ephemeris);
  const key = [time, flux, mode, ephemeris.periodDays, ephemeris.epochDays, span[0], span[1], count];
  if (key.length === work.key.length && key.every((item, i) => Object.is(item, work.key[i]))) return;
  work.key = key;
  if (work.x.length !== time.length) work.x = new Float64Array(time.length);
  const fold = mode === 'full' ? foldPhases : foldHours;
  fold(time, ephemeris.periodDays, ephemeris.epochDays, work.x);
  binPoints(work.x, flux, span[0], span[1], count, work.bins);
  work.inside = 0;
  for (let bin = 0; bin < work.bins.count; bin += 1) work.inside += work.bins.points[bin]!;
}

function binCount(scene: FoldScene, ephemeris: HandEphemeris): number {
  if (scene.mode === 'full') return PHASE_BINS;
  const minutes = scene.binMinutes ?? binMinutesFor(ephemeris.durationDays, scene.halfWidthHours);
  const [first, last] = foldSpan(scene, ephemeris);
  return Math.max(1, Math.min(MOST_BINS, Math.round(((last - first) * 60) / minutes)));
}
