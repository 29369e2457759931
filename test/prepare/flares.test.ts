import { describe, expect, it } from 'vitest';
import { findFlares } from '../../workers/prepare/find-flares.ts';
import { isRecurring } from '../../workers/prepare/flare-shape.ts';
import { makeColumn, makeJob, makeLightCurve, prepare } from './light-curve.ts';
import { awayFrom, CADENCES, DIPS, noisy, noneProtected, SIGMA, times } from './noisy-series.ts';

/** Rise in 0.3 of a width, then two exponentials: Davenport et al. (2014), ApJ 797, 122, eq. 4. */
const flare = (t: number, at: number, height: number, width: number): number => {
  const x = (t - at) / width;
  if (x < -0.3) return 0;
  return height * (x < 0 ? (x + 0.3) / 0.3 : 0.689 * Math.exp(-1.6 * x) + 0.303 * Math.exp(-0.2783 * x));
};
const sine = (t: number, period: number): number => Math.sin((2 * Math.PI * t) / period);

async function flaresIn(time: Float64Array, flux: Float64Array) {
  return (await findFlares(time, flux, noneProtected(time), [])).flares;
}

describe('flares', () => {
  it.each(CADENCES)('are found with their tails at %s, also on a rotating star', async (_, cadence) => {
    const time = times(10, cadence);
    for (const rotation of [0, 0.01]) {
      const flux = noisy(
        time,
        `flares ${rotation}`,
        (t) => flare(t, 3.3, 0.02, 0.06) + flare(t, 7.1, 0.05, 0.05) + rotation * sine(t, 3.3),
      );
      const flares = await flaresIn(time, flux);
      expect(flares).toHaveLength(2);
      for (const [k, [at, height, width]] of (
        [
          [3.3, 0.02, 0.06],
          [7.1, 0.05, 0.05],
        ] as const
      ).entries()) {
        expect(flares[k]!.start).toBeLessThan(at + cadence);
        expect(flares[k]!.start).toBeGreaterThan(at - 0.3 * width - 3 * cadence);
        // What is left of the tail is under three sigma.
        expect(flare(flares[k]!.end + cadence, at, height, width)).toBeLessThan(3 * SIGMA);
        expect(flares[k]!.end).toBeLessThan(at + 0.6 + cadence);
      }
    }
  });

  it.each(CADENCES)('are not pulsation or rotation at %s', async (_, cadence) => {
    const time = times(10, cadence);
    for (const period of [0.1, 0.15, 0.25, 0.4, 0.7, 1])
      for (const amplitude of [0.002, 0.03]) {
        const shape = (t: number) => amplitude * sine(t, period);
        expect(await flaresIn(time, noisy(time, `sine ${period}`, shape))).toEqual([]);
        const beat = (t: number) => amplitude * (sine(t, period) * sine(t, 9) + 0.4 * sine(t, 0.88 * period));
        expect(await flaresIn(time, noisy(time, `beat ${period}`, beat))).toEqual([]);
      }
  });

  it.each(CADENCES)('are not what lies beside dips at %s', async (_, cadence) => {
    const time = times(10, cadence);
    for (const [name, dip] of Object.entries(DIPS))
      for (const hours of [2, 5, 12]) {
        const shape = (t: number) => -0.05 * dip(awayFrom(t, 2.3, 1), hours / 24);
        expect(await flaresIn(time, noisy(time, `${name} ${hours}`, shape))).toEqual([]);
      }
  });

  it('are not noise, single high points, pairs, or a constant', async () => {
    const time = times(20, 1 / 720);
    const flux = noisy(time, 'still');
    expect(await flaresIn(time, flux)).toEqual([]);
    for (const i of [900, 4000, 4001, 9000]) flux[i] = 1 + 20 * SIGMA;
    expect(await flaresIn(time, flux)).toEqual([]);
    expect(await flaresIn(time, new Float64Array(time.length).fill(1))).toEqual([]);
    expect(await flaresIn(new Float64Array(0), new Float64Array(0))).toEqual([]);
    expect(await flaresIn(Float64Array.of(1), Float64Array.of(1))).toEqual([]);
  });

  it('are not peaks that come at even intervals, and that is said', async () => {
    const time = times(14, 1 / 720);
    const flux = noisy(time, 'periodic', (t) => 0.02 * Math.exp(-8 * ((t / 0.9) % 1)));
    const found = await findFlares(time, flux, noneProtected(time), []);
    expect(found.flares).toEqual([]);
    expect(found.warnings.join()).toMatch(/even intervals|% of the points/);
    expect(isRecurring([1, 2.01, 4, 4.99, 8, 9])).toBe(true);
    expect(isRecurring([1, 2.4, 4.9, 5.2, 8, 9.7, 13])).toBe(false);
  });

  it('are left out of the series with their reason, and never out of protected events', async () => {
    const time = times(10, 2 / 1440);
    const flux = noisy(time, 'flare', (t) => flare(t, 3.3, 0.02, 0.06));
    const curve = makeLightCurve([makeColumn(flux)], { time });
    const series = await prepare(makeJob(curve, { maskFlares: true }));
    expect(series.flares).toHaveLength(1);
    const { start, end } = series.flares[0]!;
    expect(series.time.every((t) => t < start || t > end)).toBe(true);
    expect(series.dropped.reason.every((reason) => reason === 3)).toBe(true);
    expect(series.dropped.time.every((t) => t >= start && t <= end)).toBe(true);
    expect(series.time.length + series.dropped.time.length).toBe(time.length);
    const protectedIntervals = [{ start: 3, end: 4 }];
    expect((await prepare(makeJob(curve, { maskFlares: true }, { protectedIntervals }))).flares).toEqual([]);
    expect((await prepare(makeJob(curve, {}))).flares).toEqual([]);
  });
});
