import type { PlacedTemplate } from './neighbourhood.ts';
import { boundWithin } from './stretches.ts';
import type { UsablePoints } from './usable-points.ts';

/** Least ingress over duration of a box: a companion of a tenth of the star's radius, centrally. */
const LEAST_INGRESS_FRACTION = 0.1;
/** Variance of the place of a step in Brownian motion with drift: Yao (1987), Ann. Stat. 15, 1321 (from memory). */
const STEP_PLACE_VARIANCE = 26;

/**
 * Error of a single event's mid-time, days, of the same three parts as that of a folded box (`box-errors.ts`):
 * T tau / (2 Q^2) from a sloped ingress tau (Carter et al. 2008, ApJ 689, 499: sigma of t_c), 26/2 T^2 / Q^4 where noise
 * lets sharp edges slide, and the width of what lies unobserved at either edge, over sqrt(48).
 *
 * @param signalToNoise Q: against white and correlated noise, with the level outside known, which timing hardly needs
 */
export function estimateTimeError(
  { x, cadenceDays }: UsablePoints,
  { centre, durationDays, ingressDays }: PlacedTemplate,
  signalToNoise: number,
): number {
  const least = Math.hypot(LEAST_INGRESS_FRACTION * durationDays, cadenceDays);
  const tau = Math.min(durationDays / 2, Math.max(ingressDays, least));
  const ingress = (durationDays * tau) / (2 * signalToNoise ** 2);
  const sliding = (STEP_PLACE_VARIANCE / 2) * (durationDays / signalToNoise ** 2) ** 2;
  const unseenAt = (edge: number): number => {
    const after = boundWithin(x, edge, 0, x.length);
    const gap = (x[after] ?? Number.POSITIVE_INFINITY) - (x[after - 1] ?? Number.NEGATIVE_INFINITY);
    return Math.min(gap, durationDays);
  };
  const sampling = unseenAt(centre - durationDays / 2) ** 2 + unseenAt(centre + durationDays / 2) ** 2;
  return Math.sqrt(ingress + sliding + sampling / 48);
}
