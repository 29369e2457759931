import type { Candling } from '../../store/candling.ts';
import type { RoomActions } from '../room-actions.ts';

/** One thing the analyst can do, reachable from the palette and by its key. */
export interface AppCommand {
  readonly title: string;
  readonly room: 'files' | 'docket' | 'strip' | 'fold' | 'search' | 'case' | 'ruling' | 'session' | 'screen';
  /** In the syntax of tinykeys. */
  readonly keys: readonly string[];
  /** Where it is one of the few on the key line at the foot: its word there. */
  readonly foot?: { readonly keys: readonly string[]; readonly words: string };
  /** Absent: always. */
  readonly when?: (candling: Candling) => boolean;
  readonly run: (candling: Candling, rooms: RoomActions) => void;
}

export const isEmpty = (candling: Candling) => (candling.document.getState().document?.targets.length ?? 0) === 0;
export const hasTargets = (candling: Candling) => !isEmpty(candling);
export const hasEphemeris = (candling: Candling) => candling.actions.bench().ephemeris !== undefined;
export const hasCase = (candling: Candling) => candling.actions.bench().case !== undefined;
export const hasTrial = (candling: Candling) => candling.view.getState().trial !== undefined && !hasCase(candling);
export const hasSession = (candling: Candling) => candling.document.getState().document !== undefined;
export const hasMark = (candling: Candling) => candling.view.getState().selectedMarkId !== undefined;
export const isRunning = (candling: Candling) => candling.actions.bench().running !== undefined;
export const hasPeak = (candling: Candling) => candling.actions.bench().search?.peaks[0] !== undefined;
