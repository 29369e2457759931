import type { FilterNoise } from './filter-noise.ts';
import { measureFilterNoise } from './filter-noise.ts';
import type { Template } from './fit-template.ts';
import type { SeriesSums } from './series-sums.ts';
import { boxOf, type FilterOutput, slideTemplate, trapezoidOf } from './slide-template.ts';
import { findStretches } from './stretches.ts';

/** A trapezoid cannot reach the threshold where the box has less than this part of it. */
const HOPE_OF_TRAPEZOID = 0.7;
/** No level is taken across a gap longer than this part of the duration. */
const LONGEST_GAP_DURATIONS = 0.5;

/** A place where a template stands out. */
export interface Candidate {
  /** Days, as `x`. */
  readonly centre: number;
  readonly template: Template;
  /** Depth over its error from white noise. */
  readonly significance: number;
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
 *
 * @param again searches only near places where points were taken out; the noise stays what it was
 */
export function searchDuration(
  sums: SeriesSums,
  durationDays: number,
  threshold: number,
  again?: { readonly noise: FilterNoise | undefined; readonly near: readonly number[] },
): DurationSearch {
  const stretches = findStretches(sums.points.x, longestGapDays(durationDays));
  const limits = { trapezoidFrom: HOPE_OF_TRAPEZOID * threshold, near: again?.near };
  const output = slideTemplate(sums, stretches, durationDays, limits);
  const noise = again === undefined ? measureFilterNoise(output) : again.noise;
  if (noise === undefined) return { durationDays, noise, candidates: [] };
  const boxes = findMaxima(output, output.box, boxOf(durationDays), noise, threshold);
  const trapezoids = findMaxima(output, output.trapezoid, trapezoidOf(durationDays), noise, threshold);
  return { durationDays, noise, candidates: [...boxes, ...trapezoids] };
}

export const longestGapDays = (durationDays: number): number => LONGEST_GAP_DURATIONS * durationDays;

function findMaxima(
  { centres, sides }: FilterOutput,
  significance: Float64Array,
  template: Template,
  noise: FilterNoise,
  threshold: number,
): Candidate[] {
  const found: Candidate[] = [];
  for (let i = 0; i < centres.length; i += 1) {
    const value = significance[i]!;
    if (value < threshold || value < (significance[i - 1] ?? 0) || value <= (significance[i + 1] ?? 0)) continue;
    if (value / noise.at(centres[i]!, sides[i]!) < threshold) continue;
    found.push({ centre: centres[i]!, template, significance: value });
  }
  return found;
}
