export interface Orbit {
  readonly periodDays: number;
  readonly epochDays: number;
  readonly axis: number;
  readonly impact: number;
  readonly eccentricity?: number;
  readonly omegaDegrees?: number;
}
type Limb = readonly [number, number];
type FluxAt = (timeDays: number) => number;

export function occultedFlux(separation: number, radiusRatio: number, limb: Limb): number;
export function scaledAxis(densityCgs: number, periodDays: number): number;
export function createSeparation(orbit: Orbit): (timeDays: number) => { separation: number; companionInFront: boolean };
export function secondaryDelay(orbit: Orbit): number;
export function createTransit(orbit: Orbit, radiusRatio: number, limb: Limb): FluxAt;
export function createEclipses(
  orbit: Orbit,
  companion: { radiusRatio: number; surfaceRatio: number },
  limb: Limb,
): FluxAt;
export function contactDuration(orbit: Orbit, radiusRatio: number, middleDays: number): number;
export function smearOverExposure(flux: FluxAt, exposureDays: number, samples?: number): FluxAt;
