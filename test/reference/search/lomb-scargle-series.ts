import { type SeededRandom, seedRandom } from './seeded-series.ts';

/** What `record-lomb-scargle.py` makes a series from. */
export interface SineSpec {
  readonly name: string;
  readonly seed: number;
  readonly kind: string;
  readonly points: number;
  readonly span?: number | undefined;
  readonly gap?: number | undefined;
  readonly nights?: number | undefined;
  readonly every?: number | undefined;
  /** Errors are drawn between these. */
  readonly low: number;
  readonly high: number;
  readonly period: number;
  readonly amplitude: number;
  readonly step: number;
  readonly count: number;
}

/** The series of the recording script, number for number. */
export function makeSineSeries(spec: SineSpec) {
  const random = seedRandom(spec.seed);
  const time = timesOf(spec, random);
  const flux = new Float64Array(time.length);
  const error = new Float64Array(time.length);
  for (let i = 0; i < time.length; i += 1) {
    error[i] = spec.low + (spec.high > spec.low ? (spec.high - spec.low) * random.uniform() : 0);
    const wave = spec.amplitude * Math.cos((2 * Math.PI * time[i]!) / spec.period);
    flux[i] = 1 + wave + error[i]! * random.normal();
  }
  return { seriesId: spec.name, time, flux, error };
}

function timesOf(spec: SineSpec, random: SeededRandom): Float64Array {
  const { kind, points, span = 0, gap = 0, nights = 1, every = 0 } = spec;
  const length = points;
  if (kind === 'even') return Float64Array.from({ length }, (_, i) => i / 48);
  if (kind === 'gap') return Float64Array.from({ length }, (_, i) => i / 48 + (2 * i >= points ? gap : 0));
  if (kind === 'uniform') return Float64Array.from({ length }, () => span * random.uniform()).sort();
  const each = Math.floor(points / nights);
  return Float64Array.from({ length }, (_, i) => every * Math.floor(i / each) + 0.33 * random.uniform()).sort();
}
