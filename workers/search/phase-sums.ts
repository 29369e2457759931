/** Cells of the time lookup in a median cadence: the finer, the seldomer a search has to step on. */
const CELLS_PER_CADENCE = 4;
const MOST_CELLS_PER_POINT = 16;
const MOST_STEPS_SAMPLED = 500;
/** One looked-up edge costs about this part of a scattered point. */
const EDGE_COST = 0.7;
/**
 * Points in one call. Short calls are compiled whole; in a long loop V8 swaps code half way, which now and then stays
 * several times slower.
 */
const POINTS_PER_CALL = 1024;

/** A weighted series and its running sums in time, from which it is summed by phase for any period. */
export interface PhaseSums {
  /** Days after the first point, length n + 1; the last is infinite. */
  readonly elapsed: Float64Array;
  /** Length n. */
  readonly weight: Float64Array;
  readonly weighted: Float64Array;
  /** Sums of weight and weighted values before each point, interleaved, length 2 (n + 1). */
  readonly before: Float64Array;
  /** Index of the first point at or after the start of each cell of time. */
  readonly lookup: Int32Array;
  readonly cellsPerDay: number;
  /** The result: sums before each phase bin, interleaved; grown when a period needs more bins. */
  sums: Float64Array;
}

/** @param time days, ascending, length n; @param weight, weighted length n */
export function makePhaseSums(time: Float64Array, weight: Float64Array, weighted: Float64Array): PhaseSums {
  const n = time.length;
  const elapsed = new Float64Array(n + 1).fill(Number.POSITIVE_INFINITY);
  const before = new Float64Array(2 * (n + 1));
  for (let i = 0; i < n; i += 1) {
    elapsed[i] = time[i]! - time[0]!;
    before[2 * i + 2] = before[2 * i]! + weight[i]!;
    before[2 * i + 3] = before[2 * i + 1]! + weighted[i]!;
  }
  return { elapsed, weight, weighted, before, ...makeLookup(elapsed, n), sums: new Float64Array(0) };
}

function makeLookup(elapsed: Float64Array, n: number): Pick<PhaseSums, 'lookup' | 'cellsPerDay'> {
  const span = elapsed[n - 1] ?? 0;
  const cadence = typicalStep(elapsed, n);
  const wanted = cadence > 0 ? (CELLS_PER_CADENCE * span) / cadence : 1;
  const cells = Math.max(1, Math.ceil(Math.min(wanted, MOST_CELLS_PER_POINT * n)));
  const cellsPerDay = span > 0 ? cells / span : 0;
  const lookup = new Int32Array(cells + 2);
  for (let cell = 0, i = 0; cell < lookup.length; cell += 1) {
    // A hair early: an edge that rounds into this cell must not start beyond its point.
    while (i < n && elapsed[i]! * cellsPerDay < cell - 1e-6) i += 1;
    lookup[cell] = i;
  }
  return { lookup, cellsPerDay };
}

/** Median of a few hundred steps from all over the series. */
function typicalStep(elapsed: Float64Array, n: number): number {
  const stride = Math.max(1, Math.floor(n / MOST_STEPS_SAMPLED));
  const steps: number[] = [];
  for (let i = 1; i < n; i += stride) steps.push(elapsed[i]! - elapsed[i - 1]!);
  return steps.sort((a, b) => a - b)[steps.length >> 1] ?? 0;
}

/**
 * Sums of weight and of weighted values before each of `bins` equal phase bins (phase 0 at the first point), and on
 * past the period's end for another `longest` bins, so that windows may wrap. Only differences of sums mean anything.
 * Dense series are read off the running sums at each bin's edge in each cycle; thin ones are scattered by point.
 */
export function sumByPhase(work: PhaseSums, periodDays: number, bins: number, longest: number): void {
  const places = 2 * (bins + longest + 2);
  if (work.sums.length < places) work.sums = new Float64Array(places);
  const n = work.weight.length;
  const span = work.elapsed[n - 1]!;
  if ((span / periodDays) * bins * EDGE_COST < n) sumByEdges(work, periodDays, bins, span);
  else sumByPoints(work, 1 / periodDays, bins);
  carryOn(work, bins, longest);
}

function sumByEdges(work: PhaseSums, periodDays: number, bins: number, span: number): void {
  const { sums, before } = work;
  const width = periodDays / bins;
  const allWeight = before.at(-2)!;
  const allWeighted = before.at(-1)!;
  sums.fill(0, 0, 2 * bins);
  for (let cycle = 0; cycle * periodDays <= span; cycle += 1) {
    const start = cycle * periodDays;
    const covered = Math.min(bins, Math.floor((span - start) / width) + 1);
    addEdges(work.elapsed, before, work.lookup, work.cellsPerDay, sums, start, width, covered);
    // Edges after the last point have everything before them.
    for (let place = 2 * covered; place < 2 * bins; place += 2) {
      sums[place] = sums[place]! + allWeight;
      sums[place + 1] = sums[place + 1]! + allWeighted;
    }
  }
}

function addEdges(
  elapsed: Float64Array,
  before: Float64Array,
  lookup: Int32Array,
  cellsPerDay: number,
  sums: Float64Array,
  start: number,
  width: number,
  count: number,
): void {
  for (let bin = 0; bin < count; bin += 1) {
    const edge = start + bin * width;
    let i = lookup[(edge * cellsPerDay) | 0]!;
    while (elapsed[i]! < edge) i += 1;
    const place = bin << 1;
    const from = i << 1;
    sums[place] = sums[place]! + before[from]!;
    sums[place + 1] = sums[place + 1]! + before[from + 1]!;
  }
}

function sumByPoints({ elapsed, weight, weighted, sums }: PhaseSums, frequency: number, bins: number): void {
  sums.fill(0, 0, 2 * bins + 4);
  const n = weight.length;
  for (let first = 0; first < n; first += POINTS_PER_CALL)
    addPoints(elapsed, weight, weighted, sums, frequency, bins, first, Math.min(n, first + POINTS_PER_CALL));
  // A phase that rounds up to 1 belongs to the first bin.
  const over = 2 * (bins + 1);
  sums[2] = sums[2]! + sums[over]!;
  sums[3] = sums[3]! + sums[over + 1]!;
  for (let place = 2; place <= 2 * bins; place += 2) {
    sums[place] = sums[place]! + sums[place - 2]!;
    sums[place + 1] = sums[place + 1]! + sums[place - 1]!;
  }
}

function addPoints(
  elapsed: Float64Array,
  weight: Float64Array,
  weighted: Float64Array,
  sums: Float64Array,
  frequency: number,
  bins: number,
  first: number,
  end: number,
): void {
  let last = 2;
  let weightHere = 0;
  let weightedHere = 0;
  for (let i = first; i < end; i += 1) {
    const cycles = elapsed[i]! * frequency;
    // Bins are stored one place late: place 0 stays empty for the running sums.
    const place = ((((cycles - Math.floor(cycles)) * bins) | 0) + 1) << 1;
    // A point that follows into the same bin waits in registers: storing and reloading at once would stall.
    if (place !== last) {
      sums[last] = sums[last]! + weightHere;
      sums[last + 1] = sums[last + 1]! + weightedHere;
      weightHere = 0;
      weightedHere = 0;
      last = place;
    }
    weightHere += weight[i]!;
    weightedHere += weighted[i]!;
  }
  sums[last] = sums[last]! + weightHere;
  sums[last + 1] = sums[last + 1]! + weightedHere;
}

function carryOn({ sums, before }: PhaseSums, bins: number, longest: number): void {
  const end = 2 * bins;
  const weight = before.at(-2)!;
  const weighted = before.at(-1)!;
  for (let place = 0; place <= 2 * longest; place += 2) {
    sums[end + place] = weight + sums[place]!;
    sums[end + place + 1] = weighted + sums[place + 1]!;
  }
}
