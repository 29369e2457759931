import { MAD_TO_SIGMA, median } from '../../../src/core/robust-statistics.ts';
import { LEAST_WINDOWS } from './event-durations.ts';
import { BOTH_SIDES } from './fit-template.ts';
import { type FilterOutput, ONE_SIDE_EVERY } from './slide-template.ts';

/** Local noise is measured in blocks of so many durations, of which half must have data. */
const BLOCK_DURATIONS = 100;
/** A block's own scatter has an error of a tenth: it counts when it exceeds the whole series' by this factor. */
const CLEARLY_NOISIER = 1.25;

/** Scatter of a filter's output in units of its error from white noise, never under 1. */
export interface FilterNoise {
  at(centre: number, sides: number): number;
}

/**
 * White and correlated noise at once: the robust scatter (1.4826 times the median modulus, about zero) of the very
 * box that looks for events, over the whole series, and over each block of a hundred durations where that is
 * clearly noisier. Apart for levels from both sides and from one, whose correlated noise is larger. Dips that fill
 * less than a few per cent of the time hardly enter; periodic ones should be masked.
 * After the idea of Pont, Zucker & Queloz (2006), MNRAS 373, 231: noise is what the same average shows elsewhere.
 *
 * @returns undefined where the data hold fewer than twenty independent durations
 */
export function measureFilterNoise(output: FilterOutput): FilterNoise | undefined {
  const { centres, box, sides, durationDays, strideDays } = output;
  const inside = box.filter((_, i) => sides[i] === BOTH_SIDES);
  const least = (LEAST_WINDOWS * durationDays) / strideDays;
  if (inside.length < least) return undefined;
  const overall = Math.max(1, scatterOf(inside));
  const isOneSideKnown = output.oneSided.length * ONE_SIDE_EVERY >= least;
  const oneSided = Math.max(overall, isOneSideKnown ? scatterOf(output.oneSided) : 0);
  const blockDays = BLOCK_DURATIONS * durationDays;
  const blocks = measureBlocks(output, blockDays);
  const excessAt = (centre: number): number => {
    const ratio = (blocks[Math.floor((centre - centres[0]!) / blockDays)] ?? 0) / overall;
    return ratio > CLEARLY_NOISIER ? ratio : 1;
  };
  return { at: (centre, from) => excessAt(centre) * (from === BOTH_SIDES ? overall : oneSided) };
}

const scatterOf = (values: Float64Array): number => MAD_TO_SIGMA * median(values.map(Math.abs));

/** Scatter in each block that is half full; others are left undefined. */
function measureBlocks(output: FilterOutput, blockDays: number): (number | undefined)[] {
  const { centres, box, sides, strideDays } = output;
  const blocks: (number | undefined)[] = [];
  for (let from = 0; from < centres.length; ) {
    const block = blocks.length;
    let end = from;
    while (end < centres.length && centres[end]! - centres[0]! < (block + 1) * blockDays) end += 1;
    const values = box.slice(from, end).filter((_, i) => sides[from + i] === BOTH_SIDES);
    blocks.push(values.length >= blockDays / 2 / strideDays ? scatterOf(values) : undefined);
    from = end;
  }
  return blocks;
}
