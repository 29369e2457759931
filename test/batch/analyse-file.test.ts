import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { newDocument } from '../../src/session/new-document.ts';
import { readSession } from '../../src/session/read-session.ts';
import { writeSession } from '../../src/session/write-session.ts';
import { densityOf as appDensityOf, searchKey } from '../../src/store/target-keys.ts';
import { analyseFile } from '../../workers/batch/analyse-file.ts';
import { buildSession } from '../../workers/batch/build-session.ts';
import { densityOf } from '../../workers/batch/result-key.ts';
import type { FileJob, SweepSettings, TargetResult } from '../../workers/batch/target-result.ts';
import { TWO_DIPS, writtenCurve } from './written-curves.ts';

const options: SweepSettings = { search: {}, rounds: 3, leastSignalToNoise: 7.1, leastEvents: 2 };

const demoBytes = (name: string): ArrayBuffer =>
  new Uint8Array(readFileSync(new URL(`../../public/demo/${name}`, import.meta.url))).buffer;

const textJob = (text: string, change: Partial<FileJob> = {}): FileJob => ({
  fileName: 'X 1.csv',
  bytes: new TextEncoder().encode(text).buffer,
  star: undefined,
  instrumentTable: undefined,
  options,
  ...change,
});

async function analysed(job: FileJob): Promise<TargetResult> {
  const outcome = await analyseFile(job);
  if (outcome.kind !== 'done') throw new Error(JSON.stringify(outcome));
  return outcome.value;
}

async function sentenceOf(job: FileJob): Promise<string> {
  const outcome = await analyseFile(job);
  return outcome.kind === 'failed' ? outcome.error.sentence : outcome.kind;
}

/** As it stands in a session that was written and read again. */
function opened(results: readonly TargetResult[], instrumentTable: FileJob['instrumentTable'] = undefined) {
  const at = '2026-12-01T08:00:00.000Z';
  const document = buildSession({
    name: 'n',
    app: '0.1.0',
    at,
    settings: options,
    instrumentTable,
    results,
    failures: [],
  });
  const read = readSession(writeSession(document), 'x.candling.json');
  if (read.kind === 'refused') throw new Error(read.sentence);
  return read.document;
}

describe('analyseFile', () => {
  it('finds both planets of one star of the demo, in two rounds, and stops at noise', async () => {
    const star = { densityCgs: 1.5 };
    const job = { fileName: 'SR-007.fits', bytes: demoBytes('SR-007.fits'), star, instrumentTable: undefined, options };
    const result = await analysed(job);
    expect(result.label).toBe('SR-007');
    expect(result.signals.map(({ round }) => round)).toEqual([1, 2]);
    expect(result.signals[0]!.timing.periodDays).toBeCloseTo(8.1347, 2);
    expect(result.signals[1]!.timing.periodDays).toBeCloseTo(3.219, 2);
    expect(result.roundsSearched).toBe(3);
    expect(result.ending).toMatch(/strongest signal of round 3, .* under 7\.1/);
  });

  it('finds nothing in a quiet star of the demo and says how strong the strongest was', async () => {
    const job = {
      fileName: 'SR-002.csv',
      bytes: demoBytes('SR-002.csv'),
      star: {},
      instrumentTable: undefined,
      options,
    };
    const result = await analysed(job);
    expect(result.signals).toEqual([]);
    expect(result.ending).toMatch(
      /^The strongest signal of round 1, .* has correlated noise S\/N [0-6]\.\d\d, under 7\.1\.$/,
    );
  });

  it('gives equal results for equal jobs and leaves the bytes as they are', async () => {
    const job = textJob(writtenCurve(2, TWO_DIPS));
    const before = job.bytes.slice(0);
    const first = await analysed(job);
    expect(new Uint8Array(job.bytes)).toEqual(new Uint8Array(before));
    expect(await analysed(textJob(writtenCurve(2, TWO_DIPS)))).toEqual(first);
    expect(first.signals).toHaveLength(2);
  });

  it('keeps to the rounds, the S/N and the number of events that are asked for', async () => {
    const text = writtenCurve(2, TWO_DIPS);
    const signalsWith = async (change: Partial<SweepSettings>) =>
      (await analysed(textJob(text, { options: { ...options, ...change } }))).signals;
    expect(await signalsWith({ rounds: 1 })).toHaveLength(1);
    expect(await signalsWith({ leastSignalToNoise: 1000 })).toHaveLength(0);
    // The signal of 3.7 d has five events, that of 2.2 d nine.
    const many = await signalsWith({ leastEvents: 7 });
    expect(many.map(({ timing }) => timing.periodDays.toFixed(1))).toEqual(['2.2']);
  });

  it('stops where the strongest signal looks like two stars, and says why', async () => {
    const eclipses = [
      { periodDays: 4, epochDays: 1, durationDays: 0.2, depth: 0.02 },
      { periodDays: 4, epochDays: 3, durationDays: 0.2, depth: 0.01 },
    ];
    const result = await analysed(textJob(writtenCurve(3, eclipses)));
    expect(result.roundsSearched).toBe(1);
    expect(result.ending).toMatch(/two unlike stars|second dip/);
  });

  it('leaves out the times of the instrument, full Julian dates or not', async () => {
    const spans = [0, 1, 2, 3, 4].map((cycle) => 2_459_001.3 + 3.7 * cycle);
    const table = {
      id: 't',
      fileName: 'dumps.csv',
      isJulian: true,
      spans: spans.map((middle) => ({ start: middle - 0.2, end: middle + 0.2, note: '' })),
    };
    const { signals } = await analysed(textJob(writtenCurve(2, TWO_DIPS), { instrumentTable: table }));
    expect(signals.map(({ timing }) => timing.periodDays.toFixed(1))).toEqual(['2.2']);
  });

  it('answers what is no light curve, or too short a one, with a sentence that names the file', async () => {
    expect(await sentenceOf(textJob(''))).toMatch(/^X 1\.csv was not read\. The file is empty/);
    expect(await sentenceOf(textJob('target,teff_k,density_gcc\nA,5800,1.2\n'))).toMatch(
      /^X 1\.csv was not swept\. .*stars/,
    );
    expect(await sentenceOf(textJob('a,b\n1,2\n2,3\n3,5\n'))).toMatch(
      /^X 1\.csv was not swept\. .*A sweep asks nobody/,
    );
    expect(await sentenceOf(textJob('time,flux\n1,1\n2,1.01\n3,0.99\n4,1\n'))).toMatch(/^X 1\.csv was not searched\. /);
    expect(await sentenceOf(textJob(writtenCurve(1, []), { fileName: '.csv' }))).toMatch(
      /^\.csv does not fit into a session\. .*label/,
    );
    expect(await sentenceOf(textJob('time,flux\n1,nan\n2,nan\n3,nan\n'))).toMatch(/^X 1\.csv was not /);
  });
});

describe('a sweep and the app', () => {
  it.each([
    ['an unknown star', undefined],
    ['a density', { densityCgs: 1.2 }],
    ['mass and radius', { massSolar: 0.9, radiusSolar: 0.95 }],
  ])('file numbers under the same key, with %s', async (_, star) => {
    const settings = { ...options, search: { oversampling: 2, longestPeriodDays: 8 } };
    const result = await analysed(textJob(writtenCurve(2, TWO_DIPS), { star, options: settings }));
    const [target] = opened([result]).targets;
    expect(target!.cases.length).toBeGreaterThan(0);
    for (const { numbers } of target!.cases) expect(numbers!.key).toBe(searchKey(target!));
    expect(densityOf(result.star)).toBe(appDensityOf(target!));
  });

  it('write ephemeris and strength of each linear case in the units of a paper, and leave them out on reading', async () => {
    const result = await analysed(textJob(writtenCurve(2, TWO_DIPS)));
    const document = opened([result]);
    const [written] = JSON.parse(writeSession(document)).targets[0].cases;
    const { timing, numbers } = result.signals[0]!;
    expect(written.ephemeris).toEqual({
      periodDays: timing.periodDays,
      epoch: timing.epochDays,
      zeroJd: 2_459_000,
      durationHours: timing.durationDays * 24,
      depthPpm: numbers.boxDepth * 1e6,
    });
    expect(Math.abs(written.ephemeris.depthPpm - 4000)).toBeLessThan(400);
    expect(written.search).toMatchObject({ snr: numbers.signalToNoise, events: 9, round: 1, rank: 1 });
    expect(Object.keys(document.targets[0]!.cases[0]!)).not.toContain('ephemeris');
    const inSigma = JSON.parse(writeSession(document));
    for (const column of inSigma.targets[0].files[0].mapping.columns) if (column.unit) column.unit = 'sigma';
    const [other] = JSON.parse(writeSession(inSigma)).targets[0].cases;
    expect(other.ephemeris.depthPpm).toBeUndefined();
    expect(other.ephemeris.periodDays).toBe(timing.periodDays);
  });

  it('give targets and cases the same shape, and separate labels', async () => {
    const one = await analysed(textJob(writtenCurve(2, TWO_DIPS)));
    const other = await analysed(textJob(writtenCurve(4, [])));
    const { targets, journal, ...rest } = opened([one, other]);
    expect(targets.map(({ label }) => label)).toEqual(['X 1', 'X 1 (2)']);
    expect(targets[0]!.cases.map(({ number, origin }) => [number, origin])).toEqual([
      [1, { kind: 'search', rank: 1, round: 1 }],
      [2, { kind: 'search', rank: 1, round: 2 }],
    ]);
    expect(targets[0]!.lastCaseNumber).toBe(2);
    expect(journal.map(({ targetId }) => targetId)).toEqual([undefined, targets[0]!.id, targets[1]!.id]);
    const { id, name, app, createdAt: at, analyst } = rest;
    expect(Object.keys(newDocument({ id, name, app, at, analyst })).sort()).toEqual(
      Object.keys({ targets, journal, ...rest }).sort(),
    );
  });
});
