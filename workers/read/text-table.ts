import { readNumber } from './numeric-text.ts';
import { type RawColumn, type RawTable, Unreadable } from './raw-table.ts';
import { factsOfComments } from './text-facts.ts';

type Separator = ',' | ';' | '\t' | 'space';

/** One line of a text file that holds values, with its number in the file (from 1). */
interface Line {
  readonly text: string;
  readonly number: number;
}

/** A CSV, TSV, semicolon or whitespace table, with or without a header, comments marked by #. */
export function readTextTable(text: string, fileName: string): RawTable {
  const { comments, lines } = splitLines(text);
  if (lines.length === 0) throw new Unreadable(`${fileName} was not read. It holds no rows of values.`);
  const separator = chooseSeparator(lines);
  const cut = (line: Line) => splitCells(line.text, separator);
  const first = cut(lines[0]!);
  const headed = first.some((cell) => readNumber(cell) === undefined);
  const body = headed ? lines.slice(1) : lines;
  if (body.length === 0) throw new Unreadable(`${fileName} was not read. There are no rows below its header.`);
  const hidden = headed ? undefined : hiddenHeader(comments, first.length);
  const names = nameColumns(headed ? first : hidden, first.length);
  const rows = body.map(cut);
  const width = commonWidth(rows, names.length, body, fileName);
  const kept = names.slice(0, width);
  return {
    columns: kept.map(({ name, unit }, at) => makeColumn(name, unit, rows, at)),
    facts: factsOfComments(comments),
    warnings: [],
  };
}

function splitLines(text: string): { comments: string[]; lines: Line[] } {
  const comments: string[] = [];
  const lines: Line[] = [];
  const all = text.replace(/^\ufeff/, '').split(/\r\n|\n|\r/);
  for (const [index, line] of all.entries()) {
    if (line.trim() === '') continue;
    if (line.trimStart().startsWith('#')) comments.push(line.trimStart().replace(/^#+/, '').trim());
    else lines.push({ text: line, number: index + 1 });
  }
  return { comments, lines };
}

/** The separator that most of the first lines agree on, in the same number; whitespace where none occurs. */
function chooseSeparator(lines: readonly Line[]): Separator {
  const sample = lines.slice(0, 50);
  for (const separator of ['\t', ';', ','] as const) {
    const counts = sample.map(({ text }) => splitCells(text, separator).length);
    if (counts.filter((count) => count > 1).length > sample.length / 2) return separator;
  }
  return 'space';
}

/** Cells of a line; a quoted cell may hold separators and doubled quotes. */
function splitCells(text: string, separator: Separator): string[] {
  if (!text.includes('"'))
    return separator === 'space' ? text.trim().split(/\s+/) : text.split(separator).map((cell) => cell.trim());
  const pattern = separator === 'space' ? /"((?:[^"]|"")*)"|(\S+)/g : quotedPattern(separator);
  const cells: string[] = [];
  for (const match of text.matchAll(pattern)) cells.push((match[1]?.replaceAll('""', '"') ?? match[2] ?? '').trim());
  return cells;
}

function quotedPattern(separator: string): RegExp {
  return new RegExp(`(?<=^|${separator})\\s*(?:"((?:[^"]|"")*)"\\s*|([^${separator}]*))(?=${separator}|$)`, 'g');
}

interface ColumnName {
  readonly name: string;
  readonly unit: string | undefined;
}

/** The last comment that has as many words as the table has columns, none of them a number, is its header. */
function hiddenHeader(comments: readonly string[], width: number): readonly string[] | undefined {
  return comments
    .map((comment) => splitCells(comment, comment.includes(',') ? ',' : comment.includes(';') ? ';' : 'space'))
    .findLast(
      (cells) => cells.length === width && cells.every((cell) => cell !== '' && readNumber(cell) === undefined),
    );
}

/** "flux [ppm]" and "flux (ppm)" carry a unit; an unnamed column is named by its place, a repeated name numbered. */
function nameColumns(header: readonly string[] | undefined, width: number): ColumnName[] {
  const cells = header ?? Array.from({ length: width }, () => '');
  const seen = new Map<string, number>();
  return cells.map((cell, index) => {
    const withUnit = /^(.*?)\s*[[(]([^\])]+)[\])]\s*$/.exec(cell);
    const bare = (withUnit?.[1] ?? cell).trim() || `column ${index + 1}`;
    const count = (seen.get(bare) ?? 0) + 1;
    seen.set(bare, count);
    return { name: count === 1 ? bare : `${bare} ${count}`, unit: withUnit?.[2]?.trim() };
  });
}

/** Rows must agree in width; a last cell that is empty in every row (or missing in the header) does not count. */
function commonWidth(rows: readonly string[][], named: number, lines: readonly Line[], fileName: string): number {
  const emptyLast = rows.every((row) => row.length < named || (row.at(-1) ?? '') === '') ? 1 : 0;
  for (const [index, row] of rows.entries()) {
    const width = row.at(-1) === '' && row.length > named - emptyLast ? row.length - 1 : row.length;
    if (width === named || width === named - emptyLast || row.length === named) continue;
    const { number } = lines[index]!;
    throw new Unreadable(
      `${fileName} was not read. Line ${number} has ${row.length} ${row.length === 1 ? 'column' : 'columns'}, ` +
        `the header names ${named}. Correct the line, or the header.`,
    );
  }
  return named;
}

function makeColumn(name: string, unit: string | undefined, rows: readonly string[][], at: number): RawColumn {
  const values = new Float64Array(rows.length);
  let words = 0;
  for (const [row, cells] of rows.entries()) {
    const value = readNumber(cells[at] ?? '');
    if (value === undefined) words += 1;
    values[row] = value ?? Number.NaN;
  }
  const texts = words > 0 ? rows.map((cells) => cells[at] ?? '') : undefined;
  return { name, unit, comment: undefined, values, texts };
}
