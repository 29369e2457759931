import { layOutColumns, readColumn, whySkipped } from './fits-column.ts';
import { factsOfHeader } from './fits-facts.ts';
import { BLOCK, type FitsHeader, readHeader } from './fits-header.ts';
import { type RawColumn, type RawTable, Unreadable } from './raw-table.ts';

interface Hdu {
  readonly header: FitsHeader;
  readonly dataBytes: number;
}

/** The light-curve-like binary table of a FITS file (Standard 4.0, section 7.3). */
export function readFitsTable(bytes: Uint8Array, fileName: string): RawTable {
  const hdus = walkHdus(bytes, fileName);
  const tables = hdus.filter(({ header }) => header.get('XTENSION') === 'BINTABLE' && header.get('ZIMAGE') !== true);
  const chosen = tables.toSorted((a, b) => promise(b.header) - promise(a.header))[0];
  if (chosen === undefined || promise(chosen.header) < 0)
    throw new Unreadable(`${fileName} was not read. ${whatWasFound(hdus)} A binary table with rows was expected.`);
  return readTable(bytes, chosen, hdus[0]!.header, fileName);
}

/** Section 3.3: headers and data units follow one another in blocks of 2880 bytes. A last one may be cut short. */
function walkHdus(bytes: Uint8Array, fileName: string): Hdu[] {
  const hdus: Hdu[] = [];
  let at = 0;
  while (at + 80 <= bytes.length) {
    let header: FitsHeader;
    try {
      header = readHeader(bytes, at, fileName);
    } catch (cause) {
      // Whatever follows a whole HDU without being a header is no reason to refuse what came before.
      if (hdus.length > 0) return hdus;
      throw cause;
    }
    if (hdus.length > 0 && header.get('XTENSION') === undefined) return hdus;
    const dataBytes = dataSize(header);
    hdus.push({ header, dataBytes });
    at = header.end + Math.ceil(dataBytes / BLOCK) * BLOCK;
  }
  return hdus;
}

/** Section 4.4.1.1, equations 1 and 2. */
function dataSize(header: FitsHeader): number {
  const number = (keyword: string, otherwise: number) => Number(header.get(keyword) ?? otherwise);
  const axes = number('NAXIS', 0);
  if (!(axes > 0)) return 0;
  let elements = 1;
  for (let axis = 1; axis <= axes; axis += 1) elements *= number(`NAXIS${axis}`, 0);
  const size = (Math.abs(number('BITPIX', 8)) / 8) * number('GCOUNT', 1) * (number('PCOUNT', 0) + elements);
  return Number.isFinite(size) && size > 0 ? size : 0;
}

/** How much a table looks like a light curve: many rows, a column of times, one of flux; negative where it cannot be. */
function promise(header: FitsHeader): number {
  const fields = Number(header.get('TFIELDS') ?? 0);
  const rows = Number(header.get('NAXIS2') ?? 0);
  if (fields < 1 || rows < 1) return -1;
  const names = Array.from({ length: fields }, (_, i) => String(header.get(`TTYPE${i + 1}`) ?? '').toLowerCase());
  const has = (pattern: RegExp) => (names.some((name) => pattern.test(name)) ? 1 : 0);
  return 4 * has(/time|jd|date|^t$/) + 4 * has(/flux|mag/) + Math.min(1, rows / 1e6);
}

function whatWasFound(hdus: readonly Hdu[]): string {
  const kinds = hdus.map(({ header }, index) =>
    index === 0 ? (Number(header.get('NAXIS') ?? 0) > 0 ? 'an image' : '') : `an extension ${header.get('XTENSION')}`,
  );
  const found = kinds.filter(Boolean);
  return found.length === 0 ? 'The FITS file holds no data.' : `The FITS file holds ${found.join(', ')}.`;
}

function readTable(bytes: Uint8Array, { header }: Hdu, primary: FitsHeader, fileName: string): RawTable {
  const layout = layOutColumns(header);
  const rowBytes = Number(header.get('NAXIS1') ?? 0);
  const promised = Number(header.get('NAXIS2') ?? 0);
  const needed = layout?.reduce((sum, { width }) => sum + width, 0) ?? 0;
  if (layout === undefined)
    throw new Unreadable(`${fileName} was not read. A TFORM card names a form that FITS 4.0 does not know.`);
  if (needed > rowBytes)
    throw new Unreadable(`${fileName} was not read. Its columns need ${needed} bytes a row, NAXIS1 says ${rowBytes}.`);
  const rows = Math.min(promised, Math.max(0, Math.floor((bytes.length - header.end) / rowBytes)));
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const warnings: string[] = [];
  if (rows < promised)
    warnings.push(`${fileName} breaks off: ${rows} of ${promised} rows are there, ${promised - rows} are missing.`);
  const columns: RawColumn[] = [];
  for (const field of layout) {
    const reason = whySkipped(field);
    if (reason !== undefined) warnings.push(reason);
    else {
      const { column, inexact } = readColumn(field, header, view, { start: header.end, rowBytes, rows });
      columns.push(column);
      if (inexact > 0)
        warnings.push(
          `Column ${field.name}: ${inexact} integers are beyond 2^53 and were rounded to the nearest double.`,
        );
    }
  }
  return { columns, facts: factsOfHeader(header, primary), warnings };
}
