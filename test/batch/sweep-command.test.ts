import { execFile } from 'node:child_process';
import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { readSession } from '../../src/session/read-session.ts';
import { analyseFile } from '../../workers/batch/analyse-file.ts';
import { openPartialResults, partialKey } from '../../workers/batch/partial-results.ts';
import { findStar } from '../../workers/batch/sort-files.ts';
import { parseOptions } from '../../workers/batch/sweep-options.ts';
import { writeNight } from './written-curves.ts';

const COMMAND = fileURLToPath(new URL('../../workers/batch/sweep.mjs', import.meta.url));
const { version } = JSON.parse(readFileSync(new URL('../../package.json', import.meta.url), 'utf8'));

interface Ended {
  readonly code: number;
  readonly out: string;
  readonly err: string;
}

let night = '';
let first: Ended = { code: -1, out: '', err: '' };
const inNight = (name: string): string => join(night, name);
const textOf = (name: string): string => readFileSync(inNight(name), 'utf8');

function sweep(...args: string[]): Promise<Ended> {
  return new Promise((resolve) => {
    execFile(process.execPath, [COMMAND, ...args], { cwd: night }, (error, out, err) => {
      resolve({ code: error === null ? 0 : Number(error.code), out, err });
    });
  });
}

function sessionOf(name: string) {
  const read = readSession(textOf(name), name);
  if (read.kind === 'refused') throw new Error(read.sentence);
  return read.document;
}

beforeAll(async () => {
  night = writeNight();
  first = await sweep('.', '--stars', 'stars.csv', '--out', 'night.candling.json', '--threads', '2');
}, 60_000);

afterAll(() => rmSync(night, { recursive: true }));

describe('the sweep of a folder with one broken file', () => {
  it('exits with 1, names the broken file and says what became of the others', () => {
    expect(first.code).toBe(1);
    expect(first.err).toMatch(/c-broken\.csv was not read\./);
    expect(first.err).toMatch(/d-copy\.csv is passed over: it has the same contents as b-two\.csv/);
    expect(first.err).toMatch(/notes\.txt is passed over: it is no table/);
    expect(first.err).toMatch(/^\d\/2 b-two\.csv: 2 cases, 2\.\d+ d \(S\/N \d+\.\d\), 3\.\d+ d/m);
    expect(first.err).toMatch(/^\d\/2 a-quiet\.csv: no case\./m);
    expect(first.out).toMatch(
      /^night\.candling\.json: 2 targets with 2 cases, 2 files passed over, 1 file failed:\n {2}c-broken/,
    );
  });

  it('writes a session that opens, its targets in the order of the files, with what is known of their stars', () => {
    const { targets, journal } = sessionOf('night.candling.json');
    expect(targets.map(({ label, cases }) => [label, cases.length])).toEqual([
      ['a-quiet', 0],
      ['b-two', 2],
    ]);
    expect(targets.map(({ star }) => star.densityCgs)).toEqual([undefined, 1.2]);
    expect(targets[1]!.cases[0]!.timing).toMatchObject({ kind: 'linear', periodDays: expect.closeTo(2.2, 2) });
    expect(journal.some(({ what }) => what.startsWith('left out: c-broken.csv'))).toBe(true);
  });

  it('leaves nothing beside the session', () => expect(existsSync(inNight('night.candling.json.partial'))).toBe(false));

  it('writes the same bytes again, in one thread, into a file of any name', async () => {
    const again = await sweep(night, '--stars=stars.csv', '--threads=1', '--out', 'again.candling.json');
    expect(again.code).toBe(1);
    expect(textOf('again.candling.json')).toBe(textOf('night.candling.json'));
  });

  it('goes on where it broke off, past a torn line', async () => {
    const { settings } = optionsOf('.', '--out', 'x');
    const fileName = 'b-two.csv';
    const job = { fileName, star: { teffK: 5800, densityCgs: 1.2 }, instrumentTable: undefined, options: settings };
    const bytes = new Uint8Array(readFileSync(inNight(fileName))).buffer;
    const outcome = await analyseFile({ ...job, bytes });
    if (outcome.kind !== 'done') throw new Error('not analysed');
    const partial = openPartialResults(inNight('broken.candling.json'), false);
    partial.add(partialKey(job, outcome.value.file.sha256, version), outcome.value);
    const path = inNight('broken.candling.json.partial');
    writeFileSync(path, `${readFileSync(path, 'utf8')}{"key": "torn`);
    const resumed = await sweep('.', '--stars', 'stars.csv', '--out', 'broken.candling.json', '--resume');
    expect(resumed.err).toMatch(/b-two\.csv: known from before, 2 cases/);
    expect(resumed.err.match(/known from before/g)).toHaveLength(1);
    expect(textOf('broken.candling.json')).toBe(textOf('night.candling.json'));
    expect(existsSync(path)).toBe(false);
  });

  it('never writes over rulings, nor over what is no session', async () => {
    const document = JSON.parse(textOf('night.candling.json'));
    document.targets[1].marks = [{ id: 'm', kind: 'dip', interval: { start: 1, end: 2 }, note: '' }];
    writeFileSync(inNight('ruled.candling.json'), JSON.stringify(document));
    const over = await sweep('a-quiet.csv', '--out', 'ruled.candling.json');
    expect([over.code, over.err]).toEqual([2, expect.stringContaining('not written over')]);
    expect(JSON.parse(textOf('ruled.candling.json'))).toEqual(document);
    const curve = textOf('a-quiet.csv');
    expect((await sweep('b-two.csv', '--out', 'a-quiet.csv')).code).toBe(2);
    expect(textOf('a-quiet.csv')).toBe(curve);
  });
});

describe('the command line', () => {
  it('helps', async () => {
    const { code, out } = await sweep('--help');
    expect(code).toBe(0);
    for (const option of ['--stars', '--out', '--threads', '--rounds', '--least-snr', '--resume'])
      expect(out).toContain(option);
  });

  it('does nothing and says why where it is called wrongly', async () => {
    const wrong = await sweep('.', '--out', 'no.candling.json', '--fast');
    expect([wrong.code, wrong.err]).toEqual([2, 'There is no option --fast. See --help.\n']);
    const lost = await sweep('nowhere', '--out', 'no.candling.json');
    expect([lost.code, lost.err]).toEqual([2, 'nowhere cannot be read: there is no such file or folder.\n']);
    const dark = await sweep('notes.txt', '--out', 'no.candling.json');
    expect([dark.code, dark.err]).toEqual([2, expect.stringContaining('There is no light curve to sweep.')]);
    expect(existsSync(inNight('no.candling.json'))).toBe(false);
  });

  it.each([
    [['--out', 'x'], /Say which files/],
    [['.'], /Say where to write/],
    [['.', '--out'], /--out needs a value/],
    [['.', '--out', 'x', '--threads', '0'], /--threads needs a whole number from 1 up to 256, not 0/],
    [['.', '--out', 'x', '--rounds', '9'], /--rounds needs a whole number from 1 up to 5, not 9/],
    [['.', '--out', 'x', '--least-snr', 'high'], /--least-snr needs a positive number, not high/],
    [['.', '--out', 'x', '--resume=yes'], /--resume takes no value/],
    [['.', '--out', 'x', '--date', 'soon'], /--date needs a date/],
  ])('refuses %j', (args, words) => {
    const parsed = parseOptions(args, undefined);
    expect(parsed.kind === 'wrong' && parsed.sentence).toMatch(words);
  });

  it('takes its date from the option, else from the environment', () => {
    const dateOf = (args: string[], epoch?: string) => {
      const parsed = parseOptions(['.', '--out', 'x', ...args], epoch);
      return parsed.kind === 'sweep' ? parsed.options.date : parsed;
    };
    expect(dateOf(['--date', '2026-12-01T08:00:00Z'], '0')).toBe('2026-12-01T08:00:00.000Z');
    expect(dateOf([], '86400')).toBe('1970-01-02T00:00:00.000Z');
    expect(dateOf([])).toBeUndefined();
  });
});

function optionsOf(...args: string[]) {
  const parsed = parseOptions(args, undefined);
  if (parsed.kind !== 'sweep') throw new Error(parsed.kind);
  return parsed.options;
}

describe('a star', () => {
  const rows = [
    { label: 'T 1', star: { teffK: 5000, densityCgs: 1 } },
    { label: 't1', star: { densityCgs: 2 } },
  ];
  it('is found by its label, whatever its capitals and spaces; later rows go before earlier ones', () =>
    expect(findStar(rows, 'T1')).toEqual({ teffK: 5000, densityCgs: 2 }));
  it('may be unknown', () => expect(findStar(rows, 'T2')).toBeUndefined());
});
