/**
 * Benchmarks, none of them a test: `npm run bench -- search`. Each prints a table and writes it beside itself.
 */
const BENCHES = {
  search: () => import('./search.bench.mjs'),
  'lomb-scargle': () => import('./lomb-scargle.bench.mjs'),
  recovery: () => import('./recovery.bench.mjs'),
};

const [name, ...options] = process.argv.slice(2);
const bench = BENCHES[name];
if (bench === undefined) {
  console.error(`Say which: ${Object.keys(BENCHES).join(', ')}.`);
  process.exitCode = 2;
} else await (await bench()).run(options);
