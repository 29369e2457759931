import type { FilterNoise } from './filter-noise.ts';
import { measureFilterNoise } from './filter-noise.ts';
import type { Template } from './fit-template.ts';
import type { SeriesSums } from './series-sums.ts';
import { type FilterOutput, slideTemplate } from './slide-template.ts';
import { findStretches } from './stretches.ts';

/** The trapezoid that is slid beside the box; refinement tries others. */
const INGRESS_FRACTION = 0.25;
/** No level is taken across a gap longer than so many durations. */
const LONGEST_GAP_DURATIONS = 1;

/** A place where a template stands out. */
export interface Candidate {
  /** Days, as `x`. */
  readonly centre: number;
  readonly template: Template;
  readonly signalToNoise: number;
}

/** What one duration gave: its noise, undefined where there is too little data, and where it stands out. */
export interface DurationSearch {
  readonly durationDays: number;
  readonly noise: FilterNoise | undefined;
  readonly candidates: readonly Candidate[];
}

/**
 * Slides a box and a trapezoid of one duration. Both are held against the noise of the box, which smooths over as long
 * a time as the trapezoid.
 */
export function searchDuration(sums: SeriesSums, durationDays: number, threshold: number): DurationSearch {
  const stretches = findStretches(sums.points.x, longestGapDays(durationDays));
  const box = slideTemplate(sums, stretches, boxOf(durationDays));
  const noise = measureFilterNoise(box);
  if (noise === undefined) return { durationDays, noise, candidates: [] };
  const trapezoid = slideTemplate(sums, stretches, trapezoidOf(durationDays));
  return { durationDays, noise, candidates: [box, trapezoid].flatMap((one) => findMaxima(one, noise, threshold)) };
}

/** The same again near places where points were taken out; the noise stays what it was. */
export function searchAgain(
  sums: SeriesSums,
  { durationDays, noise }: DurationSearch,
  threshold: number,
  near: readonly number[],
): DurationSearch {
  if (noise === undefined) return { durationDays, noise, candidates: [] };
  const stretches = findStretches(sums.points.x, longestGapDays(durationDays));
  const candidates = [boxOf(durationDays), trapezoidOf(durationDays)].flatMap((template) =>
    findMaxima(slideTemplate(sums, stretches, template, near), noise, threshold),
  );
  return { durationDays, noise, candidates };
}

const boxOf = (durationDays: number): Template => ({ durationDays, ingressDays: 0 });
const trapezoidOf = (durationDays: number): Template => ({
  durationDays,
  ingressDays: INGRESS_FRACTION * durationDays,
});

export const longestGapDays = (durationDays: number): number => LONGEST_GAP_DURATIONS * durationDays;

function findMaxima(output: FilterOutput, noise: FilterNoise, threshold: number): Candidate[] {
  const { centres, significance, sides, template } = output;
  const found: Candidate[] = [];
  for (let i = 0; i < centres.length; i += 1) {
    const value = significance[i]!;
    if (value < threshold || value < (significance[i - 1] ?? 0) || value <= (significance[i + 1] ?? 0)) continue;
    const signalToNoise = value / noise.at(centres[i]!, sides[i]!);
    if (signalToNoise >= threshold) found.push({ centre: centres[i]!, template, signalToNoise });
  }
  return found;
}
