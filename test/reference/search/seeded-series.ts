import type { SearchSeries } from '../../../src/contract/search-contract.ts';
import { createLehmerStates } from '../../demo/lehmer.mjs';

/** What `record-box-least-squares.py` makes a series from. */
export interface SeriesSpec {
  readonly seed: number;
  readonly kind: string;
  readonly points: number;
  readonly span?: number | undefined;
  readonly nights?: number | undefined;
  readonly every?: number | undefined;
  /** Errors are drawn between these. */
  readonly low: number;
  readonly high: number;
  readonly period: number;
  readonly epoch: number;
  readonly duration: number;
  readonly depth: number;
}

export interface SeededRandom {
  uniform(): number;
  normal(): number;
}

/** Park & Miller (1988) with Box & Muller (1958), as in the recording script: no first numbers are thrown away. */
export function seedRandom(seed: number): SeededRandom {
  const next = createLehmerStates(seed);
  const uniform = (): number => next() / 2147483647;
  return {
    uniform,
    normal: () => {
      const radius = Math.sqrt(-2 * Math.log(uniform()));
      return radius * Math.cos(2 * Math.PI * uniform());
    },
  };
}

/** The series of the recording script, number for number. */
export function makeSeededSeries(spec: SeriesSpec): SearchSeries {
  const random = seedRandom(spec.seed);
  const time = timesOf(spec, random);
  const flux = new Float64Array(time.length);
  const error = new Float64Array(time.length);
  for (let i = 0; i < time.length; i += 1) {
    error[i] = spec.low + (spec.high > spec.low ? (spec.high - spec.low) * random.uniform() : 0);
    flux[i] = 1 - dipAt(time[i]!, spec) + error[i]! * random.normal();
  }
  return { seriesId: `seed ${spec.seed}`, time, flux, error };
}

function timesOf({ kind, points, span = 0, nights = 1, every = 0 }: SeriesSpec, random: SeededRandom): Float64Array {
  if (kind === 'even') return Float64Array.from({ length: points }, (_, i) => i / 48);
  const each = Math.floor(points / nights);
  const at = (i: number): number =>
    kind === 'uniform' ? span * random.uniform() : every * Math.floor(i / each) + 0.33 * random.uniform();
  return Float64Array.from({ length: points }, (_, i) => at(i)).sort();
}

function dipAt(time: number, { period, epoch, duration, depth }: SeriesSpec): number {
  const cycles = (time - epoch) / period;
  const x = (cycles - Math.floor(cycles + 0.5)) * period;
  return Math.abs(x) <= duration / 2 ? depth : 0;
}
