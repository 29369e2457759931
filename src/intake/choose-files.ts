import type { IncomingFile } from '../store/add-files.ts';

/** Asks the browser for files (or a whole folder); resolves with none when the analyst leaves. */
export function chooseFiles(options: {
  readonly folder?: boolean;
  readonly multiple?: boolean;
  readonly accept?: string;
}): Promise<readonly File[]> {
  const input = document.createElement('input');
  input.type = 'file';
  input.multiple = options.multiple ?? true;
  input.webkitdirectory = options.folder ?? false;
  if (options.accept !== undefined) input.accept = options.accept;
  // An input outside the document may be collected, or not open its chooser, before the analyst has answered.
  input.hidden = true;
  document.body.append(input);
  return new Promise<readonly File[]>((resolve) => {
    input.addEventListener('change', () => resolve([...(input.files ?? [])]));
    input.addEventListener('cancel', () => resolve([]));
    input.click();
  }).finally(() => input.remove());
}

export function incoming(files: readonly File[]): readonly IncomingFile[] {
  return files.map((file) => ({ name: file.name, bytes: () => file.arrayBuffer() }));
}
