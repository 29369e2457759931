import { done, failed, type Outcome } from '../../src/contract/outcome.ts';
import type { ColumnPreview, FileFormat, ReadJob, ReadResult } from '../../src/contract/read-contract.ts';
import { buildLightCurve } from './build-light-curve.ts';
import { guessMapping } from './column-roles.ts';
import { summarise } from './column-values.ts';
import { latin1 } from './fits-header.ts';
import { readFitsTable } from './fits-table.ts';
import { readInstrumentTimes } from './instrument-table.ts';
import { type RawColumn, type RawTable, Unreadable } from './raw-table.ts';
import { readStars } from './stars-table.ts';
import { readTextTable } from './text-table.ts';
import { unzipIfGzip } from './unzip-gzip.ts';

/** What a file holds, whatever it is called. A file that cannot be read is an outcome with its sentence. */
export async function readFile(job: ReadJob): Promise<Outcome<ReadResult>> {
  const { fileName, mapping } = job;
  try {
    const sha256 = await hashOf(job.bytes);
    const bytes = unzipIfGzip(new Uint8Array(job.bytes), fileName);
    const format = formatOf(bytes, fileName);
    const table =
      format === 'fits' ? readFitsTable(bytes, fileName) : readTextTable(new TextDecoder().decode(bytes), fileName);
    return done(understand(table, { fileName, format, sha256, mapping }));
  } catch (cause) {
    if (cause instanceof Unreadable) return failed(cause.message);
    const detail = cause instanceof Error ? cause.stack : String(cause);
    return failed(`${fileName} was not read. The reader broke on it, which is a fault of Candling.`, detail);
  }
}

function understand(
  table: RawTable,
  file: Pick<ReadJob, 'fileName' | 'mapping'> & { readonly format: FileFormat; readonly sha256: string },
): ReadResult {
  const { fileName, format, sha256 } = file;
  const label = table.facts.object ?? fileName.replace(/(\.gz)?$/, '').replace(/\.[^.]+$/, '');
  const columns = table.columns.map(previewOf);
  const guess = guessMapping(table);
  if (file.mapping === undefined && guess.question !== undefined) {
    const rows = readStars(table);
    if (rows !== undefined) return { kind: 'stars', rows, sha256, warnings: table.warnings };
    const instrument = readInstrumentTimes(table);
    if (instrument !== undefined)
      return { kind: 'instrument times', sha256, ...describeSpans(instrument, table, fileName) };
    if (table.columns.length < 2)
      throw new Unreadable(`${fileName} was not read. It has one column; time and flux need two.`);
    return { kind: 'question', format, sentence: guess.question, mapping: guess.mapping, columns, sha256, label };
  }
  const mapping = file.mapping ?? guess.mapping;
  const built = buildLightCurve(table, mapping, fileName);
  // What the guess says of time is about the guess: the analyst's own mapping stands without it.
  const guessed = file.mapping === undefined ? guess.warnings : [];
  const warnings = [...table.warnings, ...guessed, ...built.warnings];
  const { lightCurve } = built;
  return { kind: 'light curve', format, lightCurve, mapping, columns, sha256, label, star: table.facts.star, warnings };
}

function describeSpans(
  { spans, leftOut }: NonNullable<ReturnType<typeof readInstrumentTimes>>,
  table: RawTable,
  fileName: string,
) {
  if (spans.length === 0)
    throw new Unreadable(
      `${fileName} was not read. None of its rows has a start and a later end of a time of the instrument.`,
    );
  const rows = leftOut === 1 ? '1 row' : `${leftOut} rows`;
  const left =
    leftOut === 0
      ? []
      : [`${fileName}: ${rows} without a start and a later end ${leftOut === 1 ? 'was' : 'were'} left out.`];
  return { spans, warnings: [...table.warnings, ...left] };
}

const MAGIC: readonly { readonly bytes: readonly number[]; readonly name: string }[] = [
  { bytes: [0x89, 0x50, 0x4e, 0x47], name: 'a PNG picture' },
  { bytes: [0xff, 0xd8, 0xff], name: 'a JPEG picture' },
  { bytes: [0x25, 0x50, 0x44, 0x46], name: 'a PDF document' },
  { bytes: [0x50, 0x4b, 0x03, 0x04], name: 'a zip archive' },
  { bytes: [0x89, 0x48, 0x44, 0x46], name: 'an HDF5 file' },
];

function formatOf(bytes: Uint8Array, fileName: string): FileFormat {
  if (bytes.length === 0) throw new Unreadable(`${fileName} was not read. The file is empty.`);
  if (/^SIMPLE {2}= +T/.test(latin1(bytes, 0, Math.min(80, bytes.length)))) return 'fits';
  const known = MAGIC.find((magic) => magic.bytes.every((byte, index) => bytes[index] === byte));
  const expected = 'A FITS table or a text table was expected.';
  if (known !== undefined) throw new Unreadable(`${fileName} was not read. It is ${known.name}. ${expected}`);
  if (bytes.subarray(0, 4096).includes(0))
    throw new Unreadable(`${fileName} was not read. It is neither FITS nor text. ${expected}`);
  return 'text';
}

async function hashOf(bytes: ArrayBuffer): Promise<string> {
  const digest = await globalThis.crypto.subtle.digest('SHA-256', bytes);
  return Array.from(new Uint8Array(digest), (byte) => byte.toString(16).padStart(2, '0')).join('');
}

const SAMPLES = 3;

function previewOf({ name, unit, values, texts }: RawColumn): ColumnPreview {
  const { smallest, largest, missing } = summarise(values);
  const sample = Array.from(
    { length: Math.min(SAMPLES, values.length) },
    (_, row) => texts?.[row] ?? String(values[row]),
  );
  const range = texts === undefined && Number.isFinite(smallest) ? { smallest, largest } : undefined;
  return { name, unit, sample, smallest: range?.smallest, largest: range?.largest, missing: texts ? 0 : missing };
}
