import type { SessionDocument } from './document.ts';

/** A session with nothing in it yet. */
export function newDocument(fields: {
  readonly id: string;
  readonly name: string;
  readonly analyst: string;
  readonly app: string;
  readonly at: string;
}): SessionDocument {
  const { id, name, analyst, app, at } = fields;
  return {
    format: 'candling-session',
    version: 2,
    id,
    name,
    app,
    createdAt: at,
    analyst,
    targets: [],
    instrumentTables: [],
    modeSets: [],
    journal: [],
  };
}
