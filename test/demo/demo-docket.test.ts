import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { measureBox } from '../../src/core/measure-box.ts';
import { buildDemoDocket, type MadeTarget, type SignalTruth } from './build-demo-docket.mjs';

const folder = new URL('../../public/demo/', import.meta.url);
const docket = buildDemoDocket();
const committed = (name: string) => new Uint8Array(readFileSync(new URL(name, folder)));
const text = (name: string) => readFileSync(new URL(name, folder), 'utf8');
const madeOf = (id: string) => docket.made.find(({ target }) => target.id === id)!;
const truthOf = (id: string) => docket.truths.targets.find(({ target }) => target === id)!;
const lightCurveNames = docket.truths.targets.map(({ file }) => file);

interface Manifest {
  readonly survey: string;
  readonly invented: boolean;
  readonly files: readonly { readonly name: string; readonly bytes: number }[];
  readonly documents: readonly string[];
}
const manifest: Manifest = JSON.parse(text('manifest.json'));

describe('the committed folder', () => {
  it('holds, byte for byte, what the program makes, and nothing else', () => {
    expect(readdirSync(folder).sort()).toEqual([...docket.files.keys()].sort());
    const different = [...docket.files].filter(([name, bytes]) => Buffer.compare(committed(name), bytes) !== 0);
    expect(different.map(([name]) => name)).toEqual([]);
  });

  it('is under 6 MB', () => {
    const bytes = [...docket.files.keys()].reduce((sum, name) => sum + committed(name).length, 0);
    expect(bytes).toBeLessThan(6e6);
  });

  it('is listed in the manifest with its sizes', () => {
    expect(manifest.files.map(({ name }) => name).sort()).toEqual([...lightCurveNames, 'stars.csv'].sort());
    for (const { name, bytes } of manifest.files) expect(committed(name).length, name).toBe(bytes);
    for (const name of manifest.documents) expect(committed(name).length, name).toBeGreaterThan(0);
  });

  it('says everywhere that it is invented', () => {
    expect(manifest.invented).toBe(true);
    expect(JSON.parse(text('truths.json')).invented).toBe(true);
    for (const name of docket.files.keys()) expect(text(name), name).toMatch(/invented/i);
  });

  it('numbers its targets SR-001 to SR-024, in truths and README alike', () => {
    const ids = Array.from({ length: 24 }, (_, i) => `SR-${String(i + 1).padStart(3, '0')}`);
    expect(docket.truths.targets.map(({ target }) => target)).toEqual(ids);
    for (const id of ids) expect(text('README.md')).toContain(`| ${id} |`);
  });
});

/** The cards before END of the header that starts at a byte, and where its data begin. */
function cardsAt(bytes: Uint8Array, start: number): { cards: string[]; dataStart: number } {
  const cards: string[] = [];
  for (let at = start; ; at += 80) {
    const card = new TextDecoder('ascii').decode(bytes.subarray(at, at + 80));
    if (card === 'END'.padEnd(80)) return { cards, dataStart: start + Math.ceil((at + 80 - start) / 2880) * 2880 };
    if (card.length < 80) throw new Error('The header has no END.');
    cards.push(card);
  }
}

const keysOf = (cards: readonly string[]) => cards.map((card) => card.slice(0, 8).trimEnd());
const cardNumber = (cards: readonly string[], key: string) =>
  Number(cards.find((card) => card.startsWith(`${key.padEnd(8)}= `))?.slice(10, 30));

describe.each(lightCurveNames.filter((name) => name.endsWith('.fits')))('%s', (name) => {
  const bytes = committed(name);
  const primary = cardsAt(bytes, 0);
  const table = cardsAt(bytes, primary.dataStart);

  it('is whole blocks, with the mandatory keywords first and in order', () => {
    // FITS 4.0 (2018): section 3.1 (blocks), 4.4.1.1 (primary header), 7.3.1 (binary table extension).
    expect(bytes.length % 2880).toBe(0);
    expect(keysOf(primary.cards).slice(0, 4)).toEqual(['SIMPLE', 'BITPIX', 'NAXIS', 'EXTEND']);
    const mandatory = ['XTENSION', 'BITPIX', 'NAXIS', 'NAXIS1', 'NAXIS2', 'PCOUNT', 'GCOUNT', 'TFIELDS'];
    expect(keysOf(table.cards).slice(0, 8)).toEqual(mandatory);
    expect(table.cards[0]).toMatch(/^XTENSION= 'BINTABLE'/);
  });

  it('has a form for every column, rows as wide as the forms, and data to its end', () => {
    const widths: Readonly<Record<string, number>> = { D: 8, E: 4, J: 4, I: 2 };
    const forms = table.cards.filter((card) => /^TFORM\d+ *= '1[DEJI]/.test(card)).map((card) => card[12]!);
    expect(forms).toHaveLength(cardNumber(table.cards, 'TFIELDS'));
    const rowBytes = forms.reduce((sum, form) => sum + widths[form]!, 0);
    expect(cardNumber(table.cards, 'NAXIS1')).toBe(rowBytes);
    const dataBytes = Math.ceil((rowBytes * cardNumber(table.cards, 'NAXIS2')) / 2880) * 2880;
    expect(table.dataStart + dataBytes).toBe(bytes.length);
  });

  it('holds the times it was made with, after JD 2459000', () => {
    const series = docket.made[lightCurveNames.indexOf(name)]!.series;
    const view = new DataView(bytes.buffer, bytes.byteOffset + table.dataStart);
    const unit = table.cards.some((card) => card.startsWith("TIMEUNIT= 's")) ? 86400 : 1;
    const last = series.time.length - 1;
    expect(cardNumber(table.cards, 'NAXIS2')).toBe(last + 1);
    expect(view.getFloat64(0) / unit).toBeCloseTo(series.time[0]!, 9);
    expect(view.getFloat64(last * cardNumber(table.cards, 'NAXIS1')) / unit).toBeCloseTo(series.time[last]!, 9);
    const whole = ['JDREFI', 'JDREFF', 'JDREF'].map((key) => cardNumber(table.cards, key) || 0);
    const modified = ['MJDREFI', 'MJDREFF'].map((key) => cardNumber(table.cards, key));
    const zeroJd = Number.isNaN(modified[0])
      ? whole[0]! + whole[1]! + whole[2]!
      : 2400000.5 + modified[0]! + modified[1]!;
    expect(zeroJd).toBe(2459000);
  });
});

/** The points that were measured and carry no flag. */
function goodPoints({ series }: MadeTarget): number[] {
  return [...series.time.keys()].filter((i) => series.quality[i] === 0);
}

const ephemerisOf = (signal: SignalTruth) => ({
  periodDays: signal.periodDays ?? 1e4,
  epochDays: signal.epochBjdMinus2459000,
  durationDays: signal.durationHours / 24,
});

const strictSignals = docket.truths.targets.flatMap(({ target, kind, signals }) =>
  kind === 'contact binary' || signals.some(({ what }) => what === 'losses of sensitivity')
    ? []
    : signals.map((signal) => [`${target} ${signal.what} of ${signal.periodDays ?? 'no'} d`, target, signal] as const),
);

describe.each(strictSignals)('%s', (_, id, signal) => {
  const made = madeOf(id);
  const good = goodPoints(made);
  const { series } = made;
  const pick = (value: (i: number) => number) => Float64Array.from(good, value);
  const times = pick((i) => series.time[i]!);
  const errors = pick((i) => series.error[i]! / series.level);

  /** Fluxes with the losses of the target's other signals left out of the measure: only what is in or out of all. */
  const box = (flux: (i: number) => number) => {
    const others = truthOf(id).signals.filter(({ epochBjdMinus2459000: epoch, periodDays }) => {
      return epoch !== signal.epochBjdMinus2459000 || periodDays !== signal.periodDays;
    });
    const kept = good.map((i) => !others.some((other) => isNear(series.time[i]!, other)));
    const keep = (values: Float64Array) => values.filter((__, n) => kept[n]);
    return measureBox(keep(times), keep(pick(flux)), keep(errors), ephemerisOf(signal))!;
  };

  it('loses the documented light at the documented ephemeris, without noise', () => {
    const depthPpm = 1e6 * box((i) => series.dips[i]!).depth;
    // Points fall where they fall within a dip: a few per cent for short and V-shaped ones.
    expect(Math.abs(depthPpm / signal.depthPpm - 1)).toBeLessThan(0.05);
  });

  it('loses it in the noise too, once the star and the drift are taken away', () => {
    const measured = box((i) => series.dips[i]! + series.corrected[i]! / series.level / flatten(i) - 1);
    expect(Math.abs(1e6 * measured.depth - signal.depthPpm)).toBeLessThan(
      4e6 * measured.depthError + 0.05 * signal.depthPpm,
    );
    expect(measured.eventCount).toBeGreaterThan(0);
    expect(measured.eventCount).toBeLessThanOrEqual(signal.eventsSeen);
  });

  /** The truth without the dips: what is left beside noise is a twentieth of the drift. */
  const flatten = (i: number) => series.variability[i]! * series.dips[i]!;
});

function isNear(
  time: number,
  { periodDays, epochBjdMinus2459000: epoch, durationHours, ...more }: SignalTruth,
): boolean {
  const reach = (0.55 * durationHours) / 24 + 0.02;
  if (more.timesBjdMinus2459000 !== undefined) return more.timesBjdMinus2459000.some((t) => Math.abs(t - time) < reach);
  const cycle = periodDays === undefined ? 0 : Math.round((time - epoch) / periodDays);
  return Math.abs(time - epoch - cycle * (periodDays ?? 0)) < reach;
}

describe('the scenario', () => {
  it('spans about 55 days in two segments, with pauses', () => {
    const { time } = madeOf('SR-014').series;
    const steps = [...time.slice(1)].map((t, i) => t - time[i]!);
    expect(time.at(-1)! - time[0]!).toBeCloseTo(54.7, 1);
    const gaps = steps.filter((step) => step > 1).map((gap) => Number(gap.toFixed(1)));
    expect(gaps).toEqual([1.5, 9.4, 1.5]);
  });

  it('moves the centroid with the dips of the neighbour, by share times loss times distance', () => {
    const made = madeOf('SR-015');
    const { series } = made;
    const primary = truthOf('SR-015').signals[0]!;
    const inside = goodPoints(made).filter((i) => series.dips[i]! < 1 - 0.7e-6 * primary.midDepthPpm);
    // Pointing wanders in days: each point is held against those a few hours from it.
    const outside = goodPoints(made).filter((i) => series.dips[i] === 1);
    const shift = inside.map((i) => {
      const near = outside.filter((j) => Math.abs(series.time[j]! - series.time[i]!) < 0.25);
      return series.centroidX[i]! - mean(near.map((j) => series.centroidX[j]!));
    });
    const loss = mean(inside.map((i) => 1 - series.dips[i]!));
    // 1.4 pixels times (1 - the neighbour's share of 0.031) times the loss; noise 0.0009 px a point.
    expect(mean(shift)).toBeCloseTo(-1.4 * loss * (1 - 0.031), 3);
    expect(Math.abs(mean(shift))).toBeGreaterThan((8 * 0.0009) / Math.sqrt(shift.length));
  });

  it('gives three targets dips at the same times', () => {
    const shared = docket.truths.targets.filter(({ signals }) => signals[0]?.what === 'dips of the instrument');
    expect(shared.map(({ target }) => target)).toEqual(['SR-009', 'SR-013', 'SR-020']);
    expect(new Set(shared.map(({ signals }) => String(signals[0]!.timesBjdMinus2459000))).size).toBe(1);
  });

  it('makes odd and even eclipses of the near-twins differ by a few per cent', () => {
    const [primary, secondary] = truthOf('SR-005').signals;
    expect(primary!.depthPpm / secondary!.depthPpm).toBeGreaterThan(1.02);
    expect(primary!.depthPpm / secondary!.depthPpm).toBeLessThan(1.04);
    expect((secondary!.epochBjdMinus2459000 - primary!.epochBjdMinus2459000) / primary!.periodDays!).toBeCloseTo(
      0.5,
      6,
    );
  });

  it('has noise of the documented size', () => {
    for (const made of docket.made) {
      const { series } = made;
      const rest = goodPoints(made).map(
        (i) => series.corrected[i]! / series.level / (series.dips[i]! * series.variability[i]!),
      );
      // Differences of neighbours see no drift; the median of their size is 0.6745 sqrt(2) sigma (normal law).
      const steps = rest
        .slice(1)
        .map((value, n) => Math.abs(value - rest[n]!))
        .sort((a, b) => a - b);
      const sigmaPpm = (1e6 * steps[steps.length >> 1]!) / (0.6745 * Math.SQRT2);
      expect(Math.abs(sigmaPpm / truthOf(made.target.id).noisePpm - 1), made.target.id).toBeLessThan(0.06);
    }
  });

  it('knows no star SR-016, and leaves some cells empty', () => {
    const rows = text('stars.csv').trimEnd().split('\n').slice(2);
    expect(rows).toHaveLength(23);
    expect(rows.some((row) => row.startsWith('SR-016'))).toBe(false);
    expect(rows.filter((row) => row.split(',').includes(''))).toHaveLength(4);
  });
});

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}
