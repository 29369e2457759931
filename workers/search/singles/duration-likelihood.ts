import { GRAVITATION_M3_KG_S2, SECONDS_PER_DAY } from '../../../src/core/constants.ts';

/** Steps of the impact angle: enough that the narrowest peak in it is seen by several. */
const STEPS_PER_WIDTH = 24;
const LEAST_STEPS = 128;
const MOST_STEPS = 4096;

/** What is known of a transit and its star; errors are of the logarithms. */
export interface TransitFacts {
  /** First to last contact, days. */
  readonly durationDays: number;
  readonly durationLogError: number;
  readonly densityCgs: number;
  readonly densityLogError: number;
  /** Ratio of radii. */
  readonly k: number;
}

/**
 * Natural logarithm, up to a constant, of the chance that an orbit of period P transits and does so for the observed
 * time: the integral over density rho (log-normal) and impact parameter b (even in 0 to 1 + k) of R/a(P, rho) times the
 * log-normal density of the observed duration about
 * T14 = (P/pi) asin sqrt(((1 + k)^2 - b^2) / (A^2 - b^2)), A = a/R = (G rho P^2 / 3 pi)^(1/3):
 * Seager & Mallén-Ornelas (2003), ApJ 585, 1038, eqs. 3 and 9, circular orbit, planet without mass.
 *
 * For each P and b the density that gives exactly the observed duration is known in closed form, and ln T falls with
 * ln rho along a straight line to far better than any duration is known; so the integral over rho is that of a product
 * of two normals and exp(-ln rho / 3). The one over b = (1 + k) sin(phi) is done by the midpoint rule, whose integrand
 * is even at one end and vanishes at the other. Checked against brute force by
 * `test/reference/search/single-period-record.py`.
 *
 * @returns -Infinity where no star can do it
 */
export function durationLogLikelihood(periodDays: number, facts: TransitFacts): number {
  const angle = (Math.PI * facts.durationDays) / periodDays;
  if (!(angle < Math.PI / 2)) return Number.NEGATIVE_INFINITY;
  const width = Math.hypot(facts.densityLogError, 3 * facts.durationLogError);
  const steps = Math.max(LEAST_STEPS, Math.min(MOST_STEPS, Math.ceil(STEPS_PER_WIDTH / width)));
  const step = Math.PI / 2 / steps;
  let most = Number.NEGATIVE_INFINITY;
  let sum = 0;
  for (let i = 0; i < steps; i += 1) {
    const term = logIntegrand((i + 0.5) * step, angle, periodDays, facts);
    if (term > most) {
      sum = sum * Math.exp(most - term) + 1;
      most = term;
    } else sum += Math.exp(term - most);
  }
  return sum > 0 ? most + Math.log(sum * step) - (2 / 3) * Math.log(periodDays) : Number.NEGATIVE_INFINITY;
}

/** 3 pi / G in g cm^-3 day^2. */
const DENSITY_UNIT = (3 * Math.PI) / (GRAVITATION_M3_KG_S2 * 1000 * SECONDS_PER_DAY ** 2);

function logIntegrand(phi: number, angle: number, periodDays: number, facts: TransitFacts): number {
  const edge = 1 + facts.k;
  const b = edge * Math.sin(phi);
  const sine = Math.sin(angle);
  const alongOrbit = ((edge * Math.cos(phi)) / sine) ** 2;
  const separation = alongOrbit + b * b;
  if (!(separation > edge * edge)) return Number.NEGATIVE_INFINITY;
  const logDensity = Math.log(DENSITY_UNIT / (periodDays * periodDays)) + 1.5 * Math.log(separation);
  // -d ln rho / d ln T at the observed duration; 3 for a wide orbit.
  const steepness = ((3 * alongOrbit) / separation) * (angle / Math.tan(angle));
  const known = facts.densityLogError ** 2;
  const seen = (steepness * facts.durationLogError) ** 2;
  const both = known + seen;
  const star = Math.log(facts.densityCgs);
  const mean = (star * seen + logDensity * known) / both;
  const variance = (known * seen) / both;
  return (
    Math.log(Math.cos(phi) * steepness) -
    0.5 * Math.log(both) -
    (logDensity - star) ** 2 / (2 * both) -
    mean / 3 +
    variance / 18
  );
}
