import type { Outcome } from '../../../src/contract/outcome.ts';
import type { SearchSeries } from '../../../src/contract/search-contract.ts';
import {
  DEFAULT_SINGLE_EVENTS,
  type SingleEventsResult,
  type SingleEventsSettings,
} from '../../../src/contract/single-events-contract.ts';
import { findSingleEvents } from '../../../workers/search/singles/find-single-events.ts';
import { seedRandom } from '../../reference/search/seeded-series.ts';
import { expectDone, quietCheckpoint } from '../search-box.ts';

/** Ten minutes. */
export const CADENCE_DAYS = 10 / 1440;
export const SIGMA = 0.001;

export interface Dip {
  readonly timeDays: number;
  readonly durationDays: number;
  readonly depth: number;
  /** 0: a box. */
  readonly ingressDays: number;
}

export const boxDip = (timeDays: number, durationDays: number, depth: number): Dip => ({
  timeDays,
  durationDays,
  depth,
  ingressDays: 0,
});

/** Times at a ten-minute cadence within the given spans, days. */
export function sampleSpans(spans: readonly (readonly [number, number])[]): Float64Array {
  return Float64Array.from(
    spans.flatMap(([from, to]) =>
      Array.from({ length: Math.round((to - from) / CADENCE_DAYS) }, (_, i) => from + i * CADENCE_DAYS),
    ),
  );
}

export interface RedNoise {
  readonly amplitude: number;
  /** Correlation falls to 1/e in so many points: a first-order autoregressive process. */
  readonly points: number;
}

/** White noise of SIGMA, red noise, dips, and whatever else is added to a flux of 1. */
export function makeSeries(
  seed: number,
  time: Float64Array,
  dips: readonly Dip[] = [],
  { red, added }: { readonly red?: RedNoise; readonly added?: (time: number, i: number) => number } = {},
): SearchSeries {
  const random = seedRandom(seed * 7919);
  const memory = red === undefined ? 0 : Math.exp(-1 / red.points);
  let slow = (red?.amplitude ?? 0) * random.normal();
  const flux = time.map((at, i) => {
    slow = memory * slow + (red?.amplitude ?? 0) * Math.sqrt(1 - memory * memory) * random.normal();
    return 1 + slow + SIGMA * random.normal() - depthAt(at, dips) + (added?.(at, i) ?? 0);
  });
  return { seriesId: `${seed}`, time, flux, error: new Float64Array(time.length).fill(SIGMA) };
}

function depthAt(at: number, dips: readonly Dip[]): number {
  return dips.reduce((sum, { timeDays, durationDays, depth, ingressDays }) => {
    const inside = durationDays / 2 - Math.abs(at - timeDays);
    if (inside < 0) return sum;
    return sum + depth * (ingressDays > 0 ? Math.min(1, inside / ingressDays) : 1);
  }, 0);
}

export function tryEvents(
  series: SearchSeries,
  settings: Partial<SingleEventsSettings> = {},
): Promise<Outcome<SingleEventsResult>> {
  return findSingleEvents(series, { key: 'k', settings: { ...DEFAULT_SINGLE_EVENTS, ...settings } }, quietCheckpoint());
}

export async function findEvents(series: SearchSeries, settings: Partial<SingleEventsSettings> = {}) {
  return expectDone(await tryEvents(series, settings)).events;
}
