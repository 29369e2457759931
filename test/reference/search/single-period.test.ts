import { spawnSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import type { SinglePeriodResult } from '../../../src/contract/single-events-contract.ts';
import { createCheckpoint } from '../../../workers/checkpoint.ts';
import { centralDurationDays } from '../../../workers/search/period-grid.ts';
import { durationLogLikelihood } from '../../../workers/search/singles/duration-likelihood.ts';
import { findPeriodOfSingle } from '../../../workers/search/singles/find-period-of-single.ts';
import { seedRandom } from './seeded-series.ts';

interface Case {
  readonly name: string;
  readonly duration: number;
  readonly durationLogError: number;
  readonly density: number;
  readonly densityLogError: number;
  readonly k: number;
  readonly centralPeriod: number;
  readonly periods: readonly number[];
  readonly relative: readonly number[];
  /** At 16, 50 and 84 %. */
  readonly quantiles: readonly [number, number, number];
}

interface Recorded {
  readonly cases: readonly Case[];
  readonly limitQuantiles: readonly [number, number, number];
}

const here = (name: string): string => fileURLToPath(new URL(name, import.meta.url));
const recorded: Recorded = JSON.parse(readFileSync(here('./single-period.json'), 'utf8'));
const PYTHON = '/usr/bin/python3';
const hasScipy = spawnSync(PYTHON, ['-c', 'import scipy']).status === 0;
if (!hasScipy) console.warn('The recorded posteriors are not recomputed: /usr/bin/python3 cannot import scipy.');

describe('recorded posteriors of a single period', () => {
  it.runIf(hasScipy || process.env.CI !== undefined)(
    'are what numpy and scipy compute today',
    () => {
      const run = spawnSync(PYTHON, [here('./single-period-record.py'), '--check'], { encoding: 'utf8' });
      expect(`${run.error ?? ''}${run.stdout}`.trim()).toBe('no difference');
      expect(run.status).toBe(0);
    },
    60_000,
  );
});

/** An event amid so short a series that no other could fall on it: the posterior knows nothing of the window. */
async function posteriorWithoutWindow(
  known: Omit<Case, 'name' | 'periods' | 'relative' | 'quantiles' | 'centralPeriod'>,
) {
  const { duration, durationLogError, density, densityLogError, k } = known;
  const random = seedRandom(17);
  const time = Float64Array.from({ length: 200 }, (_, i) => 100 + (i * 4 * duration) / 200);
  const series = {
    seriesId: 's',
    time,
    flux: time.map((at) => 1 + 1e-4 * random.normal() - (Math.abs(at - 100 - 2 * duration) < duration / 2 ? k * k : 0)),
    error: new Float64Array(time.length).fill(1e-4),
  };
  const job = {
    key: 'k',
    timeDays: 100 + 2 * duration,
    durationDays: duration,
    durationErrorDays: durationLogError * duration,
    densityCgs: density,
    densityErrorCgs: density * Math.sqrt(Math.expm1(densityLogError ** 2)),
    depth: k * k,
  };
  const outcome = await findPeriodOfSingle(
    series,
    job,
    createCheckpoint(() => false),
  );
  if (outcome.kind !== 'done') throw new Error(outcome.kind);
  return outcome.value;
}

const quantilesOf = ({ lowDays, medianDays, highDays }: SinglePeriodResult) => [lowDays, medianDays, highDays];

describe.each(recorded.cases)('posterior of a single period, $name, against a double sum in numpy', (known) => {
  const facts = {
    durationDays: known.duration,
    durationLogError: known.durationLogError,
    densityCgs: known.density,
    densityLogError: known.densityLogError,
    k: known.k,
  };

  it('has the same shape', () => {
    const logOf = (period: number): number => durationLogLikelihood(period, facts) - Math.log(period);
    const compared = known.periods.filter((_, i) => known.relative[i]! > 1e-4);
    expect(compared.length).toBeGreaterThan(4);
    known.periods.forEach((period, i) => {
      const relative = Math.exp(logOf(period) - logOf(known.centralPeriod));
      // In the far wing the duration is missed by many sigma, where the line of ln rho in ln T begins to bend.
      if (known.relative[i]! > 1e-4) expect(Math.abs(relative / known.relative[i]! - 1)).toBeLessThan(0.01);
    });
  });

  it('has the same median and central 68 %', async () => {
    quantilesOf(await posteriorWithoutWindow(known)).forEach((value, i) => {
      expect(Math.abs(value / known.quantiles[i]! - 1)).toBeLessThan(0.01);
    });
  });
});

describe('posterior of a single period in the limit of an exact star and duration', () => {
  it('is that of u = (Pmin/P)^(2/3) distributed as Beta(7/2, 1/2), Pmin a central transit', async () => {
    const exact = { duration: 0.5, durationLogError: 0.005, density: 1.41, densityLogError: 0, k: 0.001 };
    const result = await posteriorWithoutWindow(exact);
    // T = (P/pi) R/a grows with the cube root of P.
    const shortest = (exact.duration / centralDurationDays(1, exact.density)) ** 3;
    // The half per cent that the duration is taken as known to blurs ln P by three times as much, at the sharp edge.
    quantilesOf(result).forEach((value, i) => {
      expect(Math.abs(value / shortest / recorded.limitQuantiles[i]! - 1)).toBeLessThan(0.015);
    });
  });
});
