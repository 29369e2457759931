import { type DBSchema, type IDBPDatabase, openDB } from 'idb';
import type { SessionDocument } from '../session/document.ts';
import { upgrade } from '../session/upgrade.ts';
import type { TargetSummary } from './results-store.ts';
import type { RememberedView } from './view-store.ts';

/** What a session needs to come back after a reload, with its files. */
export interface SavedSession {
  readonly document: SessionDocument;
  readonly savedAt: string;
}

interface CandlingDatabase extends DBSchema {
  sessions: { key: string; value: SavedSession };
  /** Bytes of every light-curve file, by SHA-256: sessions share them. */
  files: { key: string; value: { readonly name: string; readonly bytes: ArrayBuffer } };
  views: { key: string; value: RememberedView };
  summaries: { key: string; value: ReadonlyMap<string, TargetSummary> };
}

export interface SessionStorage {
  /** The session saved last that has a target in it: an empty one is nothing to come back to. */
  lastSession(): Promise<SavedSession | undefined>;
  readSession(id: string): Promise<SavedSession | undefined>;
  saveSession(session: SavedSession): Promise<void>;
  saveFile(sha256: string, name: string, bytes: ArrayBuffer): Promise<void>;
  readFile(sha256: string): Promise<ArrayBuffer | undefined>;
  saveView(sessionId: string, view: RememberedView): Promise<void>;
  readView(sessionId: string): Promise<RememberedView | undefined>;
  saveSummaries(sessionId: string, summaries: ReadonlyMap<string, TargetSummary>): Promise<void>;
  readSummaries(sessionId: string): Promise<ReadonlyMap<string, TargetSummary>>;
}

/** The browser's own database: it stays on this machine. */
export function createSessionStorage(name = 'candling'): SessionStorage {
  const opened = openDatabase(name);
  return {
    async lastSession() {
      const sessions = await (await opened).getAll('sessions');
      const latest = sessions
        .filter(({ document }) => document.targets.length > 0)
        .reduce<SavedSession | undefined>(
          (newest, session) => (newest === undefined || session.savedAt > newest.savedAt ? session : newest),
          undefined,
        );
      return latest && inCurrentForm(latest);
    },
    async readSession(id) {
      const saved = await (await opened).get('sessions', id);
      return saved && inCurrentForm(saved);
    },
    async saveSession(session) {
      await (await opened).put('sessions', session, session.document.id);
    },
    async saveFile(sha256, fileName, bytes) {
      await (await opened).put('files', { name: fileName, bytes }, sha256);
    },
    async readFile(sha256) {
      return (await (await opened).get('files', sha256))?.bytes;
    },
    async saveView(sessionId, view) {
      await (await opened).put('views', view, sessionId);
    },
    async readView(sessionId) {
      return (await opened).get('views', sessionId);
    },
    async saveSummaries(sessionId, summaries) {
      await (await opened).put('summaries', summaries, sessionId);
    },
    async readSummaries(sessionId) {
      return (await (await opened).get('summaries', sessionId)) ?? new Map();
    },
  };
}

/** What an older Candling saved is brought up as an older file is. */
function inCurrentForm({ document, savedAt }: SavedSession): SavedSession {
  return { document: upgrade({ ...document }) as unknown as SessionDocument, savedAt };
}

function openDatabase(name: string): Promise<IDBPDatabase<CandlingDatabase>> {
  return openDB<CandlingDatabase>(name, 1, {
    upgrade(database) {
      for (const store of ['sessions', 'files', 'views', 'summaries'] as const) database.createObjectStore(store);
    },
  });
}
