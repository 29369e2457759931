import { describe, expect, it } from 'vitest';
import type { SearchSeries } from '../../../src/contract/search-contract.ts';
import { createCheckpoint } from '../../../workers/checkpoint.ts';
import { findPeriodsFromTimes } from '../../../workers/search/singles/find-periods-from-times.ts';
import { expectDone, quietCheckpoint } from '../search-box.ts';
import { boxDip, makeSeries, SIGMA, sampleSpans } from './single-series.ts';

const DURATION = 0.3;

interface Asked {
  readonly durationDays?: number;
  readonly shortestPeriodDays?: number;
  readonly timingVariationDays?: number;
  readonly errorDays?: number;
}

function askFor(series: SearchSeries, times: readonly number[], asked: Asked = {}, checkpoint = quietCheckpoint()) {
  const { errorDays = 0.003, ...rest } = asked;
  const job = { durationDays: DURATION, shortestPeriodDays: undefined, timingVariationDays: 0, ...rest };
  const marked = times.map((timeDays) => ({ timeDays, errorDays }));
  return findPeriodsFromTimes(series, { key: 'k', times: marked, ...job }, checkpoint);
}

async function periodsOf(series: SearchSeries, times: readonly number[], asked: Asked = {}): Promise<number[]> {
  const { candidates } = expectDone(await askFor(series, times, asked));
  return candidates.map(({ periodDays }) => periodDays);
}

const dipsAt = (times: readonly number[], depth = 0.005) => times.map((time) => boxDip(time, DURATION, depth));
const rounded = (values: readonly number[]) => values.map((value) => Math.round(value * 1000) / 1000);

/** The answer by counting: 1/n of the distance, down to three durations, with no other event among the data. */
function unseenPeriods(first: number, last: number, spans: readonly (readonly [number, number])[]): number[] {
  const periods: number[] = [];
  for (let n = 1; (last - first) / n > 3 * DURATION; n += 1) {
    const period = (last - first) / n;
    const isSeen = spans.some(([from, to]) => {
      for (let k = Math.ceil((from - first) / period); first + k * period < to; k += 1)
        if (k !== 0 && k !== n) return true;
      return false;
    });
    if (!isSeen) periods.push(period);
  }
  return periods;
}

describe('two transits', () => {
  it('leave one period where everything between them is observed', async () => {
    const series = makeSeries(1, sampleSpans([[0, 60]]), dipsAt([10, 50]));
    const { candidates, considered, depth, key } = expectDone(await askFor(series, [50, 10]));
    expect(key).toBe('k');
    // 40 d / n down to three durations.
    expect(considered).toBe(44);
    expect(depth).toBeCloseTo(0.005, 3);
    expect(candidates).toHaveLength(1);
    const [only] = candidates;
    expect(only!.periodDays).toBeCloseTo(40, 9);
    expect(only!.epochDays).toBeCloseTo(10, 9);
    // Two times of one error each, one cycle apart.
    expect(only!.periodErrorDays).toBeCloseTo(0.003 * Math.SQRT2, 9);
    expect(only!.weight).toBeGreaterThan(0.99);
    expect(only!).toMatchObject({ deltaChiSquare: 0, eventsPredicted: 2, eventsWithData: 2 });
  });

  it('leave exactly the periods that hide in the gap between two stretches of data', async () => {
    const spans = [
      [0, 27],
      [700, 727],
    ] as const;
    const found = expectDone(await askFor(makeSeries(2, sampleSpans(spans), dipsAt([10, 710])), [10, 710]));
    const expected = unseenPeriods(10, 710, spans).sort((a, b) => a - b);
    // Kipping (2018): the prior alone orders them, and the lightest are under 1 % of the heaviest.
    const heavy = expected.filter((period) => (period / expected[0]!) ** (-5 / 3) > 0.01);
    expect(heavy.length).toBeGreaterThan(30);
    expect(rounded(found.candidates.map(({ periodDays }) => periodDays))).toEqual(rounded(heavy));
    const [first, second] = found.candidates;
    expect(second!.weight / first!.weight).toBeCloseTo((second!.periodDays / first!.periodDays) ** (-5 / 3), 6);
  });

  it('leave two where one event of the shorter period falls in a gap', async () => {
    const time = sampleSpans([
      [0, 25],
      [35, 60],
    ]);
    const { candidates } = expectDone(await askFor(makeSeries(3, time, dipsAt([10, 50])), [10, 50]));
    expect(rounded(candidates.map(({ periodDays }) => periodDays))).toEqual([20, 40]);
    expect(candidates[0]).toMatchObject({ eventsPredicted: 3, eventsWithData: 2 });
    const ratio = 2 ** (-5 / 3);
    expect(candidates[1]!.weight).toBeCloseTo(ratio / (1 + ratio), 4);
  });

  it('are helped by dips that were not marked', async () => {
    const all = [0, 10, 20, 30, 40, 50];
    const { candidates } = expectDone(await askFor(makeSeries(4, sampleSpans([[0, 60]]), dipsAt(all)), [10, 50]));
    expect(rounded(candidates.map(({ periodDays }) => periodDays))).toEqual([10]);
    expect(candidates[0]!.deltaChiSquare).toBeLessThan(-30);
    // The seventh falls on the end of the series, where half of it is seen to be absent or is not seen at all.
    expect(candidates[0]!.eventsPredicted).toBe(7);
  });

  it('count one absent event for a factor of 10,000 at most, so that one bad night does not decide alone', async () => {
    // The event at 30 is missing from data that look good; a thousand times deeper makes no difference.
    const time = sampleSpans([
      [5, 15],
      [25, 35],
      [45, 55],
    ]);
    for (const depth of [0.01, 0.3]) {
      const series = makeSeries(5, time, dipsAt([10, 50], depth));
      const { candidates } = expectDone(await askFor(series, [10, 50], { shortestPeriodDays: 20 }));
      expect(rounded(candidates.map(({ periodDays }) => periodDays))).toEqual([40]);
      const odds = (1 - candidates[0]!.weight) / candidates[0]!.weight;
      expect(odds).toBeCloseTo(1e-4 * 2 ** (5 / 3), 5);
    }
  });

  it('rule out less where the events are shallow', async () => {
    const weightOfShorter = async (depth: number): Promise<number> => {
      let sum = 0;
      for (let seed = 30; seed < 36; seed += 1) {
        const series = makeSeries(seed, sampleSpans([[0, 60]]), dipsAt([10, 50], depth));
        const { candidates } = expectDone(await askFor(series, [10, 50], { shortestPeriodDays: 19 }));
        sum += 1 - candidates.find(({ periodDays }) => periodDays > 30)!.weight;
      }
      return sum / 6;
    };
    // Four sigma an event: exp(-16/2) on average, times what the noise makes of it; the cap of 1e-4 for deep ones.
    expect(await weightOfShorter(0.0007)).toBeGreaterThan(10 * (await weightOfShorter(0.005)));
  });

  it('weigh less in red noise, where an absent event could be hidden by it', async () => {
    const red = { amplitude: 0.0015, points: 40 };
    const time = sampleSpans([[0, 60]]);
    const quiet = makeSeries(7, time, dipsAt([10, 50], 0.002));
    const restless = makeSeries(7, time, dipsAt([10, 50], 0.002), { red });
    const objection = async (series: SearchSeries): Promise<number> => {
      const outcome = expectDone(await askFor(series, [10, 50], { shortestPeriodDays: 19 }));
      return -2 * Math.log(1 / outcome.candidates.find(({ periodDays }) => periodDays > 30)!.weight - 1);
    };
    expect(await objection(restless)).toBeLessThan((await objection(quiet)) / 2);
  });
});

describe('three transits', () => {
  const time = sampleSpans([
    [0, 25],
    [35, 60],
    [200, 220],
  ]);

  it('leave only periods that fit all of them', async () => {
    const series = makeSeries(8, time, dipsAt([10, 50, 210]));
    expect(rounded(await periodsOf(series, [10, 50, 210]))).toEqual([20, 40]);
  });

  it('fit no period when one strays, unless it may', async () => {
    const times = [10, 50, 210.1];
    const series = makeSeries(9, time, dipsAt(times));
    expect(await periodsOf(series, times)).toEqual([]);
    const found = expectDone(await askFor(series, times, { timingVariationDays: 0.1 })).candidates;
    expect(found.map(({ periodDays }) => Math.round(periodDays * 10) / 10)).toEqual([20, 40]);
    // A stray of up to 0.1 d has a standard deviation of 0.1/sqrt(3), over cycles 0, 1, 5 of the longer period.
    const spread = 0 + 1 + 25 - 36 / 3;
    expect(found[1]!.periodErrorDays).toBeCloseTo(Math.hypot(0.003, 0.1 / Math.sqrt(3)) / Math.sqrt(spread), 6);
  });

  it('find an unmarked event where timing variations have put it', async () => {
    const covered = sampleSpans([[0, 60]]);
    const late = makeSeries(10, covered, dipsAt([10, 30.35, 50]));
    expect(rounded(await periodsOf(late, [10, 50]))).toEqual([40]);
    expect(rounded(await periodsOf(late, [10, 50], { timingVariationDays: 0.4 }))).toEqual([20]);
  });

  it('are given no shorter period than asked', async () => {
    const series = makeSeries(11, time, dipsAt([10, 50, 210]));
    expect(rounded(await periodsOf(series, [10, 50, 210], { shortestPeriodDays: 20.5 }))).toEqual([40]);
    expect(rounded(await periodsOf(series, [10, 50, 210], { shortestPeriodDays: 20 }))).toEqual([20, 40]);
    expect(await periodsOf(series, [10, 50, 210], { shortestPeriodDays: 300 })).toEqual([]);
  });
});

describe('periods that cannot be weighed', () => {
  const series = makeSeries(12, sampleSpans([[0, 60]]), dipsAt([10, 50]));

  it.each([
    ['one time', [10], {}, 'at least two'],
    ['the same time twice', [10, 10], {}, 'at least two'],
    ['no number', [10, Number.NaN], {}, 'not a number'],
    ['no duration', [10, 50], { durationDays: 0 }, 'duration'],
    ['negative variation', [10, 50], { timingVariationDays: -1 }, 'variation'],
    ['negative period', [10, 50], { shortestPeriodDays: -1 }, 'shortest period'],
    ['too many periods', [10, 50], { shortestPeriodDays: 1e-5 }, 'raise the shortest period'],
    ['marks off the data', [-10, 90], {}, 'level beside'],
    ['marks on nothing', [20, 40], {}, 'ppm deep'],
  ])('give a sentence: %s', async (_, times, asked, sentence) => {
    const outcome = await askFor(series, times, asked);
    expect(outcome).toMatchObject({ kind: 'failed', error: { sentence: expect.stringContaining(sentence) } });
  });

  it('give a sentence for three points', async () => {
    const three = {
      seriesId: 's',
      time: new Float64Array([1, 2, 3]),
      flux: new Float64Array(3),
      error: new Float64Array(3),
    };
    expect((await askFor({ ...three, error: three.error.fill(SIGMA) }, [1, 3])).kind).toBe('failed');
  });

  it('hear a cancel', async () => {
    const eager = { ...createCheckpoint(() => true), isDue: () => true };
    expect(await askFor(series, [10, 50], {}, eager)).toEqual({ kind: 'cancelled' });
  });
});
