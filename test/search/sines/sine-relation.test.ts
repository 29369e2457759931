import { describe, expect, it } from 'vitest';
import { relateSine, sampleWindow } from '../../../workers/search/sines/sine-relation.ts';
import { weighSeries } from '../../../workers/search/sines/weighted-series.ts';
import { evenTimes, makeSines, nightTimes } from './sine-series.ts';

const relate = (frequency: number, windowFrequencies: readonly number[] = []) =>
  relateSine(frequency, [3.1, 1.2345], { spanDays: 100, windowFrequencies });

describe('the relation of a frequency to earlier ones', () => {
  it.each([
    [3.1 + 0.014, 'beside f1'],
    [6.2, '2 f1'],
    [9.3, '3 f1'],
    [1.55, 'f1 / 2'],
    [2.469, '2 f2'],
    [4.3345, 'f1 + f2'],
    [1.8655, 'f1 − f2'],
    [3.1 + 0.016, undefined],
    [7.77, undefined],
  ])('%f per day is %s', (frequency, words) => {
    expect(relate(frequency)).toBe(words);
  });

  it('is an alias only where the sampling repeats itself so', () => {
    expect(relate(4.1)).toBeUndefined();
    expect(relate(4.1, [1])).toBe('f1 + 1 / d, an alias');
    expect(relate(2.1, [1])).toBe('f1 − 1 / d, an alias');
    expect(relate(0.7655, [1, 2])).toBe('2 / d − f2, an alias');
    expect(relate(3.1 + 0.0733, [0.0733])).toBe('f1 + 0.0733 / d, an alias');
  });

  it('is not claimed of what lies beside zero', () => {
    const twins = [3.1, 3.112];
    expect(relateSine(0.012, twins, { spanDays: 100, windowFrequencies: [] })).toBeUndefined();
  });
});

describe('the sampling', () => {
  it('repeats itself daily in nights, and not in an even series', () => {
    expect(sampleWindow(weighSeries(makeSines(nightTimes(20), []))).windowFrequencies).toContain(1);
    expect(sampleWindow(weighSeries(makeSines(evenTimes(900), []))).windowFrequencies).toEqual([]);
  });
});
