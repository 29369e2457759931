import { type ReactNode, useState } from 'react';
import { collectDropped } from './collect-dropped.ts';
import './intake.css';

/** The whole window takes files and folders. */
export function DropTarget({
  onFiles,
  children,
}: {
  readonly onFiles: (files: readonly File[]) => void;
  readonly children: ReactNode;
}) {
  const [over, setOver] = useState(false);
  const hasFiles = (event: React.DragEvent) => event.dataTransfer.types.includes('Files');
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: dropping is one way of several to open files
    <div
      className="drop-target"
      onDragOver={(event) => {
        if (!hasFiles(event)) return;
        event.preventDefault();
        setOver(true);
      }}
      onDragLeave={(event) => {
        if (event.relatedTarget === null) setOver(false);
      }}
      onDrop={(event) => {
        if (!hasFiles(event)) return;
        event.preventDefault();
        setOver(false);
        void collectDropped(event.dataTransfer.items).then(onFiles);
      }}
    >
      {children}
      {over && <p className="drop-words">Drop files or folders to read them here. Nothing is sent anywhere.</p>}
    </div>
  );
}
