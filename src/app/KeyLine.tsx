import { useCandling, useDocument, useResults, useView } from '../store/use-candling.ts';
import { availableCommands } from './commands.ts';
import { KeyWords } from './KeyWords.tsx';

/** The few keys that work now. */
export function KeyLine() {
  const candling = useCandling();
  const { rulingDraft, markDraft, tool } = useView((state) => state);
  const analyst = useDocument((state) => state.document?.analyst);
  // What works depends on all of them; the line is small.
  useView((state) => state);
  useDocument((state) => state.document);
  useResults((state) => state.searches);
  return (
    <footer className="key-line">
      {rulingDraft !== undefined ? (
        <>
          <Hint keys={['1', '2', '3', '4']} words="ruling" />
          <Hint keys={['Q', 'W', 'E', 'R', 'T', 'Y']} words="reason" />
          <Hint keys={['J', 'L']} words="confidence" />
          <Hint keys={['Enter']} words="record" />
          <Hint keys={['K']} words="park until…" />
          <Hint keys={['Esc']} words="leave" />
        </>
      ) : tool === 'mark' || markDraft !== undefined ? (
        <>
          <span>drag over the strip to mark</span>
          <Hint keys={['Enter']} words="save" />
          <Hint keys={['Esc']} words="leave" />
        </>
      ) : (
        availableCommands(candling)
          .flatMap(({ foot }) => (foot === undefined ? [] : [foot]))
          .map(({ keys, words }) => (
            <span key={words} className="hint">
              {keys.map((key) => (
                <KeyWords key={key} keys={key} />
              ))}
              {words}
            </span>
          ))
      )}
      <span className="spread" />
      {analyst === '' ? (
        <button type="button" className="top-key" onClick={() => candling.view.setState({ dialog: 'session' })}>
          <kbd>W</kbd> name the analyst
        </button>
      ) : (
        <span className="quiet">{analyst === undefined ? 'works offline' : `Analyst ${analyst}, works offline`}</span>
      )}
    </footer>
  );
}

function Hint({ keys, words }: { readonly keys: readonly string[]; readonly words: string }) {
  return (
    <span className="hint">
      <span className="key-words">
        {keys.map((key) => (
          <kbd key={key}>{key}</kbd>
        ))}
      </span>{' '}
      {words}
    </span>
  );
}
