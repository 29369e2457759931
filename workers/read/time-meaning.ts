import type { TimeFrame, TimeReference, TimeScale } from '../../src/core/light-curve.ts';
import { summarise } from './column-values.ts';
import { scaleOf, unitOf } from './fits-facts.ts';
import type { FileFacts, RawColumn } from './raw-table.ts';
import { timeMeaning } from './text-facts.ts';

const SECONDS = 86400;
/** Julian dates of the years 1900 and 2132: outside, a light curve's time is not what it is said to be. */
const EARLIEST_JD = 2415020;
const LATEST_JD = 2500000;

export interface TimeUnderstanding {
  readonly unit: 'day' | 'second';
  /** Of the numbers in the file. */
  readonly reference: TimeReference;
  readonly reason: string;
  readonly warnings: readonly string[];
}

/** What the time column counts from, from the header, its unit, its comment and its name; values only contradict. */
export function readTimeMeaning(column: RawColumn | undefined, facts: FileFacts): TimeUnderstanding {
  const unknown: TimeReference = { zeroJd: undefined, scale: facts.scale, frame: facts.frame };
  if (column === undefined) return { unit: 'day', reference: unknown, reason: 'no time column', warnings: [] };
  const { name, unit: unitText, comment, values } = column;
  const own = [unitText, comment, name].map((text) => timeMeaning(text ?? ''));
  const unit = unitOf(unitText) ?? facts.timeUnit ?? own.find(({ timeUnit }) => timeUnit)?.timeUnit ?? 'day';
  const scale = firstKnown<TimeScale>([facts.scale, ...own.map((meaning) => meaning.scale), scaleOf(name)]);
  const frame = firstKnown<TimeFrame>([facts.frame, ...own.map((meaning) => meaning.frame)]);
  const { smallest, largest } = summarise(values);
  const inDays = unit === 'second' ? SECONDS : 1;
  const lies = (zeroJd: number) => smallest / inDays + zeroJd > EARLIEST_JD && largest / inDays + zeroJd < LATEST_JD;
  const isJulianName = /jd/i.test(name);
  const stated = [facts.zeroJd, ...own.map(({ zeroJd }) => zeroJd)].find((zeroJd) => zeroJd !== undefined);

  if (stated !== undefined && lies(stated))
    return {
      unit,
      reference: { zeroJd: stated, scale, frame },
      reason: 'the file states the zero of time',
      warnings: [],
    };
  if (lies(0)) {
    const reason = isJulianName ? `named ${name}, and its values are Julian dates` : 'its values are Julian dates';
    return { unit, reference: { zeroJd: 0, scale, frame }, reason, warnings: [] };
  }
  return {
    unit,
    reference: { ...unknown, scale, frame },
    reason: 'the zero of time is not stated',
    warnings: [contradiction(name, isJulianName, stated, smallest, largest)],
  };
}

function contradiction(
  name: string,
  isJulianName: boolean,
  stated: number | undefined,
  smallest: number,
  largest: number,
): string {
  const range = `${plain(smallest)} to ${plain(largest)}`;
  if (stated !== undefined)
    return `Column ${name} holds ${range}; from the stated zero, JD ${stated}, that is no date of a light curve. Times are taken as days from an unknown zero.`;
  if (isJulianName)
    return `Column ${name} holds ${range}, which are not Julian dates: taken as days from an unknown zero. Correct the columns if you know the zero.`;
  return `The zero of time is not stated: column ${name} holds ${range}, taken as days from an unknown zero. Correct the columns if you know it.`;
}

function plain(value: number): string {
  return String(Number(value.toPrecision(7))).replace('-', '\u2212');
}

function firstKnown<T extends string>(values: readonly (T | 'unknown')[]): T | 'unknown' {
  return values.find((value) => value !== 'unknown') ?? 'unknown';
}
