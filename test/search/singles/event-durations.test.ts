import { describe, expect, it } from 'vitest';
import { centralDurationDays } from '../../../workers/search/period-grid.ts';
import { chooseEventDurations } from '../../../workers/search/singles/event-durations.ts';
import { selectUsablePoints } from '../../../workers/search/singles/usable-points.ts';
import { CADENCE_DAYS, makeSeries, sampleSpans } from './single-series.ts';

function pointsOver(spanDays: number) {
  const points = selectUsablePoints(makeSeries(1, sampleSpans([[0, spanDays]])), 'This');
  if (typeof points === 'string') throw new Error(points);
  return points;
}

describe('durations of single events', () => {
  it('reach from the shortest that 3 days give to the longest that 30 spans give', () => {
    const durations = chooseEventDurations(pointsOver(100), 1.41, undefined);
    // The room for other densities is that of the box search: 0.03 to 30 times the star's.
    expect(durations[0]).toBeCloseTo(centralDurationDays(3, 30 * 1.41), 9);
    expect(durations.at(-1)).toBeCloseTo(centralDurationDays(30 * 99.993, 0.03 * 1.41), 3);
    durations.forEach((duration, i) => {
      if (i > 0) expect(duration / durations[i - 1]!).toBeLessThan(1.3501);
    });
  });

  it('are never under two cadences nor over a twentieth of the data', () => {
    const [first] = chooseEventDurations(pointsOver(100), 1000, undefined);
    expect(first).toBeCloseTo(2 * CADENCE_DAYS, 9);
    const most = chooseEventDurations(pointsOver(6), 1.41, undefined).at(-1)!;
    expect(most).toBeLessThanOrEqual(0.3);
    expect(most).toBeGreaterThan(0.3 / 1.36);
  });

  it('are those that are given, where the data suffice', () => {
    expect(chooseEventDurations(pointsOver(6), undefined, [2, 0.25, 0.1, 0.25])).toEqual([0.1, 0.25]);
  });
});
