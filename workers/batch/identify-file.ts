import { done, failed, type Outcome } from '../../src/contract/outcome.ts';
import type { InstrumentSpan, StarRow } from '../../src/contract/read-contract.ts';
import { readFile } from '../read/read-file.ts';

/** What a file holds, without its flux: enough to find its star and to tell it from others. */
export type Identified =
  | { readonly kind: 'light curve'; readonly label: string; readonly sha256: string }
  | { readonly kind: 'stars'; readonly rows: readonly StarRow[] }
  | { readonly kind: 'instrument times'; readonly spans: readonly InstrumentSpan[] };

/** A file that a person would be asked about is a failed outcome: a sweep asks nobody. */
export async function identifyFile(fileName: string, bytes: ArrayBuffer): Promise<Outcome<Identified>> {
  const read = await readFile({ jobId: fileName, fileName, bytes });
  if (read.kind !== 'done') return read;
  const { value } = read;
  switch (value.kind) {
    case 'light curve':
      return done({ kind: value.kind, label: value.label, sha256: value.sha256 });
    case 'stars':
      return done({ kind: value.kind, rows: value.rows });
    case 'instrument times':
      return done({ kind: value.kind, spans: value.spans });
    case 'question':
      return failed(questionWords(fileName, value.sentence));
  }
}

export const questionWords = (fileName: string, sentence: string): string =>
  `${fileName} was not swept. ${sentence} A sweep asks nobody: open the file in Candling.`;
