import { measureFilterNoise } from './filter-noise.ts';
import { fitTemplate, makeTemplateFit, NO_SIDE } from './fit-template.ts';
import { makeSeriesSums } from './series-sums.ts';
import { boxOf, slideTemplate } from './slide-template.ts';
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
 * Where the data hold fewer than twenty durations the noise is taken as white.
 *
 * @param points with the known events taken out
 */
export function makeEventEvidence(points: UsablePoints, depth: number, durationDays: number): EventEvidence {
  const sums = makeSeriesSums(points);
  const stretches = findStretches(points.x, longestGapDays(durationDays));
  const noise = measureFilterNoise(slideTemplate(sums, stretches, durationDays));
  const cells = layCells(points, durationDays);
  const fit = makeTemplateFit();
  const measure = (cell: number): void => {
    const time = cells.start + cell * cells.stepDays;
    fitTemplate(sums, stretchAt(points.x, stretches, time), time, boxOf(durationDays), fit);
    const information = fit.information / (noise?.at(time, fit.sides) ?? 1) ** 2;
    cells.objection[cell] = soften(information * depth * (depth - 2 * fit.depth));
    const isGood = fit.sides !== NO_SIDE && fit.pointsInside * points.cadenceDays >= GOOD_COVERAGE * durationDays;
    cells.isGood[cell] = isGood ? 1 : 0;
  };
  return {
    stretches,
    objectionAt: (time, strayDays) => leastObjection(cells, time - strayDays, time + strayDays, measure),
    isOnGoodData: (time) => {
      const cell = cellAt(cells, time);
      if (!(cell >= 0 && cell < cells.isGood.length)) return false;
      if (Number.isNaN(cells.objection[cell])) measure(cell);
      return cells.isGood[cell] === 1;
    },
  };
}

/** Answers at evenly spaced times, filled in as they are asked for; NaN until then. */
interface Cells {
  readonly start: number;
  readonly stepDays: number;
  readonly objection: Float64Array;
  readonly isGood: Uint8Array;
}

function layCells({ x, spanDays }: UsablePoints, durationDays: number): Cells {
  const reach = spanDays + 2 * durationDays;
  const stepDays = Math.max(CELL * durationDays, reach / MOST_CELLS);
  const count = Math.ceil(reach / stepDays) + 1;
  return {
    start: x[0]! - durationDays,
    stepDays,
    objection: new Float64Array(count).fill(Number.NaN),
    isGood: new Uint8Array(count),
  };
}

const cellAt = ({ start, stepDays }: Cells, time: number): number => Math.round((time - start) / stepDays);

function leastObjection(cells: Cells, from: number, to: number, measure: (cell: number) => void): number {
  const last = Math.min(cells.objection.length - 1, cellAt(cells, to));
  let least = Number.POSITIVE_INFINITY;
  for (let cell = Math.max(0, cellAt(cells, from)); cell <= last; cell += 1) {
    if (Number.isNaN(cells.objection[cell])) measure(cell);
    least = Math.min(least, cells.objection[cell]!);
  }
  return Number.isFinite(least) ? least : 0;
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
    fitTemplate(sums, stretch, time, boxOf(durationDays), fit);
    information += fit.information;
    sum += fit.information * fit.depth;
  }
  return information > 0 ? { depth: sum / information, error: 1 / Math.sqrt(information) } : undefined;
}
