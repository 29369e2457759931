import type { ColumnAssignment, FileMapping } from '../../src/core/file-mapping.ts';
import type { FluxColumn, LightCurve } from '../../src/core/light-curve.ts';
import { type RawColumn, type RawTable, Unreadable } from './raw-table.ts';

const SECONDS = 86400;
/** A pause longer than half a day and twenty cadences begins a new segment. */
const SEGMENT_DAYS = 0.5;
const SEGMENT_CADENCES = 20;

/** The light curve of a table read with a mapping: sorted by time, rows without a time left out and counted. */
export function buildLightCurve(
  table: RawTable,
  mapping: FileMapping,
  fileName: string,
): { readonly lightCurve: LightCurve; readonly warnings: readonly string[] } {
  const columnOf = (name: string): RawColumn => {
    const column = table.columns.find((candidate) => candidate.name === name);
    if (column === undefined) throw new Unreadable(`${fileName} was not read. It has no column named ${name}.`);
    return column;
  };
  const ofRole = (role: ColumnAssignment['role']) => mapping.columns.filter((assignment) => assignment.role === role);
  const timeColumn = ofRole('time')[0];
  if (timeColumn === undefined) throw new Unreadable(`${fileName} was not read. No column is chosen as time.`);
  if (ofRole('flux').length === 0) throw new Unreadable(`${fileName} was not read. No column is chosen as flux.`);

  const stored = columnOf(timeColumn.column).values;
  const order = orderByTime(stored);
  if (order.length === 0) throw new Unreadable(`${fileName} was not read. Column ${timeColumn.column} holds no times.`);
  const inOrder = (values: Float64Array) => Float64Array.from(order, (row) => values[row]!);
  const { time, zeroJd } = rebase(inOrder(stored), mapping);
  const quality = ofRole('quality').map(({ column }) => inOrder(columnOf(column).values));
  const fluxColumns = ofRole('flux').map((flux) => makeFlux(flux, mapping, columnOf, inOrder));
  const covariates = Object.fromEntries(
    ofRole('covariate').map(({ column }) => [column, inOrder(columnOf(column).values)]),
  );
  const lightCurve: LightCurve = {
    time,
    timeReference: { ...mapping.timeReference, zeroJd },
    exposureDays: mapping.exposureDays,
    stamp: mapping.stamp,
    passband: mapping.passband,
    fluxColumns,
    quality: joinFlags(quality, time.length),
    hasQuality: quality.length > 0,
    covariates,
    segmentStarts: findSegments(time),
  };
  return { lightCurve, warnings: [...droppedRows(stored, order, fileName), ...repeatedTimes(time)] };
}

/** Row numbers in order of time; rows without a time are not among them, equal times keep their order. */
function orderByTime(time: Float64Array): number[] {
  const rows: number[] = [];
  for (let row = 0; row < time.length; row += 1) if (Number.isFinite(time[row]!)) rows.push(row);
  return rows.sort((a, b) => time[a]! - time[b]! || a - b);
}

/** Days, and full Julian dates counted from a whole thousand: subtracting it is exact, and later sums keep their digits. */
function rebase(time: Float64Array, mapping: FileMapping): { time: Float64Array; zeroJd: number | undefined } {
  const days = mapping.timeUnit === 'second' ? time.map((seconds) => seconds / SECONDS) : time;
  const { zeroJd } = mapping.timeReference;
  if (zeroJd !== 0) return { time: days, zeroJd };
  const thousand = Math.floor(days[0]! / 1000) * 1000;
  return { time: days.map((day) => day - thousand), zeroJd: thousand };
}

function makeFlux(
  flux: ColumnAssignment,
  mapping: FileMapping,
  columnOf: (name: string) => RawColumn,
  inOrder: (values: Float64Array) => Float64Array,
): FluxColumn {
  const errors = mapping.columns.filter(({ role }) => role === 'flux error');
  const own =
    errors.find(({ errorOf }) => errorOf === flux.column) ?? errors.find(({ errorOf }) => errorOf === undefined);
  return {
    name: flux.column,
    flux: inOrder(columnOf(flux.column).values),
    error: own && inOrder(columnOf(own.column).values),
    meaning: flux.meaning ?? 'unknown',
    unit: flux.unit ?? 'unknown',
  };
}

/** Flags of several columns are one set of bits; a missing flag is no flag. */
function joinFlags(columns: readonly Float64Array[], length: number): Int32Array {
  const flags = new Int32Array(length);
  for (const column of columns) for (let i = 0; i < length; i += 1) flags[i]! |= column[i]!;
  return flags;
}

function findSegments(time: Float64Array): Int32Array {
  const steps = time.slice(1).map((value, index) => value - time[index]!);
  const cadence = steps.toSorted()[steps.length >> 1] ?? 0;
  const pause = Math.max(SEGMENT_DAYS, SEGMENT_CADENCES * cadence);
  const starts = [0];
  for (const [index, step] of steps.entries()) if (step > pause) starts.push(index + 1);
  return Int32Array.from(starts);
}

function droppedRows(stored: Float64Array, order: readonly number[], fileName: string): string[] {
  const dropped = stored.length - order.length;
  return dropped === 0 ? [] : [`${fileName}: ${dropped} of ${stored.length} rows have no time and were left out.`];
}

function repeatedTimes(time: Float64Array): string[] {
  let repeated = 0;
  for (let i = 1; i < time.length; i += 1) if (time[i] === time[i - 1]) repeated += 1;
  return repeated === 0 ? [] : [`${repeated} times occur more than once; all their points are kept.`];
}
