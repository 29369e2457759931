import type { SessionDocument } from '../session/document.ts';
import { readSession } from '../session/read-session.ts';
import { writeVettingLogCsv, writeVettingLogJson } from '../session/vetting-log.ts';
import { writeSession } from '../session/write-session.ts';
import type { Candling } from '../store/candling.ts';
import { fileStem, saveFile } from './save-file.ts';

export const SESSION_SUFFIX = '.candling.json';

/** The committed document: a drag in progress is no part of an export. */
const committed = (candling: Candling) => candling.document.getState().history?.present;

export function exportSession(candling: Candling): void {
  const document = committed(candling);
  if (document === undefined) return;
  saveFile(`${fileStem(document.name)}${SESSION_SUFFIX}`, writeSession(document), 'application/json');
}

export function exportVettingLog(candling: Candling, format: 'csv' | 'json'): void {
  const document = committed(candling);
  if (document === undefined) return;
  const stamp = { at: new Date().toISOString(), app: candling.app };
  const name = `${fileStem(document.name)}-vetting-log.${format}`;
  if (format === 'csv') saveFile(name, writeVettingLogCsv(document, stamp), 'text/csv');
  else saveFile(name, writeVettingLogJson(document, stamp), 'application/json');
}

/** Opens a session file in place of what is open; one that cannot be, or that would undo decisions, changes nothing. */
export async function importSession(candling: Candling, file: Pick<File, 'name' | 'text'>): Promise<void> {
  const { view } = candling;
  const refuse = (sentence: string) => view.setState({ notice: { kind: 'error', sentence } });
  try {
    const read = readSession(await file.text(), file.name);
    if (read.kind === 'refused') return refuse(read.sentence);
    const open = committed(candling);
    const ahead = open === undefined ? 0 : entriesAhead(open, read.document);
    if (ahead > 0) return refuse(olderWords(file.name, ahead));
    const isCopy = open?.id !== read.document.id && (await isBehindSaved(candling, read.document));
    await candling.openSession(isCopy ? asEarlierState(read.document) : read.document);
    const missing = await missingFiles(candling, read.document);
    const words = [isCopy ? copyWords(file.name) : '', missing.length > 0 ? missingWords(missing) : ''].filter(Boolean);
    if (words.length > 0) view.setState({ notice: { kind: 'notice', sentence: words.join(' ') } });
  } catch (cause) {
    refuse(`${file.name} was not opened. The browser said: ${cause instanceof Error ? cause.message : String(cause)}.`);
  }
}

/** How many journal entries of the open session an older copy of it lacks: opening the copy would lose them. */
export function entriesAhead(open: SessionDocument, copy: SessionDocument): number {
  if (open.id !== copy.id) return 0;
  const known = new Set(copy.journal.map(({ id }) => id));
  return open.journal.filter(({ id }) => !known.has(id)).length;
}

/** Whether this machine keeps a later state of the same session: opening this one under its name would write over it. */
async function isBehindSaved({ storage }: Candling, document: SessionDocument): Promise<boolean> {
  const saved = await storage.readSession(document.id);
  return saved !== undefined && entriesAhead(saved.document, document) > 0;
}

function asEarlierState(document: SessionDocument): SessionDocument {
  return { ...document, id: globalThis.crypto.randomUUID(), name: `${document.name} (earlier state)` };
}

const copyWords = (fileName: string): string =>
  `${fileName} is an earlier state of a session that this machine keeps: it was opened as a session of its own, and the later one is as it was.`;

function olderWords(fileName: string, ahead: number): string {
  const entries = ahead === 1 ? '1 journal entry' : `${ahead} journal entries`;
  return `${fileName} was not opened. It is an earlier state of the open session and lacks ${entries} of it. To go back to it, export the open session, start a new one, then import this file. Nothing was changed.`;
}

async function missingFiles(candling: Candling, document: SessionDocument): Promise<readonly string[]> {
  const missing: string[] = [];
  for (const file of document.targets.flatMap(({ files }) => files))
    if ((await candling.storage.readFile(file.sha256)) === undefined) missing.push(file.name);
  return missing;
}

const MOST_NAMED = 5;

export function missingWords(names: readonly string[]): string {
  const named = names.slice(0, MOST_NAMED).join(', ');
  const more = names.length > MOST_NAMED ? ` and ${names.length - MOST_NAMED} more` : '';
  const files = names.length === 1 ? '1 file of this session is' : `${names.length} files of this session are`;
  return `${files} not on this machine (${named}${more}). Open them again to see their flux; marks and rulings are here.`;
}
