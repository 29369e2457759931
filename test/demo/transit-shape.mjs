/**
 * Light lost when one disc passes before another, by plain numerical integration: slow, independent of any closed
 * form that the program uses, and exact to better than 1e-6.
 */

/** Newton's constant in cgs, CODATA 2018. */
const GRAVITATION_CGS = 6.6743e-8;
const SECONDS_PER_DAY = 86400;
const NODES = gaussLegendre(64);

/**
 * Relative flux of a star with I(mu) = 1 - u1 (1 - mu) - u2 (1 - mu)^2 behind an opaque disc.
 * The covered arc of each stellar annulus is summed by Gauss-Legendre quadrature; r is replaced by an angle so that
 * the square-root ends of the integrand become smooth.
 *
 * @param {number} separation of the centres, stellar radii
 * @param {number} radiusRatio of the disc to the star; may exceed 1
 * @param {readonly [number, number]} limb u1, u2
 */
export function occultedFlux(separation, radiusRatio, [u1, u2]) {
  const z = Math.abs(separation);
  const k = radiusRatio;
  if (z >= 1 + k) return 1;
  if (k >= 1 + z) return 0;
  const whole = fluxWithin(1, u1, u2);
  let covered = z < k ? fluxWithin(Math.min(1, k - z), u1, u2) : 0;
  const inner = Math.abs(z - k);
  const half = (Math.min(1, z + k) - inner) / 2;
  if (half <= 0 || z < 1e-12) return 1 - covered / whole;
  for (const { x, weight } of NODES) {
    const angle = (Math.PI * (1 + x)) / 2;
    const r = inner + half * (1 - Math.cos(angle));
    const cosine = (r * r + z * z - k * k) / (2 * r * z);
    const arc = 2 * Math.acos(Math.max(-1, Math.min(1, cosine)));
    covered += weight * (Math.PI / 2) * half * Math.sin(angle) * arc * r * intensity(r, u1, u2);
  }
  return 1 - covered / whole;
}

/** @param {number} r @param {number} u1 @param {number} u2 */
function intensity(r, u1, u2) {
  const dark = 1 - Math.sqrt(Math.max(0, (1 - r) * (1 + r)));
  return 1 - u1 * dark - u2 * dark * dark;
}

/** Flux inside stellar radius r, by elementary integration. @param {number} r @param {number} u1 @param {number} u2 */
function fluxWithin(r, u1, u2) {
  const m2 = Math.max(0, 1 - r * r);
  const m3 = m2 * Math.sqrt(m2);
  return Math.PI * ((1 - u1 - u2) * r * r + ((u1 + 2 * u2) * 2 * (1 - m3)) / 3 - (u2 * (1 - m2 * m2)) / 2);
}

/**
 * Orbit's semi-major axis in stellar radii from Kepler's third law, (G rho P^2 / 3 pi)^(1/3).
 * Source: Seager & Mallen-Ornelas (2003), ApJ 585, 1038, eq. 9 with a massless companion.
 *
 * @param {number} densityCgs mean density of the star times (1 + mass ratio), g cm^-3
 * @param {number} periodDays
 */
export function scaledAxis(densityCgs, periodDays) {
  const seconds = periodDays * SECONDS_PER_DAY;
  return Math.cbrt((GRAVITATION_CGS * densityCgs * seconds * seconds) / (3 * Math.PI));
}

/**
 * @typedef {object} Orbit
 * @property {number} periodDays
 * @property {number} epochDays inferior conjunction
 * @property {number} axis semi-major axis in stellar radii
 * @property {number} impact projected separation at that conjunction, stellar radii
 * @property {number} [eccentricity]
 * @property {number} [omegaDegrees] argument of periastron of the star's orbit
 */

/**
 * Projected separation of the two centres. Source: Winn (2010), arXiv:1001.2010, eqs. 1, 5 and 7.
 *
 * @param {Orbit} orbit
 * @returns {(timeDays: number) => { separation: number, companionInFront: boolean }} separation in stellar radii
 */
export function createSeparation({ periodDays, epochDays, axis, impact, eccentricity = 0, omegaDegrees = 90 }) {
  const omega = (omegaDegrees * Math.PI) / 180;
  const semiLatus = axis * (1 - eccentricity * eccentricity);
  const cosInclination = (impact * (1 + eccentricity * Math.sin(omega))) / semiLatus;
  const sin2Inclination = 1 - cosInclination * cosInclination;
  const meanAtEpoch = meanFromTrue(Math.PI / 2 - omega, eccentricity);
  return (timeDays) => {
    const mean = meanAtEpoch + (2 * Math.PI * (timeDays - epochDays)) / periodDays;
    const anomaly = trueFromMean(mean, eccentricity);
    const height = Math.sin(omega + anomaly);
    const distance = semiLatus / (1 + eccentricity * Math.cos(anomaly));
    return {
      separation: distance * Math.sqrt(Math.max(0, 1 - height * height * sin2Inclination)),
      companionInFront: height > 0,
    };
  };
}

/**
 * Time from inferior to superior conjunction, days.
 *
 * @param {Orbit} orbit
 */
export function secondaryDelay({ periodDays, eccentricity = 0, omegaDegrees = 90 }) {
  const omega = (omegaDegrees * Math.PI) / 180;
  const first = meanFromTrue(Math.PI / 2 - omega, eccentricity);
  const second = meanFromTrue(-Math.PI / 2 - omega, eccentricity);
  const cycles = (second - first) / (2 * Math.PI);
  return periodDays * (cycles - Math.floor(cycles));
}

/** @param {number} anomaly @param {number} e */
function meanFromTrue(anomaly, e) {
  const eccentric = 2 * Math.atan(Math.sqrt((1 - e) / (1 + e)) * Math.tan(anomaly / 2));
  return eccentric - e * Math.sin(eccentric);
}

/** @param {number} mean @param {number} e */
function trueFromMean(mean, e) {
  if (e === 0) return mean;
  let eccentric = mean;
  for (let i = 0; i < 12; i += 1) {
    eccentric -= (eccentric - e * Math.sin(eccentric) - mean) / (1 - e * Math.cos(eccentric));
  }
  return 2 * Math.atan(Math.sqrt((1 + e) / (1 - e)) * Math.tan(eccentric / 2));
}

/**
 * A planet before its star.
 *
 * @param {Orbit} orbit @param {number} radiusRatio @param {readonly [number, number]} limb
 * @returns {(timeDays: number) => number} relative flux
 */
export function createTransit(orbit, radiusRatio, limb) {
  const separationAt = createSeparation(orbit);
  return (timeDays) => {
    const { separation, companionInFront } = separationAt(timeDays);
    return companionInFront ? occultedFlux(separation, radiusRatio, limb) : 1;
  };
}

/**
 * Two stars in mutual eclipse, spherical, with one limb law.
 *
 * @param {Orbit} orbit in radii of the first star
 * @param {{ radiusRatio: number, surfaceRatio: number }} companion relative to the first star
 * @param {readonly [number, number]} limb
 * @returns {(timeDays: number) => number} flux of both, 1 outside eclipse
 */
export function createEclipses(orbit, { radiusRatio, surfaceRatio }, limb) {
  const separationAt = createSeparation(orbit);
  const light = radiusRatio * radiusRatio * surfaceRatio;
  return (timeDays) => {
    const { separation, companionInFront } = separationAt(timeDays);
    const first = companionInFront ? occultedFlux(separation, radiusRatio, limb) : 1;
    const second = companionInFront ? 1 : occultedFlux(separation / radiusRatio, 1 / radiusRatio, limb);
    return (first + light * second) / (1 + light);
  };
}

/**
 * First to fourth contact about a conjunction, days, found by bisection on each side; 0 when the discs miss.
 *
 * @param {Orbit} orbit @param {number} radiusRatio @param {number} middleDays a conjunction
 */
export function contactDuration(orbit, radiusRatio, middleDays) {
  const separationAt = createSeparation(orbit);
  /** @param {number} sign */
  const contact = (sign) => {
    let inside = 0;
    let outside = orbit.periodDays / 5;
    for (let i = 0; i < 60; i += 1) {
      const middle = (inside + outside) / 2;
      if (separationAt(middleDays + sign * middle).separation < 1 + radiusRatio) inside = middle;
      else outside = middle;
    }
    return inside;
  };
  return contact(1) + contact(-1);
}

/**
 * What an exposure records of a changing flux: the mean of evenly spaced samples of it.
 * Source: Kipping (2010), MNRAS 408, 1758, section 4 (resampling).
 *
 * @param {(timeDays: number) => number} flux @param {number} exposureDays @param {number} [samples]
 * @returns {(middleDays: number) => number}
 */
export function smearOverExposure(flux, exposureDays, samples = 9) {
  return (middleDays) => {
    let sum = 0;
    for (let i = 0; i < samples; i += 1) sum += flux(middleDays + exposureDays * ((i + 0.5) / samples - 0.5));
    return sum / samples;
  };
}

/** Nodes and weights on (-1, 1), by Newton's method on the Legendre polynomial. @param {number} count */
function gaussLegendre(count) {
  return Array.from({ length: count }, (_, i) => {
    let x = Math.cos((Math.PI * (i + 0.75)) / (count + 0.5));
    let slope = 0;
    for (let pass = 0; pass < 20; pass += 1) {
      let [before, value] = [1, x];
      for (let n = 2; n <= count; n += 1) [before, value] = [value, ((2 * n - 1) * x * value - (n - 1) * before) / n];
      slope = (count * (x * value - before)) / (x * x - 1);
      x -= value / slope;
    }
    return { x, weight: 2 / ((1 - x * x) * slope * slope) };
  });
}
