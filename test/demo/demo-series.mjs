/** The invented instrument: when it looked, what it added, and the columns that came out. */
import { createDips, createVariability, exposureDaysOf, SHARED_DIPS } from './demo-signals.mjs';
import { createLehmer } from './lehmer.mjs';

/** Spans of observation, BJD_TDB - 2459000: two segments, each with a pause of 1.5 days. */
export const WINDOWS = [
  [12.3, 22.7],
  [24.2, 34.6],
  [44.0, 54.6],
  [56.1, 67.0],
];
/** Meaning of the quality bits. */
export const FLAGS = { particle: 1, wheels: 2, strayLight: 4, missing: 8 };
/** Moments at which the reaction wheels were slowed; the star shifts for about an hour. */
const WHEEL_TIMES = [14.9, 19.15, 27.65, 31.9, 46.2, 50.45, 57.25, 61.5, 65.75];
const WHEEL_DAYS = 0.045;

/**
 * @typedef {object} DemoSeries
 * @property {Float64Array} time middle of exposure, BJD_TDB - 2459000, days
 * @property {Float64Array} dips noise-free, relative
 * @property {Float64Array} variability noise-free, relative
 * @property {Float64Array} raw electron/s; NaN where missing
 * @property {Float64Array} corrected electron/s; NaN where missing
 * @property {Float64Array} error electron/s
 * @property {Float64Array} quality
 * @property {Float64Array} centroidX pixels
 * @property {Float64Array} centroidY pixels
 * @property {Float64Array} background electron/s
 * @property {number} level electron/s of the star
 */

/** @typedef {import('./demo-targets.mjs').DemoTarget} DemoTarget */

/** @param {DemoTarget} target @returns {DemoSeries} */
export function makeSeries(target) {
  const time = timesOf(target);
  const level = Math.round(60000 * Math.exp((Math.LN10 / 2.5) * (11 - target.star.mag)));
  const dips = time.map(createDips(target));
  const variability = time.map(createVariability(target));
  const quality = flagTimes(target, time);
  const noise = makeNoise(target, time, quality);
  const drift = createDrift(target);
  const missing = (/** @type {number} */ i) => (Number(quality[i]) & FLAGS.missing ? Number.NaN : 1);
  /** @param {number} share of the drift that is left @param {number} wheelShare */
  const flux = (share, wheelShare) =>
    time.map((t, i) => {
      const wheels = Number(quality[i]) & FLAGS.wheels ? -0.0011 * wheelShare : 0;
      const star = level * Number(dips[i]) * Number(variability[i]);
      return missing(i) * star * (1 + share * drift(t) + wheels) * (1 + Number(noise[i]));
    });
  return {
    time,
    dips,
    variability,
    level,
    quality,
    raw: flux(1, 1),
    corrected: flux(0.05, 0.4),
    error: time.map((_, i) => missing(i) * level * target.noisePpm * 1e-6),
    ...makeCovariates(target, time, quality, dips),
  };
}

/** @param {DemoTarget} target */
function timesOf(target) {
  const exposure = exposureDaysOf(target);
  // Light reaches the barycentre earlier or later by up to a minute across the invented field.
  const lightTime = createLehmer(`sable ridge ${target.id} light time`).between(-6e-4, 6e-4);
  const times = WINDOWS.flatMap(([start, end]) => {
    const count = Math.floor((Number(end) - Number(start)) / exposure + 1e-6);
    return Array.from({ length: count }, (_, i) => Number(start) + (i + 0.5) * exposure + lightTime);
  });
  return Float64Array.from(times);
}

/** @param {DemoTarget} target @param {Float64Array} time */
function flagTimes(target, time) {
  const random = createLehmer(`sable ridge ${target.id} flags`);
  const lost = random.between(0.15, 0.85);
  const lostStart = 59.2 + lost;
  return time.map((t) => {
    let flags = 0;
    if (random.uniform() < 0.004) flags |= FLAGS.missing;
    if (t > lostStart && t < lostStart + 0.12) flags |= FLAGS.missing;
    if (WHEEL_TIMES.some((wheel) => Math.abs(t - wheel) < WHEEL_DAYS / 2)) flags |= FLAGS.wheels;
    if (strayLight(t) > 0.5) flags |= FLAGS.strayLight;
    if (random.uniform() < 0.0022) flags |= FLAGS.particle;
    return flags;
  });
}

/** Rises to 1 at the end of each window. @param {number} t */
function strayLight(t) {
  const window = WINDOWS.find(([start, end]) => t >= Number(start) - 0.01 && t <= Number(end) + 0.01);
  return window === undefined ? 0 : Math.exp((t - Number(window[1])) / 0.22);
}

/**
 * White noise, and particle hits on the high side, of which a third was not flagged.
 * @param {DemoTarget} target @param {Float64Array} time @param {Float64Array} quality
 */
function makeNoise({ id, noisePpm }, time, quality) {
  const random = createLehmer(`sable ridge ${id} noise`);
  const sigma = noisePpm * 1e-6;
  return time.map((_, i) => {
    const white = sigma * random.normal();
    if (!(Number(quality[i]) & FLAGS.particle)) return white;
    if (random.uniform() < 1 / 3) quality[i] = Number(quality[i]) & ~FLAGS.particle;
    return white + sigma * random.between(6, 28);
  });
}

/**
 * Slow change of sensitivity: per window a level, a parabola, a settling and a slow wave.
 * @param {DemoTarget} target
 */
function createDrift({ id }) {
  const random = createLehmer(`sable ridge ${id} drift`);
  const each = WINDOWS.map(() => ({
    level: random.between(-0.0012, 0.0012),
    slope: random.between(-0.0018, 0.0018),
    curve: random.between(-0.0014, 0.0014),
    settling: random.between(-0.0016, 0.0016),
    wave: random.between(0.0001, 0.0004),
    wavePhase: random.between(0, 2 * Math.PI),
  }));
  return (/** @type {number} */ t) => {
    const index = Math.max(
      0,
      WINDOWS.findLastIndex(([start]) => t >= Number(start) - 0.01),
    );
    const [start, end] = /** @type {[number, number]} */ (WINDOWS[index]);
    const { level, slope, curve, settling, wave, wavePhase } = /** @type {(typeof each)[number]} */ (each[index]);
    const x = (2 * (t - start)) / (end - start) - 1;
    const slow = wave * Math.sin((2 * Math.PI * t) / 4.3 + wavePhase);
    return level + slope * x + curve * x * x + settling * Math.exp((start - t) / 0.45) + slow;
  };
}

/**
 * Where the light fell, and the sky. A blended pair pulls the centroid towards the target when it dims.
 * @param {DemoTarget} target @param {Float64Array} time @param {Float64Array} quality @param {Float64Array} dips
 */
function makeCovariates(target, time, quality, dips) {
  const random = createLehmer(`sable ridge ${target.id} pixels`);
  const home = [random.between(180, 1860), random.between(180, 1860)];
  const sky = random.between(40, 90);
  /** @param {0 | 1} axis */
  const centroid = (axis) => {
    const phase = random.between(0, 2 * Math.PI);
    const offset = target.pair?.offsetPixels?.[axis] ?? 0;
    const share = target.pair?.lightFraction ?? 0;
    return time.map((t, i) => {
      const flags = Number(quality[i]);
      if (flags & FLAGS.missing) return Number.NaN;
      const pointing = 0.006 * Math.sin((2 * Math.PI * t) / 13.1 + phase) + 0.0009 * random.normal();
      const neighbour = (offset * (share - (1 - Number(dips[i])))) / Number(dips[i]);
      return Number(home[axis]) + pointing + neighbour + (flags & FLAGS.wheels ? 0.02 : 0);
    });
  };
  const centroidX = centroid(0);
  const centroidY = centroid(1);
  const background = time.map((t) => {
    const near = SHARED_DIPS.times.some((dip) => Math.abs(t - dip) < SHARED_DIPS.durationDays / 2);
    const wave = 1 + 0.05 * Math.sin((2 * Math.PI * t) / 27.3) + 0.6 * strayLight(t);
    return sky * (wave + (target.sharedDips && near ? 0.12 : 0)) + 0.6 * random.normal();
  });
  return { centroidX, centroidY, background };
}
