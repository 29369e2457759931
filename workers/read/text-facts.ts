import type { StampConvention, TimeFrame } from '../../src/core/light-curve.ts';
import { scaleOf } from './fits-facts.ts';
import { type FileFacts, NO_FACTS } from './raw-table.ts';

const SECONDS = 86400;
const MINUTES = 1440;

/** What "# key = value" (or "key: value") comments of a text file say. */
export function factsOfComments(comments: readonly string[]): FileFacts {
  const said = new Map<string, string>();
  for (const comment of comments) {
    const pair = /^([A-Za-z][\w ]*?)\s*[=:]\s*(.+)$/.exec(comment);
    if (pair !== null) said.set(pair[1]!.toLowerCase(), pair[2]!.trim());
  }
  const time = said.get('time') ?? said.get('time system') ?? '';
  return {
    ...NO_FACTS,
    object: said.get('object') ?? said.get('target') ?? said.get('star'),
    passband: said.get('filter') ?? said.get('passband') ?? said.get('band') ?? 'unknown',
    exposureDays: exposureDays(said),
    stamp: stampIn(said.get('stamp') ?? time),
    ...timeMeaning(time),
  };
}

/** What a text such as "BJD_TDB - 2457000, middle of exposure" says of time. */
export function timeMeaning(text: string): Pick<FileFacts, 'zeroJd' | 'scale' | 'frame' | 'timeUnit'> {
  const words = text.replaceAll('_', ' ');
  const day = /\b([BH]?)(M?)JD\b/i.exec(words);
  const scale = scaleOf(words);
  const timeUnit = /\bseconds?\b/i.test(words) ? 'second' : /\bdays?\b|JD/i.test(words) ? 'day' : undefined;
  if (day === null) return { zeroJd: undefined, scale, frame: 'unknown', timeUnit };
  const offset = /JD\b[^-+\d]*[-\u2212]\s*(\d[\d ,]*\.?\d*)/i.exec(words);
  const subtracted = offset === null ? undefined : Number(offset[1]!.replace(/[ ,]/g, ''));
  // A bare "BJD" says nothing of an offset: only the values can tell whether it is whole.
  const zeroJd = day[2] === '' ? subtracted : MJD_ZERO + (subtracted ?? 0);
  return { zeroJd, scale, frame: FRAMES[day[1]!.toUpperCase()] ?? 'unknown', timeUnit };
}

const MJD_ZERO = 2400000.5;
const FRAMES: Readonly<Record<string, TimeFrame>> = { B: 'barycentric', H: 'heliocentric', '': 'unknown' };

function exposureDays(said: ReadonlyMap<string, string>): number | undefined {
  for (const [key, value] of said) {
    const found = /^(?:exposure|exptime|exposure time|exposure_time)[_ ]?(s|sec|seconds|min|minutes|d|days)?$/.exec(
      key,
    );
    const size = /^([\d.]+(?:[eE][+-]?\d+)?)\s*(s|sec|seconds|min|minutes|d|days)?$/.exec(value);
    if (found === null || size === null) continue;
    const unit = found[1] ?? size[2];
    if (unit === undefined) return undefined;
    return Number(size[1]) / (unit.startsWith('s') ? SECONDS : unit.startsWith('m') ? MINUTES : 1);
  }
  return undefined;
}

function stampIn(text: string): StampConvention {
  if (/\b(mid|middle|centre|center)\b/i.test(text)) return 'middle';
  if (/\bstart\b/i.test(text)) return 'start';
  return /\bend\b/i.test(text) ? 'end' : 'unknown';
}
