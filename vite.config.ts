import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';
import pkg from './package.json' with { type: 'json' };

/** Cross-origin isolation lets buffers be shared between threads; the app works without it, by transfer. */
const isolation = {
  'Cross-Origin-Opener-Policy': 'same-origin',
  'Cross-Origin-Embedder-Policy': 'require-corp',
};

/** Nothing but this origin: no remote script, style, font or request, and no eval. */
const contentSecurityPolicy = [
  "default-src 'self'",
  "script-src 'self'",
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
  plugins: [react()],
  define: { __APP_VERSION__: JSON.stringify(pkg.version) },
  build: { assetsInlineLimit: 0, target: 'es2023', chunkSizeWarningLimit: 900 },
  worker: { format: 'es' },
  server: { headers: isolation },
  preview: { headers: { ...isolation, 'Content-Security-Policy': contentSecurityPolicy } },
  test: {
    include: ['test/**/*.test.ts', 'test/**/*.test.tsx'],
    environment: 'node',
    testTimeout: 30_000,
    coverage: { include: ['src/core/**', 'src/session/**', 'src/jobs/**', 'workers/**'] },
  },
});
