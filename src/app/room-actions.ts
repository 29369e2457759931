import type { RulingKind } from '../session/document.ts';

/** What commands need of the rooms: given by the composition root, so that the list of commands imports no room. */
export interface RoomActions {
  openFiles(): void;
  openFolder(): void;
  loadDemo(): void;
  importSession(): void;
  exportSession(): void;
  exportVettingLog(format: 'csv' | 'json'): void;
  ruleWith(kind: RulingKind): void;
}
