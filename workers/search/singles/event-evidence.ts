import { measureFilterNoise } from './filter-noise.ts';
import { fitTemplate, makeTemplateFit, NO_SIDE, type Template } from './fit-template.ts';
import { makeSeriesSums } from './series-sums.ts';
import { slideTemplate } from './slide-template.ts';
import { findStretches, type Stretch, stretchAt } from './stretches.ts';
import { longestGapDays } from './template-search.ts';
import type { UsablePoints } from './usable-points.ts';

/** Places are told apart to this part of the duration, unless the span would need more cells than `MOST_CELLS`. */
const CELL = 1 / 8;
const MOST_CELLS = 4_000_000;
/** Chance that what is seen at one place is the instrument's doing: no single place counts for more than 2 ln of it. */
const INSTRUMENT_CHANCE = 1e-4;
/** An event falls on good data when this part of its points is there, with a level beside them. */
const GOOD_COVERAGE = 0.5;
/** Beyond this the exponential says the same. */
const MOST_CHI_SQUARE = 200;

/** What the data say at any time of an event of a known depth and duration. Times in days, as `x`. */
export interface EventEvidence {
  readonly stretches: readonly Stretch[];
  /**
   * Chi-square with the event less chi-square without, capped: positive where it is absent, negative where there is a
   * dip, 0 without data. The least within `strayDays` of the time.
   */
  objectionAt(time: number, strayDays: number): number;
  isOnGoodData(time: number): boolean;
}

/**
 * Holds a box of the given depth against no box, both with a free local level (and slope, with a level on both sides).
 * With d the fitted depth and I its information over the squared noise of the same filter along the series (white and
 * correlated, `filter-noise.ts`), the difference of chi-square is I D (D - 2 d). It is then softened for the chance
 * that the instrument made or spoilt what is seen: r = exp(-difference/2) becomes ((1-e) r + e) / (1-e + e r), e = 1e-4,
 * so that one place changes a period's chance by at most a factor of 10,000 (our own choice).
 * Where the data hold fewer than twelve durations the noise is taken as white.
 *
 * @param points with the known events taken out
 */
export function makeEventEvidence(points: UsablePoints, depth: number, durationDays: number): EventEvidence {
  const template: Template = { durationDays, ingressDays: 0 };
  const sums = makeSeriesSums(points);
  const stretches = findStretches(points.x, longestGapDays(durationDays));
  const noise = measureFilterNoise(slideTemplate(sums, stretches, template));
  const start = points.x[0]! - durationDays;
  const cellDays = Math.max(CELL * durationDays, (points.spanDays + 2 * durationDays) / MOST_CELLS);
  const cells = Math.ceil((points.spanDays + 2 * durationDays) / cellDays) + 1;
  const objections = new Float64Array(cells).fill(Number.NaN);
  const good = new Uint8Array(cells);
  const fit = makeTemplateFit();
  const measure = (cell: number): void => {
    const time = start + cell * cellDays;
    fitTemplate(sums, stretchAt(points.x, stretches, time), time, template, fit);
    const information = fit.information / (noise?.at(time, fit.sides) ?? 1) ** 2;
    objections[cell] = soften(information * depth * (depth - 2 * fit.depth));
    const isGood = fit.sides !== NO_SIDE && fit.pointsInside * points.cadenceDays >= GOOD_COVERAGE * durationDays;
    good[cell] = isGood ? 1 : 0;
  };
  const cellAt = (time: number): number => Math.round((time - start) / cellDays);
  return {
    stretches,
    objectionAt: (time, strayDays) => {
      const last = Math.min(cells - 1, cellAt(time + strayDays));
      let least = Number.POSITIVE_INFINITY;
      for (let cell = Math.max(0, cellAt(time - strayDays)); cell <= last; cell += 1) {
        if (Number.isNaN(objections[cell])) measure(cell);
        least = Math.min(least, objections[cell]!);
      }
      return Number.isFinite(least) ? least : 0;
    },
    isOnGoodData: (time) => {
      const cell = cellAt(time);
      if (!(cell >= 0 && cell < cells)) return false;
      if (Number.isNaN(objections[cell])) measure(cell);
      return good[cell] === 1;
    },
  };
}

function soften(difference: number): number {
  const ratio = Math.exp(-Math.max(-MOST_CHI_SQUARE, Math.min(MOST_CHI_SQUARE, difference)) / 2);
  const sound = 1 - INSTRUMENT_CHANCE;
  return -2 * Math.log((sound * ratio + INSTRUMENT_CHANCE) / (sound + INSTRUMENT_CHANCE * ratio));
}

export interface MeasuredDepth {
  readonly depth: number;
  /** From white noise. */
  readonly error: number;
}

/**
 * Mean depth of boxes at the given times (as `x`), weighted by their information.
 *
 * @returns undefined when none has data and a level beside it
 */
export function measureMeanDepth(
  points: UsablePoints,
  times: readonly number[],
  durationDays: number,
): MeasuredDepth | undefined {
  const sums = makeSeriesSums(points);
  const stretches = findStretches(points.x, longestGapDays(durationDays));
  const fit = makeTemplateFit();
  let information = 0;
  let sum = 0;
  for (const time of times) {
    const stretch = stretchAt(points.x, stretches, time);
    fitTemplate(sums, stretch, time, { durationDays, ingressDays: 0 }, fit);
    information += fit.information;
    sum += fit.information * fit.depth;
  }
  return information > 0 ? { depth: sum / information, error: 1 / Math.sqrt(information) } : undefined;
}
