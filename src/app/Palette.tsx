import { useEffect, useRef, useState } from 'react';
import { useCandling } from '../store/use-candling.ts';
import type { AppCommand } from './commands/app-command.ts';
import { availableCommands } from './commands.ts';
import { KeyWords } from './KeyWords.tsx';
import { matchCommands } from './match-commands.ts';
import type { RoomActions } from './room-actions.ts';

/** Every command that works now, found by typing; Enter runs the lit one. */
export function Palette({ rooms }: { readonly rooms: RoomActions }) {
  const candling = useCandling();
  const dialog = useRef<HTMLDialogElement>(null);
  const [text, setText] = useState('');
  const [at, setAt] = useState(0);
  const found = matchCommands(availableCommands(candling), text);
  useEffect(() => dialog.current?.showModal(), []);
  const leave = () => candling.view.setState({ dialog: undefined });
  const run = (command: AppCommand | undefined) => {
    leave();
    command?.run(candling, rooms);
  };
  const step = (by: number) => setAt((at + by + found.length) % Math.max(1, found.length));
  return (
    <dialog ref={dialog} className="sheet palette" aria-label="All commands" onClose={leave}>
      <input
        className="field"
        role="combobox"
        aria-expanded="true"
        aria-controls="palette-list"
        aria-activedescendant={found[at] && `palette-${at}`}
        aria-label="Find a command"
        placeholder="find a command"
        value={text}
        onChange={(event) => {
          setText(event.target.value);
          setAt(0);
        }}
        onKeyDown={(event) => {
          if (event.key === 'ArrowDown') step(1);
          else if (event.key === 'ArrowUp') step(-1);
          else if (event.key === 'Enter') run(found[at]?.command);
          else return;
          event.preventDefault();
        }}
      />
      <div id="palette-list" role="listbox" aria-label="Commands">
        {found.map(({ command, pieces }, index) => (
          // biome-ignore lint/a11y/useKeyWithClickEvents: keys are the combobox's, which owns this list
          <div
            key={command.title}
            id={`palette-${index}`}
            role="option"
            tabIndex={-1}
            aria-selected={index === at}
            ref={index === at ? (element) => element?.scrollIntoView({ block: 'nearest' }) : undefined}
            onClick={() => run(command)}
          >
            <span>
              {pieces.map(({ text: piece, matched, start }) => (matched ? <b key={start}>{piece}</b> : piece))}
            </span>
            <span className="quiet">{command.room}</span>
            <KeyWords keys={command.keys[0]!} />
          </div>
        ))}
      </div>
      {found.length === 0 && <p className="palette-none">No command has these words.</p>}
    </dialog>
  );
}
