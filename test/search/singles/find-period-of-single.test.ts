import { describe, expect, it } from 'vitest';
import type { SearchSeries } from '../../../src/contract/search-contract.ts';
import type { SinglePeriodJob, SinglePeriodResult } from '../../../src/contract/single-events-contract.ts';
import { shortestUnseenPeriod } from '../../../src/core/shortest-unseen-period.ts';
import { createCheckpoint } from '../../../workers/checkpoint.ts';
import { findPeriodOfSingle } from '../../../workers/search/singles/find-period-of-single.ts';
import { expectDone, quietCheckpoint } from '../search-box.ts';
import { boxDip, makeSeries, sampleSpans } from './single-series.ts';

const event = {
  key: 'k',
  timeDays: 10,
  durationDays: 0.3,
  durationErrorDays: 0.015,
  densityCgs: 1.4,
  densityErrorCgs: 0.2,
  depth: 0.005,
} satisfies Omit<SinglePeriodJob, 'jobId' | 'seriesId'>;

const ask = (series: SearchSeries, changed: Partial<SinglePeriodJob> = {}, checkpoint = quietCheckpoint()) =>
  findPeriodOfSingle(series, { ...event, ...changed }, checkpoint);

async function posteriorOf(series: SearchSeries, changed: Partial<SinglePeriodJob> = {}): Promise<SinglePeriodResult> {
  return expectDone(await ask(series, changed));
}

function at(result: SinglePeriodResult, periodDays: number): number {
  return result.posterior[result.periods.findIndex((period) => period >= periodDays)]!;
}

const month = makeSeries(1, sampleSpans([[0, 27]]), [boxDip(10, 0.3, 0.005)]);

describe('the period of a single transit', () => {
  it('has a posterior whose highest value is 1, with the median inside its central 68 %', async () => {
    const { periods, posterior, medianDays, lowDays, highDays } = await posteriorOf(month);
    expect(Math.max(...posterior)).toBe(1);
    expect(periods.every((period, i) => i === 0 || period > periods[i - 1]!)).toBe(true);
    expect(periods.at(-1)!).toBeGreaterThan(27000);
    const total = posterior.reduce((sum, value) => sum + value, 0);
    const partBelow = (limit: number) => posterior.reduce((s, v, i) => s + (periods[i]! < limit ? v : 0), 0) / total;
    expect(partBelow(lowDays)).toBeCloseTo(0.16, 1);
    expect(partBelow(medianDays)).toBeCloseTo(0.5, 1);
    expect(partBelow(highDays)).toBeCloseTo(0.84, 1);
  });

  it('is longer than any that the data would have shown again', async () => {
    const result = await posteriorOf(month, { densityCgs: undefined, densityErrorCgs: undefined });
    // An event that ends the series with a third of its points is not seen yet, for that bound one point more is.
    expect(Math.abs(result.shortestDays - shortestUnseenPeriod(month.time, 10, 0.3))).toBeLessThan(0.3);
    result.periods.forEach((period, i) => {
      if (period < 16.9) expect(result.posterior[i]).toBe(0);
      if (period > 17.4 && period < 100) expect(result.posterior[i]).toBeGreaterThan(0);
    });
  });

  it('may hide in gaps, and nowhere between them', async () => {
    // Gaps two days wide at 13 to 15 and 19 to 21: from the event at 7 a period of 6 to 8 puts the next two in both,
    // and the one before the event at the start of the series or ahead of it.
    const time = sampleSpans([
      [1.5, 13],
      [15, 19],
      [21, 27],
    ]);
    const series = makeSeries(2, time, [boxDip(7, 0.3, 0.005)]);
    const result = await posteriorOf(series, { timeDays: 7, densityCgs: 30, densityErrorCgs: 20 });
    // An event of which less than a third is observed is not asked for: 0.05 d beyond the data.
    const open = (period: number): boolean =>
      [-3, -2, -1, 1, 2, 3, 4].every((k) => {
        const time = 7 + k * period;
        return time < 1.46 || time > 27.04 || (time > 13.04 && time < 14.96) || (time > 19.04 && time < 20.96);
      });
    const periods = [3.3, 5.2, 6.1, 6.5, 6.8, 7.2, 9, 11, 12.5, 13.3, 15, 19, 20.5, 25];
    expect(periods.map((period) => [period, at(result, period) > 0])).toEqual(
      periods.map((period) => [period, open(period)]),
    );
    expect(periods.some((period) => open(period) && period < 12)).toBe(true);
    expect(open(result.shortestDays)).toBe(true);
  });

  it('is not ruled out by data too noisy to show another event', async () => {
    const shallow = { depth: 0.00015 };
    const weak = makeSeries(3, sampleSpans([[0, 27]]), [boxDip(10, 0.3, shallow.depth)]);
    const { shortestDays } = await posteriorOf(weak, shallow);
    expect(shortestDays).toBeLessThan(16);
  });

  it('is longer for a longer event, and for a denser star', async () => {
    const { medianDays } = await posteriorOf(month);
    const longer = await posteriorOf(month, { durationDays: 0.4 });
    const denser = await posteriorOf(month, { densityCgs: 2.8 });
    // T^3 rho, up to the window at the short end.
    expect(longer.medianDays / medianDays).toBeGreaterThan(2);
    expect(denser.medianDays / medianDays).toBeGreaterThan(1.8);
  });

  it('knows less when less is known of the star', async () => {
    const width = ({ lowDays, highDays }: SinglePeriodResult): number => Math.log(highDays / lowDays);
    const known = width(await posteriorOf(month, { durationDays: 0.5 }));
    const vague = width(await posteriorOf(month, { durationDays: 0.5, densityErrorCgs: undefined }));
    const unknown = width(await posteriorOf(month, { durationDays: 0.5, densityCgs: undefined }));
    expect(vague).toBeGreaterThan(known);
    expect(unknown).toBeGreaterThan(vague);
  });
});

describe('a period that cannot be told', () => {
  it.each([
    ['time', { timeDays: Number.NaN }],
    ['duration', { durationDays: 0 }],
    ['error of the duration', { durationErrorDays: -1 }],
    ['density', { densityCgs: 0 }],
    ['error of the density', { densityErrorCgs: Number.NaN }],
    ['depth', { depth: 0 }],
    ['depth', { depth: 1.5 }],
  ])('gives a sentence on a wrong %s', async (name, changed) => {
    const outcome = await ask(month, changed);
    expect(outcome).toMatchObject({ kind: 'failed', error: { sentence: expect.stringContaining(name) } });
  });

  it('gives a sentence when duration and density ask for centuries', async () => {
    const outcome = await ask(month, { durationDays: 1.2, densityCgs: 60 });
    expect(outcome).toMatchObject({ kind: 'failed', error: { sentence: expect.stringContaining('years') } });
  });

  it('gives a sentence for three points', async () => {
    const column = (...values: number[]) => new Float64Array(values);
    const series = { seriesId: 's', time: column(1, 2, 3), flux: column(1, 1, 1), error: column(1, 1, 1) };
    expect((await ask(series)).kind).toBe('failed');
  });

  it('hears a cancel', async () => {
    const eager = { ...createCheckpoint(() => true), isDue: () => true };
    expect(await ask(month, {}, eager)).toEqual({ kind: 'cancelled' });
  });
});
