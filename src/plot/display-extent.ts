import { type Span, wideSpan } from './span.ts';

const BINS = 2048;
/** Fewer points than this under everything else cannot squeeze the plot: they are drawn on its lower edge. */
const STRAY_LOW = 3;
const STRAY_HIGH_FRACTION = 0.0005;
/** While nothing lies further out than this there are no strays to look for. */
const NEAR_SIGMAS = 6;

/**
 * The y span that shows a series for judging dips: everything downwards but a few strays, upwards all but the
 * highest two thousandth part (flares and cosmic rays), with a margin of 6 %. NaN are passed over.
 *
 * @param values length n; only `from` (included) to `to` (not) are looked at
 */
export function displayExtent(values: Float64Array, from: number, to: number): Span {
  const { low, high, count, mean, sigma } = roughLook(values, from, to);
  if (count === 0) return [-1, 1];
  const unsuspected = count < 200 || (high - mean < NEAR_SIGMAS * sigma && mean - low < NEAR_SIGMAS * sigma);
  const core = unsuspected ? { low, high } : trimmed(values, from, to, low, high, count);
  const margin = (core.high - core.low) * 0.06;
  return wideSpan(core.low - margin, core.high + margin);
}

/** One pass; sums are taken from the first value so that a large mean costs no digits. */
function roughLook(values: Float64Array, from: number, to: number) {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  let count = 0;
  let sum = 0;
  let squares = 0;
  const origin = values[from] || 0;
  for (let i = from; i < to; i += 1) {
    const value = values[i]!;
    if (Number.isNaN(value)) continue;
    if (value < low) low = value;
    if (value > high) high = value;
    count += 1;
    sum += value - origin;
    squares += (value - origin) * (value - origin);
  }
  const shift = sum / count;
  return { low, high, count, mean: origin + shift, sigma: Math.sqrt(Math.max(0, squares / count - shift * shift)) };
}

/** Cuts strays by a histogram that is refined once, so that one far point cannot hide the rest in one bin. */
function trimmed(values: Float64Array, from: number, to: number, low: number, high: number, count: number) {
  const highStrays = Math.floor(count * STRAY_HIGH_FRACTION);
  let edge = { low, high };
  for (let pass = 0; pass < 2; pass += 1) edge = cut(values, from, to, edge.low, edge.high, highStrays);
  // Strays that lie close to the rest are no strays: showing them costs little.
  const width = edge.high - edge.low;
  return {
    low: edge.low - low < width * 0.5 ? low : edge.low,
    high: high - edge.high < width * 0.25 ? high : edge.high,
  };
}

function cut(values: Float64Array, from: number, to: number, low: number, high: number, highStrays: number) {
  const counts = new Uint32Array(BINS);
  const perBin = BINS / (high - low || 1);
  for (let i = from; i < to; i += 1) {
    const bin = Math.floor((values[i]! - low) * perBin);
    if (bin >= 0) counts[Math.min(bin, BINS - 1)]! += 1;
    else if (bin < 0) counts[0]! += 1;
  }
  let first = 0;
  for (let seen = counts[0]!; seen <= STRAY_LOW && first < BINS - 1; first += 1) seen += counts[first + 1]!;
  let last = BINS - 1;
  for (let seen = counts[last]!; seen <= highStrays && last > first; last -= 1) seen += counts[last - 1]!;
  return { low: low + first / perBin, high: low + (last + 1) / perBin };
}
