/**
 * The 24 invented targets of the Sable Ridge docket. No star, position or signal here is of anything in the sky.
 * Times are BJD_TDB - 2459000, days.
 */

/**
 * @typedef {object} Star
 * @property {number} mag @property {number} teff @property {number} teffError
 * @property {number} radius @property {number} radiusError solar radii
 * @property {number} mass @property {number} massError solar masses
 */
/** @typedef {{ periodDays: number, epochDays: number, radiusRatio: number, impact: number, ttv?: { minutes: number, periodDays: number, phase: number } }} Planet */
/**
 * Two eclipsing stars; `star` is the first of them. `lightFraction` is their share of the light in the aperture, and
 * `offsetPixels` where they sit from the target; both are absent when the pair is the target itself.
 * @typedef {object} Pair
 * @property {number} periodDays @property {number} epochDays @property {number} impact
 * @property {number} radiusRatio @property {number} surfaceRatio @property {number} massRatio
 * @property {number} [eccentricity] @property {number} [omegaDegrees]
 * @property {{ radius: number, mass: number }} star
 * @property {number} [lightFraction] @property {readonly [number, number]} [offsetPixels]
 */
/** @typedef {{ periodDays: number, amplitudePpm: number }} Mode */
/** @typedef {{ days: number, amplitude: number, decayMinutes: number }} Flare */
/**
 * @typedef {object} FileShape
 * @property {'fits' | 'csv'} format
 * @property {'split' | 'whole' | 'mjd' | 'seconds'} [reference] FITS: how the zero of time is said
 * @property {'J' | 'I'} [quality] FITS: width of the flags
 * @property {boolean} [scaled] FITS: fluxes and centroids as scaled integers
 * @property {boolean} [relative] FITS: FLUX_CORR is normalised
 * @property {boolean} [missingTimes] FITS: a few rows have no time
 * @property {boolean} [exposureInDays] FITS: XPOSURE in TIMEUNIT instead of EXPOSURE in seconds
 * @property {'plain' | 'offset' | 'semicolon' | 'magnitude' | 'ppm' | 'bare'} [layout] CSV
 */
/**
 * @typedef {object} DemoTarget
 * @property {string} id
 * @property {string} kind
 * @property {string} what
 * @property {number} cadenceMinutes
 * @property {number} noisePpm of one point
 * @property {Star} star
 * @property {boolean} [unlisted] has no row in stars.csv
 * @property {readonly string[]} [emptyCells] of stars.csv
 * @property {FileShape} file
 * @property {{ rotationDays: number, amplitudePpm: number, count: number }} spots
 * @property {readonly Planet[]} [planets]
 * @property {Pair} [pair]
 * @property {{ periodDays: number, epochDays: number }} [contact]
 * @property {readonly Mode[]} [modes]
 * @property {readonly Flare[]} [flares]
 * @property {boolean} [sharedDips]
 * @property {readonly number[]} [sensitivityDrops] times
 */

/** @param {number} mag @param {readonly [number, number]} teff @param {readonly [number, number]} radius @param {readonly [number, number]} mass @returns {Star} */
function star(mag, [teff, teffError], [radius, radiusError], [mass0, massError]) {
  return { mag, teff, teffError, radius, radiusError, mass: mass0, massError };
}

const quiet = { rotationDays: 26, amplitudePpm: 110, count: 2 };

/** @type {readonly DemoTarget[]} */
export const DEMO_TARGETS = [
  {
    id: 'SR-001',
    kind: 'planet',
    what: 'hot giant planet of a quiet star',
    cadenceMinutes: 20,
    noisePpm: 420,
    star: star(12.36, [5880, 90], [1.07, 0.03], [1.05, 0.04]),
    file: { format: 'fits', reference: 'split', quality: 'J' },
    spots: quiet,
    planets: [{ periodDays: 3.0517, epochDays: 13.417, radiusRatio: 0.0968, impact: 0.31 }],
  },
  {
    id: 'SR-002',
    kind: 'nothing',
    what: 'quiet star without any signal',
    cadenceMinutes: 20,
    noisePpm: 340,
    star: star(12.02, [5610, 85], [0.94, 0.03], [0.96, 0.04]),
    file: { format: 'csv', layout: 'plain' },
    spots: quiet,
  },
  {
    id: 'SR-003',
    kind: 'planet',
    what: 'long-period planet, three events',
    cadenceMinutes: 20,
    noisePpm: 300,
    star: star(11.71, [5420, 70], [0.88, 0.02], [0.92, 0.03]),
    file: { format: 'fits', reference: 'whole', quality: 'J', relative: true },
    spots: quiet,
    planets: [{ periodDays: 18.9071, epochDays: 14.213, radiusRatio: 0.0415, impact: 0.25 }],
  },
  {
    id: 'SR-004',
    kind: 'rotator',
    what: 'rapid rotator with evolving spots',
    cadenceMinutes: 30,
    noisePpm: 520,
    star: star(12.77, [4870, 110], [0.79, 0.04], [0.82, 0.05]),
    file: { format: 'csv', layout: 'plain' },
    spots: { rotationDays: 0.9127, amplitudePpm: 11000, count: 4 },
  },
  {
    id: 'SR-005',
    kind: 'eclipsing binary',
    what: 'pair of near-twin stars, grazing: a box search finds half the true period',
    cadenceMinutes: 20,
    noisePpm: 380,
    star: star(12.21, [5790, 100], [1.0, 0.05], [1.0, 0.06]),
    file: { format: 'fits', reference: 'split', quality: 'I' },
    spots: { rotationDays: 11.4, amplitudePpm: 500, count: 3 },
    pair: {
      periodDays: 3.6782,
      epochDays: 13.118,
      impact: 1.68,
      radiusRatio: 0.97,
      surfaceRatio: 0.965,
      massRatio: 0.98,
      star: { radius: 1.0, mass: 1.0 },
    },
  },
  {
    id: 'SR-006',
    kind: 'single event',
    what: 'one transit of a planet whose period exceeds the span',
    cadenceMinutes: 30,
    noisePpm: 330,
    star: star(11.95, [5700, 80], [0.98, 0.03], [0.99, 0.04]),
    file: { format: 'fits', reference: 'mjd', quality: 'J' },
    spots: quiet,
    planets: [{ periodDays: 141.6, epochDays: 48.631, radiusRatio: 0.0611, impact: 0.18 }],
  },
  {
    id: 'SR-007',
    kind: 'planets',
    what: 'two planets of one star',
    cadenceMinutes: 20,
    noisePpm: 310,
    star: star(11.88, [5040, 75], [0.8, 0.02], [0.85, 0.03]),
    file: { format: 'fits', reference: 'split', quality: 'J' },
    spots: { rotationDays: 19.3, amplitudePpm: 900, count: 3 },
    planets: [
      { periodDays: 3.219, epochDays: 12.944, radiusRatio: 0.0342, impact: 0.22 },
      { periodDays: 8.1347, epochDays: 16.071, radiusRatio: 0.0438, impact: 0.37 },
    ],
  },
  {
    id: 'SR-008',
    kind: 'eclipsing binary',
    what: 'star with a dwarf companion on an eccentric orbit: secondary far from half phase',
    cadenceMinutes: 20,
    noisePpm: 280,
    star: star(11.42, [6210, 110], [1.3, 0.05], [1.2, 0.06]),
    file: { format: 'fits', reference: 'whole', quality: 'J' },
    spots: quiet,
    pair: {
      periodDays: 5.5022,
      epochDays: 14.307,
      impact: 0.3,
      radiusRatio: 0.21,
      surfaceRatio: 0.05,
      massRatio: 0.2,
      eccentricity: 0.28,
      omegaDegrees: 40,
      star: { radius: 1.3, mass: 1.2 },
    },
  },
  {
    id: 'SR-009',
    kind: 'instrument',
    what: 'dips of the instrument, at the same times as in SR-013 and SR-020',
    cadenceMinutes: 30,
    noisePpm: 260,
    star: star(11.33, [6020, 95], [1.12, 0.04], [1.08, 0.05]),
    file: { format: 'csv', layout: 'plain' },
    spots: quiet,
    sharedDips: true,
  },
  {
    id: 'SR-010',
    kind: 'planet',
    what: 'ultra-short-period planet, very shallow',
    cadenceMinutes: 10,
    noisePpm: 330,
    star: star(10.94, [5210, 70], [0.84, 0.02], [0.87, 0.03]),
    file: { format: 'fits', reference: 'split', quality: 'I' },
    spots: { rotationDays: 22.1, amplitudePpm: 420, count: 2 },
    planets: [{ periodDays: 0.70314, epochDays: 12.871, radiusRatio: 0.0153, impact: 0.2 }],
  },
  {
    id: 'SR-011',
    kind: 'flares',
    what: 'spotted dwarf with flares and no dips',
    cadenceMinutes: 20,
    noisePpm: 820,
    star: star(13.61, [3310, 80], [0.34, 0.02], [0.33, 0.02]),
    file: { format: 'csv', layout: 'offset' },
    spots: { rotationDays: 3.118, amplitudePpm: 6200, count: 3 },
    flares: [
      { days: 13.84, amplitude: 0.021, decayMinutes: 38 },
      { days: 16.27, amplitude: 0.0074, decayMinutes: 25 },
      { days: 18.02, amplitude: 0.083, decayMinutes: 64 },
      { days: 18.11, amplitude: 0.017, decayMinutes: 30 },
      { days: 21.49, amplitude: 0.0096, decayMinutes: 28 },
      { days: 26.66, amplitude: 0.034, decayMinutes: 46 },
      { days: 30.93, amplitude: 0.0082, decayMinutes: 31 },
      { days: 33.15, amplitude: 0.0127, decayMinutes: 24 },
      { days: 45.38, amplitude: 0.051, decayMinutes: 58 },
      { days: 48.71, amplitude: 0.0068, decayMinutes: 22 },
      { days: 51.22, amplitude: 0.0154, decayMinutes: 40 },
      { days: 57.9, amplitude: 0.0089, decayMinutes: 33 },
      { days: 61.08, amplitude: 0.0271, decayMinutes: 52 },
      { days: 65.43, amplitude: 0.011, decayMinutes: 27 },
    ],
  },
  {
    id: 'SR-012',
    kind: 'instrument',
    what: 'sudden losses of sensitivity that heal over hours',
    cadenceMinutes: 20,
    noisePpm: 300,
    star: star(11.77, [5930, 85], [1.04, 0.03], [1.03, 0.04]),
    file: { format: 'fits', reference: 'split', quality: 'J', missingTimes: true },
    spots: quiet,
    sensitivityDrops: [15.672, 28.31, 47.905, 62.744],
  },
  {
    id: 'SR-013',
    kind: 'instrument',
    what: 'dips of the instrument, at the same times as in SR-009 and SR-020',
    cadenceMinutes: 20,
    noisePpm: 310,
    star: star(11.58, [5350, 80], [0.87, 0.03], [0.9, 0.04]),
    file: { format: 'fits', reference: 'split', quality: 'J', scaled: true },
    spots: { rotationDays: 17.2, amplitudePpm: 700, count: 3 },
    sharedDips: true,
  },
  {
    id: 'SR-014',
    kind: 'planet',
    what: 'mid-size planet of a spotted star',
    cadenceMinutes: 20,
    noisePpm: 260,
    star: star(11.82, [5190, 70], [0.83, 0.02], [0.852, 0.033]),
    file: { format: 'fits', reference: 'split', quality: 'J' },
    spots: { rotationDays: 14.7, amplitudePpm: 1900, count: 3 },
    planets: [{ periodDays: 7.3184, epochDays: 15.2236, radiusRatio: 0.0333, impact: 0.33 }],
  },
  {
    id: 'SR-015',
    kind: 'blended eclipsing binary',
    what: 'eclipses of a faint neighbour in the aperture: the centroid moves with the dips',
    cadenceMinutes: 20,
    noisePpm: 340,
    star: star(11.91, [5860, 90], [1.06, 0.03], [1.04, 0.04]),
    file: { format: 'fits', reference: 'mjd', quality: 'J' },
    spots: quiet,
    pair: {
      periodDays: 2.4108,
      epochDays: 13.562,
      impact: 0.62,
      radiusRatio: 0.21,
      surfaceRatio: 0.08,
      massRatio: 0.22,
      star: { radius: 0.72, mass: 0.74 },
      lightFraction: 0.031,
      offsetPixels: [1.4, -0.9],
    },
  },
  {
    id: 'SR-016',
    kind: 'planet',
    what: 'planet of a star of which nothing is known (no row in stars.csv)',
    cadenceMinutes: 20,
    noisePpm: 360,
    star: star(12.4, [5500, 0], [0.9, 0], [0.92, 0]),
    unlisted: true,
    file: { format: 'csv', layout: 'bare' },
    spots: quiet,
    planets: [{ periodDays: 4.9907, epochDays: 14.655, radiusRatio: 0.0282, impact: 0.4 }],
  },
  {
    id: 'SR-017',
    kind: 'contact binary',
    what: 'two stars in contact: flux never constant, minima of unequal depth',
    cadenceMinutes: 10,
    noisePpm: 650,
    star: star(12.95, [5480, 130], [1.01, 0.08], [1.02, 0.09]),
    emptyCells: ['mass_msun', 'mass_err_msun', 'density_gcc', 'density_err_gcc'],
    file: { format: 'fits', reference: 'split', quality: 'I' },
    spots: { rotationDays: 0.3371, amplitudePpm: 2500, count: 1 },
    contact: { periodDays: 0.3371, epochDays: 12.4415 },
  },
  {
    id: 'SR-018',
    kind: 'planet',
    what: 'planet with transit-timing variations',
    cadenceMinutes: 20,
    noisePpm: 300,
    star: star(11.66, [5560, 75], [0.92, 0.02], [0.95, 0.03]),
    file: { format: 'fits', reference: 'split', quality: 'J' },
    spots: quiet,
    planets: [
      {
        periodDays: 4.8725,
        epochDays: 13.308,
        radiusRatio: 0.0752,
        impact: 0.28,
        ttv: { minutes: 11, periodDays: 36, phase: 0.7 },
      },
    ],
  },
  {
    id: 'SR-019',
    kind: 'planet',
    what: 'small planet',
    cadenceMinutes: 20,
    noisePpm: 220,
    star: star(11.04, [4980, 70], [0.77, 0.02], [0.82, 0.03]),
    emptyCells: ['logg'],
    file: { format: 'csv', layout: 'ppm' },
    spots: { rotationDays: 29, amplitudePpm: 260, count: 2 },
    planets: [{ periodDays: 4.1163, epochDays: 13.926, radiusRatio: 0.0181, impact: 0.15 }],
  },
  {
    id: 'SR-020',
    kind: 'instrument',
    what: 'dips of the instrument, at the same times as in SR-009 and SR-013',
    cadenceMinutes: 30,
    noisePpm: 240,
    star: star(11.21, [6330, 110], [1.26, 0.05], [1.17, 0.06]),
    file: { format: 'fits', reference: 'whole', quality: 'I', exposureInDays: true },
    spots: quiet,
    sharedDips: true,
  },
  {
    id: 'SR-021',
    kind: 'eclipsing binary',
    what: 'grazing eclipsing binary, V-shaped, with a shallower secondary',
    cadenceMinutes: 20,
    noisePpm: 480,
    star: star(12.49, [5840, 100], [1.02, 0.04], [1.05, 0.05]),
    file: { format: 'fits', reference: 'seconds', quality: 'J' },
    spots: { rotationDays: 9.6, amplitudePpm: 650, count: 2 },
    pair: {
      periodDays: 6.7405,
      epochDays: 15.884,
      impact: 1.55,
      radiusRatio: 0.75,
      surfaceRatio: 0.55,
      massRatio: 0.75,
      star: { radius: 1.02, mass: 1.05 },
    },
  },
  {
    id: 'SR-022',
    kind: 'planet',
    what: 'grazing giant planet of a spotted star, V-shaped',
    cadenceMinutes: 20,
    noisePpm: 450,
    star: star(12.58, [5260, 85], [0.85, 0.03], [0.89, 0.04]),
    emptyCells: ['teff_err_k'],
    file: { format: 'csv', layout: 'semicolon' },
    spots: { rotationDays: 7.9, amplitudePpm: 4200, count: 4 },
    planets: [{ periodDays: 2.8437, epochDays: 13.771, radiusRatio: 0.121, impact: 0.98 }],
  },
  {
    id: 'SR-023',
    kind: 'planet',
    what: 'deep transits of a giant planet before a dwarf star',
    cadenceMinutes: 20,
    noisePpm: 900,
    star: star(14.12, [3560, 75], [0.49, 0.02], [0.5, 0.02]),
    file: { format: 'csv', layout: 'magnitude' },
    spots: { rotationDays: 21.5, amplitudePpm: 1400, count: 2 },
    planets: [{ periodDays: 2.2186, epochDays: 12.987, radiusRatio: 0.158, impact: 0.21 }],
  },
  {
    id: 'SR-024',
    kind: 'pulsator',
    what: 'star pulsating in several modes',
    cadenceMinutes: 20,
    noisePpm: 270,
    star: star(11.12, [7240, 140], [1.62, 0.07], [1.58, 0.08]),
    emptyCells: ['radius_err_rsun', 'density_err_gcc'],
    file: { format: 'fits', reference: 'split', quality: 'J', relative: true },
    spots: quiet,
    modes: [
      { periodDays: 0.0713, amplitudePpm: 1400 },
      { periodDays: 0.0837, amplitudePpm: 900 },
      { periodDays: 0.1391, amplitudePpm: 650 },
      { periodDays: 0.1944, amplitudePpm: 420 },
      { periodDays: 1.92, amplitudePpm: 600 },
    ],
  },
];
