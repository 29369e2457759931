import { GRAVITATION_M3_KG_S2, SECONDS_PER_DAY, SOLAR_DENSITY_CGS } from '../../src/core/constants.ts';

/** Density of the rocky body that the default shortest period lets survive, g cm^-3. */
const ROCKY_DENSITY_CGS = 5.5;

/**
 * The shortest period at which a rocky body of 5.5 g cm^-3 is not torn apart, 12.6 h (rho / 1 g cm^-3)^-1/2 = 5.4 h.
 * Source: Rappaport et al. (2013), ApJ 773, L15 (incompressible fluid; a strong core survives a little closer).
 */
export const ROCHE_PERIOD_DAYS = 12.6 / 24 / Math.sqrt(ROCKY_DENSITY_CGS);

/** G rho in day^-2. */
function gravitationDensity(densityCgs: number): number {
  return GRAVITATION_M3_KG_S2 * densityCgs * 1000 * SECONDS_PER_DAY ** 2;
}

/** Period of a circular orbit at the star's surface, days: sqrt(3 pi / (G rho)). No transit is faster. */
export function surfacePeriodDays(densityCgs: number): number {
  return Math.sqrt((3 * Math.PI) / gravitationDensity(densityCgs));
}

/**
 * Duration of a central transit of a small body on a circular orbit, days: (P / pi) R/a, R/a = (3 pi / (G rho P^2))^1/3.
 * Source: Seager & Mallén-Ornelas (2003), ApJ 585, 1038, in the limit of a small k and b = 0.
 */
export function centralDurationDays(periodDays: number, densityCgs: number): number {
  return (periodDays / Math.PI) * (surfacePeriodDays(densityCgs) / periodDays) ** (2 / 3);
}

/** The constant A of the grid, day^(-1/3): ((2 pi)^(2/3) / pi) R (G M)^(-1/3) / (S OS). Ofir (2014) eq. 6. */
export function frequencyStepConstant(densityCgs: number, spanDays: number, oversampling: number): number {
  // R (G M)^(-1/3) depends on the density alone: (3 / (4 pi G rho))^(1/3).
  const radiusTerm = Math.cbrt(3 / (4 * Math.PI * gravitationDensity(densityCgs)));
  return (((2 * Math.PI) ** (2 / 3) / Math.PI) * radiusTerm) / (spanDays * oversampling);
}

/** The number of frequencies before rounding; x = N lands on the highest frequency. Ofir (2014) eq. 7. */
export function frequencyCount(lowest: number, highest: number, stepConstant: number): number {
  return (Math.cbrt(highest) - Math.cbrt(lowest) + stepConstant / 3) * (3 / stepConstant);
}

export interface PeriodGridInput {
  readonly shortestPeriodDays: number;
  readonly longestPeriodDays: number;
  readonly spanDays: number;
  readonly oversampling: number;
  /** Solar where unknown. */
  readonly densityCgs: number | undefined;
}

/**
 * Trial periods such that neighbours drift by 1/oversampling of a central transit's duration over the span:
 * f_x = (A x / 3 + C)^3, x = 1..N, C = f_min^(1/3) - A/3. N is rounded up and the last frequency held at the highest.
 * Source: Ofir (2014), A&A 561, A138, eqs. 3-8.
 *
 * @returns days, ascending
 */
export function makePeriodGrid(input: PeriodGridInput): Float64Array {
  const { step, lowest, highest, count } = gridShape(input);
  const offset = Math.cbrt(lowest) - step / 3;
  const periods = new Float64Array(count);
  for (let x = 1; x <= count; x += 1) periods[count - x] = 1 / Math.min(highest, ((step * x) / 3 + offset) ** 3);
  return periods;
}

/** How many trials the grid has, without making it. */
export function countTrials(input: PeriodGridInput): number {
  return gridShape(input).count;
}

function gridShape(input: PeriodGridInput): { step: number; lowest: number; highest: number; count: number } {
  const step = frequencyStepConstant(input.densityCgs ?? SOLAR_DENSITY_CGS, input.spanDays, input.oversampling);
  const lowest = 1 / input.longestPeriodDays;
  const highest = 1 / input.shortestPeriodDays;
  // A hair is taken off so that rounding does not add a second trial at the highest frequency.
  return { step, lowest, highest, count: Math.max(1, Math.ceil(frequencyCount(lowest, highest, step) - 1e-9)) };
}
