import { access, constants, open, readFile, rename, rm, stat } from 'node:fs/promises';
import { basename, dirname, join } from 'node:path';
import type { SessionDocument } from '../../src/session/document.ts';
import { readSession } from '../../src/session/read-session.ts';
import { writeSession } from '../../src/session/write-session.ts';
import { reasonOf } from './find-files.ts';

/** Why a session cannot be put there, a sentence; what an analyst decided, or another file, is never written over. */
export async function refuseOutput(path: string): Promise<string | undefined> {
  const name = basename(path);
  try {
    await access(dirname(path), constants.W_OK);
  } catch (cause) {
    return `Nothing can be written to ${dirname(path)}: ${reasonOf(cause)}.`;
  }
  const before = await stat(path).catch(() => undefined);
  if (before === undefined) return undefined;
  if (before.isDirectory()) return `${path} is a folder: name the file to write.`;
  if (before.size === 0) return undefined;
  const read = readSession(await readFile(path, 'utf8'), name);
  if (read.kind === 'refused') return `${name} is there and is no session that can be read: it is not written over.`;
  return holdsDecisions(read.document)
    ? `${name} is there and holds an analyst's work: it is not written over. Write to another file.`
    : undefined;
}

function holdsDecisions({ targets }: SessionDocument): boolean {
  return targets.some(
    ({ marks, cases }) =>
      marks.length > 0 ||
      cases.some(
        ({ rulings, parked, origin }) => rulings.length > 0 || parked !== undefined || origin.kind !== 'search',
      ),
  );
}

/** Whole or not at all: written beside, read back as the app will, and put in place in one step. */
export async function writeOutput(path: string, document: SessionDocument): Promise<void> {
  const text = writeSession(document);
  const read = readSession(text, basename(path));
  // A fault of ours; what was found stays beside the session for another try.
  if (read.kind === 'refused') throw new Error(read.sentence);
  const aside = join(dirname(path), `.${basename(path)}.${process.pid}.tmp`);
  try {
    const file = await open(aside, 'w');
    await file.writeFile(text);
    await file.sync();
    await file.close();
    await rename(aside, path);
  } finally {
    await rm(aside, { force: true });
  }
}
