import { describe, expect, it } from 'vitest';
import type { Outcome } from '../../src/contract/outcome.ts';
import { type BoxSearchSettings, DEFAULT_BOX_SEARCH } from '../../src/core/box-search-settings.ts';
import { type BoxPlan, planBoxSearch } from '../../workers/search/plan-box-search.ts';
import { expectDone } from './search-box.ts';

function plan(settings: Partial<BoxSearchSettings>, spanDays = 27, cadenceDays = 1 / 48): Outcome<BoxPlan> {
  const time = Float64Array.from({ length: Math.round(spanDays / cadenceDays) + 1 }, (_, i) => i * cadenceDays);
  const ones = new Float64Array(time.length).fill(1);
  return planBoxSearch({ seriesId: '', time, flux: ones, error: ones }, { ...DEFAULT_BOX_SEARCH, ...settings });
}

const sentenceOf = (outcome: Outcome<BoxPlan>): string =>
  outcome.kind === 'failed' ? outcome.error.sentence : outcome.kind;

describe('plan of a box search', () => {
  it('searches from the Roche limit of rock to half the span when nothing is asked', () => {
    const { resolved, periods } = expectDone(plan({}));
    // Rappaport et al. (2013): 12.6 h (5.5)^-1/2 = 5.37 h.
    expect(resolved.shortestPeriodDays * 24).toBeCloseTo(5.373, 3);
    expect(resolved.longestPeriodDays).toBeCloseTo(13.5, 12);
    expect(periods[0]).toBeCloseTo(resolved.shortestPeriodDays, 12);
    expect(periods.at(-1)).toBeCloseTo(13.5, 9);
    expect(periods.every((period, i) => i === 0 || period > periods[i - 1]!)).toBe(true);
    expect(resolved.trialCount).toBe(periods.length);
  });

  it('tries at every period only boxes from two cadences to a quarter of it', () => {
    const { periods, durations, rangeAt } = expectDone(plan({}));
    const range = { first: 0, last: 0 };
    for (const period of periods) {
      rangeAt(period, range);
      expect(range.last).toBeGreaterThanOrEqual(range.first);
      expect(durations[range.last]!).toBeLessThanOrEqual(0.25 * period * (1 + 1e-9));
      expect(durations[range.first]!).toBeGreaterThanOrEqual((2 / 48) * (1 - 1e-9));
    }
    const spacing = [...durations.slice(1)].map((duration, i) => duration / durations[i]!);
    expect(Math.max(...spacing)).toBeLessThanOrEqual(1.3501);
  });

  it('covers the central transit of the given star, of denser and of thinner ones', () => {
    const { durations, rangeAt } = expectDone(plan({ densityCgs: 5 }, 27, 1 / 720));
    const range = { first: 0, last: 0 };
    rangeAt(10, range);
    // 10 d, 5 g/cm³: (P/π)(3π/(GρP²))^(1/3) = 2.57 h; 30 times denser and 0.03 times as dense. Computed by hand.
    expect(durations[range.first]! * 24).toBeLessThan(1.35 * (2.57 / 30 ** (1 / 3)));
    expect(durations[range.last]! * 24).toBeGreaterThan(2.57 / 0.03 ** (1 / 3) / 1.35);
  });

  it('does not search inside a giant star', () => {
    // Period at the surface of a star of 0.001 g/cm³, by Kepler's third law: sqrt(3 pi / (G rho)) = 4.35 d.
    expect(expectDone(plan({ densityCgs: 0.001 })).resolved.shortestPeriodDays).toBeCloseTo(4.35, 2);
  });

  it.each([
    ['longest below shortest', { shortestPeriodDays: 5, longestPeriodDays: 4 }, /shortest period \(5 d\) is not below/],
    ['longest beyond the span', { longestPeriodDays: 30 }, /exceeds the 27 d that the data span/],
    ['negative period', { shortestPeriodDays: -1 }, /positive number of days, not -1/],
    ['no oversampling', { oversampling: 0 }, /oversampling must be a positive number/],
    ['negative density', { densityCgs: -2 }, /density must be a positive/],
    ['no duration', { durationsDays: [] }, /list of durations is empty/],
    ['NaN duration', { durationsDays: [0.1, Number.NaN] }, /positive numbers of days, not NaN/],
    ['long boxes', { shortestPeriodDays: 1, durationsDays: [0.5] }, /longer than a quarter of the shortest period/],
    ['period under the cadence', { shortestPeriodDays: 0.01 }, /longer than a quarter of the shortest period/],
    ['endless', { oversampling: 1e6, shortestPeriodDays: 0.2 }, /million trial periods/],
  ])('says so when the settings contradict: %s', (_, settings, sentence) => {
    expect(sentenceOf(plan(settings))).toMatch(sentence);
  });

  it('says so when the series is too short', () => {
    expect(sentenceOf(plan({}, 0.2))).toMatch(/too short for two events|at least 10 points/);
    expect(sentenceOf(plan({}, 0.1))).toMatch(/at least 10 points/);
  });
});
