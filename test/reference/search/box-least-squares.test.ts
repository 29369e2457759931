import { spawnSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { measureBox } from '../../../src/core/measure-box.ts';
import { BINS_PER_BOX, makeBoxWork, makeTrialBox, searchTrial } from '../../../workers/search/box-search.ts';
import { makeSeededSeries, type SeriesSpec } from './seeded-series.ts';

interface Boxes {
  readonly power: readonly number[];
  readonly depth: readonly number[];
  readonly depthError: readonly number[];
  readonly signalToNoise: readonly number[];
  readonly duration: readonly number[];
  readonly epoch: readonly number[];
}

interface Recorded {
  readonly series: readonly {
    readonly spec: SeriesSpec & { readonly name: string };
    readonly durations: readonly number[];
    readonly sum: number;
    readonly last: readonly [number, number, number];
    readonly periods: readonly number[];
    readonly snr: Boxes;
    readonly likelihood: Boxes;
  }[];
}

const here = (name: string): string => fileURLToPath(new URL(name, import.meta.url));
const recorded: Recorded = JSON.parse(readFileSync(here('./box-least-squares.json'), 'utf8'));
const PYTHON = '/usr/bin/python3';
const hasAstropy = spawnSync(PYTHON, ['-c', 'import astropy']).status === 0;
if (!hasAstropy) console.warn('The recorded box searches are not recomputed: /usr/bin/python3 cannot import astropy.');

describe('recorded box searches', () => {
  it.runIf(hasAstropy || process.env.CI !== undefined)('are what astropy computes today', () => {
    const run = spawnSync(PYTHON, [here('./record-box-least-squares.py'), '--check'], { encoding: 'utf8' });
    expect(`${run.error ?? ''}${run.stdout}`.trim()).toBe('no difference');
    expect(run.status).toBe(0);
  });
});

describe.each(recorded.series)(
  'box search of the $spec.name series against astropy (brute force, unbinned)',
  (known) => {
    const series = makeSeededSeries(known.spec);
    const { time, flux, error } = series;
    // astropy has no floor on the weight inside a box.
    const work = makeBoxWork(series, 0);
    const durations = Float64Array.from(known.durations);
    const best = makeTrialBox();
    const search = (periodDays: number, binsPerBox: number): number => {
      searchTrial(work, periodDays, durations, { first: 0, last: durations.length - 1 }, best, binsPerBox);
      return best.signalToNoise;
    };

    it('is of the same series', () => {
      expect(flux.reduce((sum, value) => sum + value, 0)).toBeCloseTo(known.sum, 9);
      [time, flux, error].forEach((column, i) => void expect(column.at(-1)).toBeCloseTo(known.last[i]!, 12));
    });

    it('measures the same depth, error and S/N in the same box', () => {
      for (const boxes of [known.snr, known.likelihood])
        known.periods.forEach((periodDays, i) => {
          // astropy counts points strictly inside; a hair keeps those on an edge out.
          const box = { periodDays, epochDays: boxes.epoch[i]!, durationDays: boxes.duration[i]! - 1e-9 };
          const measure = measureBox(time, flux, error, box)!;
          expect(measure.depth).toBeCloseTo(boxes.depth[i]!, 11);
          expect(measure.depthError).toBeCloseTo(boxes.depthError[i]!, 11);
          expect(measure.signalToNoise).toBeCloseTo(boxes.signalToNoise[i]!, 7);
        });
    });

    it('finds as good a box up to the width of its phase bins', () => {
      // A window on bins misses the best one by at most half a bin at either edge, and its width by half a bin more:
      // in all 1.5 bins of a box of ten or more, of which a random part is lost. The points between the edges carry
      // noise of their own, about the root of that part of one sigma squared: 0.4.
      known.periods.forEach((periodDays, i) => {
        const bound = (1.5 / 2 / BINS_PER_BOX) * known.snr.signalToNoise[i]! + 0.4;
        expect(Math.abs(search(periodDays, BINS_PER_BOX) - known.snr.signalToNoise[i]!)).toBeLessThan(bound);
      });
    });

    it('misses no box with fine bins', () => {
      // That it finds better boxes, between astropy's lattice of a twentieth of the box, is no fault: they are exact.
      known.periods.forEach((periodDays, i) => {
        expect(search(periodDays, 300)).toBeGreaterThan(0.99 * known.snr.signalToNoise[i]!);
      });
    });

    it('gives the exact depth and S/N of the box it returns', () => {
      for (const periodDays of known.periods) {
        search(periodDays, BINS_PER_BOX);
        const measures = [-1e-9, 1e-9].map(
          (hair) => measureBox(time, flux, error, { ...best, periodDays, durationDays: best.durationDays + hair })!,
        );
        // A point on an edge may count either way.
        const closest = measures.sort((a, b) => distance(a.depth) - distance(b.depth))[0]!;
        expect(closest.depth).toBeCloseTo(best.depth, 11);
        expect(closest.signalToNoise).toBeCloseTo(best.signalToNoise, 7);
      }
    });

    const distance = (depth: number): number => Math.abs(depth - best.depth);
  },
);
