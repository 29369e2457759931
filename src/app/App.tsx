import { useEffect, useMemo, useState } from 'react';
import { Bench } from '../bench/Bench.tsx';
import { RecipeDialog } from '../bench/RecipeDialog.tsx';
import { SearchDialog } from '../bench/SearchDialog.tsx';
import { CaseChips } from '../cases/CaseChips.tsx';
import { CaseSheet } from '../cases/CaseSheet.tsx';
import { HandTimingDialog } from '../cases/HandTimingDialog.tsx';
import { ParkDialog } from '../cases/ParkDialog.tsx';
import { Docket } from '../docket/Docket.tsx';
import { DropTarget } from '../intake/DropTarget.tsx';
import { FirstRun } from '../intake/FirstRun.tsx';
import { MappingForm } from '../intake/MappingForm.tsx';
import { SessionDialog } from '../records/SessionDialog.tsx';
import { useCandling, useDocument, useView } from '../store/use-candling.ts';
import { createRoomActions } from './create-room-actions.ts';
import { KeyLine } from './KeyLine.tsx';
import { KeyList } from './KeyList.tsx';
import { bindKeys } from './key-bindings.ts';
import { openGiven } from './open-given.ts';
import { Palette } from './Palette.tsx';
import type { RoomActions } from './room-actions.ts';
import { TopBar } from './TopBar.tsx';
import { useTheme } from './use-theme.ts';
import './app.css';

export function App() {
  const candling = useCandling();
  const rooms = useMemo(() => createRoomActions(candling), [candling]);
  const [started, setStarted] = useState(false);
  useTheme();
  useEffect(() => bindKeys(candling, rooms), [candling, rooms]);
  useEffect(() => {
    // A reload or a killed tab comes back where it was.
    void candling.reopenLast().finally(() => setStarted(true));
  }, [candling]);
  return (
    <DropTarget onFiles={(files) => void openGiven(candling, files)}>
      {started && <Screen rooms={rooms} />}
      <Dialogs rooms={rooms} />
    </DropTarget>
  );
}

function Screen({ rooms }: { readonly rooms: RoomActions }) {
  const candling = useCandling();
  const { docketHidden, sheetHidden } = useView((state) => state);
  const empty = useDocument((state) => (state.document?.targets.length ?? 0) === 0);
  const shown = `screen${docketHidden ? ' no-docket' : ''}${sheetHidden || empty ? ' no-sheet' : ''}`;
  return (
    <div className={shown}>
      <TopBar />
      {!docketHidden && <Docket />}
      {empty ? (
        <FirstRun
          onOpenFiles={rooms.openFiles}
          onOpenFolder={rooms.openFolder}
          onReopen={() => void candling.reopenLast()}
          onImport={rooms.importSession}
          onDemo={rooms.loadDemo}
        />
      ) : (
        <Bench chips={<CaseChips />} />
      )}
      {!empty && !sheetHidden && <CaseSheet />}
      <KeyLine />
    </div>
  );
}

function Dialogs({ rooms }: { readonly rooms: RoomActions }) {
  const { view } = useCandling();
  const dialog = useView((state) => state.dialog);
  const leave = () => view.setState({ dialog: undefined });
  return (
    <>
      {dialog === 'palette' && <Palette rooms={rooms} />}
      {dialog === 'keys' && <KeyList />}
      {dialog === 'recipe' && <RecipeDialog onLeave={leave} />}
      {dialog === 'search settings' && <SearchDialog onLeave={leave} />}
      {dialog === 'timing by hand' && <HandTimingDialog onLeave={leave} />}
      {dialog === 'park' && <ParkDialog onLeave={leave} />}
      {dialog === 'session' && <SessionDialog onLeave={leave} onImport={rooms.importSession} />}
      <MappingForm />
    </>
  );
}
