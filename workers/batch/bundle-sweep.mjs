import { createHash, randomUUID } from 'node:crypto';
import { access, readdir, rename, rm, stat } from 'node:fs/promises';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const ROOT = fileURLToPath(new URL('../../', import.meta.url));
const CACHE = join(ROOT, 'node_modules/.cache/candling-sweep');
const SOURCES = ['src/core', 'src/contract', 'src/session', 'workers', 'vite.config.ts', 'package.json'];
const ENTRIES = ['run-sweep', 'sweep-thread'];
/** Builds of older sources are kept this long, since a sweep that runs still loads from its own. */
const KEPT_MS = 24 * 3600 * 1000;

/**
 * The folder with the bundled sweep, built as the app is and only when a source has changed since: Node 20 runs no
 * TypeScript. It lies under node_modules so that the packages it imports are found.
 *
 * @returns {Promise<string>} holds run-sweep.mjs and sweep-thread.mjs
 */
export async function bundleSweep() {
  const outDir = join(CACHE, await hashOfSources());
  const isThere = await access(join(outDir, `${ENTRIES[0]}.mjs`)).then(
    () => true,
    () => false,
  );
  if (isThere) return outDir;
  // Built aside and put in place whole, for another sweep may start at the same moment.
  const aside = join(CACHE, randomUUID());
  await buildInto(aside);
  await rename(aside, outDir).catch(() => rm(aside, { recursive: true, force: true }));
  await removeOld(outDir);
  return outDir;
}

async function buildInto(outDir) {
  const { build, loadConfigFromFile } = await import('vite');
  const { config } = await loadConfigFromFile({ command: 'build', mode: 'production' }, join(ROOT, 'vite.config.ts'));
  await build({
    root: ROOT,
    configFile: false,
    logLevel: 'error',
    plugins: config.plugins,
    publicDir: false,
    build: {
      outDir,
      minify: false,
      ssr: true,
      target: 'es2023',
      rollupOptions: {
        input: Object.fromEntries(ENTRIES.map((name) => [name, join(ROOT, `workers/batch/${name}.ts`)])),
        output: { entryFileNames: '[name].mjs', chunkFileNames: '[name]-[hash].mjs' },
      },
    },
  });
}

async function hashOfSources() {
  const hash = createHash('sha256');
  for (const source of SOURCES) await addTo(hash, join(ROOT, source));
  return hash.digest('hex').slice(0, 16);
}

async function addTo(hash, path) {
  const found = await stat(path);
  if (!found.isDirectory()) hash.update(`${path} ${found.size} ${found.mtimeMs}\n`);
  else for (const name of (await readdir(path)).sort()) await addTo(hash, join(path, name));
}

async function removeOld(current) {
  for (const name of await readdir(CACHE)) {
    const path = join(CACHE, name);
    const found = await stat(path).catch(() => undefined);
    if (path !== current && found !== undefined && Date.now() - found.mtimeMs > KEPT_MS)
      await rm(path, { recursive: true, force: true });
  }
}
