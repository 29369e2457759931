import type { FluxColumn, FluxUnit } from '../../src/core/light-curve.ts';

/** Flux near 1 and its error in the same unit; a missing error is NaN. */
export interface RelativeFlux {
  readonly raw: Float64Array;
  readonly error: Float64Array | undefined;
}

/** Whether depths of this unit stay in units of the scatter: then a trend is subtracted and not divided by. */
export const isInSigma = (unit: FluxUnit): boolean => unit === 'sigma';

/** Turns flux of one column into relative flux, given the median of the points that are kept. */
export type Normalise = (flux: Float64Array, error: Float64Array | undefined, medianFlux: number) => RelativeFlux;

/**
 * How a column's unit becomes flux near 1:
 * - magnitudes: 10^(-0.4 (m - median m)), Pogson (1856), MNRAS 17, 12; an error s becomes flux * 0.4 ln 10 * s;
 * - ppm: (1 + v / 1e6) over (1 + median / 1e6);
 * - sigma: 1 + v - median, so that a depth keeps its number in sigma;
 * - everything else is proportional to flux: v / median.
 */
export function normaliserOf(unit: FluxUnit): Normalise {
  if (unit === 'magnitude') return fromMagnitudes;
  if (unit === 'ppm') return (flux, error, centre) => affine(flux, error, 1e-6 / (1 + centre * 1e-6), centre);
  if (isInSigma(unit)) return (flux, error, centre) => affine(flux, error, 1, centre);
  return (flux, error, centre) => affine(flux, error, 1 / centre, centre);
}

/** Why a column cannot be normalised, if so. */
export function findUnitProblem({ name, unit }: FluxColumn, medianFlux: number): string | undefined {
  if (unit === 'magnitude' || isInSigma(unit)) return undefined;
  const centre = unit === 'ppm' ? 1 + medianFlux * 1e-6 : medianFlux;
  if (centre > 0) return undefined;
  return `The median of flux column "${name}" is ${Number(medianFlux.toPrecision(4))}, but flux must be positive to be divided by it: if the column holds ppm, magnitudes or multiples of its scatter, say so in the file's columns.`;
}

function affine(flux: Float64Array, error: Float64Array | undefined, scale: number, centre: number): RelativeFlux {
  return {
    raw: flux.map((value) => 1 + (value - centre) * scale),
    error: error?.map((sigma) => sigma * scale),
  };
}

function fromMagnitudes(flux: Float64Array, error: Float64Array | undefined, centre: number): RelativeFlux {
  const raw = flux.map((magnitude) => 10 ** (-0.4 * (magnitude - centre)));
  return { raw, error: error?.map((sigma, i) => 0.4 * Math.LN10 * sigma * raw[i]!) };
}
