/** Hands a text to the browser as a file to be saved. */
export function saveFile(name: string, text: string, type: string): void {
  const url = URL.createObjectURL(new Blob([text], { type }));
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  link.click();
  // The click has already taken the file; the address is not needed past this turn.
  setTimeout(() => URL.revokeObjectURL(url), 10_000);
}

/** A name for a file from a session's: what file systems refuse becomes a hyphen. */
export function fileStem(name: string): string {
  const stem = name
    .normalize('NFKD')
    .replace(/[^\p{L}\p{N}._-]+/gu, '-')
    .replace(/^[-.]+|[-.]+$/g, '');
  return stem === '' ? 'session' : stem.slice(0, 80);
}
