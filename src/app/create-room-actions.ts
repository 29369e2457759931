import { ruleWith } from '../cases/ruling-actions.ts';
import { chooseFiles } from '../intake/choose-files.ts';
import { loadDemo } from '../intake/load-demo.ts';
import { exportSession, exportVettingLog, importSession } from '../records/session-files.ts';
import type { Candling } from '../store/candling.ts';
import { openGiven } from './open-given.ts';
import type { RoomActions } from './room-actions.ts';

/** Ties the list of commands to the rooms that carry them out. */
export function createRoomActions(candling: Candling): RoomActions {
  return {
    openFiles: () => void chooseFiles({}).then((files) => openGiven(candling, files)),
    openFolder: () => void chooseFiles({ folder: true }).then((files) => openGiven(candling, files)),
    loadDemo: () => void openDemo(candling),
    importSession: () =>
      void chooseFiles({ multiple: false, accept: '.json,application/json' }).then(async ([file]) => {
        if (file !== undefined) await importSession(candling, file);
      }),
    exportSession: () => exportSession(candling),
    exportVettingLog: (format) => exportVettingLog(candling, format),
    ruleWith: (kind) => ruleWith(candling, kind),
  };
}

async function openDemo(candling: Candling): Promise<void> {
  try {
    const files = await loadDemo();
    await candling.startSession('demo docket, invented');
    await candling.files.add(files);
  } catch (cause) {
    const reason = cause instanceof Error ? cause.message : String(cause);
    candling.view.setState({ notice: { kind: 'error', sentence: `The demo docket was not opened: ${reason}.` } });
  }
}
