import { describe, expect, it } from 'vitest';
import { findDrops } from '../../workers/prepare/find-drops.ts';
import { fitRecovery } from '../../workers/prepare/fit-recovery.ts';
import { makeColumn, makeJob, makeLightCurve, prepare } from './light-curve.ts';
import { awayFrom, CADENCES, DIPS, noisy, noneProtected, SIGMA, times } from './noisy-series.ts';

const drop = (t: number, at: number, depth: number, decay: number): number =>
  t < at ? 0 : -depth * Math.exp(-(t - at) / decay);

const dropsIn = (time: Float64Array, flux: Float64Array) => findDrops(time, flux, noneProtected(time), []);

describe('sudden drops', () => {
  it.each(CADENCES)('are found at %s, however slowly the flux comes back', (_, cadence) => {
    const time = times(14, cadence);
    for (const decay of [0.25, 1, 3, 1e9])
      for (const depth of [20 * SIGMA, 0.05]) {
        const flux = noisy(time, `drop ${decay}`, (t) => drop(t, 5.2003, depth, decay));
        const found = dropsIn(time, flux);
        expect(found).toHaveLength(1);
        expect(Math.abs(time[found[0]!]! - 5.2003)).toBeLessThan(1.5 * cadence);
      }
  });

  it.each(CADENCES)('are found across a short gap at %s', (_, cadence) => {
    const time = times(14, cadence).filter((t) => t < 5 || t > 5.2);
    const found = dropsIn(
      time,
      noisy(time, 'gap', (t) => drop(t, 5.1, 0.01, 3)),
    );
    expect(found).toHaveLength(1);
    expect(time[found[0]!]! - 5.2).toBeLessThan(1.5 * cadence);
    // A star that varies as much over that time was only not watched.
    const varying = noisy(time, 'gap', (t) => 0.02 * Math.sin(2 * t));
    expect(dropsIn(time, varying)).toEqual([]);
  });

  it.each(CADENCES)('are not dips of any shape and length at %s', (_, cadence) => {
    const time = times(14, cadence);
    for (const [name, dip] of Object.entries(DIPS))
      for (const hours of [1, 3, 6, 12])
        for (const depth of [0.004, 0.4])
          for (const period of [3.3, 20]) {
            const flux = noisy(time, `${name} ${hours}`, (t) => -depth * dip(awayFrom(t, period, 6.2), hours / 24));
            expect(dropsIn(time, flux)).toEqual([]);
          }
  });

  it.each(CADENCES)('are not eclipses of a fast binary that varies, nor variation or noise, at %s', (_, cadence) => {
    const time = times(14, cadence);
    for (const dip of Object.values(DIPS)) {
      const binary = (t: number) =>
        -0.3 * dip(awayFrom(t, 0.8, 0.1), 0.15) - 0.1 * dip(awayFrom(t, 0.8, 0.5), 0.15) + 0.03 * Math.sin(8 * t);
      expect(dropsIn(time, noisy(time, 'binary', binary))).toEqual([]);
    }
    for (const period of [0.1, 0.5, 3])
      expect(
        dropsIn(
          time,
          noisy(time, 'wave', (t) => 0.02 * Math.sin((2 * Math.PI * t) / period)),
        ),
      ).toEqual([]);
    expect(dropsIn(time, noisy(time, 'still'))).toEqual([]);
  });

  it('are not looked for where nothing varies or nothing is', () => {
    const time = times(5, 1 / 48);
    expect(dropsIn(time, new Float64Array(time.length).fill(1))).toEqual([]);
    expect(dropsIn(new Float64Array(0), new Float64Array(0))).toEqual([]);
    expect(dropsIn(Float64Array.of(1), Float64Array.of(1))).toEqual([]);
  });

  it('are not told from a dip whose end was not seen, nor looked for in protected events', () => {
    const time = times(14, 1 / 48);
    const late = noisy(time, 'late', (t) => drop(t, 13.5, 0.01, 3));
    expect(dropsIn(time, late)).toEqual([]);
    const flux = noisy(time, 'own', (t) => drop(t, 5.2, 0.01, 3));
    const isProtected = Uint8Array.from(time, (t) => (Math.abs(t - 5.2) < 0.1 ? 1 : 0));
    expect(findDrops(time, flux, isProtected, [])).toEqual([]);
  });
});

describe('the series at a drop', () => {
  it.each(CADENCES)('is split there and its recovery taken out, at %s', async (_, cadence) => {
    const time = times(14, cadence);
    const flux = noisy(time, 'series', (t) => drop(t, 5.5, 0.006, 0.2) + 0.001 * Math.sin(t));
    const curve = makeLightCurve([makeColumn(flux)], { time });
    const detrend = { kind: 'biweight', windowDays: 1.5 } as const;
    const series = await prepare(makeJob(curve, { splitAtDrops: true, detrend }));
    expect(series.drops).toHaveLength(1);
    expect(Math.abs(series.drops[0]! - 5.5)).toBeLessThan(1.5 * cadence);
    expect(series.pieceStarts).toHaveLength(2);
    expect(series.time[series.pieceStarts[1]!]).toBe(series.drops[0]);
    expect(series.isAtEdge[series.pieceStarts[1]!]).toBe(1);
    expect(series.warnings.join()).toMatch(/drops suddenly by .* ppm at 5\.5.* recovery over 0\.\d+ d/);
    const meanAfter = ({ time: at, flux: values }: typeof series): number => {
      const own = values.filter((_v, i) => at[i]! >= 5.5 && at[i]! < 5.7);
      return own.reduce((sum, value) => sum + value, 0) / own.length - 1;
    };
    expect(Math.abs(meanAfter(series))).toBeLessThan(3e-4);
    const whole = await prepare(makeJob(curve, { detrend }));
    expect(whole.drops).toEqual([]);
    expect(meanAfter(whole)).toBeLessThan(-1e-3);
  });

  it('keeps a transit that follows soon after', async () => {
    const time = times(14, 2 / 1440);
    const isInside = (t: number) => Math.abs(t - 6.1) < 0.06;
    const flux = noisy(time, 'both', (t) => drop(t, 5.5, 0.006, 0.4) - (isInside(t) ? 0.003 : 0));
    const curve = makeLightCurve([makeColumn(flux)], { time });
    const series = await prepare(
      makeJob(curve, { splitAtDrops: true, detrend: { kind: 'biweight', windowDays: 1.5 } }),
    );
    const inside = series.flux.filter((_, i) => isInside(series.time[i]!));
    const depth = 1 - inside.reduce((sum, value) => sum + value, 0) / inside.length;
    expect(Math.abs(depth / 0.003 - 1)).toBeLessThan(0.1);
  });
});

describe('a recovery', () => {
  const time = times(5, 1 / 480);
  const weight = new Uint8Array(time.length).fill(1);

  it('is fitted with its height and time scale, on a slope and beside outliers', () => {
    const flux = noisy(time, 'recovery', (t) => 0.002 * t + drop(t, 0, 0.01, 0.35));
    for (let i = 5; i < flux.length; i += 40) flux[i]! += 0.02;
    const found = fitRecovery(time, flux, weight, 0.0095, 1 / 480)!;
    expect(Math.abs(found.decayDays / 0.35 - 1)).toBeLessThan(0.1);
    expect(Math.abs(found.height / 0.01 - 1)).toBeLessThan(0.05);
  });

  it('is not seen in noise, on a step, or in too few points', () => {
    expect(fitRecovery(time, noisy(time, 'step'), weight, 0.01, 1 / 480)).toBeUndefined();
    const short = time.subarray(0, 15);
    const flux = noisy(short, 'short', (t) => drop(t, 0, 0.01, 0.01));
    expect(fitRecovery(short, flux, weight.subarray(0, 15), 0.01, 1 / 480)).toBeUndefined();
  });
});
