import type { StampConvention, StarParameters, TimeFrame, TimeScale } from '../../src/core/light-curve.ts';
import type { FitsHeader, FitsValue } from './fits-header.ts';
import type { FileFacts } from './raw-table.ts';

const MJD_ZERO = 2400000.5;
const SECONDS = 86400;

/**
 * What the headers say of time, exposure, passband and star. Time keywords by FITS Standard 4.0, section 9 (after
 * Rots et al. 2015, A&A 574, A36); the star's keywords are common practice. The table's header comes before the
 * primary one.
 */
export function factsOfHeader(table: FitsHeader, primary: FitsHeader): FileFacts {
  const get = (keyword: string): FitsValue | undefined => table.get(keyword) ?? primary.get(keyword);
  const comment = (keyword: string) => table.commentOf(keyword) ?? primary.commentOf(keyword) ?? '';
  const number = (...keywords: string[]): number | undefined => {
    for (const keyword of keywords) {
      const value = get(keyword);
      if (typeof value === 'number') return value;
    }
    return undefined;
  };
  const text = (...keywords: string[]) => {
    const found = keywords.map(get).find((value) => typeof value === 'string' && value !== '');
    return found === undefined ? undefined : String(found).trim();
  };
  return {
    object: text('OBJECT'),
    passband: text('FILTER', 'PASSBAND', 'BAND') ?? 'unknown',
    exposureDays: exposureDays(number, comment),
    stamp: stampOf(number('TIMEPIXR')),
    timeUnit: unitOf(text('TIMEUNIT')),
    zeroJd: zeroOf(number),
    scale: scaleOf(text('TIMESYS')),
    frame: frameOf(text('TREFPOS')),
    star: starOf(number),
  };
}

type NumberOf = (...keywords: string[]) => number | undefined;

/** JDREF or MJDREF, whole or as integer and fraction; section 9.2.2. */
function zeroOf(number: NumberOf): number | undefined {
  const whole = number('JDREFI', 'BJDREFI');
  if (whole !== undefined) return whole + (number('JDREFF', 'BJDREFF') ?? 0);
  const jd = number('JDREF', 'BJDREF');
  if (jd !== undefined) return jd;
  const mjdWhole = number('MJDREFI');
  const mjd = mjdWhole === undefined ? number('MJDREF') : mjdWhole + (number('MJDREFF') ?? 0);
  return mjd === undefined ? undefined : MJD_ZERO + mjd;
}

/** XPOSURE is in the unit of time; the others are seconds by common practice, unless their comment says days. */
function exposureDays(number: NumberOf, comment: (keyword: string) => string): number | undefined {
  for (const keyword of ['XPOSURE', 'EXPOSURE', 'EXPTIME']) {
    const value = number(keyword);
    if (value === undefined || !(value > 0)) continue;
    if (/\[\s*d(ays?)?\s*\]|\bdays?\b/i.test(comment(keyword))) return value;
    return value / SECONDS;
  }
  return undefined;
}

function stampOf(pixel: number | undefined): StampConvention {
  if (pixel === 0) return 'start';
  if (pixel === 0.5) return 'middle';
  return pixel === 1 ? 'end' : 'unknown';
}

export function unitOf(unit: string | undefined): 'day' | 'second' | undefined {
  if (unit === undefined) return undefined;
  if (/^(s|sec|second|seconds)$/i.test(unit.trim())) return 'second';
  return /^(d|day|days)\b/i.test(unit.trim()) || /days?\b|jd/i.test(unit) ? 'day' : undefined;
}

export function scaleOf(text: string | undefined): TimeScale {
  const found = /\b(TDB|UTC|TT|TAI)\b/i.exec((text ?? '').replaceAll('_', ' '));
  return found === null ? 'unknown' : (found[1]!.toUpperCase() as TimeScale);
}

function frameOf(position: string | undefined): TimeFrame {
  if (position === undefined) return 'unknown';
  if (/^BARY/i.test(position)) return 'barycentric';
  if (/^HELIO/i.test(position)) return 'heliocentric';
  return /^(GEO|TOPO)/i.test(position) ? 'geocentric' : 'unknown';
}

function starOf(number: NumberOf): StarParameters {
  const known: StarParameters = {
    raDeg: number('RA_OBJ', 'RA'),
    decDeg: number('DEC_OBJ', 'DEC'),
    magnitude: number('MAG'),
    teffK: number('TEFF'),
    radiusSolar: number('RADIUS'),
    massSolar: number('MASS'),
    loggCgs: number('LOGG'),
  };
  return Object.fromEntries(Object.entries(known).filter(([, value]) => value !== undefined));
}
