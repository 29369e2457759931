/**
 * Recovery on a simulated docket: planets of S/N 8 to 40 over quiet and spotted stars at three cadences, prepared by
 * the default recipe and searched; and the same light curves through a running median and astropy's box search. Noise
 * without planets, white and red, says how many cases a threshold makes of nothing. `npm run bench -- recovery [n]`.
 */
import { spawn } from 'node:child_process';
import { writeFile } from 'node:fs/promises';
import { createInterface } from 'node:readline';
import { fileURLToPath } from 'node:url';
import { createLehmer } from '../demo/lehmer.mjs';
import { bundleModules } from './bundle-module.mjs';
import { machineWords } from './machine-words.mjs';

const PLANETS = 200;
/** S/N from which the sweep makes a case. */
const THRESHOLD = 7.1;
const WINDOW_DAYS = 1.5;
const DENSITY = 1.41;
const SAMPLINGS = [
  { name: '27 d at 2 min', days: 27, cadence: 2 / 1440, sigma: 1.2e-3 },
  { name: '27 d at 10 min', days: 27, cadence: 10 / 1440, sigma: 6e-4 },
  { name: '80 d at 30 min', days: 80, cadence: 1 / 48, sigma: 4e-4 },
];

/** Rotation with two harmonics whose phases wander, of the amplitude of a spotted star. */
function spots(random, amplitude) {
  const period = 3 + 15 * random.uniform();
  const phases = [random.uniform(), random.uniform()];
  const drift = 0.02 * random.normal();
  return (t) =>
    amplitude * Math.sin(2 * Math.PI * (t / period + phases[0] + drift * t * 0.05)) +
    0.4 * amplitude * Math.sin(4 * Math.PI * (t / period + phases[1]));
}

/** First-order autoregression with a memory of some hours. */
function redNoise(random, sigma, cadence) {
  const keep = Math.exp(-cadence / 0.15);
  let level = 0;
  return () => {
    level = keep * level + sigma * Math.sqrt(1 - keep * keep) * random.normal();
    return level;
  };
}

function makeCurve(number, kind) {
  const random = createLehmer(`recovery ${kind} ${number}`);
  const sampling = SAMPLINGS[number % SAMPLINGS.length];
  const { days, cadence, sigma } = sampling;
  const isSpotted = number % 2 === 1;
  const star = isSpotted ? spots(random, 4e-3) : () => 0;
  const red = kind === 'red' ? redNoise(random, 0.5 * sigma, cadence) : () => 0;
  const period = 0.8 * (days / 3 / 0.8) ** random.uniform();
  // Duration of a solar-density star at an impact parameter of up to 0.8.
  const central = 0.0754 * Math.cbrt(period);
  const impact = 0.8 * random.uniform();
  const duration = central * Math.sqrt(1 - impact * impact);
  const epoch = period * random.uniform();
  const events = Math.max(2, Math.floor((days - epoch) / period) + 1);
  const strength = 8 + 32 * random.uniform();
  const depth = kind === 'planet' ? (strength * sigma) / Math.sqrt((events * duration) / cadence) : 0;
  const time = Float64Array.from({ length: Math.floor(days / cadence) }, (_, i) => 1000 + i * cadence);
  const gap = days / 2;
  const kept = time.filter((t) => Math.abs(t - 1000 - gap) > 0.6);
  const flux = kept.map((t) => {
    const x = Math.abs(((t - 1000 - epoch + period * 1.5) % period) - period / 2) / (duration / 2);
    const dip = x >= 1.1 ? 0 : x <= 0.9 ? 1 : (1.1 - x) / 0.2;
    return 1 + star(t) + red() - depth * dip + sigma * random.normal();
  });
  return {
    time: kept,
    flux,
    error: kept.map(() => sigma),
    sampling,
    isSpotted,
    period,
    epoch: 1000 + epoch,
    duration,
    depth,
    days,
    strength,
  };
}

const isFound = (curve, period) => {
  const cycles = Math.max(1, curve.days / curve.period);
  return [1, 0.5, 2].some(
    (factor) => Math.abs(period - curve.period * factor) * cycles < (factor * curve.duration) / 2 + 0.02,
  );
};

function startAstropy() {
  const script = fileURLToPath(new URL('./search-astropy-docket.py', import.meta.url));
  const child = spawn('/usr/bin/python3', [script], { stdio: ['pipe', 'pipe', 'inherit'] });
  const lines = createInterface({ input: child.stdout })[Symbol.asyncIterator]();
  return {
    async search(curve, plan) {
      const { time, flux, error } = curve;
      const given = { time: [...time], flux: [...flux], error: [...error], windowDays: WINDOW_DAYS };
      child.stdin.write(
        `${JSON.stringify({ ...given, periods: [...plan.periods], durations: [...plan.durations].filter((d) => d < plan.periods[0] / 2) })}\n`,
      );
      const { value } = await lines.next();
      return value === undefined ? undefined : JSON.parse(value);
    },
    end: () => child.stdin.end(),
  };
}

export async function run(options) {
  const count = Number(options[0] ?? PLANETS);
  const kernels = await bundleModules({
    plan: 'workers/search/plan-box-search.ts',
    part: 'workers/search/search-part.ts',
    summarise: 'workers/search/summarise.ts',
    prepare: 'workers/prepare/prepare.ts',
    recipe: 'src/core/recipe.ts',
    settings: 'src/core/box-search-settings.ts',
    checkpoint: 'workers/checkpoint.ts',
  });
  const astropy = startAstropy();
  const settings = { ...kernels.DEFAULT_BOX_SEARCH, densityCgs: DENSITY };
  const checkpoint = () => kernels.createCheckpoint(() => false);

  async function searchOwn(curve) {
    const n = curve.time.length;
    const lightCurve = {
      time: curve.time,
      timeReference: { zeroJd: undefined, scale: 'unknown', frame: 'unknown' },
      exposureDays: undefined,
      stamp: 'unknown',
      passband: 'unknown',
      fluxColumns: [{ name: 'flux', flux: curve.flux, error: curve.error, meaning: 'corrected', unit: 'relative' }],
      quality: new Int32Array(n),
      hasQuality: false,
      covariates: {},
      segmentStarts: Int32Array.of(0),
    };
    const rest = {
      excluded: [],
      protectedEvents: [],
      protectedIntervals: [],
      instrumentSpans: [],
      commonModes: undefined,
    };
    const job = { jobId: '', key: '', lightCurve, recipe: kernels.DEFAULT_RECIPE, ...rest };
    const { value: series } = await kernels.prepareSeries(job, checkpoint());
    const input = { seriesId: '', time: series.time, flux: series.flux, error: series.error };
    const part = await kernels.searchBoxPart(input, { key: '', settings, part: 0, partCount: 1 }, checkpoint());
    const result = await kernels.summariseBoxSearch(input, { key: '', settings, parts: [part.value] }, checkpoint());
    return { input, result: result.value };
  }

  const tally = {};
  const add = (key, own, theirs) => {
    tally[key] ??= { n: 0, own: 0, theirs: 0 };
    tally[key].n += 1;
    tally[key].own += own ? 1 : 0;
    tally[key].theirs += theirs ? 1 : 0;
  };
  for (let number = 0; number < count; number += 1) {
    const curve = makeCurve(number, 'planet');
    const { input, result } = await searchOwn(curve);
    const plan = kernels.planBoxSearch(input, settings).value;
    const other = await astropy.search(curve, plan);
    const [best] = result.peaks;
    const own = best !== undefined && isFound(curve, best.periodDays) && best.correlatedSignalToNoise >= THRESHOLD;
    const theirs = other !== undefined && isFound(curve, other[0]) && other[3] >= THRESHOLD;
    for (const key of [
      'all',
      curve.sampling.name,
      curve.isSpotted ? 'spotted' : 'quiet',
      curve.strength < 14 ? 'S/N 8 to 14' : 'S/N over 14',
    ])
      add(key, own, theirs);
  }
  const noise = {};
  for (const kind of ['white', 'red']) {
    noise[kind] = { n: 0, white: 0, correlated: 0, theirs: 0 };
    for (let number = 0; number < Math.max(10, count / 2); number += 1) {
      const curve = makeCurve(number, kind);
      const { input, result } = await searchOwn(curve);
      const other = await astropy.search(curve, kernels.planBoxSearch(input, settings).value);
      noise[kind].n += 1;
      if ((result.peaks[0]?.signalToNoise ?? 0) >= THRESHOLD) noise[kind].white += 1;
      if ((result.peaks[0]?.correlatedSignalToNoise ?? 0) >= THRESHOLD) noise[kind].correlated += 1;
      if (other !== undefined && other[3] >= THRESHOLD) noise[kind].theirs += 1;
    }
  }
  astropy.end();
  const rows = Object.entries(tally).map(
    ([key, { n, own, theirs }]) => `| ${key} | ${n} | ${percent(own, n)} | ${percent(theirs, n)} |`,
  );
  const noiseRows = Object.entries(noise).map(
    ([kind, { n, white, correlated, theirs }]) => `| ${kind} | ${n} | ${white} | ${correlated} | ${theirs} |`,
  );
  const words = `# Recovery of injected planets

Written by \`npm run bench -- recovery\` on ${machineWords()}. Light curves invented and seeded; half of the stars have
spots of 4000 ppm. A planet counts as found when the strongest signal has its period (or half or twice it), to half a
duration over the span, at S/N ${THRESHOLD} or more. Beside ours (default recipe and search): a running median of ${WINDOW_DAYS} d and
astropy's BoxLeastSquares on the same trial periods.

| planets | light curves | found | running median and astropy |
| --- | --- | --- | --- |
${rows.join('\n')}

Light curves without planets whose strongest signal reaches S/N ${THRESHOLD}:

| noise | light curves | white-noise S/N | S/N with correlated noise | running median and astropy |
| --- | --- | --- | --- | --- |
${noiseRows.join('\n')}
`;
  console.log(words);
  if (count >= PLANETS) await writeFile(new URL('./recovery-table.md', import.meta.url), words);
}

const percent = (part, whole) => `${part} (${((100 * part) / whole).toFixed(0)} %)`;
