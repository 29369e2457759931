import { Unreadable } from './raw-table.ts';

/** One header of a FITS file: FITS Standard 4.0, section 4. */
export interface FitsHeader {
  /** Value of a keyword as written: string, number, boolean; undefined where absent or without value. */
  get(keyword: string): FitsValue | undefined;
  /** Comment after the slash. */
  commentOf(keyword: string): string | undefined;
  /** Texts of COMMENT and HISTORY cards. */
  readonly comments: readonly string[];
  /** First byte after the header's last block. */
  readonly end: number;
}

export type FitsValue = string | number | boolean;

const CARD = 80;
export const BLOCK = 2880;

/** @param start of a header's first card in `bytes` */
export function readHeader(bytes: Uint8Array, start: number, fileName: string): FitsHeader {
  const values = new Map<string, FitsValue | undefined>();
  const notes = new Map<string, string>();
  const comments: string[] = [];
  let continued: string | undefined;
  for (let at = start, number = 1; ; at += CARD, number += 1) {
    if (at + CARD > bytes.length)
      throw new Unreadable(`${fileName} was not read. Its FITS header breaks off at card ${number}, before END.`);
    const card = latin1(bytes, at, at + CARD);
    const keyword = keywordOf(card);
    if (keyword === 'END') return makeHeader(values, notes, comments, blockEnd(at + CARD, start));
    if (keyword === 'COMMENT' || keyword === 'HISTORY' || keyword === '') {
      comments.push(card.slice(8).trim());
    } else if (keyword === 'CONTINUE' && continued !== undefined) {
      const { value } = parseValue(card.slice(8));
      const before = String(values.get(continued) ?? '');
      if (typeof value === 'string') values.set(continued, before.replace(/&$/, '') + value);
    } else if (!values.has(keyword)) {
      const { value, comment } = parseValue(valueField(card, keyword));
      values.set(keyword, value);
      if (comment !== '') notes.set(keyword, comment);
      continued = typeof value === 'string' && value.endsWith('&') ? keyword : undefined;
    }
  }
}

function makeHeader(
  values: ReadonlyMap<string, FitsValue | undefined>,
  notes: ReadonlyMap<string, string>,
  comments: readonly string[],
  end: number,
): FitsHeader {
  return {
    get: (keyword) => {
      const value = values.get(keyword);
      return typeof value === 'string' ? value.replace(/&$/, '').trimEnd() : value;
    },
    commentOf: (keyword) => notes.get(keyword),
    comments,
    end,
  };
}

/** Section 4.1.2.1; HIERARCH cards by the registered convention. */
function keywordOf(card: string): string {
  if (card.startsWith('HIERARCH ')) return card.slice(9, card.indexOf('=') < 0 ? undefined : card.indexOf('=')).trim();
  return card.slice(0, 8).trim();
}

function valueField(card: string, keyword: string): string {
  if (card.startsWith('HIERARCH ')) return card.slice(card.indexOf('=') + 1);
  return card.slice(8, 10) === '= ' ? card.slice(10) : keyword === '' ? '' : card.slice(10);
}

/** Section 4.2: strings in quotes with doubled quotes inside, logicals, integers and reals (D exponents too). */
function parseValue(field: string): { value: FitsValue | undefined; comment: string } {
  const quoted = /^\s*'((?:[^']|'')*)'/.exec(field);
  if (quoted !== null)
    return { value: quoted[1]!.replaceAll("''", "'").trimEnd(), comment: commentIn(field.slice(quoted[0].length)) };
  const slash = field.indexOf('/');
  const text = (slash < 0 ? field : field.slice(0, slash)).trim();
  const comment = slash < 0 ? '' : field.slice(slash + 1).trim();
  if (text === 'T' || text === 'F') return { value: text === 'T', comment };
  const number = Number(text.replace(/[dD]/, 'e'));
  return { value: text === '' || Number.isNaN(number) ? undefined : number, comment };
}

function commentIn(rest: string): string {
  const slash = rest.indexOf('/');
  return slash < 0 ? '' : rest.slice(slash + 1).trim();
}

function blockEnd(at: number, start: number): number {
  return start + Math.ceil((at - start) / BLOCK) * BLOCK;
}

export function latin1(bytes: Uint8Array, start: number, end: number): string {
  let text = '';
  for (let i = start; i < end; i += 1) text += String.fromCharCode(bytes[i]!);
  return text;
}
