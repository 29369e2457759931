import type { SessionDocument } from './document.ts';

/** The text of a *.candling.json file. */
export function writeSession(document: SessionDocument): string {
  return `${JSON.stringify(document, undefined, 1)}\n`;
}
