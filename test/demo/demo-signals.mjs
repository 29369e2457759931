/** What each invented target does to its light: signals, and the truths written about them. */
import { createLehmer } from './lehmer.mjs';
import {
  contactDuration,
  createEclipses,
  createTransit,
  scaledAxis,
  secondaryDelay,
  smearOverExposure,
} from './transit-shape.mjs';

/** Quadratic limb darkening of every star here. @type {readonly [number, number]} */
export const LIMB = [0.4, 0.25];
/** Mean density of the Sun, g cm^-3: 3 GM / (4 pi G R^3) from IAU 2015 Resolution B3 and CODATA 2018 G. */
export const SOLAR_DENSITY_CGS = 1.4098;
const MINUTES_PER_DAY = 1440;

/** Mid-times of the dips that three targets share, and their shape. */
export const SHARED_DIPS = { times: [17.36, 31.05, 44.74, 58.43], durationDays: 0.3, depth: 0.00041 };
export const SENSITIVITY_DROP = { depth: 0.0042, recoveryDays: 0.32 };

/** @typedef {import('./demo-targets.mjs').DemoTarget} DemoTarget */
/** @typedef {(timeDays: number) => number} FluxAt */
/**
 * @typedef {object} Signal
 * @property {string} what
 * @property {FluxAt} flux of this signal alone, before smearing; 1 where it takes nothing away
 * @property {number | undefined} periodDays
 * @property {number} epochDays
 * @property {number} durationDays
 * @property {readonly number[]} [times] of events that are not strictly periodic
 * @property {Record<string, number>} [more]
 */

/**
 * @param {DemoTarget} target
 * @returns {Signal[]} one for each kind of dip: an eclipsing pair has two, which share one flux function
 */
export function signalsOf(target) {
  const single = target.kind === 'single event';
  return [
    ...(target.planets ?? []).map((planet) => planetSignal(target, planet, single)),
    ...(target.pair === undefined ? [] : pairSignals(target.pair)),
    ...(target.contact === undefined ? [] : contactSignals(target.contact)),
    ...(target.sharedDips ? [sharedDipSignal()] : []),
    ...(target.sensitivityDrops === undefined ? [] : [dropSignal(target.sensitivityDrops)]),
  ];
}

/** @param {{ mass: number, radius: number }} star */
export const densityOf = ({ mass, radius }) => (SOLAR_DENSITY_CGS * mass) / (radius * radius * radius);

/** @param {DemoTarget} target @param {import('./demo-targets.mjs').Planet} planet @param {boolean} single @returns {Signal} */
function planetSignal(target, planet, single) {
  const { periodDays, epochDays, radiusRatio, impact, ttv } = planet;
  const axis = scaledAxis(densityOf(target.star), periodDays);
  const orbit = { periodDays, epochDays, axis, impact };
  const strict = createTransit(orbit, radiusRatio, LIMB);
  const delay = ttv === undefined ? undefined : timingDelay(planet, ttv);
  return {
    what: single ? 'one transit' : 'transit',
    flux: delay === undefined ? strict : (t) => strict(t - delay(t)),
    periodDays: single ? undefined : periodDays,
    epochDays,
    durationDays: contactDuration(orbit, radiusRatio, epochDays),
    ...(delay === undefined ? {} : { times: eventTimes(planet).map((t) => t + delay(t)) }),
    more: { radiusRatio, impact, scaledAxis: axis, ...(single ? { truePeriodDays: periodDays } : {}) },
  };
}

/**
 * The delay of the event nearest in time: constant through each event, so that its shape is kept.
 * @param {{ periodDays: number, epochDays: number }} ephemeris
 * @param {{ minutes: number, periodDays: number, phase: number }} ttv
 * @returns {FluxAt}
 */
function timingDelay({ periodDays, epochDays }, ttv) {
  return (t) => {
    const event = epochDays + periodDays * Math.round((t - epochDays) / periodDays);
    return (ttv.minutes / MINUTES_PER_DAY) * Math.sin((2 * Math.PI * event) / ttv.periodDays + ttv.phase);
  };
}

/** Linear mid-times within the span of the survey. @param {{ periodDays: number, epochDays: number }} ephemeris */
function eventTimes({ periodDays, epochDays }) {
  const times = [];
  for (let t = epochDays; t < 67; t += periodDays) times.push(t);
  return times;
}

/** @param {import('./demo-targets.mjs').Pair} pair @returns {Signal[]} */
function pairSignals(pair) {
  const { periodDays, epochDays, impact, eccentricity = 0, omegaDegrees = 90 } = pair;
  const axis = scaledAxis(densityOf(pair.star) * (1 + pair.massRatio), periodDays);
  const orbit = { periodDays, epochDays, axis, impact, eccentricity, omegaDegrees };
  const both = createEclipses(orbit, pair, LIMB);
  const share = pair.lightFraction ?? 1;
  const secondaryDays = epochDays + secondaryDelay(orbit);
  const shared = { periodDays, flux: (/** @type {number} */ t) => 1 - share * (1 - both(t)) };
  const more = { radiusRatio: pair.radiusRatio, surfaceRatio: pair.surfaceRatio, impact, scaledAxis: axis };
  const phase = { secondaryPhase: secondaryDelay(orbit) / periodDays, eccentricity, omegaDegrees };
  const duration = (/** @type {number} */ t) => contactDuration(orbit, pair.radiusRatio, t);
  return [
    { ...shared, what: 'primary eclipse', epochDays, durationDays: duration(epochDays), more: { ...more, ...phase } },
    { ...shared, what: 'secondary eclipse', epochDays: secondaryDays, durationDays: duration(secondaryDays) },
  ];
}

/**
 * A contact binary as three harmonics of its orbit: two broad minima, the first the deeper, 1 at the higher maximum.
 * @param {{ periodDays: number, epochDays: number }} contact @returns {Signal[]}
 */
function contactSignals({ periodDays, epochDays }) {
  /** @type {FluxAt} */
  const shape = (t) => {
    const angle = (2 * Math.PI * (t - epochDays)) / periodDays;
    return 1 - 0.082 * (1 + Math.cos(2 * angle)) - 0.02 * (Math.cos(4 * angle) - 1) - 0.007 * Math.cos(angle);
  };
  const top = highest(shape, epochDays, periodDays);
  const shared = { periodDays, flux: (/** @type {number} */ t) => shape(t) / top, durationDays: periodDays / 4 };
  return [
    { ...shared, what: 'primary minimum', epochDays },
    { ...shared, what: 'secondary minimum', epochDays: epochDays + periodDays / 2 },
  ];
}

/** @param {FluxAt} flux @param {number} start @param {number} length */
function highest(flux, start, length) {
  let top = -Infinity;
  for (let i = 0; i < 1000; i += 1) top = Math.max(top, flux(start + (length * i) / 1000));
  return top;
}

/** @returns {Signal} */
function sharedDipSignal() {
  const { times, durationDays, depth } = SHARED_DIPS;
  /** Falls within a sixth of its length and comes back slowly, as no orbit would have it. @type {FluxAt} */
  const flux = (t) => {
    const nearest = times.find((time) => Math.abs(t - time) < durationDays / 2);
    if (nearest === undefined) return 1;
    const x = (t - nearest) / durationDays + 0.5;
    return 1 - depth * Math.min(1, 6 * x, 2.2 * (1 - x));
  };
  return { what: 'dips of the instrument', flux, periodDays: 13.69, epochDays: 17.36, durationDays, times };
}

/** @param {readonly number[]} times @returns {Signal} */
function dropSignal(times) {
  const { depth, recoveryDays } = SENSITIVITY_DROP;
  /** @type {FluxAt} */
  const flux = (t) => {
    const last = times.findLast((time) => time <= t);
    return last === undefined ? 1 : 1 - depth * Math.exp((last - t) / recoveryDays);
  };
  const middle = times.map((time) => time + recoveryDays / 2);
  return {
    what: 'losses of sensitivity',
    flux,
    periodDays: undefined,
    epochDays: Number(middle[0]),
    durationDays: recoveryDays,
    times: middle,
  };
}

/**
 * All the dips of a target together, as the detector would record them without noise.
 * @param {DemoTarget} target @returns {FluxAt}
 */
export function createDips(target) {
  const fluxes = [...new Set(signalsOf(target).map(({ flux }) => flux))];
  /** @type {FluxAt} */
  const together = (t) => fluxes.reduce((product, flux) => product * flux(t), 1);
  return smearOverExposure(together, exposureDaysOf(target));
}

/** @param {DemoTarget} target */
export const exposureDaysOf = ({ cadenceMinutes }) => cadenceMinutes / MINUTES_PER_DAY;

/**
 * What the star does by itself: spots, pulsation and flares, smeared over the exposure.
 * @param {DemoTarget} target @returns {FluxAt} relative flux about 1
 */
export function createVariability(target) {
  const parts = [createSpots(target), createPulsation(target.modes ?? []), createFlares(target.flares ?? [])];
  return smearOverExposure((t) => parts.reduce((sum, part) => sum + part(t), 1), exposureDaysOf(target));
}

/**
 * Spots: each turns at its own latitude's rate and comes and goes; a harmonic makes it other than a sine.
 * @param {DemoTarget} target @returns {FluxAt}
 */
function createSpots({ id, spots }) {
  const random = createLehmer(`sable ridge ${id} spots`);
  const each = Array.from({ length: spots.count }, () => ({
    period: spots.rotationDays * (1 + 0.05 * random.between(-1, 1)),
    phase: random.between(0, 2 * Math.PI),
    harmonicPhase: random.between(0, 2 * Math.PI),
    life: random.between(28, 60),
    lifePhase: random.between(0, 2 * Math.PI),
    amplitude: (spots.amplitudePpm * 1e-6 * random.between(0.6, 1.2)) / Math.sqrt(spots.count),
  }));
  return (t) =>
    each.reduce((sum, { period, phase, harmonicPhase, life, lifePhase, amplitude }) => {
      const turn = (2 * Math.PI * t) / period;
      const strength = 0.65 + 0.35 * Math.sin((2 * Math.PI * t) / life + lifePhase);
      return sum - amplitude * strength * (Math.cos(turn + phase) + 0.35 * Math.cos(2 * turn + harmonicPhase));
    }, 0);
}

/** @param {readonly import('./demo-targets.mjs').Mode[]} modes @returns {FluxAt} */
function createPulsation(modes) {
  return (t) =>
    modes.reduce(
      (sum, { periodDays, amplitudePpm }, i) =>
        sum + 1e-6 * amplitudePpm * Math.sin((2 * Math.PI * t) / periodDays + 1.7 * i),
      0,
    );
}

/** Fast linear rise, two-part exponential decay. @param {readonly import('./demo-targets.mjs').Flare[]} flares @returns {FluxAt} */
function createFlares(flares) {
  const riseDays = 4 / MINUTES_PER_DAY;
  return (t) =>
    flares.reduce((sum, { days, amplitude, decayMinutes }) => {
      const since = t - days;
      if (since < -riseDays || since > 1) return sum;
      if (since < 0) return sum + amplitude * (1 + since / riseDays);
      const x = (since * MINUTES_PER_DAY) / decayMinutes;
      return sum + amplitude * (0.7 * Math.exp(-2.2 * x) + 0.3 * Math.exp(-0.6 * x));
    }, 0);
}
