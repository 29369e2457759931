import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { bundleSweep } from './bundle-sweep.mjs';

/** The headless sweep: `npm run sweep -- --help`. */
const { env } = process;
const NOTHING_DONE = 2;

try {
  const { version } = JSON.parse(readFileSync(new URL('../../package.json', import.meta.url), 'utf8'));
  const folder = await bundleSweep();
  const { runSweep } = await import(pathToFileURL(join(folder, 'run-sweep.mjs')).href);
  process.exitCode = await runSweep(process.argv.slice(2), {
    app: version,
    // npm runs its scripts in the project's folder, wherever it was called.
    from: (env.npm_lifecycle_event === 'sweep' && env.INIT_CWD) || process.cwd(),
    threadFile: join(folder, 'sweep-thread.mjs'),
    epoch: env.SOURCE_DATE_EPOCH,
    say: (line) => console.error(line),
    tell: (line) => console.log(line),
  });
} catch (cause) {
  console.error('The sweep broke, which is a fault of Candling. What was searched is kept: go on with --resume.');
  console.error(cause);
  process.exitCode = NOTHING_DONE;
}
