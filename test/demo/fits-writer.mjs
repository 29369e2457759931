/**
 * Writes FITS files with binary tables, for tests and for the demo docket.
 * Source: FITS Standard 4.0 (2018), sections 3 (blocks), 4.1-4.2 (cards), 4.4.1 (order of keywords), 7.3 (tables).
 */

/**
 * @typedef {object} Card
 * @property {string} key up to 8 characters; COMMENT and HISTORY take their text as value
 * @property {string | number | boolean | undefined} value undefined writes a card whose value is undefined (4.1.2.3)
 * @property {string} [comment]
 * @property {boolean} [real] write an integral number as a real ("0.0")
 */

/**
 * @typedef {object} Column
 * @property {string} name
 * @property {'D' | 'E' | 'J' | 'I'} format
 * @property {ArrayLike<number>} values physical values; NaN is a missing one
 * @property {string} [unit]
 * @property {string} [comment]
 * @property {number} [scale] TSCALn: physical = TZEROn + TSCALn * stored
 * @property {number} [zero] TZEROn
 * @property {number} [nullValue] TNULLn, the stored number of a missing value; integer columns only
 */

/** @typedef {{ name: string, columns: readonly Column[], cards?: readonly Card[] }} Table */

const BLOCK_BYTES = 2880;
const CARD_CHARACTERS = 80;
/** @type {Record<Column['format'], number>} */
const FORMAT_BYTES = { D: 8, E: 4, J: 4, I: 2 };
const INTEGER_LIMITS = { J: 2147483647, I: 32767 };

/**
 * A whole file: a primary header without data, then one binary table after another.
 *
 * @param {{ primary?: readonly Card[], tables: readonly Table[] }} file
 * @returns {Uint8Array} a multiple of 2880 bytes
 */
export function writeFits({ primary = [], tables }) {
  const parts = [encodeHeader([...primaryCards(), ...primary])];
  for (const table of tables) {
    parts.push(encodeHeader([...tableCards(table), ...(table.cards ?? [])]), encodeRows(table));
  }
  return joinBytes(parts);
}

/** @returns {Card[]} */
function primaryCards() {
  return [
    { key: 'SIMPLE', value: true, comment: 'conforms to FITS standard' },
    { key: 'BITPIX', value: 8, comment: 'array data type' },
    { key: 'NAXIS', value: 0, comment: 'no primary data array' },
    { key: 'EXTEND', value: true, comment: 'file contains extensions' },
  ];
}

/** @param {Table} table @returns {Card[]} */
function tableCards({ name, columns }) {
  return [
    { key: 'XTENSION', value: 'BINTABLE', comment: 'binary table extension' },
    { key: 'BITPIX', value: 8, comment: '8-bit bytes' },
    { key: 'NAXIS', value: 2, comment: 'two-dimensional table' },
    { key: 'NAXIS1', value: rowBytes(columns), comment: 'bytes in a row' },
    { key: 'NAXIS2', value: rowCount(columns), comment: 'rows' },
    { key: 'PCOUNT', value: 0, comment: 'no heap' },
    { key: 'GCOUNT', value: 1, comment: 'one group' },
    { key: 'TFIELDS', value: columns.length, comment: 'columns' },
    ...columns.flatMap(columnCards),
    { key: 'EXTNAME', value: name, comment: 'name of this table' },
  ];
}

/** @param {Column} column @param {number} index @returns {Card[]} */
function columnCards({ name, format, unit, comment, scale, zero, nullValue }, index) {
  const n = index + 1;
  /** @type {Card[]} */
  const cards = [
    { key: `TTYPE${n}`, value: name, comment: comment ?? '' },
    { key: `TFORM${n}`, value: `1${format}` },
  ];
  if (unit !== undefined) cards.push({ key: `TUNIT${n}`, value: unit });
  if (scale !== undefined) cards.push({ key: `TSCAL${n}`, value: scale, real: true });
  if (zero !== undefined) cards.push({ key: `TZERO${n}`, value: zero, real: true });
  if (nullValue !== undefined) cards.push({ key: `TNULL${n}`, value: nullValue });
  return cards;
}

/** @param {readonly Column[]} columns */
const rowBytes = (columns) => columns.reduce((sum, { format }) => sum + FORMAT_BYTES[format], 0);

/** @param {readonly Column[]} columns */
function rowCount(columns) {
  const counts = new Set(columns.map(({ values }) => values.length));
  if (counts.size > 1) throw new Error(`Columns of one table differ in length: ${[...counts].join(', ')}.`);
  return columns[0]?.values.length ?? 0;
}

/** @param {readonly Card[]} cards */
function encodeHeader(cards) {
  const text = `${cards.map(formatCard).join('')}${'END'.padEnd(CARD_CHARACTERS)}`;
  const bytes = new Uint8Array(wholeBlocks(text.length)).fill(0x20);
  for (let i = 0; i < text.length; i += 1) bytes[i] = text.charCodeAt(i);
  return bytes;
}

/**
 * One 80-character card, fixed format (FITS 4.0, section 4.2).
 *
 * @param {Card} card
 */
export function formatCard({ key, value, comment, real }) {
  if (!/^[A-Z0-9_-]{1,8}$/.test(key)) throw new Error(`"${key}" is not a FITS keyword.`);
  const start = key.padEnd(8);
  if (key === 'COMMENT' || key === 'HISTORY') return fitCard(`${start}${value}`);
  const body = `${start}= ${formatValue(value, real ?? false)}`;
  return fitCard(comment ? `${body} / ${comment}` : body);
}

/** @param {string} text */
function fitCard(text) {
  if (!/^[\x20-\x7e]*$/.test(text)) throw new Error(`A FITS card is plain ASCII: "${text}".`);
  if (text.length > CARD_CHARACTERS) throw new Error(`A FITS card has 80 characters, this has more: "${text}".`);
  return text.padEnd(CARD_CHARACTERS);
}

/** @param {Card['value']} value @param {boolean} real */
function formatValue(value, real) {
  if (value === undefined) return ''.padEnd(20);
  if (typeof value === 'string') return `'${value.replaceAll("'", "''").padEnd(8)}'`.padEnd(20);
  if (typeof value === 'boolean') return (value ? 'T' : 'F').padStart(20);
  if (!Number.isFinite(value)) throw new Error('A FITS card cannot hold a number that is not finite.');
  return (real ? formatReal(value) : formatNumber(value)).padStart(20);
}

/** @param {number} value */
const formatNumber = (value) => (Number.isInteger(value) ? String(value) : formatReal(value));

/** Shortest decimal that reads back as the same double, with the point that a FITS real needs. @param {number} value */
function formatReal(value) {
  const [digits, exponent] = String(value).split('e');
  const mantissa = digits?.includes('.') ? digits : `${digits}.0`;
  return exponent === undefined ? mantissa : `${mantissa}E${exponent.replace('+', '')}`;
}

/** @param {Table} table */
function encodeRows({ columns }) {
  const stride = rowBytes(columns);
  const bytes = new Uint8Array(wholeBlocks(stride * rowCount(columns)));
  const view = new DataView(bytes.buffer);
  let offset = 0;
  for (const column of columns) {
    encodeColumn(view, column, offset, stride);
    offset += FORMAT_BYTES[column.format];
  }
  return bytes;
}

/** @param {DataView} view @param {Column} column @param {number} offset @param {number} stride */
function encodeColumn(view, column, offset, stride) {
  const { format, values } = column;
  for (let row = 0; row < values.length; row += 1) {
    const at = offset + row * stride;
    const physical = Number(values[row]);
    if (format === 'D') view.setFloat64(at, unscale(column, physical));
    else if (format === 'E') view.setFloat32(at, unscale(column, physical));
    else if (format === 'J') view.setInt32(at, toInteger(column, format, physical, row));
    else view.setInt16(at, toInteger(column, format, physical, row));
  }
}

/** @param {Column} column @param {number} physical */
const unscale = ({ scale = 1, zero = 0 }, physical) => (physical - zero) / scale;

/** @param {Column} column @param {'J' | 'I'} format @param {number} physical @param {number} row */
function toInteger(column, format, physical, row) {
  if (Number.isNaN(physical)) {
    if (column.nullValue !== undefined) return column.nullValue;
    throw new Error(`Column ${column.name}, row ${row + 1}: a missing value needs a nullValue.`);
  }
  const stored = Math.round(unscale(column, physical));
  const limit = INTEGER_LIMITS[format];
  if (stored > limit || stored < -limit - 1 || stored === column.nullValue) {
    throw new Error(`Column ${column.name}, row ${row + 1}: ${physical} does not fit format ${format}.`);
  }
  return stored;
}

/** @param {number} bytes */
const wholeBlocks = (bytes) => Math.ceil(bytes / BLOCK_BYTES) * BLOCK_BYTES;

/** @param {readonly Uint8Array[]} parts */
function joinBytes(parts) {
  const whole = new Uint8Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    whole.set(part, at);
    at += part.length;
  }
  return whole;
}
