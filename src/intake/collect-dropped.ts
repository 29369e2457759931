/** The files of a drop, those inside dropped folders too. */
export async function collectDropped(items: DataTransferItemList): Promise<File[]> {
  // Entries must be taken before the first wait: the list is emptied once the event is over.
  const entries = [...items].map((item) => item.webkitGetAsEntry()).filter((entry) => entry !== null);
  const files: File[] = [];
  for (const entry of entries) await collect(entry, files);
  return files.sort((a, b) => a.name.localeCompare(b.name, 'en', { numeric: true }));
}

async function collect(entry: FileSystemEntry, files: File[]): Promise<void> {
  if (entry.name.startsWith('.')) return;
  if (entry.isFile) files.push(await fileOf(entry as FileSystemFileEntry));
  else if (entry.isDirectory)
    for (const inner of await entriesOf(entry as FileSystemDirectoryEntry)) await collect(inner, files);
}

const fileOf = (entry: FileSystemFileEntry) => new Promise<File>((resolve, reject) => entry.file(resolve, reject));

/** A reader hands a folder out in portions; an empty one is the end. */
async function entriesOf(folder: FileSystemDirectoryEntry): Promise<FileSystemEntry[]> {
  const reader = folder.createReader();
  const all: FileSystemEntry[] = [];
  for (;;) {
    const portion = await new Promise<FileSystemEntry[]>((resolve, reject) => reader.readEntries(resolve, reject));
    if (portion.length === 0) return all;
    all.push(...portion);
  }
}
