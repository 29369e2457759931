/**
 * The box search, refinement of its peaks included, against astropy's compiled BoxLeastSquares (method='fast') on the
 * same series, periods and durations, one thread each, runs interleaved, medians of CPU time; and the S/N that each
 * finds of the injected signal. `npm run bench -- search [quick]`; quick leaves the four years out.
 */
import { spawn } from 'node:child_process';
import { writeFile } from 'node:fs/promises';
import { createInterface } from 'node:readline';
import { fileURLToPath } from 'node:url';
import { createLehmer } from '../demo/lehmer.mjs';
import { bundleModules } from './bundle-module.mjs';
import { machineWords } from './machine-words.mjs';

const ROUNDS = 5;
const BINS_PER_BOX = 10;
const SETTINGS = { oversampling: 3, densityCgs: 1.41, objective: 'white noise S/N', masked: [] };
const checkpointOf = (createCheckpoint) => createCheckpoint(() => false);

const WORKLOADS = [
  { name: '27 d at 2 min', times: () => even(27, 2 / 1440), depth: 4e-4, goal: 20 },
  { name: '27 d at 20 s', times: () => even(27, 20 / 86_400), depth: 2.2e-4, goal: 60 },
  { name: '4 yr at 30 min', times: () => even(1461, 30 / 1440), depth: 1.8e-4, goal: 15, rounds: 1, isLong: true },
  { name: 'three seasons of nights', times: nights, depth: 1.5e-3, goal: 10, rounds: 3 },
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

/** White noise of 1000 ppm and one box signal, 3.1 h every 4.7 d: a planet that no constant was tuned on. */
function makeSeries({ name, times, depth }) {
  const random = createLehmer(`bench ${name}`);
  const time = times();
  const [period, epoch, half] = [4.717, 2.203, 0.0646];
  const isInside = (t) => Math.abs(((t - epoch + period / 2) % period) - period / 2) < half;
  const flux = time.map((t) => 1 + 1e-3 * random.normal() - (isInside(t) ? depth : 0));
  return { seriesId: 'bench', time, flux, error: new Float64Array(time.length).fill(1e-3) };
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
  return groups.filter(({ durations: tried }) => tried.length > 0);
}

/** One Python process that answers a run for each line. */
function startAstropy(series, plan) {
  const script = fileURLToPath(new URL('./time-astropy-box.py', import.meta.url));
  const child = spawn('/usr/bin/python3', [script], {
    env: { ...process.env, OMP_NUM_THREADS: '1' },
    stdio: ['pipe', 'pipe', 'inherit'],
  });
  const lines = createInterface({ input: child.stdout })[Symbol.asyncIterator]();
  const { time, flux, error } = series;
  const groups = groupPeriods(plan);
  child.stdin.write(
    `${JSON.stringify({ time: [...time], flux: [...flux], error: [...error], groups, oversample: BINS_PER_BOX })}\n`,
  );
  return {
    async run() {
      child.stdin.write('go\n');
      const { value } = await lines.next();
      return value === undefined ? undefined : JSON.parse(value);
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

async function measure(workload, kernels) {
  const { planBoxSearch, searchBoxPart, summariseBoxSearch, createCheckpoint } = kernels;
  const series = makeSeries(workload);
  const plan = planBoxSearch(series, SETTINGS).value;
  const search = async () => {
    const job = { key: '', settings: SETTINGS, part: 0, partCount: 1 };
    const part = await searchBoxPart(series, job, checkpointOf(createCheckpoint));
    return summariseBoxSearch(
      series,
      { key: '', settings: SETTINGS, parts: [part.value] },
      checkpointOf(createCheckpoint),
    );
  };
  const scanOnly = () =>
    searchBoxPart(series, { key: '', settings: SETTINGS, part: 0, partCount: 1 }, checkpointOf(createCheckpoint));
  const astropy = startAstropy(series, plan);
  const own = [];
  const scans = [];
  const theirs = [];
  let ownBest;
  let theirBest;
  await search();
  for (let round = 0; round < (workload.rounds ?? ROUNDS); round += 1) {
    const scan = await cpuOf(scanOnly);
    scans.push(scan.ms);
    const run = await cpuOf(search);
    own.push(run.ms);
    ownBest = run.value.value.peaks[0];
    const other = await astropy.run();
    if (other === undefined) break;
    theirs.push(other.ms);
    theirBest = other;
  }
  astropy.end();
  return { workload, series, plan, own: median(own), scan: median(scans), ownBest, theirs: median(theirs), theirBest };
}

function rowOf({ workload, series, plan, own, scan, ownBest, theirs, theirBest }) {
  const ratio = theirs / own;
  const signal = ownBest.signalToNoise / theirBest.best[0];
  return [
    workload.name,
    series.time.length,
    plan.periods.length,
    `${scan.toFixed(0)}`,
    `${own.toFixed(0)}`,
    `${theirs.toFixed(0)}`,
    `${ratio.toFixed(1)} (goal ${workload.goal})`,
    `${ownBest.signalToNoise.toFixed(2)} at ${ownBest.periodDays.toFixed(4)} d`,
    `${theirBest.best[0].toFixed(2)} at ${theirBest.best[1].toFixed(4)} d`,
    `${((signal - 1) * 100).toFixed(2)} %`,
  ];
}

const HEAD = [
  'series',
  'points',
  'trials',
  'scan / ms',
  'with peaks / ms',
  'astropy / ms',
  'astropy over ours',
  'our S/N',
  'astropy S/N',
  'difference',
];

export async function run(options) {
  const kernels = await bundleModules({
    plan: 'workers/search/plan-box-search.ts',
    part: 'workers/search/search-part.ts',
    summarise: 'workers/search/summarise.ts',
    checkpoint: 'workers/checkpoint.ts',
  });
  const isQuick = options.includes('quick');
  const rows = [];
  let version = '';
  for (const workload of WORKLOADS) {
    if (isQuick && workload.isLong) continue;
    const measured = await measure(workload, kernels);
    version = measured.theirBest?.version ?? version;
    rows.push(rowOf(measured));
    console.log(rows.at(-1).join(' | '));
  }
  const line = (cells) => `| ${cells.join(' | ')} |`;
  const table = [line(HEAD), line(HEAD.map(() => '---')), ...rows.map(line)].join('\n');
  if (isQuick) return;
  const words = `# Box search: our kernel and astropy's compiled one

Written by \`npm run bench -- search\` on ${machineWords()}, astropy ${version}, one thread each, runs interleaved,
medians of CPU time on the same series, trial periods and durations (density of the Sun, oversampling 3).

${table}

"With peaks" has the signals found, grouped and refined at full precision in it, and what they stand out from.
`;
  await writeFile(new URL('./search-table.md', import.meta.url), words);
}
