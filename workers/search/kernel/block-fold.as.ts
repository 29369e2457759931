/**
 * Box search over a block of neighbouring trial frequencies. The series is scattered once, into one phase profile for
 * each short span of time, at the frequency in the middle of the block; a trial of the block is then a sum of shifted
 * profiles, four bins at once. Addresses are bytes; the memory is laid out by the caller. Time and phase are Float64,
 * sums Float32 of weights that add up to one and of mean-subtracted flux of about unit scatter.
 */

/** First address that is free for the caller. */
export function heapBase(): usize {
  return __heap_base;
}

/** Entries of a running sum: one for each bin, and on past the cycle's end for the longest window, thinned or not. */
export function roomOf(bins: i32, longest: i32): i32 {
  return bins + longest + (longest >> 3) + 16;
}

/**
 * Searches all trials of a block.
 *
 * @param shifts of each trial, its frequency less the block's (f64, per day)
 * @param found five values of 4 bytes for each trial: f32 score s^2 / (r (1 - r)), i32 first bin, i32 width, f32 r, f32 s
 */
export function searchBlock(
  time: usize,
  weight: usize,
  weighted: usize,
  heads: usize,
  middles: usize,
  segments: i32,
  profiles: usize,
  stride: usize,
  frequency: f64,
  bins: i32,
  longest: i32,
  widths: usize,
  widthCount: i32,
  fewest: i32,
  leastWeight: f32,
  places: usize,
  sums: usize,
  running: usize,
  thin: usize,
  shifts: usize,
  trials: i32,
  found: usize,
): void {
  scatter(time, weight, weighted, heads, segments, profiles, stride, frequency, bins);
  const room = <usize>roomOf(bins, longest) << 2;
  for (let trial: i32 = 0; trial < trials; trial++) {
    const best = found + <usize>trial * FOUND_BYTES;
    const shift = load<f64>(shifts + (<usize>trial << 3));
    combine(heads, middles, segments, profiles, stride, shift, bins, places, sums, running, longest);
    scan(running, bins, longest, widths, widthCount, fewest, leastWeight, thin, best);
    const start = running + (<usize>load<i32>(best, 4) << 2);
    const end = start + (<usize>load<i32>(best, 8) << 2);
    store<f32>(best, load<f32>(end) - load<f32>(start), 12);
    store<f32>(best, load<f32>(end + room) - load<f32>(start + room), 16);
  }
}

const FOUND_BYTES: usize = 20;

/** Of one profile, as three i32: its first bin in the cycle, how many bins it has, and its first point. */
const HEAD: usize = 12;

/**
 * Scatters the points of every segment into its profile.
 *
 * @param points times (f64, days from the start), weights (f32), weighted flux (f32): three addresses
 * @param heads `count` + 1 heads; the first points are given, the rest is written
 * @param profiles room for `stride` bytes of weights, then as many of weighted flux, for each segment
 */
function scatter(
  time: usize,
  weight: usize,
  weighted: usize,
  heads: usize,
  count: i32,
  profiles: usize,
  stride: usize,
  frequency: f64,
  bins: i32,
): void {
  const perCycle: f64 = <f64>bins;
  for (let k: i32 = 0; k < count; k++) {
    const head = heads + <usize>k * HEAD;
    const first = load<i32>(head, 8);
    const end = load<i32>(head + HEAD, 8);
    const place = profiles + <usize>k * stride * 2;
    const start = load<f64>(time + (<usize>first << 3)) * frequency;
    const last = load<f64>(time + (<usize>(end - 1) << 3)) * frequency;
    const isWhole = last - start >= 1.0 - 2.0 / perCycle;
    const length = isWhole ? bins : <i32>((last - start) * perCycle) + 2;
    memory.fill(place, 0, <usize>(length + 4) << 2);
    memory.fill(place + stride, 0, <usize>(length + 4) << 2);
    if (isWhole) {
      store<i32>(head, 0, 0);
      store<i32>(head, bins, 4);
      for (let i = first; i < end; i++) {
        const cycles = load<f64>(time + (<usize>i << 3)) * frequency;
        let bin = <i32>((cycles - Math.floor(cycles)) * perCycle);
        if (bin >= bins) bin = 0;
        addPoint(place + (<usize>bin << 2), stride, weight + (<usize>i << 2), weighted + (<usize>i << 2));
      }
      // Twice, so that a shifted cycle can be read in one go.
      const cycle = <usize>bins << 2;
      memory.copy(place + cycle, place, cycle);
      memory.copy(place + stride + cycle, place + stride, cycle);
    } else {
      // Shorter than a cycle: its bins are counted on from its first one.
      const origin = <i32>Math.floor(start * perCycle);
      let bin: i32 = 0;
      for (let i = first; i < end; i++) {
        bin = <i32>Math.floor(load<f64>(time + (<usize>i << 3)) * frequency * perCycle) - origin;
        addPoint(place + (<usize>bin << 2), stride, weight + (<usize>i << 2), weighted + (<usize>i << 2));
      }
      store<i32>(head, ((origin % bins) + bins) % bins, 0);
      store<i32>(head, bin + 1, 4);
    }
  }
}

// @ts-ignore: decorator
@inline
function addPoint(place: usize, stride: usize, weight: usize, weighted: usize): void {
  store<f32>(place, load<f32>(place) + load<f32>(weight));
  store<f32>(place + stride, load<f32>(place + stride) + load<f32>(weighted));
}

/**
 * Sums the profiles, each shifted to a trial's frequency, into the bins of one cycle and on into running sums.
 *
 * @param middles times of the segments' middles (f64) @param shift trial frequency less the block's, per day
 * @param places room for an address a segment
 * @param sums room for 2 * bins + 24 weights and as many weighted
 * @param running room for `roomOf` of each: sums before each bin, carried on past the cycle's end
 */
function combine(
  heads: usize,
  middles: usize,
  count: i32,
  profiles: usize,
  stride: usize,
  shift: f64,
  bins: i32,
  places: usize,
  sums: usize,
  running: usize,
  longest: i32,
): void {
  const half = <usize>(2 * bins + 24) << 2;
  const perCycle = <f64>bins;
  let whole: usize = 0;
  for (let k: i32 = 0; k < count; k++) {
    if (load<i32>(heads + <usize>k * HEAD, 4) != bins) continue;
    const back = inCycle(-shift * load<f64>(middles + (<usize>k << 3)), perCycle);
    store<usize>(places + (whole << 2), profiles + <usize>k * stride * 2 + (<usize>back << 2));
    whole++;
  }
  sumWhole(places, whole, stride, bins, sums, half);
  for (let k: i32 = 0; k < count; k++) {
    const head = heads + <usize>k * HEAD;
    const length = load<i32>(head, 4);
    if (length == bins) continue;
    let bin = load<i32>(head) + inCycle(shift * load<f64>(middles + (<usize>k << 3)), perCycle);
    if (bin >= bins) bin -= bins;
    const at = sums + (<usize>bin << 2);
    const profile = profiles + <usize>k * stride * 2;
    addShifted(at, profile, length);
    addShifted(at + half, profile + stride, length);
  }
  runOn(sums, half, running, bins, longest);
}

/** The nearest bin of a shift in cycles; the last and the first are the same. */
// @ts-ignore: decorator
@inline
function inCycle(cycles: f64, perCycle: f64): i32 {
  return <i32>((cycles - floor<f64>(cycles)) * perCycle + 0.5);
}

/** Sixteen bins at a time, all profiles added up in registers; what lies past the cycle is set to zero. */
function sumWhole(places: usize, count: usize, stride: usize, bins: i32, sums: usize, half: usize): void {
  const none = f32x4.splat(0);
  const end = places + (count << 2);
  let bin: i32 = 0;
  for (; count > 0 && bin < bins; bin += 16) {
    const at = <usize>bin << 2;
    let w0 = none, w1 = none, w2 = none, w3 = none;
    let s0 = none, s1 = none, s2 = none, s3 = none;
    for (let p = places; p < end; p += 4) {
      const profile = load<usize>(p) + at;
      const other = profile + stride;
      w0 = f32x4.add(w0, v128.load(profile));
      w1 = f32x4.add(w1, v128.load(profile, 16));
      w2 = f32x4.add(w2, v128.load(profile, 32));
      w3 = f32x4.add(w3, v128.load(profile, 48));
      s0 = f32x4.add(s0, v128.load(other));
      s1 = f32x4.add(s1, v128.load(other, 16));
      s2 = f32x4.add(s2, v128.load(other, 32));
      s3 = f32x4.add(s3, v128.load(other, 48));
    }
    const into = sums + at;
    v128.store(into, w0);
    v128.store(into, w1, 16);
    v128.store(into, w2, 32);
    v128.store(into, w3, 48);
    v128.store(into + half, s0);
    v128.store(into + half, s1, 16);
    v128.store(into + half, s2, 32);
    v128.store(into + half, s3, 48);
  }
  const first = <usize>min<i32>(bin, bins) << 2;
  memory.fill(sums + first, 0, half - first);
  memory.fill(sums + half + first, 0, half - first);
}

// @ts-ignore: decorator
@inline
function addShifted(into: usize, profile: usize, length: i32): void {
  // Profiles end in zeros, so that the last four may be added whole.
  for (let i: i32 = 0; i < length; i += 4) {
    const place = <usize>i << 2;
    v128.store(into + place, f32x4.add(v128.load(into + place), v128.load(profile + place)));
  }
}

/** Both running sums in one loop: each waits for its own last sum, not for the other's. */
function runOn(sums: usize, half: usize, running: usize, bins: i32, longest: i32): void {
  const room = <usize>roomOf(bins, longest) << 2;
  const wrap = <usize>bins << 2;
  let weight: f32 = 0;
  let weighted: f32 = 0;
  for (let i: i32 = 0; i < bins; i++) {
    const place = <usize>i << 2;
    store<f32>(running + place, weight);
    store<f32>(running + place + room, weighted);
    weight += load<f32>(sums + place) + load<f32>(sums + place + wrap);
    weighted += load<f32>(sums + place + half) + load<f32>(sums + place + half + wrap);
  }
  const ahead = roomOf(bins, longest) - bins;
  for (let i: i32 = 0; i < ahead; i++) {
    const place = <usize>i << 2;
    store<f32>(running + place + wrap, weight + load<f32>(running + place));
    store<f32>(running + place + wrap + room, weighted + load<f32>(running + place + room));
  }
}

/**
 * The best window of a set of widths in one cycle of running sums. Long windows are tried on every second, fourth ...
 * start, on thinned running sums.
 *
 * @param widths i32, bins, ascending @param thin room as for the running sums
 * @param best f32 score s^2 / (r (1 - r)), i32 first bin, i32 width: written
 * @param fewest a window thinner than 2 * fewest bins is tried at every start
 */
function scan(
  running: usize,
  bins: i32,
  longest: i32,
  widths: usize,
  count: i32,
  fewest: i32,
  leastWeight: f32,
  thin: usize,
  best: usize,
): void {
  const room = <usize>roomOf(bins, longest) << 2;
  let weights = running;
  let weighted = running + room;
  let level: i32 = 0;
  let starts = bins;
  let score: f32 = 0;
  let start: i32 = 0;
  let width: i32 = 0;
  let length = roomOf(bins, longest);
  const least = f32x4.splat(leastWeight);
  const one = f32x4.splat(1);
  const zero = f32x4.splat(0);
  let highest = f32x4.splat(0);
  for (let d: i32 = 0; d < count; d++) {
    const whole = load<i32>(widths + (<usize>d << 2));
    while (whole >> (level + 1) >= fewest) {
      level++;
      length = (length + 1) >> 1;
      starts = (bins + (1 << level) - 1) >> level;
      const target = level & 1 ? thin : thin + room;
      thinOut(weights, target, length);
      thinOut(weighted, target + (room >> 1), length);
      weights = target;
      weighted = target + (room >> 1);
    }
    const wide = (whole + ((1 << level) >> 1)) >> level;
    const ahead = <usize>wide << 2;
    for (let i: i32 = 0; i < starts; i += 4) {
      const place = <usize>i << 2;
      const s = f32x4.sub(v128.load(weighted + place + ahead), v128.load(weighted + place));
      const r = f32x4.sub(v128.load(weights + place + ahead), v128.load(weights + place));
      // Rises count as nothing, and too thin windows as if they had the least weight: what passes is looked at closely.
      const dip = f32x4.min(s, zero);
      const fair = f32x4.max(r, least);
      const better = f32x4.gt(f32x4.mul(dip, dip), f32x4.mul(f32x4.mul(highest, fair), f32x4.sub(one, fair)));
      if (!v128.any_true(better)) continue;
      for (let lane: i32 = 0; lane < 4; lane++) {
        if (i + lane >= starts) break;
        const at = place + (<usize>lane << 2);
        const sum = load<f32>(weighted + at + ahead) - load<f32>(weighted + at);
        const weight = load<f32>(weights + at + ahead) - load<f32>(weights + at);
        if (sum >= 0 || weight < leastWeight || <f32>1 - weight < leastWeight) continue;
        const value = (sum * sum) / (weight * (<f32>1 - weight));
        if (value <= score) continue;
        score = value;
        start = (i + lane) << level;
        width = wide << level;
        highest = f32x4.splat(value);
      }
    }
  }
  store<f32>(best, score);
  store<i32>(best, start, 4);
  store<i32>(best, width, 8);
}

// @ts-ignore: decorator
@inline
function thinOut(from: usize, to: usize, length: i32): void {
  for (let i: i32 = 0; i < length; i++) store<f32>(to + (<usize>i << 2), load<f32>(from + (<usize>i << 3)));
}
