import type { EventEvidence } from './event-evidence.ts';
import type { CycleLine } from './fit-cycles.ts';

/** A predicted time is looked for within the allowed variation and so many errors of the prediction. */
const PREDICTION_SIGMA = 2;

export interface PeriodVerdict {
  /** Sum over the predicted events that are not among the marked ones. */
  readonly deltaChiSquare: number;
  readonly eventsPredicted: number;
  readonly eventsWithData: number;
}

/**
 * Asks the data about every event that a line predicts within the span, at the time within its errors and the allowed
 * variation, but not beyond its own cycle, that the data object to least.
 *
 * @param x days, times of the points
 * @param giveUpAt the sum at which the rest need not be asked
 */
export function judgePeriod(
  x: Float64Array,
  evidence: EventEvidence,
  line: CycleLine,
  durationDays: number,
  variationDays: number,
  giveUpAt: number,
): PeriodVerdict {
  const { epoch, periodDays, cycles } = line;
  const half = durationDays / 2;
  const firstCycle = (time: number): number => Math.ceil((time - half - epoch) / periodDays);
  const lastCycle = (time: number): number => Math.floor((time + half - epoch) / periodDays);
  let deltaChiSquare = 0;
  let eventsWithData = 0;
  for (const { from, end } of evidence.stretches) {
    const last = lastCycle(x[end - 1]!);
    for (let cycle = firstCycle(x[from]!); cycle <= last && deltaChiSquare < giveUpAt; cycle += 1) {
      const time = epoch + cycle * periodDays;
      const stray = Math.min(periodDays / 2, variationDays + PREDICTION_SIGMA * line.predictionError(cycle));
      const isMarked = cycles.includes(cycle);
      if (isMarked || evidence.isOnGoodData(time)) eventsWithData += 1;
      if (!isMarked) deltaChiSquare += evidence.objectionAt(time, stray);
    }
  }
  const eventsPredicted = Math.max(0, lastCycle(x.at(-1)!) - firstCycle(x[0]!) + 1);
  return { deltaChiSquare, eventsPredicted, eventsWithData };
}
