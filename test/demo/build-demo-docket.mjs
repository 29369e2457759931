/** The whole demo docket as bytes, by file name. */
import { encodeLightCurve, fileNameOf, SURVEY } from './demo-files.mjs';
import { makeSeries } from './demo-series.mjs';
import { writeReadme, writeStarsTable } from './demo-tables.mjs';
import { DEMO_TARGETS } from './demo-targets.mjs';
import { describeTruths } from './demo-truths.mjs';

/**
 * @returns {{
 *   files: Map<string, Uint8Array>,
 *   made: { target: import('./demo-targets.mjs').DemoTarget, series: import('./demo-series.mjs').DemoSeries }[],
 *   truths: ReturnType<typeof describeTruths>,
 * }}
 */
export function buildDemoDocket() {
  const made = DEMO_TARGETS.map((target) => ({ target, series: makeSeries(target) }));
  const truths = describeTruths(made);
  const encoder = new TextEncoder();
  /** @type {Map<string, Uint8Array>} */
  const files = new Map();
  for (const { target, series } of made) files.set(fileNameOf(target), encodeLightCurve(target, series));
  files.set('stars.csv', encoder.encode(writeStarsTable(DEMO_TARGETS)));
  const listed = [...files].map(([name, bytes]) => ({ name, bytes: bytes.length }));
  files.set('manifest.json', encoder.encode(json(manifestOf(listed))));
  files.set('truths.json', encoder.encode(json(truths)));
  files.set('README.md', encoder.encode(writeReadme(truths, listed)));
  return { files, made, truths };
}

/** @param {{ name: string, bytes: number }[]} listed */
function manifestOf(listed) {
  return {
    survey: SURVEY,
    invented: true,
    note: 'Invented data, made by a program: no such survey or stars exist. See README.md for what is hidden in them.',
    targets: DEMO_TARGETS.length,
    totalBytes: listed.reduce((sum, { bytes }) => sum + bytes, 0),
    files: listed,
    documents: ['README.md', 'truths.json'],
  };
}

/** @param {unknown} value */
const json = (value) => `${JSON.stringify(value, undefined, 1)}\n`;
