import { defineConfig } from '@playwright/test';
import { findBrowser } from './find-browser.ts';

const PORT = 4179;
const isRoot = process.getuid?.() === 0;

export default defineConfig({
  testDir: '.',
  outputDir: '../test-results',
  workers: 1,
  timeout: 120_000,
  expect: { timeout: 20_000 },
  forbidOnly: true,
  reporter: [['list']],
  use: {
    baseURL: `http://localhost:${PORT}/`,
    viewport: { width: 1440, height: 900 },
    trace: 'retain-on-failure',
    launchOptions: {
      executablePath: findBrowser(),
      // Chromium refuses its sandbox to root, as in a container.
      args: isRoot ? ['--no-sandbox'] : [],
    },
  },
  webServer: {
    command: `npx vite preview --port ${PORT} --strictPort`,
    cwd: new URL('..', import.meta.url).pathname,
    port: PORT,
    reuseExistingServer: false,
  },
});
