/**
 * Writes the demo docket to public/demo; with --check, compares what is there instead and fails where it differs.
 *
 *     node test/demo/write-demo-docket.mjs [--check]
 */
import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { buildDemoDocket } from './build-demo-docket.mjs';

const folder = new URL('../../public/demo/', import.meta.url);
const { files } = buildDemoDocket();
const total = [...files.values()].reduce((sum, bytes) => sum + bytes.length, 0);

/** @param {string} name @param {Uint8Array} bytes */
function isSame(name, bytes) {
  try {
    return readFileSync(new URL(name, folder)).equals(bytes);
  } catch {
    return false;
  }
}

if (process.argv.includes('--check')) {
  const different = [...files].filter(([name, bytes]) => !isSame(name, bytes)).map(([name]) => name);
  if (different.length > 0) console.error(`Missing or different in public/demo: ${different.join(', ')}.`);
  else console.log(`All ${files.size} files are as the program makes them.`);
  process.exitCode = different.length > 0 ? 1 : 0;
} else {
  mkdirSync(folder, { recursive: true });
  for (const [name, bytes] of files) writeFileSync(new URL(name, folder), bytes);
  console.log(`Wrote ${files.size} files, ${total} bytes, to ${fileURLToPath(folder)}.`);
}
