import { existsSync } from 'node:fs';
import { stat } from 'node:fs/promises';
import { basename, resolve } from 'node:path';
import type { Outcome } from '../../src/contract/outcome.ts';
import type { StarRow } from '../../src/contract/read-contract.ts';
import { buildSession } from './build-session.ts';
import type { FoundFile } from './find-files.ts';
import { openPartialResults, partialKey, partialPath } from './partial-results.ts';
import { writeOutput } from './session-output.ts';
import { findStar, type SortedFiles, sortFiles } from './sort-files.ts';
import type { SweepHost } from './sweep-host.ts';
import type { SweepOptions } from './sweep-options.ts';
import { progressLine, summaryLines } from './sweep-words.ts';
import type { FileJob, TargetResult } from './target-result.ts';
import type { ThreadPool } from './thread-pool.ts';

export interface Run {
  readonly options: SweepOptions;
  readonly host: SweepHost;
  /** Full path of the session. */
  readonly out: string;
  readonly pool: ThreadPool;
}

/**
 * Reads every file, then searches the light curves among them with what is known of their stars, then writes the
 * session. @returns why nothing was done, or how many files failed
 */
export async function sweepFiles(
  run: Run,
  files: readonly FoundFile[],
  starFile: FoundFile | undefined,
): Promise<string | { readonly failures: number }> {
  const { options, host, out, pool } = run;
  const named = starFile === undefined ? [] : await readStarFile(pool, starFile);
  if (typeof named === 'string') return named;
  const contents = await Promise.all(files.map(({ path, fileName }) => pool.run({ kind: 'identify', path, fileName })));
  const sorted = sortFiles(files, contents);
  for (const { fileName, why } of sorted.skipped) host.say(`${fileName} is passed over: it ${why}`);
  for (const { sentence } of sorted.failures) host.say(sentence);
  if (sorted.curves.length === 0) return 'There is no light curve to sweep.';
  const searched = await searchAll(run, sorted, named);
  const failures = [...sorted.failures.map(({ sentence }) => sentence), ...searched.failures];
  if (searched.results.length === 0) return 'No file could be searched: nothing was written.';
  const at = options.date ?? (await newestChange([...sorted.used, ...(starFile ? [starFile] : [])]));
  const record = { name: nameOf(options.paths, host.from), app: host.app, at, settings: options.settings, failures };
  const { results } = searched;
  await writeOutput(out, buildSession({ ...record, results, instrumentTable: sorted.instrumentTable }));
  searched.forget();
  for (const line of summaryLines(options.out, results, failures, sorted.skipped.length)) host.tell(line);
  return { failures: failures.length };
}

async function readStarFile(pool: ThreadPool, { path, fileName }: FoundFile): Promise<readonly StarRow[] | string> {
  const content = await pool.run({ kind: 'identify', path, fileName });
  if (content.kind === 'failed') return content.error.sentence;
  if (content.kind === 'done' && content.value.kind === 'stars') return content.value.rows;
  return `${fileName} is no table of stars: it needs a column of labels and two of parameters.`;
}

interface Searched {
  readonly results: readonly TargetResult[];
  readonly failures: readonly string[];
  /** Removes what was kept for a broken sweep. */
  readonly forget: () => void;
}

async function searchAll(run: Run, sorted: SortedFiles, namedStars: readonly StarRow[]): Promise<Searched> {
  const { options, host, out, pool } = run;
  const { curves, instrumentTable } = sorted;
  if (!options.isResumed && existsSync(partialPath(out)))
    host.say(`${basename(partialPath(out))} of a broken sweep is begun anew; --resume would have gone on with it.`);
  const partial = openPartialResults(out, options.isResumed);
  // Later rows go before earlier ones: the table that was named has the last word.
  const stars = [...sorted.stars, ...namedStars];
  let ended = 0;
  const search = async ({ path, fileName, label, sha256 }: SortedFiles['curves'][number]) => {
    const star = findStar(stars, label);
    const job: Omit<FileJob, 'bytes'> = { fileName, star, instrumentTable, options: options.settings };
    const key = partialKey(job, sha256, host.app);
    const known = partial.known.get(key);
    const outcome: Outcome<TargetResult> =
      known === undefined ? await pool.run({ kind: 'analyse', path, ...job }) : { kind: 'done', value: known };
    if (known === undefined && outcome.kind === 'done') partial.add(key, outcome.value);
    ended += 1;
    host.say(progressLine({ ended, total: curves.length, fileName, outcome, isKnown: known !== undefined }));
    return outcome;
  };
  const outcomes = await Promise.all(curves.map(search));
  return {
    results: outcomes.flatMap((outcome) => (outcome.kind === 'done' ? [outcome.value] : [])),
    failures: outcomes.flatMap((outcome) => (outcome.kind === 'failed' ? [outcome.error.sentence] : [])),
    forget: partial.remove,
  };
}

/** The session was made of these files: a date that is the same whenever they are. */
async function newestChange(files: readonly FoundFile[]): Promise<string> {
  const times = await Promise.all(files.map(async ({ path }) => (await stat(path)).mtimeMs));
  return new Date(times.reduce((newest, time) => Math.max(newest, time))).toISOString();
}

/** Of what was swept and not of where it went, so that the same files make the same session under any name. */
function nameOf(paths: readonly string[], from: string): string {
  return paths.length === 1 ? `sweep of ${basename(resolve(from, paths[0]!))}` : `sweep of ${paths.length} paths`;
}
