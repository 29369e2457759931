/** The light-curve files of the docket: FITS binary tables and delimited text, in the variety an analyst meets. */
import { FLAGS } from './demo-series.mjs';
import { exposureDaysOf } from './demo-signals.mjs';
import { writeFits } from './fits-writer.mjs';

/** @typedef {import('./demo-targets.mjs').DemoTarget} DemoTarget */
/** @typedef {import('./demo-series.mjs').DemoSeries} DemoSeries */
/** @typedef {import('./fits-writer.mjs').Card} Card */
/** @typedef {import('./fits-writer.mjs').Column} Column */

export const SURVEY = 'Sable Ridge';
/** Julian date of time 0 in the tables: BJD_TDB - 2459000. */
export const TIME_ZERO_JD = 2459000;
const SECONDS_PER_DAY = 86400;

/** @param {DemoTarget} target */
export const fileNameOf = ({ id, file }) => `${id}.${file.format}`;

/** @param {DemoTarget} target @param {DemoSeries} series @returns {Uint8Array} */
export function encodeLightCurve(target, series) {
  if (target.file.format === 'fits') return encodeFits(target, series);
  return new TextEncoder().encode(encodeText(target, series));
}

/** @param {DemoTarget} target @param {DemoSeries} series */
function encodeFits(target, series) {
  const { id } = target;
  return writeFits({
    primary: [
      { key: 'ORIGIN', value: `${SURVEY} (invented)`, comment: 'no such survey exists' },
      { key: 'OBJECT', value: id, comment: 'invented star' },
      { key: 'FILTER', value: 'Sable R', comment: 'invented passband' },
      { key: 'COMMENT', value: 'Invented data, made by a program to demonstrate with. Nothing in this' },
      { key: 'COMMENT', value: 'file was observed.' },
    ],
    tables: [{ name: 'LIGHTCURVE', cards: fitsCards(target, series), columns: fitsColumns(target, series) }],
  });
}

/** @param {DemoTarget} target @param {DemoSeries} series @returns {Card[]} */
function fitsCards(target, series) {
  const { id, file } = target;
  const exposure = exposureDaysOf(target);
  const unitDays = file.reference === 'seconds' ? 1 / SECONDS_PER_DAY : 1;
  const first = Number(series.time[0]) - exposure / 2;
  const last = Number(series.time.at(-1)) + exposure / 2;
  return [
    { key: 'OBJECT', value: id, comment: 'invented star' },
    { key: 'FILTER', value: 'Sable R', comment: 'invented passband' },
    ...referenceCards(file.reference ?? 'split'),
    { key: 'TIMESYS', value: 'TDB', comment: 'time scale' },
    { key: 'TIMEUNIT', value: unitDays === 1 ? 'd' : 's', comment: 'unit of TIME and of time keywords' },
    { key: 'TREFPOS', value: 'BARYCENTER', comment: 'times are those of the barycentre' },
    { key: 'TIMEPIXR', value: 0.5, comment: 'stamps are middles of exposures' },
    { key: 'TIMEDEL', value: exposure / unitDays, comment: 'spacing of the stamps', real: true },
    file.exposureInDays
      ? { key: 'XPOSURE', value: exposure, comment: '[d] exposure of one point', real: true }
      : { key: 'EXPOSURE', value: Math.round(exposure * SECONDS_PER_DAY), comment: '[s] exposure of one point' },
    { key: 'TSTART', value: round(first / unitDays, 6), comment: 'start of the first exposure', real: true },
    { key: 'TSTOP', value: round(last / unitDays, 6), comment: 'end of the last exposure', real: true },
    { key: 'COMMENT', value: 'QUALITY bits: 1 particle hit, 2 wheels slowed, 4 stray light,' },
    { key: 'COMMENT', value: '8 no measurement. 0 is good.' },
    { key: 'COMMENT', value: 'Invented data: nothing in this file was observed.' },
  ];
}

/** The same zero of time, JD 2459000.0, said in several lawful ways. @param {NonNullable<DemoTarget['file']['reference']>} reference @returns {Card[]} */
function referenceCards(reference) {
  if (reference === 'whole') return [{ key: 'JDREF', value: TIME_ZERO_JD, comment: '[d] zero of time', real: true }];
  const julian = reference !== 'mjd';
  const name = julian ? 'JDREF' : 'MJDREF';
  return [
    { key: `${name}I`, value: julian ? TIME_ZERO_JD : 58999, comment: '[d] zero of time, whole days' },
    { key: `${name}F`, value: julian ? 0 : 0.5, comment: '[d] zero of time, fraction', real: true },
  ];
}

/** @param {DemoTarget} target @param {DemoSeries} series @returns {Column[]} */
function fitsColumns(target, series) {
  const { file } = target;
  const { level, quality, centroidX, centroidY, background } = series;
  const perSecond = { unit: 'electron/s' };
  const flux = file.scaled
    ? { format: /** @type {const} */ ('J'), scale: 0.001, zero: level, nullValue: -2147483648 }
    : { format: /** @type {const} */ ('E') };
  /** @param {Float64Array} values @returns {Partial<Column> & { format: 'I' | 'E' }} */
  const pixel = (values) =>
    file.scaled
      ? { format: 'I', scale: 0.00002, zero: Math.round(firstFinite(values)), nullValue: -32768, unit: 'pixel' }
      : { format: 'E', unit: 'pixel' };
  return [
    timeColumn(target, series),
    { name: 'FLUX_RAW', values: series.raw, ...flux, ...perSecond, comment: 'before correction' },
    ...correctedColumns(target, series, flux),
    { name: 'QUALITY', values: quality, format: file.quality ?? 'J', comment: 'bit flags' },
    { name: 'CENTROID_X', values: centroidX, ...pixel(centroidX) },
    { name: 'CENTROID_Y', values: centroidY, ...pixel(centroidY) },
    { name: 'BACKGROUND', values: background, format: 'E', ...perSecond },
  ];
}

/** @param {DemoTarget} target @param {DemoSeries} series @returns {Column} */
function timeColumn({ file }, { time, quality }) {
  const inSeconds = file.reference === 'seconds';
  const values = time.map((t, i) => {
    const lost = file.missingTimes && Number(quality[i]) & FLAGS.missing && i % 3 === 0;
    return lost ? Number.NaN : inSeconds ? t * SECONDS_PER_DAY : t;
  });
  return { name: 'TIME', format: 'D', unit: inSeconds ? 's' : 'd', values, comment: 'BJD_TDB - 2459000' };
}

/**
 * @param {DemoTarget} target @param {DemoSeries} series @param {Pick<Column, 'format'> & Partial<Column>} flux
 * @returns {Column[]}
 */
function correctedColumns({ file }, { corrected, error, level }, flux) {
  const unit = 'electron/s';
  if (!file.relative) {
    return [
      { name: 'FLUX_CORR', values: corrected, ...flux, unit, comment: 'drift of the instrument removed' },
      { name: 'FLUX_ERR', values: error, format: 'E', unit, comment: 'one sigma, of either flux' },
    ];
  }
  const ofLevel = (/** @type {number} */ value) => value / level;
  return [
    { name: 'FLUX_CORR', values: corrected.map(ofLevel), format: 'E', comment: 'relative, drift removed' },
    { name: 'FLUX_RAW_ERR', values: error, format: 'E', unit, comment: 'one sigma' },
    { name: 'FLUX_CORR_ERR', values: error.map(ofLevel), format: 'E', comment: 'one sigma, relative' },
  ];
}

/** @param {Float64Array} values */
const firstFinite = (values) => values.find((value) => Number.isFinite(value)) ?? 0;

/** @param {DemoTarget} target @param {DemoSeries} series */
function encodeText(target, series) {
  const layout = target.file.layout ?? 'plain';
  const { columns, separator, comments, flagged } = TEXT_LAYOUTS[layout];
  const head = [`# survey = ${SURVEY} (invented)`, ...comments(target)];
  const rows = [];
  for (let i = 0; i < series.time.length; i += 1) {
    // A file without flags holds only the good points.
    if (!flagged && series.quality[i] !== 0) continue;
    rows.push(
      Object.values(columns)
        .map((cell) => cell(series, i))
        .join(separator),
    );
  }
  return `${[...head, Object.keys(columns).join(separator), ...rows].join('\n')}\n`;
}

/** @typedef {(series: DemoSeries, row: number) => string} Cell */
/** @typedef {{ columns: Record<string, Cell>, separator: string, flagged: boolean, comments: (target: DemoTarget) => string[] }} TextLayout */

/** @param {number} digits @param {(series: DemoSeries, row: number) => number} value @param {string} [missing] @returns {Cell} */
const number =
  (digits, value, missing = '') =>
  (series, row) => {
    const x = value(series, row);
    return Number.isNaN(x) ? missing : x.toFixed(digits);
  };

const bjd = number(6, ({ time }, i) => TIME_ZERO_JD + Number(time[i]));
const relative = (/** @type {string} */ missing) =>
  number(6, ({ corrected, level }, i) => Number(corrected[i]) / level, missing);
const relativeError = (/** @type {string} */ missing) =>
  number(6, ({ error, level }, i) => Number(error[i]) / level, missing);
/** @type {Cell} */
const flag = ({ quality }, i) => String(quality[i]);
const magnitude = number(5, ({ corrected }, i) => 16.5 - 2.5 * Math.log10(Number(corrected[i]) / 1000));
const magnitudeError = number(
  5,
  ({ corrected, error }, i) => (2.5 / Math.LN10) * (Number(error[i]) / Number(corrected[i])),
);

/** @param {DemoTarget} target */
const usualComments = (target) => [
  `# object = ${target.id}`,
  '# filter = Sable R',
  '# time = BJD_TDB, middle of exposure, days',
  `# exposure_s = ${target.cadenceMinutes * 60}`,
  '# flag bits = 1 particle hit, 2 wheels slowed, 4 stray light, 8 no measurement; 0 is good',
];

/** @type {Record<NonNullable<DemoTarget['file']['layout']>, TextLayout>} */
const TEXT_LAYOUTS = {
  plain: {
    columns: { bjd_tdb: bjd, flux: relative(''), flux_err: relativeError(''), flag },
    separator: ',',
    flagged: true,
    comments: usualComments,
  },
  offset: {
    columns: {
      time: number(6, ({ time }, i) => Number(time[i])),
      flux: relative('nan'),
      flux_err: relativeError('nan'),
      quality: flag,
      background: number(2, ({ background }, i) => Number(background[i])),
    },
    separator: ',',
    flagged: true,
    comments: (target) => usualComments(target).map((line) => line.replace('BJD_TDB,', 'BJD_TDB - 2459000,')),
  },
  semicolon: {
    columns: { bjd_tdb: bjd, flux: relative(''), flux_err: relativeError(''), flag },
    separator: ';',
    flagged: true,
    comments: usualComments,
  },
  magnitude: {
    columns: { bjd_tdb: bjd, mag: magnitude, mag_err: magnitudeError },
    separator: ',',
    flagged: false,
    comments: (target) => [...usualComments(target).slice(0, 4), '# flux = magnitude, flagged points left out'],
  },
  ppm: {
    columns: {
      bjd_tdb: bjd,
      flux_ppm: number(1, ({ corrected, level }, i) => 1e6 * (Number(corrected[i]) / level - 1)),
      flux_err_ppm: number(1, ({ error, level }, i) => (1e6 * Number(error[i])) / level),
      flag,
    },
    separator: ',',
    flagged: true,
    comments: (target) => [...usualComments(target), '# flux = parts per million about the mean level'],
  },
  bare: {
    columns: { bjd_tdb: bjd, flux: relative(''), flux_err: relativeError('') },
    separator: ',',
    flagged: false,
    comments: (target) => [`# object = ${target.id}`],
  },
};

/** @param {number} value @param {number} digits */
export const round = (value, digits) => Number(value.toFixed(digits));
