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

/** Opens a session file in place of what is open; a broken or foreign one is refused and changes nothing. */
export async function importSession(candling: Candling, file: File): Promise<void> {
  const read = readSession(await file.text(), file.name);
  if (read.kind === 'refused') {
    candling.view.setState({ notice: { kind: 'error', sentence: read.sentence } });
    return;
  }
  await candling.openSession(read.document);
  const missing = await missingFiles(candling, read.document);
  if (missing.length > 0) candling.view.setState({ notice: { kind: 'notice', sentence: missingWords(missing) } });
}

async function missingFiles(candling: Candling, document: SessionDocument): Promise<readonly string[]> {
  const missing: string[] = [];
  for (const file of document.targets.flatMap(({ files }) => files))
    if ((await candling.storage.readFile(file.sha256)) === undefined) missing.push(file.name);
  return missing;
}

const MOST_NAMED = 5;

function missingWords(names: readonly string[]): string {
  const named = names.slice(0, MOST_NAMED).join(', ');
  const more = names.length > MOST_NAMED ? ` and ${names.length - MOST_NAMED} more` : '';
  const files = names.length === 1 ? '1 file of this session is' : `${names.length} files of this session are`;
  return `${files} not on this machine (${named}${more}). Open them again to see their flux; marks and rulings are here.`;
}
