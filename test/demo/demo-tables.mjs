/** The stars table and the README of the docket. */
import { SURVEY } from './demo-files.mjs';
import { densityOf } from './demo-signals.mjs';
import { createLehmer } from './lehmer.mjs';

/** Solar log g in cgs: log10(GM/R^2) from IAU 2015 Resolution B3. */
const SOLAR_LOGG = 4.438;

/** @typedef {import('./demo-targets.mjs').DemoTarget} DemoTarget */

/** One row for each star of which something is known; what is not known is an empty cell. @param {readonly DemoTarget[]} targets */
export function writeStarsTable(targets) {
  const rows = targets.filter(({ unlisted }) => !unlisted).map(starCells);
  const names = Object.keys(/** @type {Record<string, string>} */ (rows[0]));
  const lines = rows.map((row) => names.map((name) => row[name]).join(','));
  return [`# survey = ${SURVEY} (invented): no such stars exist`, names.join(','), ...lines, ''].join('\n');
}

/** @param {DemoTarget} target @returns {Record<string, string>} */
function starCells({ id, star, emptyCells = [] }) {
  const random = createLehmer(`sable ridge ${id} place`);
  const density = densityOf(star);
  const relativeError = Math.hypot(star.massError / star.mass, (3 * star.radiusError) / star.radius);
  const cells = {
    target: id,
    ra_deg: random.between(211.2, 219.8).toFixed(5),
    dec_deg: random.between(36.1, 43.9).toFixed(5),
    mag: star.mag.toFixed(2),
    band: 'Sable R',
    teff_k: star.teff.toFixed(0),
    teff_err_k: star.teffError.toFixed(0),
    radius_rsun: star.radius.toFixed(3),
    radius_err_rsun: star.radiusError.toFixed(3),
    mass_msun: star.mass.toFixed(3),
    mass_err_msun: star.massError.toFixed(3),
    logg: (SOLAR_LOGG + Math.log10(star.mass / (star.radius * star.radius))).toFixed(2),
    density_gcc: density.toFixed(3),
    density_err_gcc: (density * relativeError).toFixed(3),
  };
  return Object.fromEntries(Object.entries(cells).map(([name, text]) => [name, emptyCells.includes(name) ? '' : text]));
}

/** @typedef {ReturnType<typeof import('./demo-truths.mjs').describeTruths>} Truths */

/** @param {Truths} truths @param {readonly { name: string, bytes: number }[]} files */
export function writeReadme(truths, files) {
  const megabytes = (files.reduce((sum, { bytes }) => sum + bytes, 0) / 1e6).toFixed(1);
  return `# ${SURVEY}: an invented docket

**Everything in this folder is invented.** No survey of this name took these data; no star, position, signal or instrument here is of anything that exists. The files were made by a program, to try Candling with and to test it against known answers.

${files.length} files, ${megabytes} MB: ${truths.targets.length} light curves, and \`stars.csv\` with what is known of the stars. \`manifest.json\` lists them; \`truths.json\` holds the answers below for programs.

Made by \`node test/demo/write-demo-docket.mjs\`; \`--check\` compares this folder with what the program makes, byte for byte. Random numbers are those of a Lehmer generator (Park & Miller 1988), with normal deviates by Box & Muller (1958). Each use has its own seed, the hash of a text such as \`sable ridge SR-014 noise\`, so that one target can change without the others.

## Scenario
A small telescope above the air watched one field in a band called Sable R for 55 days: two segments of 22 days with a pause of 1.5 days in the middle of each, and 9.4 days between them. Points are 10, 20 or 30 minutes apart with an exposure as long; stamps are the middle of exposures, as BJD_TDB. Times below are BJD_TDB - 2459000.

What the instrument adds:
- slow drift, with settling at the start of each span: whole in FLUX_RAW, a twentieth of it left in FLUX_CORR and in the text files;
- moments when the wheels were slowed (flag 2): the star shifts and dims for an hour;
- stray light at the end of each span (flag 4): the background rises;
- particle hits, always bright; two in three are flagged (flag 1);
- points without a measurement (flag 8), among them some hours on end in the last span;
- in SR-009, SR-013 and SR-020, dips at four times that are the same for all three;
- in SR-012, four sudden losses of sensitivity, not flagged.

Planets and stars are dark or bright spheres before a star with quadratic limb darkening u = (${truths.limbDarkening.join(', ')}), integrated numerically and averaged over the exposure. Orbits are circular but for SR-008, and their size follows from the mean density of the star in \`stars.csv\` (for SR-015 that of the hidden pair, for SR-016 one that the table does not give).

## Files
| file | form |
|---|---|
| most \`.fits\` | binary table: TIME in days since JD 2459000 (JDREFI + JDREFF), FLUX_RAW and FLUX_CORR in electron/s, FLUX_ERR of either, QUALITY, CENTROID_X and _Y in pixels, BACKGROUND |
| SR-003, SR-024 | FLUX_CORR is relative, with an error column for each flux |
| SR-003, SR-008, SR-020 | zero of time as JDREF |
| SR-006, SR-015 | zero of time as MJDREFI + MJDREFF |
| SR-020 | exposure as XPOSURE in days |
| SR-021 | TIME in seconds |
| SR-012 | some rows without a time |
| SR-013 | fluxes and centroids as scaled integers |
| SR-002, SR-004, SR-009 | comma-separated: bjd_tdb, flux, flux_err, flag |
| SR-011 | time as BJD_TDB - 2459000, missing values written nan, a background column |
| SR-016 | says neither exposure nor which moment of it, no flags |
| SR-019 | flux in ppm |
| SR-022 | separated by semicolons |
| SR-023 | magnitudes, no flags |

## Truths
Duration is first to fourth contact. Depth is the mean loss over it; in brackets, the loss at mid-event. Both are of the signal averaged over the exposure.

| target | what it is | signal | period (d) | epoch | duration (h) | depth (ppm) | events seen |
|---|---|---|---|---|---|---|---|
${truths.targets.flatMap(readmeRows).join('\n')}

Further:
${readmeNotes(truths).join('\n')}
`;
}

/** @param {Truths['targets'][number]} target */
function readmeRows({ target, what, signals }) {
  if (signals.length === 0) return [`| ${target} | ${what} | none | | | | | |`];
  return signals.map((signal, i) => {
    const depth = `${signal.depthPpm.toFixed(0)} (${signal.midDepthPpm.toFixed(0)})`;
    const period = signal.periodDays ?? '';
    const cells = [signal.what, period, signal.epochBjdMinus2459000, signal.durationHours.toFixed(2), depth];
    return `| ${i === 0 ? target : ''} | ${i === 0 ? what : ''} | ${cells.join(' | ')} | ${signal.eventsSeen} |`;
  });
}

/** @param {Truths} truths */
function readmeNotes({ targets }) {
  return targets.flatMap((target) => {
    const notes = [];
    if (target.boxPeriodDays !== undefined) notes.push(`a box search finds ${target.boxPeriodDays} d`);
    if (target.rotationDays !== undefined) notes.push(`spots turn in about ${target.rotationDays} d`);
    for (const { what, timesBjdMinus2459000: times } of target.signals) {
      if (times !== undefined) notes.push(`${what} at ${times.map((t) => t.toFixed(3)).join(', ')}`);
    }
    if (target.modes !== undefined) {
      const modes = target.modes.map(({ periodDays, amplitudePpm }) => `${periodDays} d (${amplitudePpm} ppm)`);
      notes.push(`modes of ${modes.join(', ')}`);
    }
    if (target.flareTimesBjdMinus2459000 !== undefined) {
      notes.push(`flares at ${target.flareTimesBjdMinus2459000.join(', ')}`);
    }
    return notes.length === 0 ? [] : [`- ${target.target}: ${notes.join('; ')}.`];
  });
}
