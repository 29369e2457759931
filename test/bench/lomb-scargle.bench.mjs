/**
 * The Lomb-Scargle periodogram against astropy's fast one on the same series and frequencies, one thread each, runs
 * interleaved, medians of CPU time; and the largest difference of each from the direct sums.
 * `npm run bench -- lomb-scargle`
 */
import { spawn } from 'node:child_process';
import { writeFile } from 'node:fs/promises';
import { createInterface } from 'node:readline';
import { fileURLToPath } from 'node:url';
import { createLehmer } from '../demo/lehmer.mjs';
import { bundleModules } from './bundle-module.mjs';
import { machineWords } from './machine-words.mjs';

const ROUNDS = 15;
const GOAL = 3;
/** About so many frequencies are summed directly. */
const EXACT = 300;
const SETTINGS = { shortestPeriodDays: undefined, longestPeriodDays: undefined, oversampling: 5, rounds: 5 };

const WORKLOADS = [
  { name: '27 d at 2 min', times: () => even(27, 2 / 1440) },
  { name: '4 yr at 30 min', times: () => even(1461, 30 / 1440) },
  { name: 'three seasons of nights', times: nights },
];

const even = (spanDays, cadenceDays) =>
  Float64Array.from({ length: Math.floor(spanDays / cadenceDays) }, (_, i) => i * cadenceDays);

/** Three seasons of 120 nights, half of them clear, 4 to 9 hours each, about every 9 minutes. */
function nights() {
  const random = createLehmer('nights of the bench');
  const times = [];
  for (let season = 0; season < 3; season += 1)
    for (let night = 0; night < 120; night += 1) {
      if (random.uniform() < 0.5) continue;
      const hours = 4 + 5 * random.uniform();
      for (let t = 0; t < hours; t += 0.1 + 0.1 * random.uniform()) times.push(365 * season + night + t / 24);
    }
  return Float64Array.from(times);
}

/** Three sines of 600, 300 and 150 ppm in white noise of about 1000 ppm, with errors of different sizes. */
function makeSeries({ name, times }) {
  const random = createLehmer(`sines ${name}`);
  const time = times();
  const error = time.map(() => random.between(5e-4, 1.5e-3));
  const wave = (t, perDay, amplitude) => amplitude * Math.cos(2 * Math.PI * perDay * t);
  const flux = time.map(
    (t, i) => 1 + wave(t, 0.731, 6e-4) + wave(t, 1.462, 3e-4) + wave(t, 4.417, 1.5e-4) + error[i] * random.normal(),
  );
  return { seriesId: 'bench', time, flux, error };
}

/** One Python process that answers each line with one. */
function startAstropy({ time, flux, error }, grid) {
  const script = fileURLToPath(new URL('./time-astropy-sines.py', import.meta.url));
  const child = spawn('/usr/bin/python3', [script], {
    env: { ...process.env, OMP_NUM_THREADS: '1' },
    stdio: ['pipe', 'pipe', 'inherit'],
  });
  const lines = createInterface({ input: child.stdout })[Symbol.asyncIterator]();
  child.stdin.write(`${JSON.stringify({ time: [...time], flux: [...flux], error: [...error], ...grid })}\n`);
  return {
    async ask(what) {
      child.stdin.write(`${what}\n`);
      const { value } = await lines.next();
      if (value === undefined) throw new Error('/usr/bin/python3 with astropy did not answer.');
      return JSON.parse(value);
    },
    end: () => child.stdin.end(),
  };
}

const median = (values) => [...values].sort((a, b) => a - b)[values.length >> 1];

async function cpuOf(work) {
  const before = process.cpuUsage();
  const value = await work();
  const { user, system } = process.cpuUsage(before);
  return { ms: (user + system) / 1000, value };
}

/** As the job does it, from the series as it is given. */
function findAllPowers(
  given,
  grid,
  { weighSeries, planSums, sumAtFrequencies, sampleFrequencies, findPowers, runSteps },
) {
  const series = weighSeries(given);
  const frequencies = { ...grid, plan: planSums(grid.last), sum: sumAtFrequencies };
  const matrices = runSteps(sampleFrequencies(series, frequencies));
  return runSteps(findPowers(series, matrices, frequencies));
}

async function measure(workload, kernels) {
  const { weighSeries, planSines, computeLombScargle, createCheckpoint } = kernels;
  const series = makeSeries(workload);
  const grid = planSines(weighSeries(series), SETTINGS);
  const astropy = startAstropy(series, { ...grid, every: Math.ceil((grid.last - grid.first) / EXACT) });
  const periodogram = () => findAllPowers(series, grid, kernels);
  const whole = () =>
    computeLombScargle(
      series,
      { key: '', settings: SETTINGS },
      createCheckpoint(() => false),
    );
  const [own, wholes, theirs] = [[], [], []];
  let power;
  let peaks;
  await whole();
  for (let round = 0; round < ROUNDS; round += 1) {
    const run = await cpuOf(periodogram);
    own.push(run.ms);
    power = run.value;
    theirs.push((await astropy.ask('go')).ms);
    const all = await cpuOf(whole);
    wholes.push(all.ms);
    peaks = all.value.value.peaks;
  }
  const { exact, fastError, version } = await astropy.ask('exact');
  astropy.end();
  const every = Math.ceil((grid.last - grid.first) / EXACT);
  const ownError = Math.max(...exact.map((value, i) => Math.abs(power[grid.first + i * every] - value)));
  return {
    workload,
    series,
    grid,
    own: median(own),
    whole: median(wholes),
    theirs: median(theirs),
    peaks,
    ownError,
    fastError,
    version,
  };
}

const rowOf = ({ workload, series, grid, own, whole, theirs, peaks, ownError, fastError }) => [
  workload.name,
  series.time.length,
  grid.last - grid.first + 1,
  own.toFixed(1),
  theirs.toFixed(0),
  `${(theirs / own).toFixed(1)} (goal ${GOAL})`,
  ownError.toExponential(0),
  fastError.toExponential(0),
  `${whole.toFixed(0)} (${peaks.length})`,
];

const HEAD = [
  'series',
  'points',
  'frequencies',
  'ours / ms',
  'astropy / ms',
  'astropy over ours',
  'our error',
  'error of astropy',
  'with peaks / ms (number of them)',
];

export async function run() {
  const kernels = await bundleModules({
    weigh: 'workers/search/sines/weighted-series.ts',
    plan: 'workers/search/sines/plan-sines.ts',
    sums: 'workers/search/sines/sums-at-frequencies.ts',
    power: 'workers/search/sines/lomb-scargle-power.ts',
    steps: 'workers/search/sines/steps.ts',
    whole: 'workers/search/sines/lomb-scargle.ts',
    checkpoint: 'workers/checkpoint.ts',
  });
  const rows = [];
  let version = '';
  for (const workload of WORKLOADS) {
    const measured = await measure(workload, kernels);
    version = measured.version;
    rows.push(rowOf(measured));
    console.log(rows.at(-1).join(' | '));
  }
  const line = (cells) => `| ${cells.join(' | ')} |`;
  const table = [line(HEAD), line(HEAD.map(() => '---')), ...rows.map(line)].join('\n');
  const words = `# Lomb-Scargle periodogram: ours and astropy's fast one

Written by \`npm run bench -- lomb-scargle\` on ${machineWords()}, astropy ${version}, one thread each, runs
interleaved, medians of CPU time on the same series and frequencies (oversampling 5, up to a period of four cadences).

${table}

Errors are the largest differences in power (0 to 1) from the direct sums at some ${EXACT} frequencies. "With peaks" has
the sines in it, found, refined, taken out and fitted together round by round.
`;
  await writeFile(new URL('./lomb-scargle-table.md', import.meta.url), words);
}

if (process.argv[1] === fileURLToPath(import.meta.url)) await run();
