import { useCandling, useDocument, useResults } from '../store/use-candling.ts';
import { EggSign } from './EggSign.tsx';
import { timeLeftWords } from './time-left-words.ts';

/** The session and whether it is saved; the sweep; the two keys that lead to all others. */
export function TopBar() {
  const { view } = useCandling();
  const name = useDocument((state) => state.document?.name);
  const hasTargets = useDocument((state) => (state.document?.targets.length ?? 0) > 0);
  return (
    <header className="top-bar">
      <span className="word-mark">
        <EggSign /> Candling
      </span>
      {name === undefined ? (
        <span className="session-name">no session</span>
      ) : (
        <button type="button" className="session-name" onClick={() => view.setState({ dialog: 'session' })}>
          {name}
        </button>
      )}
      {hasTargets ? <SaveWords /> : <span className="quiet small">Nothing leaves this machine</span>}
      <span className="spread" />
      <SweepWords />
      <button type="button" className="top-key" onClick={() => view.setState({ dialog: 'palette' })}>
        <kbd>Ctrl</kbd>
        <kbd>K</kbd> all commands
      </button>
      <button type="button" className="top-key" onClick={() => view.setState({ dialog: 'keys' })}>
        <kbd>?</kbd> keys
      </button>
    </header>
  );
}

function SaveWords() {
  const state = useDocument((document) => document.saveState);
  const readOnly = useDocument((document) => document.readOnly);
  const words = readOnly
    ? 'read-only'
    : state?.kind === 'saved'
      ? `Saved ${new Date(state.at).toLocaleTimeString('en-GB')}`
      : state?.kind === 'saving'
        ? 'Saving'
        : state?.kind === 'not saved'
          ? 'Not saved'
          : '';
  return (
    <span className="quiet small" data-save={readOnly ? 'read-only' : state?.kind}>
      {words}
    </span>
  );
}

function SweepWords() {
  const { sweep } = useCandling();
  const running = useResults((state) => state.sweep);
  const hasTargets = useDocument((state) => (state.document?.targets.length ?? 0) > 0);
  if (running === undefined)
    return hasTargets ? (
      <button type="button" className="top-key sweep-words" onClick={() => void sweep.start()}>
        <kbd>Shift</kbd>
        <kbd>S</kbd> search the docket
      </button>
    ) : null;
  const { what, done, total, startedAt } = running;
  return (
    <span className="sweep" role="status">
      <span className="sweep-words small">
        Sweep: {done} of {total} {what === 'search' ? 'searched' : 'with false alarms'}
        {timeLeftWords(done, total, Date.now() - startedAt)}
      </span>
      <span className="progress-bar" aria-hidden="true">
        <i style={{ width: `${(100 * done) / total}%` }} />
      </span>
      <button type="button" className="top-key" onClick={() => sweep.cancel()}>
        <kbd>Esc</kbd> cancel
      </button>
    </span>
  );
}
