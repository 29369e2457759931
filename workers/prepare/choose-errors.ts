import { median, pointToPointScatter, robustSigma } from '../../src/core/robust-statistics.ts';

/** Stands in where the flux does not vary at all, relative. */
const SMALLEST_ERROR = 1e-6;
/** Given errors this far from the scatter of neighbours, either way, are worth a word. */
const SUSPICIOUS_RATIO = 2;

export interface ChosenErrors {
  /** One sigma, finite and positive. */
  readonly error: Float64Array;
  readonly origin: 'given' | 'estimated';
  readonly warnings: readonly string[];
}

/**
 * The errors of prepared flux: the given ones where at least half are usable (the rest take their median), else one
 * value for all, the scatter between neighbours.
 *
 * @param flux detrended, length n; @param given in the unit of flux, length n, or undefined
 */
export function chooseErrors(flux: Float64Array, given: Float64Array | undefined, column: string): ChosenErrors {
  const usable = given?.filter(isUsable) ?? new Float64Array(0);
  const scatter = estimateScatter(flux);
  if (given === undefined || usable.length * 2 < flux.length) return estimateErrors(flux, scatter, given, column);
  const typical = median(usable);
  const warnings = [];
  const bad = flux.length - usable.length;
  if (bad > 0) warnings.push(`${bad} points of "${column}" had no usable error and took the median of the others.`);
  const ratio = scatter / typical;
  if (ratio > SUSPICIOUS_RATIO || ratio < 1 / SUSPICIOUS_RATIO)
    warnings.push(
      `The errors given for "${column}" are ${describeRatio(ratio)} than the scatter between neighbouring points: S/N values inherit that.`,
    );
  return { error: given.map((sigma) => (isUsable(sigma) ? sigma : typical)), origin: 'given', warnings };
}

const isUsable = (sigma: number): boolean => sigma > 0 && Number.isFinite(sigma);

const describeRatio = (ratio: number): string =>
  ratio > 1 ? `${ratio.toFixed(1)} times smaller` : `${(1 / ratio).toFixed(1)} times larger`;

function estimateScatter(flux: Float64Array): number {
  return [pointToPointScatter(flux), robustSigma(flux)].find(isUsable) ?? SMALLEST_ERROR;
}

function estimateErrors(
  flux: Float64Array,
  scatter: number,
  given: Float64Array | undefined,
  column: string,
): ChosenErrors {
  const why =
    given === undefined ? `"${column}" has no errors` : `Most errors of "${column}" are missing or not positive`;
  const value = `${Number((scatter * 1e6).toPrecision(3))} ppm`;
  return {
    error: new Float64Array(flux.length).fill(scatter),
    origin: 'estimated',
    warnings: [`${why}: ${value} was estimated from the scatter between neighbouring points.`],
  };
}
