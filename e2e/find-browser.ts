import { execFileSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { chromium } from '@playwright/test';

const PLACES = [
  process.env.CHROMIUM_PATH,
  '/usr/bin/chromium',
  '/usr/bin/chromium-browser',
  '/usr/bin/google-chrome',
  '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
];

/** A Chromium on this machine; undefined lets Playwright use its own, which is installed where it is missing. */
export function findBrowser(): string | undefined {
  const found = PLACES.find((path) => path !== undefined && path !== '' && existsSync(path));
  if (found !== undefined) return found;
  if (!existsSync(chromium.executablePath()))
    execFileSync('npx', ['playwright', 'install', 'chromium'], { stdio: 'inherit' });
  return undefined;
}
