import { type ReactNode, useEffect, useRef } from 'react';

/** A modal form on the rise surface; Escape and a click beside it leave it. */
export function SheetDialog(props: {
  readonly title: string;
  readonly onLeave: () => void;
  readonly children: ReactNode;
}) {
  const dialog = useRef<HTMLDialogElement>(null);
  const { title, onLeave, children } = props;
  useEffect(() => dialog.current?.showModal(), []);
  return (
    // biome-ignore lint/a11y/useKeyWithClickEvents: Escape leaves a dialog by itself
    <dialog
      ref={dialog}
      className="sheet"
      aria-label={title}
      onClose={onLeave}
      onClick={(event) => {
        if (event.target === dialog.current) dialog.current?.close();
      }}
    >
      <header className="head-line">
        <h2>{title}</h2>
        <span className="spread" />
        <button type="button" className="button compact" onClick={() => dialog.current?.close()}>
          <kbd>Esc</kbd> close
        </button>
      </header>
      <div className="sheet-body">{children}</div>
    </dialog>
  );
}
