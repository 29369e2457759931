/**
 * Times the box search and prints its ratio to astropy's compiled `fast` method on the same series, periods and
 * durations: `node test/bench/box-search.bench-run.mjs`. Not a test: nothing is asserted, and noise decides digits.
 */
import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { createLehmer } from '../demo/lehmer.mjs';
import { bundleModules } from './bundle-module.mjs';

const ROUNDS = 5;
const BINS_PER_BOX = 10;

const { planBoxSearch, searchBoxPart, summariseBoxSearch, prepareSeries, createCheckpoint } = await bundleModules({
  plan: 'workers/search/plan-box-search.ts',
  part: 'workers/search/search-part.ts',
  summarise: 'workers/search/summarise.ts',
  prepare: 'workers/prepare/prepare.ts',
  checkpoint: 'workers/checkpoint.ts',
});

/** Evenly sampled white noise with one box signal. */
function makeSeries(spanDays, cadenceDays) {
  const random = createLehmer(`bench ${spanDays} ${cadenceDays}`);
  const n = Math.floor(spanDays / cadenceDays);
  const time = Float64Array.from({ length: n }, (_, i) => i * cadenceDays);
  const isInside = (t) => Math.abs(((t - 1.1 + 1.85) % 3.7) - 1.85) < 0.06;
  const flux = time.map((t) => 1 + 1e-3 * random.normal() - (isInside(t) ? 1e-3 : 0));
  return { seriesId: 'bench', time, flux, error: new Float64Array(n).fill(1e-3) };
}

const settings = { oversampling: 3 };
const checkpoint = () => createCheckpoint(() => false);
const median = (values) => values.sort((a, b) => a - b)[values.length >> 1];

async function time(work, rounds = ROUNDS) {
  const took = [];
  for (let round = 0; round < rounds; round += 1) {
    const start = performance.now();
    await work();
    took.push(performance.now() - start);
  }
  return median(took);
}

/** Consecutive periods that are tried with the same durations. */
function groupPeriods({ periods, durations, rangeAt }) {
  const groups = [];
  const range = { first: 0, last: 0 };
  let key = '';
  for (const period of periods) {
    rangeAt(period, range);
    const own = `${range.first} ${range.last}`;
    if (own !== key) groups.push({ periods: [], durations: [...durations.subarray(range.first, range.last + 1)] });
    key = own;
    groups.at(-1).periods.push(period);
  }
  return groups;
}

function timeAstropy({ time: times, flux, error }, plan, rounds) {
  const script = fileURLToPath(new URL('./time-astropy-box.py', import.meta.url));
  const series = { time: [...times], flux: [...flux], error: [...error] };
  const input = JSON.stringify({ ...series, groups: groupPeriods(plan), oversample: BINS_PER_BOX, rounds });
  const run = spawnSync('/usr/bin/python3', [script], { input, maxBuffer: 1e9 });
  return run.status === 0 ? Number(run.stdout) : undefined;
}

async function report(name, spanDays, cadenceDays, rounds = ROUNDS) {
  const series = makeSeries(spanDays, cadenceDays);
  const search = () => searchBoxPart(series, { key: '', settings, part: 0, partCount: 1 }, checkpoint());
  const { value: part } = await search();
  const plan = planBoxSearch(series, settings).value;
  const own = await time(search, rounds);
  const peaks = await time(
    () => summariseBoxSearch(series, { key: '', settings, parts: [part] }, checkpoint()),
    rounds,
  );
  const theirs = timeAstropy(series, plan, rounds);
  const ratio =
    theirs === undefined
      ? 'astropy is not here'
      : `astropy ${theirs.toFixed(0)} ms, ratio ${(theirs / own).toFixed(2)}`;
  console.log(
    `${name}: ${series.time.length} points, ${plan.periods.length} trials, ${plan.durations.length} durations`,
  );
  console.log(`  search ${own.toFixed(0)} ms (${ratio}), peaks ${peaks.toFixed(0)} ms`);
  await reportPreparation(series);
}

async function reportPreparation({ time: times, flux, error }) {
  const n = times.length;
  const lightCurve = {
    time: times,
    timeReference: { zeroJd: undefined, scale: 'unknown', frame: 'unknown' },
    exposureDays: undefined,
    stamp: 'unknown',
    passband: 'unknown',
    fluxColumns: [{ name: 'flux', flux, error, meaning: 'corrected', unit: 'relative' }],
    quality: new Int32Array(n),
    hasQuality: false,
    covariates: {},
    segmentStarts: Int32Array.of(0),
  };
  const recipe = {
    fluxColumn: undefined,
    qualityMask: -1,
    clip: { kind: 'sigma', side: 'high', sigma: 4 },
    detrend: { kind: 'biweight', windowDays: 1.5 },
    protectCases: false,
  };
  const job = { jobId: '', key: '', lightCurve, recipe, excluded: [], protectedEvents: [], protectedIntervals: [] };
  const took = await time(() => prepareSeries(job, checkpoint()));
  console.log(`  preparation with a 1.5 d biweight: ${took.toFixed(0)} ms`);
}

await report('W1: 27 d at 2 min', 27, 2 / 1440);
await report('W3: 27 d at 20 s', 27, 20 / 86400);
if (process.argv.includes('--long')) await report('W2: 4 yr at 30 min', 1461, 30 / 1440, 1);
