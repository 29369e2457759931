import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { build, loadConfigFromFile } from 'vite';

/**
 * Bundles TypeScript modules as the app's build does and imports the result, so that what is timed is what ships.
 * @param {Record<string, string>} entries name to path, relative to the project
 */
export async function bundleModules(entries) {
  const outDir = await mkdtemp(join(tmpdir(), 'candling-bench-'));
  const { config } = await loadConfigFromFile({ command: 'build', mode: 'production' });
  try {
    await build({
      configFile: false,
      logLevel: 'error',
      plugins: config.plugins,
      ssr: { noExternal: true },
      build: { outDir, minify: false, ssr: true, target: 'es2023', rollupOptions: { input: entries } },
    });
    const loaded = {};
    for (const name of Object.keys(entries)) {
      const file = await import(pathToFileURL(join(outDir, `${name}.js`)).href).catch(
        () => import(pathToFileURL(join(outDir, `${name}.mjs`)).href),
      );
      Object.assign(loaded, file);
    }
    return loaded;
  } finally {
    await rm(outDir, { recursive: true });
  }
}
