import { useEffect, useState } from 'react';
import { formatNumber } from '../core/number-format.ts';
import { useCandling } from '../store/use-candling.ts';
import { Egg } from './Egg.tsx';

export interface FirstRunActions {
  readonly onOpenFiles: () => void;
  readonly onOpenFolder: () => void;
  readonly onReopen: () => void;
  readonly onImport: () => void;
  readonly onDemo: () => void;
}

/** The empty app: the egg, and four ways to begin. */
export function FirstRun({ onOpenFiles, onOpenFolder, onReopen, onImport, onDemo }: FirstRunActions) {
  const { storage } = useCandling();
  const [last, setLast] = useState<{ readonly name: string; readonly targets: number }>();
  useEffect(() => {
    let gone = false;
    void storage.lastSession().then((session) => {
      const found = session?.document;
      if (!gone && found !== undefined) setLast({ name: found.name, targets: found.targets.length });
    });
    return () => {
      gone = true;
    };
  }, [storage]);
  const lastWords =
    last === undefined
      ? 'none on this machine yet'
      : `${last.name}, ${formatNumber(last.targets)} ${last.targets === 1 ? 'target' : 'targets'}`;
  return (
    <main className="first-run" data-region="bench" tabIndex={-1} aria-label="Begin">
      <Egg />
      <div className="first-actions">
        <h1>Open light curves to begin</h1>
        <p>
          Drop files or a folder anywhere. FITS and text tables are read here, in this browser, and are not sent
          anywhere.
        </p>
        <ul>
          <Action keys="O" title="Open files" hint="one star a file, or many" onRun={onOpenFiles} />
          <Action keys="Shift O" title="Open a folder" hint="with all files in it" onRun={onOpenFolder} />
          <Action keys="R" title="Reopen the last session" hint={lastWords} onRun={onReopen} off={last === undefined} />
          <Action keys="I" title="Import a session" hint="a *.candling.json document" onRun={onImport} />
          <Action keys="D" title="Try the demo docket" hint="24 invented stars, 2.8 MB" onRun={onDemo} />
        </ul>
        <p className="small quiet">A file that cannot be read is named with the reason; the others still open.</p>
      </div>
    </main>
  );
}

function Action(props: {
  readonly keys: string;
  readonly title: string;
  readonly hint: string;
  readonly onRun: () => void;
  readonly off?: boolean;
}) {
  const { keys, title, hint, onRun, off = false } = props;
  return (
    <li>
      <button type="button" onClick={onRun} disabled={off}>
        <span className="key-words">
          {keys.split(' ').map((key) => (
            <kbd key={key}>{key}</kbd>
          ))}
        </span>
        <span className="title">{title}</span>
        <span className="hint">{hint}</span>
      </button>
    </li>
  );
}
