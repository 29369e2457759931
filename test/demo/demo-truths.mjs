/** What is true of the invented targets: the answers that a search, a fit or an analyst can be held against. */
import { fileNameOf, round, SURVEY, TIME_ZERO_JD } from './demo-files.mjs';
import { densityOf, exposureDaysOf, LIMB, signalsOf } from './demo-signals.mjs';
import { smearOverExposure } from './transit-shape.mjs';

/** Points at which a dip's mean depth is taken. */
const DEPTH_SAMPLES = 400;
const HOURS_PER_DAY = 24;
const PPM = 1e6;

/**
 * @typedef {object} SignalTruth
 * @property {string} what
 * @property {number} [periodDays] absent where the dips have none
 * @property {number} epochBjdMinus2459000
 * @property {number} durationHours first to fourth contact
 * @property {number} depthPpm mean over that duration
 * @property {number} midDepthPpm
 * @property {number} eventsSeen
 * @property {number[]} [timesBjdMinus2459000]
 */

/** @param {readonly { target: import('./demo-targets.mjs').DemoTarget, series: import('./demo-series.mjs').DemoSeries }[]} made */
export function describeTruths(made) {
  return {
    survey: SURVEY,
    invented: true,
    note: 'Invented stars and signals; the truths behind the demo docket.',
    timeZeroJd: TIME_ZERO_JD,
    timeScale: 'TDB',
    limbDarkening: LIMB,
    depthMeaning:
      'depthPpm: mean loss over durationHours (first to fourth contact) of the signal smeared over the exposure, below the undimmed level; midDepthPpm: loss at the epoch, smeared alike',
    targets: made.map(({ target, series }) => describeTarget(target, series)),
  };
}

/** @param {import('./demo-targets.mjs').DemoTarget} target @param {import('./demo-series.mjs').DemoSeries} series */
function describeTarget(target, series) {
  const { id, kind, what, modes, flares, spots } = target;
  const rotates = spots.rotationDays < 25 && kind !== 'contact binary';
  return {
    target: id,
    file: fileNameOf(target),
    kind,
    what,
    cadenceMinutes: target.cadenceMinutes,
    noisePpm: target.noisePpm,
    inStarsTable: !target.unlisted,
    ...(target.unlisted ? {} : { densityGcc: round(densityOf(target.star), 4) }),
    ...(rotates ? { rotationDays: spots.rotationDays } : {}),
    signals: signalsOf(target).map((signal) => describeSignal(signal, exposureDaysOf(target), series.time)),
    ...boxPeriod(target),
    ...(modes === undefined ? {} : { modes }),
    ...(flares === undefined ? {} : { flareTimesBjdMinus2459000: flares.map(({ days }) => days) }),
  };
}

/** Where both eclipses are alike, a box search finds them as one. @param {import('./demo-targets.mjs').DemoTarget} target */
function boxPeriod({ id, pair }) {
  return id === 'SR-005' && pair !== undefined ? { boxPeriodDays: pair.periodDays / 2 } : {};
}

/** @param {import('./demo-signals.mjs').Signal} signal @param {number} exposureDays @param {Float64Array} time @returns {SignalTruth} */
function describeSignal(signal, exposureDays, time) {
  const { what, flux, periodDays, epochDays, durationDays, times, more } = signal;
  const smeared = smearOverExposure(flux, exposureDays);
  // A timing variation moves the event of the epoch too.
  const middle = times?.[0] ?? epochDays;
  let loss = 0;
  for (let i = 0; i < DEPTH_SAMPLES; i += 1) {
    loss += 1 - smeared(middle + durationDays * ((i + 0.5) / DEPTH_SAMPLES - 0.5));
  }
  return {
    what,
    ...(periodDays === undefined ? {} : { periodDays }),
    epochBjdMinus2459000: round(epochDays, 6),
    durationHours: round(durationDays * HOURS_PER_DAY, 4),
    depthPpm: round((PPM * loss) / DEPTH_SAMPLES, 1),
    midDepthPpm: round(PPM * (1 - smeared(middle)), 1),
    eventsSeen: countEvents(signal, time),
    ...(times === undefined ? {} : { timesBjdMinus2459000: times.map((t) => round(t, 6)) }),
    ...Object.fromEntries(Object.entries(more ?? {}).map(([name, value]) => [name, round(value, 6)])),
  };
}

/** Events with at least one point within them. @param {import('./demo-signals.mjs').Signal} signal @param {Float64Array} time */
function countEvents({ periodDays, epochDays, durationDays, times }, time) {
  const events = new Set();
  for (const t of time) {
    const cycle = periodDays === undefined ? 0 : Math.round((t - epochDays) / periodDays);
    const index = times?.findIndex((event) => Math.abs(t - event) < durationDays / 2);
    const inside =
      index === undefined ? Math.abs(t - epochDays - cycle * (periodDays ?? 0)) < durationDays / 2 : index >= 0;
    if (inside) events.add(index ?? cycle);
  }
  return events.size;
}
