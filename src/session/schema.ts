import * as v from 'valibot';
import { SEARCH_OBJECTIVES } from '../core/box-search-settings.ts';
import { CONFIDENCES, MARK_KINDS, RULING_KINDS, type SessionDocument } from './document.ts';

/** What a session file must hold. Keys that are not known are left out; what is known must be of its kind. */

const finite = v.pipe(v.number(), v.finite());
const positive = v.pipe(v.number(), v.finite(), v.gtValue(0));
const text = v.string();
const count = v.pipe(v.number(), v.integer(), v.minValue(0));
const filled = v.pipe(v.string(), v.minLength(1));
const moment = v.pipe(v.string(), v.isoTimestamp());
const maybe = <T extends v.GenericSchema>(schema: T) => v.optional(schema);

const interval = v.pipe(
  v.object({ start: finite, end: finite }),
  v.check(({ start, end }) => start <= end, 'expected a start before its end'),
);

const ephemeris = v.object({ periodDays: positive, epochDays: finite, durationDays: positive });

const timing = v.variant('kind', [
  v.object({
    kind: v.literal('linear'),
    periodDays: positive,
    epochDays: finite,
    durationDays: positive,
    periodErrorDays: maybe(finite),
    epochErrorDays: maybe(finite),
    durationErrorDays: maybe(finite),
    periodEpochCovariance: maybe(finite),
  }),
  v.object({
    kind: v.literal('alias set'),
    epochDays: finite,
    durationDays: positive,
    periods: v.pipe(v.array(v.object({ periodDays: positive, weight: finite })), v.minLength(1)),
  }),
  v.object({
    kind: v.literal('event list'),
    durationDays: positive,
    events: v.array(v.object({ timeDays: finite, errorDays: maybe(finite) })),
  }),
  v.object({
    kind: v.literal('single'),
    timeDays: finite,
    durationDays: positive,
    shortestPeriodDays: maybe(positive),
    longestPeriodDays: maybe(positive),
    likelyPeriodDays: maybe(positive),
    likelyFromDays: maybe(positive),
    likelyToDays: maybe(positive),
  }),
  v.object({ kind: v.literal('aperiodic'), durationDays: positive, times: v.array(finite) }),
]);

const recipe = v.object({
  fluxColumn: maybe(text),
  qualityMask: v.pipe(v.number(), v.integer()),
  clip: v.variant('kind', [
    v.object({ kind: v.literal('none') }),
    v.object({ kind: v.literal('sigma'), side: v.picklist(['high', 'low', 'both']), sigma: positive }),
  ]),
  detrend: v.variant('kind', [
    v.object({ kind: v.literal('none') }),
    v.object({ kind: v.literal('biweight'), windowDays: positive }),
    v.object({ kind: v.literal('running median'), windowDays: positive }),
    v.object({ kind: v.literal('savitzky-golay'), windowDays: positive, degree: count }),
    v.object({ kind: v.literal('spline'), knotDays: positive }),
    v.object({ kind: v.literal('harmonics'), count: count }),
  ]),
  maskFlares: v.boolean(),
  splitAtDrops: v.boolean(),
  covariates: maybe(v.object({ names: v.array(text), per: v.picklist(['series', 'segment', 'night']) })),
  commonModes: count,
  protectCases: v.boolean(),
});

const numbers = v.object({
  key: text,
  boxDepth: finite,
  boxDepthError: maybe(finite),
  signalToNoise: maybe(finite),
  correlatedSignalToNoise: maybe(finite),
  sde: maybe(finite),
  falseAlarmProbability: maybe(finite),
  eventCount: maybe(finite),
});

const timeReference = v.object({
  zeroJd: maybe(finite),
  scale: v.picklist(['TDB', 'TT', 'UTC', 'TAI', 'unknown']),
  frame: v.picklist(['barycentric', 'heliocentric', 'geocentric', 'unknown']),
});

const mapping = v.object({
  columns: v.array(
    v.object({
      column: text,
      role: v.picklist(['time', 'flux', 'flux error', 'quality', 'covariate', 'ignore']),
      errorOf: maybe(text),
      meaning: maybe(v.picklist(['raw', 'corrected', 'aperture', 'unknown'])),
      unit: maybe(v.picklist(['relative', 'electron/s', 'ppm', 'magnitude', 'sigma', 'unknown'])),
      reason: text,
    }),
  ),
  timeUnit: v.picklist(['day', 'second']),
  timeReference,
  timeReason: text,
  exposureDays: maybe(positive),
  stamp: v.picklist(['start', 'middle', 'end', 'unknown']),
  passband: text,
});

const file = v.object({
  name: filled,
  sha256: v.pipe(v.string(), v.regex(/^[0-9a-f]{64}$/, 'expected a SHA-256 in hexadecimal')),
  bytes: finite,
  mapping,
  timeReference,
  points: finite,
  warnings: v.array(text),
});

const STAR_FIELDS = [
  'raDeg',
  'decDeg',
  'magnitude',
  'teffK',
  'teffErrorK',
  'radiusSolar',
  'radiusErrorSolar',
  'massSolar',
  'massErrorSolar',
  'loggCgs',
  'loggErrorCgs',
  'densityCgs',
  'densityErrorCgs',
] as const;

const star = v.object({ magnitudeBand: maybe(text), ...v.entriesFromList(STAR_FIELDS, maybe(finite)) });

const ruling = v.object({
  id: filled,
  kind: v.picklist(RULING_KINDS),
  reasons: v.array(text),
  confidence: v.picklist(CONFIDENCES),
  note: text,
  analyst: text,
  at: moment,
  app: text,
  timing,
  recipe,
  numbers: maybe(numbers),
});

const oneCase = v.object({
  id: filled,
  number: v.pipe(v.number(), v.integer(), v.minValue(1)),
  origin: v.variant('kind', [
    v.object({ kind: v.literal('search'), rank: finite, round: maybe(finite), relation: maybe(text) }),
    v.object({ kind: v.literal('single event'), rank: finite }),
    v.object({ kind: v.literal('marks'), markIds: v.array(text) }),
    v.object({ kind: v.literal('hand') }),
  ]),
  timing,
  numbers: maybe(numbers),
  rulings: v.array(ruling),
  parked: maybe(
    v.object({
      reason: text,
      until: maybe(v.pipe(v.string(), v.isoDate())),
      at: moment,
      analyst: text,
    }),
  ),
});

const target = v.object({
  id: filled,
  label: filled,
  files: v.pipe(v.array(file), v.minLength(1)),
  star,
  recipe,
  search: v.object({
    shortestPeriodDays: maybe(positive),
    longestPeriodDays: maybe(positive),
    oversampling: maybe(positive),
    densityCgs: maybe(positive),
    durationsDays: maybe(v.array(positive)),
    objective: maybe(v.picklist(SEARCH_OBJECTIVES)),
    masked: maybe(
      v.array(
        v.object({ ...ephemeris.entries, boxDepth: maybe(finite), signalToNoise: maybe(finite), sde: maybe(finite) }),
      ),
    ),
  }),
  instrumentTable: maybe(text),
  modeSet: maybe(text),
  marks: v.array(v.object({ id: filled, kind: v.picklist(MARK_KINDS), interval, note: text })),
  cases: v.array(oneCase),
  lastCaseNumber: v.pipe(v.number(), v.integer(), v.minValue(0)),
});

export const sessionSchema: v.GenericSchema<unknown, SessionDocument> = v.object({
  format: v.literal('candling-session'),
  version: v.literal(2),
  id: filled,
  name: text,
  app: text,
  createdAt: moment,
  analyst: text,
  targets: v.array(target),
  instrumentTables: v.array(
    v.object({
      id: filled,
      fileName: text,
      isJulian: v.boolean(),
      spans: v.array(v.object({ start: finite, end: finite, note: text })),
    }),
  ),
  modeSets: v.array(
    v.object({ id: filled, stars: v.array(v.object({ targetId: filled, masked: v.array(ephemeris) })) }),
  ),
  journal: v.array(
    v.object({
      id: filled,
      at: moment,
      analyst: text,
      app: text,
      targetId: maybe(text),
      caseId: maybe(text),
      what: text,
    }),
  ),
}) as v.GenericSchema<unknown, SessionDocument>;
