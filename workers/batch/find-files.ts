import { readdir, realpath, stat } from 'node:fs/promises';
import { basename, join, resolve } from 'node:path';

/** A file to be read: named by the caller, or met in a folder. */
export interface FoundFile {
  readonly path: string;
  readonly fileName: string;
  /** Undefined for what was named itself. */
  readonly folder: string | undefined;
}

/** What a folder's file of such a name fails at is reported as a failure; anything else there is no table. */
const TABLE_NAME = /\.(fits?|fts|csv|tsv|dat|ecsv|tbl|lc)(\.gz)?$/i;

/** A file that was named, or that by its name should be a table: not to read it is a failure and no skip. */
export const isExpected = ({ fileName, folder }: FoundFile): boolean =>
  folder === undefined || TABLE_NAME.test(fileName);

/**
 * Every file of the paths, folders walked to their ends, each once, in the order of its full path whatever the order
 * of the arguments. Names that begin with a dot, sessions and what broken sweeps leave are passed over.
 *
 * @returns a sentence where a path cannot be read
 */
export async function findFiles(paths: readonly string[], from: string): Promise<readonly FoundFile[] | string> {
  const found = new Map<string, FoundFile>();
  for (const given of paths) {
    const path = resolve(from, given);
    try {
      const isFolder = (await stat(path)).isDirectory();
      const files = isFolder ? await walk(path) : [{ path, fileName: basename(path), folder: undefined }];
      for (const file of files) await addOnce(found, file);
    } catch (cause) {
      return `${given} cannot be read: ${reasonOf(cause)}.`;
    }
  }
  return [...found.values()].sort((a, b) => (a.path < b.path ? -1 : 1));
}

/** A file that was named stays named, though its folder is given too. */
async function addOnce(found: Map<string, FoundFile>, file: FoundFile): Promise<void> {
  const real = await realpath(file.path);
  const before = found.get(real);
  if (before === undefined || file.folder === undefined) found.set(real, file);
}

async function walk(folder: string): Promise<FoundFile[]> {
  const entries = await readdir(folder, { withFileTypes: true });
  const files: FoundFile[] = [];
  for (const entry of entries) {
    const path = join(folder, entry.name);
    if (entry.name.startsWith('.') || /\.candling\.json(\.partial)?$/.test(entry.name)) continue;
    if (entry.isDirectory()) files.push(...(await walk(path)));
    // A link to a folder is not followed: it may lead round in a circle.
    else if (entry.isFile() || (entry.isSymbolicLink() && (await isFile(path))))
      files.push({ path, fileName: entry.name, folder });
  }
  return files;
}

const isFile = (path: string): Promise<boolean> =>
  stat(path).then(
    (found) => found.isFile(),
    () => false,
  );

/** What the system said, in words for the two usual cases. */
export function reasonOf(cause: unknown): string {
  const code = (cause as NodeJS.ErrnoException).code;
  if (code === 'ENOENT') return 'there is no such file or folder';
  if (code === 'EACCES' || code === 'EPERM') return 'it may not be read or written';
  return cause instanceof Error ? cause.message : String(cause);
}
