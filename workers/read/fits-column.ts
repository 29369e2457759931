import { type FitsHeader, latin1 } from './fits-header.ts';
import type { RawColumn } from './raw-table.ts';

/** Bytes of one element of each TFORM letter: FITS Standard 4.0, table 18. */
const ELEMENT_BYTES: Readonly<Record<string, number>> = {
  L: 1,
  B: 1,
  I: 2,
  J: 4,
  K: 8,
  A: 1,
  E: 4,
  D: 8,
  C: 8,
  M: 16,
  P: 8,
  Q: 16,
};

export interface FitsColumn {
  readonly number: number;
  readonly name: string;
  readonly letter: string;
  readonly repeat: number;
  readonly width: number;
  /** Offset in a row. */
  readonly offset: number;
}

/** Where each column lies in a row; undefined for a form that the standard does not know. */
export function layOutColumns(header: FitsHeader): FitsColumn[] | undefined {
  const fields = Number(header.get('TFIELDS') ?? 0);
  const columns: FitsColumn[] = [];
  let offset = 0;
  for (let number = 1; number <= fields; number += 1) {
    const form = /^(\d*)([LXBIJKAEDCMPQ])/.exec(String(header.get(`TFORM${number}`) ?? '').trim());
    if (form === null) return undefined;
    const repeat = form[1] === '' ? 1 : Number(form[1]);
    const letter = form[2]!;
    const width = letter === 'X' ? Math.ceil(repeat / 8) : repeat * ELEMENT_BYTES[letter]!;
    const name = String(header.get(`TTYPE${number}`) ?? '').trim() || `column ${number}`;
    columns.push({ number, name, letter, repeat, width, offset });
    offset += width;
  }
  return columns;
}

/** Why a column cannot be a series of one value a row; undefined where it can. */
export function whySkipped({ name, letter, repeat }: FitsColumn): string | undefined {
  if (letter === 'C' || letter === 'M') return `Column ${name} holds complex numbers and was left out.`;
  if (letter === 'P' || letter === 'Q') return `Column ${name} holds arrays of varying length and was left out.`;
  if (repeat === 0) return `Column ${name} is empty and was left out.`;
  if (letter !== 'A' && letter !== 'X' && repeat !== 1)
    return `Column ${name} holds ${repeat} values in each row and was left out.`;
  if (letter === 'X' && repeat > 32) return `Column ${name} holds ${repeat} bits in each row and was left out.`;
  return undefined;
}

/**
 * Values of one column, bit for bit: a stored integer equal to TNULL is missing, otherwise
 * value = TZERO + TSCAL * stored (sections 7.3.2 and 7.3.3). Big-endian.
 */
export function readColumn(
  column: FitsColumn,
  header: FitsHeader,
  view: DataView,
  table: { readonly start: number; readonly rowBytes: number; readonly rows: number },
): { readonly column: RawColumn; readonly inexact: number } {
  const { number, name, letter } = column;
  const values = new Float64Array(table.rows);
  const texts: string[] | undefined = letter === 'A' ? [] : undefined;
  const scale = Number(header.get(`TSCAL${number}`) ?? 1);
  const zero = Number(header.get(`TZERO${number}`) ?? 0);
  const isNull = nullTest(header.get(`TNULL${number}`), letter);
  const scaled = 'BIJKED'.includes(letter) && (scale !== 1 || zero !== 0);
  let inexact = 0;
  for (let row = 0; row < table.rows; row += 1) {
    const at = table.start + row * table.rowBytes + column.offset;
    if (texts !== undefined) {
      texts.push(textAt(view, at, column.width));
      values[row] = Number.NaN;
      continue;
    }
    const stored = storedAt(view, at, column);
    if (typeof stored === 'bigint') {
      const value = isNull(Number(stored)) ? Number.NaN : wideInteger(stored, scale, zero);
      values[row] = value;
      if (stored > MOST_EXACT || stored < -MOST_EXACT) inexact += 1;
    } else values[row] = isNull(stored) ? Number.NaN : scaled ? zero + scale * stored : stored;
  }
  const unit = String(header.get(`TUNIT${number}`) ?? '').trim() || undefined;
  return { column: { name, unit, comment: header.commentOf(`TTYPE${number}`), values, texts }, inexact };
}

const MOST_EXACT = BigInt(Number.MAX_SAFE_INTEGER);

/** An unsigned 64-bit column (TZERO 2^63) is put together exactly before it becomes a double. */
function wideInteger(stored: bigint, scale: number, zero: number): number {
  if (scale === 1 && Number.isInteger(zero)) return Number(stored + BigInt(zero));
  return zero + scale * Number(stored);
}

function nullTest(tnull: unknown, letter: string): (stored: number) => boolean {
  // TNULL is defined for integer columns only; other letters have NaN.
  if (typeof tnull !== 'number' || !'BIJK'.includes(letter)) return () => false;
  return (stored) => stored === tnull;
}

function storedAt(view: DataView, at: number, { letter, repeat }: FitsColumn): number | bigint {
  switch (letter) {
    case 'L':
      return logical(view.getUint8(at));
    case 'X':
      return bitsAt(view, at, repeat);
    case 'B':
      return view.getUint8(at);
    case 'I':
      return view.getInt16(at);
    case 'J':
      return view.getInt32(at);
    case 'K':
      return view.getBigInt64(at);
    case 'E':
      return view.getFloat32(at);
    default:
      return view.getFloat64(at);
  }
}

function logical(byte: number): number {
  if (byte === 84) return 1;
  return byte === 70 ? 0 : Number.NaN;
}

/** Bits from the most significant one on, as an unsigned number. */
function bitsAt(view: DataView, at: number, count: number): number {
  let value = 0;
  for (let bit = 0; bit < count; bit += 1)
    value = value * 2 + ((view.getUint8(at + (bit >> 3)) >> (7 - (bit & 7))) & 1);
  return value;
}

/** A string ends at its first null byte; trailing spaces do not count. */
function textAt(view: DataView, at: number, width: number): string {
  const text = latin1(new Uint8Array(view.buffer, view.byteOffset + at, width), 0, width);
  const end = text.indexOf('\0');
  return (end < 0 ? text : text.slice(0, end)).trimEnd();
}
