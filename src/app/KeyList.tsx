import { SheetDialog } from '../bench/SheetDialog.tsx';
import { useCandling } from '../store/use-candling.ts';
import { COMMANDS } from './commands.ts';
import { KeyWords } from './KeyWords.tsx';

/** All keys by room, and what a hand on a plot does. */
export function KeyList() {
  const { view } = useCandling();
  const rooms = [...new Set(COMMANDS.map(({ room }) => room))];
  return (
    <SheetDialog title="All keys" onLeave={() => view.setState({ dialog: undefined })}>
      {rooms.map((room) => (
        <section key={room}>
          <h3>{room}</h3>
          <ul className="key-list">
            {COMMANDS.filter((command) => command.room === room).map(({ title, keys }) => (
              <li key={title}>
                <span>{title}</span>
                <span>
                  {keys.map((key) => (
                    <KeyWords key={key} keys={key} />
                  ))}
                </span>
              </li>
            ))}
          </ul>
        </section>
      ))}
      <section>
        <h3>on the plots</h3>
        <ul className="key-list">
          <li>Wheel zooms about the cursor, a drag pans, a double click shows everything.</li>
          <li>Shift and a drag over the strip marks; a selected mark is moved by its middle and sized by its sides.</li>
          <li>A drag over the fold moves the epoch; with Alt or Ctrl it changes the period. Escape undoes the drag.</li>
          <li>A click in the periodogram folds there.</li>
        </ul>
      </section>
    </SheetDialog>
  );
}
