import { describe, expect, it } from 'vitest';
import { median } from '../../src/core/robust-statistics.ts';
import { createSlidingMedian } from '../../workers/prepare/sliding-median.ts';
import { seedRandom } from '../reference/search/seeded-series.ts';

describe('sliding median', () => {
  it('is the median of every window, with equal values and windows of any width', () => {
    const random = seedRandom(5);
    const values = Float64Array.from({ length: 300 }, () => 0.5 + Math.round(8 * random.normal()));
    const sliding = createSlidingMedian(values);
    let [first, end] = [0, 0];
    for (let step = 0; step < 400; step += 1) {
      end = Math.min(300, end + Math.floor(4 * random.uniform()));
      first = Math.min(end, first + Math.floor(4 * random.uniform()));
      sliding.moveTo(first, end);
      expect(sliding.median()).toBe(median(values.subarray(first, end)));
    }
  });

  it('takes one value, and none', () => {
    const one = createSlidingMedian(Float64Array.of(7));
    expect(one.median()).toBeNaN();
    one.moveTo(0, 1);
    expect(one.median()).toBe(7);
    expect(createSlidingMedian(new Float64Array(0)).median()).toBeNaN();
  });
});
