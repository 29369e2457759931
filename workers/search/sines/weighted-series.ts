/** Below this part of the largest flux, a scatter is rounding error of the flux itself. */
const ROUNDING = 1e-14;

/** A series made ready for sines: times about the middle of the span, weights that add up to one, no mean. */
export interface WeightedSeries {
  /** Days from `middleDays`, ascending, length n. */
  readonly time: Float64Array;
  readonly weight: Float64Array;
  /** Less its weighted mean. */
  readonly flux: Float64Array;
  /** Weighted mean of flux^2; 0 where that is only rounding error. */
  readonly variance: number;
  readonly middleDays: number;
  readonly spanDays: number;
}

/** What is read of a series: days, ascending; flux; its error. */
interface Given {
  readonly time: Float64Array;
  readonly flux: Float64Array;
  readonly error: Float64Array;
}

/** Points without a time, a flux or an error above zero are left out. */
export function weighSeries(given: Given): WeightedSeries {
  const { time, flux, error } = usablePoints(given);
  const first = time[0] ?? 0;
  const last = time.at(-1) ?? 0;
  const middleDays = first + (last - first) / 2;
  const weight = weightsOf(error);
  const largest = takeMean(flux, weight);
  for (let i = 0; i < time.length; i += 1) time[i] = time[i]! - middleDays;
  const variance = varianceOf(flux, weight);
  const isNoise = variance > (ROUNDING * largest) ** 2;
  return { time, weight, flux, variance: isNoise ? variance : 0, middleDays, spanDays: last - first };
}

/** Copies; plain loops, since callbacks of typed arrays cost more than all else here. */
function usablePoints({ time, flux, error }: Given): Given {
  const usable = { time: time.slice(), flux: flux.slice(), error: error.slice() };
  let n = 0;
  for (let i = 0; i < time.length; i += 1) {
    const isUsable = error[i]! > 0 && Number.isFinite(error[i]) && Number.isFinite(time[i]) && Number.isFinite(flux[i]);
    if (!isUsable) continue;
    usable.time[n] = time[i]!;
    usable.flux[n] = flux[i]!;
    usable.error[n] = error[i]!;
    n += 1;
  }
  if (n === time.length) return usable;
  return { time: usable.time.slice(0, n), flux: usable.flux.slice(0, n), error: usable.error.slice(0, n) };
}

/** 1 / error^2, through the smallest error so that no error is too small or too large to square. */
function weightsOf(error: Float64Array): Float64Array {
  let smallest = Number.POSITIVE_INFINITY;
  for (let i = 0; i < error.length; i += 1) if (error[i]! < smallest) smallest = error[i]!;
  const weight = new Float64Array(error.length);
  let total = 0;
  for (let i = 0; i < error.length; i += 1) {
    const ratio = smallest / error[i]!;
    weight[i] = ratio * ratio;
    total += weight[i]!;
  }
  for (let i = 0; i < weight.length; i += 1) weight[i] = weight[i]! / total;
  return weight;
}

/** Takes the weighted mean out of the flux in place. @returns the largest |flux| before */
function takeMean(flux: Float64Array, weight: Float64Array): number {
  const start = flux[0] ?? 0;
  let mean = 0;
  let largest = 0;
  for (let i = 0; i < flux.length; i += 1) {
    mean += weight[i]! * (flux[i]! - start);
    largest = Math.max(largest, Math.abs(flux[i]!));
  }
  for (let i = 0; i < flux.length; i += 1) flux[i] = flux[i]! - start - mean;
  return largest;
}

/** Weighted mean of the squares. */
export function varianceOf(flux: Float64Array, weight: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < flux.length; i += 1) sum += weight[i]! * flux[i]! * flux[i]!;
  return sum;
}

/** Weighted standard deviation of the times, days. */
export function timeScatter({ time, weight }: WeightedSeries): number {
  let mean = 0;
  let square = 0;
  for (let i = 0; i < time.length; i += 1) {
    mean += weight[i]! * time[i]!;
    square += weight[i]! * time[i]! * time[i]!;
  }
  return Math.sqrt(Math.max(0, square - mean * mean));
}
