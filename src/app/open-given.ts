import { incoming } from '../intake/choose-files.ts';
import { importSession, SESSION_SUFFIX } from '../records/session-files.ts';
import type { Candling } from '../store/candling.ts';

/** Files that were dropped or chosen: a session is opened, everything else is read into the docket. */
export async function openGiven(candling: Candling, files: readonly File[]): Promise<void> {
  const session = files.find((file) => file.name.endsWith(SESSION_SUFFIX));
  const others = files.filter((file) => !file.name.endsWith(SESSION_SUFFIX));
  if (session !== undefined) await importSession(candling, session);
  if (others.length === 0) return;
  if (candling.document.getState().document === undefined) await candling.startSession('untitled');
  await candling.files.add(incoming(others));
}
