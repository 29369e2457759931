import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { Detrend } from '../../../src/core/recipe.ts';
import { fillSpline, penaltyOf } from '../../../workers/prepare/detrend/spline.ts';
import { findPrincipalModes } from '../../../workers/prepare/principal-modes.ts';
import { trendOf } from '../../prepare/trend-of.ts';
import { quietCheckpoint } from '../../search/search-box.ts';
import { seedRandom } from '../search/seeded-series.ts';

/** Written by `record-trends.py` (scipy 1.10, numpy 1.24). */
interface Recorded {
  readonly points: number;
  readonly savitzkyGolay: readonly {
    readonly points: number;
    readonly degree: number;
    readonly inner: readonly number[];
    readonly all: readonly number[];
  }[];
  readonly unevenPolynomial: { readonly windowDays: number; readonly degree: number; readonly all: readonly number[] };
  readonly medians: readonly { readonly points: number; readonly inner: readonly number[] }[];
  readonly splines: readonly {
    readonly kind: 'even' | 'uneven';
    readonly seed: number;
    readonly knotDays: number;
    readonly penalty: number;
    readonly smoothing: readonly number[];
    readonly penalised: readonly number[];
  }[];
  readonly components: {
    readonly seed: number;
    readonly rows: number;
    readonly length: number;
    readonly modes: readonly {
      readonly mode: readonly number[];
      readonly loading: readonly number[];
      readonly explained: number;
    }[];
  };
}

const recorded: Recorded = JSON.parse(readFileSync(new URL('trends.json', import.meta.url), 'utf8'));

/** The series of the recording script, number for number. */
function makeSeries(kind: 'even' | 'uneven', seed: number) {
  const random = seedRandom(seed);
  const time = new Float64Array(recorded.points);
  const flux = new Float64Array(recorded.points);
  let at = 0;
  for (let i = 0; i < time.length; i += 1) {
    at = kind === 'even' ? i / 48 : at + (0.4 + 1.2 * random.uniform()) / 48;
    time[i] = at;
    flux[i] = 1 + 0.01 * Math.sin((2 * Math.PI * at) / 1.3) + 0.002 * random.normal();
  }
  return { time, flux };
}

function expectClose(found: ArrayLike<number>, expected: readonly number[], tolerance: number): void {
  expect(found).toHaveLength(expected.length);
  for (let i = 0; i < expected.length; i += 1) expect(Math.abs(found[i]! - expected[i]!)).toBeLessThan(tolerance);
}

describe('Savitzky-Golay', () => {
  /** Savitzky & Golay (1964), Anal. Chem. 36, 1627, Table I, quadratic and cubic smoothing. */
  it.each([
    [5, [-3, 12, 17, 12, -3], 35],
    [7, [-2, 3, 6, 7, 6, 3, -2], 21],
    [9, [-21, 14, 39, 54, 59, 54, 39, 14, -21], 231],
    [11, [-36, 9, 44, 69, 84, 89, 84, 69, 44, 9, -36], 429],
  ])('has the published weights of %i points', async (points, weights, norm) => {
    const time = Float64Array.from({ length: 41 }, (_, i) => i);
    const flux = Float64Array.from({ length: 41 }, (_, i) => (i === 20 ? 1 : 0));
    for (const degree of [2, 3]) {
      const trend = await trendOf({ kind: 'savitzky-golay', windowDays: points - 0.5, degree }, time, flux);
      for (const [place, weight] of weights.entries())
        expect(trend[20 - (place - (points - 1) / 2)]).toBeCloseTo(weight / norm, 12);
    }
  });

  /** Savitzky & Golay (1964), Table I, five points: a parabola is kept; a spike leaves 17/35. */
  it.each([
    [[1, 4, 9, 16, 25], 9],
    [[0, 0, 1, 0, 0], 17 / 35],
  ])('makes the middle of %j to %f', async (values, middle) => {
    const detrend = { kind: 'savitzky-golay', windowDays: 4.5, degree: 2 } as const;
    const trend = await trendOf(detrend, Float64Array.of(0, 1, 2, 3, 4), Float64Array.from(values));
    expect(trend[2]).toBeCloseTo(middle, 12);
  });

  it.each(recorded.savitzkyGolay)(
    'is scipy’s of $points points and degree $degree, and polyfit’s at the ends',
    async (row) => {
      const { time, flux } = makeSeries('even', 7);
      const { points, degree } = row;
      const trend = await trendOf({ kind: 'savitzky-golay', windowDays: (points - 0.5) / 48, degree }, time, flux);
      const half = (points - 1) / 2;
      expectClose(trend.subarray(half, time.length - half), row.inner, 1e-10);
      // At the ends the cut windows hold fewer points than a free polynomial of this degree needs beyond itself.
      const first = Math.max(0, degree + 2 - half - 1);
      const ends = { from: first, to: time.length - first };
      expectClose(trend.subarray(ends.from, ends.to), row.all.slice(ends.from, ends.to), 1e-8);
    },
  );

  it('is numpy’s polyfit on uneven times', async () => {
    const { time, flux } = makeSeries('uneven', 8);
    const { windowDays, degree, all } = recorded.unevenPolynomial;
    expectClose(await trendOf({ kind: 'savitzky-golay', windowDays, degree }, time, flux), all, 1e-10);
  });
});

describe('running median', () => {
  it.each(recorded.medians)('is scipy’s median_filter of $points points', async ({ points, inner }) => {
    const { time, flux } = makeSeries('even', 7);
    const trend = await trendOf({ kind: 'running median', windowDays: (points - 0.5) / 48 }, time, flux);
    const half = (points - 1) / 2;
    expectClose(trend.subarray(half, time.length - half), inner, 1e-15);
  });
});

describe('spline', () => {
  it.each(recorded.splines)('of $knotDays d on $kind times', async ({ kind, seed, knotDays, ...expected }) => {
    const { time, flux } = makeSeries(kind, seed);
    expect(penaltyOf(time, knotDays) / expected.penalty).toBeCloseTo(1, 9);
    const trend = new Float64Array(time.length).fill(Number.NaN);
    fillSpline({ first: 0, time, memberTime: time, memberFlux: flux, trend }, knotDays, 1);
    // A dense solution of the same normal equations.
    expectClose(trend, expected.penalised, 1e-10);
    // scipy's has a knot at every point; four to a time scale come near it, a hundredth of the noise of a point.
    expectClose(trend, expected.smoothing, 2e-5);
  });
});

describe('principal modes', () => {
  it('are numpy’s singular vectors', async () => {
    const { seed, rows, length, modes } = recorded.components;
    const random = seedRandom(seed);
    const given = Array.from({ length: rows }, (_, k) =>
      Float64Array.from(
        { length },
        (_, i) => random.normal() + (k + 1) * 0.4 * Math.sin(i / 7) + (k - 2.5) * 0.3 * Math.cos(i / 3),
      ),
    );
    const found = (await findPrincipalModes(given, modes.length, quietCheckpoint()))!;
    for (const [k, expected] of modes.entries()) {
      expect(found.explained[k]).toBeCloseTo(expected.explained, 10);
      expectClose(found.loadings[k]!, expected.loading, 1e-9);
      expectClose(found.modes[k]!, expected.mode, 1e-8);
    }
  });
});

/** The rule of the spline's penalty, and what a window of a mean would do, on a pure sine far from the ends. */
describe('what is left of a sine', () => {
  const time = Float64Array.from({ length: 4800 }, (_, i) => i / 48);
  const keptOf = async (detrend: Detrend, periodDays: number): Promise<number> => {
    const wave = time.map((at) => Math.sin((2 * Math.PI * at) / periodDays));
    const trend = await trendOf(
      detrend,
      time,
      wave.map((value) => 1 + 1e-3 * value),
    );
    let [both, own] = [0, 0];
    for (let i = 1200; i < 3600; i += 1) {
      both += (trend[i]! - 1) * wave[i]!;
      own += 1e-3 * wave[i]! * wave[i]!;
    }
    return both / own;
  };

  it.each([
    [2, 0.5],
    [4, 1 / (1 + 1 / 16)],
    [1, 1 / (1 + 16)],
  ])('of period %f knot distances is by the spline’s rule, Silverman (1984)', async (ratio, kept) => {
    expect(await keptOf({ kind: 'spline', knotDays: 1.25 }, ratio * 1.25)).toBeCloseTo(kept, 2);
  });
});
