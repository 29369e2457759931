import { spawnSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import {
  BOTH_SIDES,
  fitTemplate,
  makeTemplateFit,
  solveTemplate,
} from '../../../workers/search/singles/fit-template.ts';
import { makeSeriesSums } from '../../../workers/search/singles/series-sums.ts';
import { boundWithin } from '../../../workers/search/singles/stretches.ts';
import { selectUsablePoints } from '../../../workers/search/singles/usable-points.ts';
import { seedRandom } from './seeded-series.ts';

interface Fit {
  readonly depth: number;
  readonly depthError: number;
  readonly pointsInside: number;
}

interface Recorded {
  readonly seed: number;
  readonly points: number;
  readonly span: number;
  readonly sum: number;
  readonly fits: readonly {
    readonly centre: number;
    readonly duration: number;
    readonly ingress: number;
    readonly sloped: Fit;
    readonly level: Fit;
  }[];
}

const here = (name: string): string => fileURLToPath(new URL(name, import.meta.url));
const recorded: Recorded = JSON.parse(readFileSync(here('./single-template.json'), 'utf8'));
const PYTHON = '/usr/bin/python3';
const hasNumpy = spawnSync(PYTHON, ['-c', 'import numpy']).status === 0;
if (!hasNumpy) console.warn('The recorded templates are not recomputed: /usr/bin/python3 cannot import numpy.');

function makeSums() {
  const random = seedRandom(recorded.seed);
  const time = Float64Array.from({ length: recorded.points }, () => recorded.span * random.uniform()).sort();
  const error = new Float64Array(time.length);
  const flux = time.map((at, i) => {
    error[i] = 0.001 + 0.002 * random.uniform();
    return 1 + 0.004 * at + error[i]! * random.normal() - (Math.abs(at - 4) < 0.25 ? 0.01 : 0);
  });
  const points = selectUsablePoints({ seriesId: 's', time, flux, error }, 'This');
  if (typeof points === 'string') throw new Error(points);
  return { flux, sums: makeSeriesSums(points) };
}

describe('a template with a local level and slope against least squares by numpy', () => {
  const { flux, sums } = makeSums();
  const { x, anchorDays } = sums.points;

  it.runIf(hasNumpy || process.env.CI !== undefined)('is recorded as numpy computes it today', () => {
    const run = spawnSync(PYTHON, [here('./single-template-record.py'), '--check'], { encoding: 'utf8' });
    expect(`${run.error ?? ''}${run.stdout}`.trim()).toBe('no difference');
    expect(run.status).toBe(0);
  });

  it('is of the same series', () => {
    expect(flux.reduce((sum, value) => sum + value, 0)).toBeCloseTo(recorded.sum, 9);
  });

  it.each(recorded.fits)('has the same depth and error at $centre, ingress $ingress', (known) => {
    const template = { durationDays: known.duration, ingressDays: known.ingress };
    const fit = makeTemplateFit();
    const centre = known.centre - anchorDays;
    fitTemplate(sums, { from: 0, end: x.length }, centre, template, fit);
    expect(fit.sides).toBe(BOTH_SIDES);
    expect(fit.pointsInside).toBe(known.sloped.pointsInside);
    expect(fit.depth).toBeCloseTo(known.sloped.depth, 11);
    expect(1 / Math.sqrt(fit.information)).toBeCloseTo(known.sloped.depthError, 11);
    const from = boundWithin(x, centre - 2.5 * known.duration, 0, x.length);
    const end = boundWithin(x, centre + 2.5 * known.duration, from, x.length);
    solveTemplate(sums, from, end, centre, template, false, fit);
    expect(fit.depth).toBeCloseTo(known.level.depth, 11);
    expect(1 / Math.sqrt(fit.information)).toBeCloseTo(known.level.depthError, 11);
  });
});
