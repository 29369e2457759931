import { readFile } from 'node:fs/promises';
import { dirname, resolve } from 'node:path';
import react from '@vitejs/plugin-react';
import { main as assemble } from 'assemblyscript/asc';
import type { Plugin } from 'vite';
import { defineConfig } from 'vitest/config';
import pkg from './package.json' with { type: 'json' };

/** Cross-origin isolation lets buffers be shared between threads; the app works without it, by transfer. */
const isolation = {
  'Cross-Origin-Opener-Policy': 'same-origin',
  'Cross-Origin-Embedder-Policy': 'require-corp',
};

const KERNEL = '?kernel';

/**
 * `import bytes from './x.as.ts?kernel'` compiles AssemblyScript and gives the WebAssembly module as a Uint8Array, the
 * same in the browser, in Node and in tests.
 */
export function assemblyScript(): Plugin {
  return {
    name: 'candling:assemblyscript',
    enforce: 'pre',
    resolveId: (source, importer) =>
      source.endsWith(KERNEL) && importer !== undefined ? resolve(dirname(importer), source) : undefined,
    async load(id) {
      if (!id.endsWith(KERNEL)) return undefined;
      const file = id.slice(0, -KERNEL.length);
      this.addWatchFile(file);
      const base64 = Buffer.from(await compileKernel(file)).toString('base64');
      return `export default Uint8Array.from(atob('${base64}'), (character) => character.charCodeAt(0));`;
    },
  };
}

async function compileKernel(file: string): Promise<Uint8Array> {
  let binary: Uint8Array | undefined;
  const { error, stderr } = await assemble(
    ['kernel.ts', '-O3', '--noAssert', '--enable', 'simd', '--runtime', 'stub', '--outFile', 'kernel.wasm'],
    {
      readFile: (name) => (name === 'kernel.ts' ? readFile(file, 'utf8') : null),
      writeFile: (name, contents) => {
        if (name === 'kernel.wasm') binary = contents as Uint8Array;
      },
      listFiles: () => null,
    },
  );
  if (error !== null || binary === undefined) throw new Error(`${file} was not compiled.\n${stderr.toString()}`);
  return binary;
}

/** Nothing but this origin: no remote script, style, font or request, and no eval; WebAssembly may be compiled. */
const contentSecurityPolicy = [
  "default-src 'self'",
  "script-src 'self' 'wasm-unsafe-eval'",
  "style-src 'self'",
  "worker-src 'self'",
  "img-src 'self' blob: data:",
  "connect-src 'self'",
  "object-src 'none'",
  "base-uri 'none'",
  "form-action 'none'",
  "frame-ancestors 'none'",
].join('; ');

export default defineConfig({
  base: './',
  plugins: [react(), assemblyScript()],
  define: { __APP_VERSION__: JSON.stringify(pkg.version) },
  build: { assetsInlineLimit: 0, target: 'es2023', chunkSizeWarningLimit: 900 },
  worker: { format: 'es', plugins: () => [assemblyScript()] },
  server: { headers: isolation },
  preview: { headers: { ...isolation, 'Content-Security-Policy': contentSecurityPolicy } },
  test: {
    include: ['test/**/*.test.ts', 'test/**/*.test.tsx'],
    environment: 'node',
    testTimeout: 30_000,
    coverage: { include: ['src/core/**', 'src/session/**', 'src/jobs/**', 'workers/**'] },
  },
});
