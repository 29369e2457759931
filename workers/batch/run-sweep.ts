import { resolve } from 'node:path';
import { findFiles } from './find-files.ts';
import { refuseOutput } from './session-output.ts';
import { sweepFiles } from './sweep-files.ts';
import type { SweepHost } from './sweep-host.ts';
import { HELP, parseOptions, type SweepOptions } from './sweep-options.ts';
import { createThreadPool } from './thread-pool.ts';

const ALL_READ = 0;
const SOME_FAILED = 1;
const NOTHING_DONE = 2;

/** The command line. @returns the exit code */
export async function runSweep(args: readonly string[], host: SweepHost): Promise<number> {
  const parsed = parseOptions(args, host.epoch);
  if (parsed.kind === 'help') {
    host.tell(HELP.trimEnd());
    return ALL_READ;
  }
  const ended = parsed.kind === 'wrong' ? parsed.sentence : await sweep(parsed.options, host);
  if (typeof ended !== 'string') return ended.failures === 0 ? ALL_READ : SOME_FAILED;
  host.say(ended);
  return NOTHING_DONE;
}

/** @returns why nothing was done, or how many files failed */
async function sweep(options: SweepOptions, host: SweepHost): Promise<string | { readonly failures: number }> {
  const out = resolve(host.from, options.out);
  const files = await findFiles(options.paths, host.from);
  if (typeof files === 'string') return files;
  const stars = options.stars === undefined ? [] : await findFiles([options.stars], host.from);
  if (typeof stars === 'string') return stars;
  const refusal = await refuseOutput(out);
  if (refusal !== undefined) return refusal;
  const others = files.filter(({ path }) => path !== stars[0]?.path);
  const pool = createThreadPool(host.threadFile, options.threads);
  try {
    return await sweepFiles({ options, host, out, pool }, others, stars[0]);
  } finally {
    await pool.close();
  }
}
