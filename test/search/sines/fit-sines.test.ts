import { describe, expect, it } from 'vitest';
import { fitSines, fitSinesFreely } from '../../../workers/search/sines/fit-sines.ts';
import { runSteps } from '../../../workers/search/sines/steps.ts';
import { weighSeries } from '../../../workers/search/sines/weighted-series.ts';
import { evenTimes, makeSines } from './sine-series.ts';

const range = { lowest: 0.03, highest: 12 };

describe('sines fitted together', () => {
  const [slow, fast] = [1 / 2.2, 1 / 0.71];
  const series = weighSeries(
    makeSines(
      evenTimes(1500),
      [
        [2.2, 2e-3, 101],
        [0.71, 1e-3, 100.3],
      ],
      0,
    ),
  );

  it('leave nothing of a series that is made of them', () => {
    const fit = fitSines(series, [slow, fast])!;
    expect(Math.hypot(fit.sines[0]!.cosine, fit.sines[0]!.sine)).toBeCloseTo(2e-3, 12);
    expect(Math.max(...fit.residual.map(Math.abs))).toBeLessThan(1e-13);
  });

  it('come to the least squares from frequencies beside it', () => {
    const beside = 0.2 / series.spanDays;
    const fit = runSteps(fitSinesFreely(series, [slow + beside, fast - beside], range))!;
    expect(fit.sines[0]!.frequencyPerDay).toBeCloseTo(slow, 9);
    expect(fit.sines[1]!.frequencyPerDay).toBeCloseTo(fast, 9);
    expect(fit.variance).toBeLessThan(1e-12 * series.variance);
  });

  it('keep their frequencies where these would leave the range', () => {
    const fit = runSteps(fitSinesFreely(series, [slow + 0.01], { lowest: slow + 0.01, highest: 12 }))!;
    expect(fit.sines[0]!.frequencyPerDay).toBe(slow + 0.01);
  });

  it('are refused where they are one, or where the times cannot tell them apart', () => {
    expect(fitSines(series, [slow, slow])).toBeUndefined();
    // 48 points a day: 48 - f has the values of f.
    expect(fitSines(series, [slow, 48 - slow])).toBeUndefined();
  });

  it('weigh each point by its error', () => {
    const given = makeSines(evenTimes(600), [[1.3, 1e-3, 100]], 0);
    const flux = given.flux.map((value, i) => (i % 3 === 0 ? value + (i % 2) : value));
    const error = given.error.map((value, i) => (i % 3 === 0 ? 1e6 * value : value));
    const fit = fitSines(weighSeries({ time: given.time, flux, error }), [1 / 1.3])!;
    expect(Math.hypot(fit.sines[0]!.cosine, fit.sines[0]!.sine)).toBeCloseTo(1e-3, 8);
  });
});
