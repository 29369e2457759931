import { describe, expect, it } from 'vitest';
import { DEFAULT_SINGLE_EVENTS } from '../../../src/contract/single-events-contract.ts';
import { createCheckpoint } from '../../../workers/checkpoint.ts';
import { findSingleEvents } from '../../../workers/search/singles/find-single-events.ts';
import { boxDip, CADENCE_DAYS, findEvents, makeSeries, SIGMA, sampleSpans, tryEvents } from './single-series.ts';

const month = sampleSpans([
  [1000, 1013],
  [1014.2, 1027],
]);

/** A trapezoid of 7.2 h whose floor alone would have this S/N, were the level known. */
function injected(signalToNoise: number, timeDays: number) {
  const depth = (signalToNoise * SIGMA) / Math.sqrt(0.26 / CADENCE_DAYS);
  return { timeDays, durationDays: 0.3, ingressDays: 0.04, depth };
}

describe('a single transit', () => {
  // At S/N 9 edges slide in the noise; a level fitted from two durations on either side costs a tenth of the S/N.
  it.each([
    [9, 0.45],
    [14, 0.35],
    [30, 0.15],
  ])('of S/N %i is found at its time, depth and duration', async (signalToNoise, tolerance) => {
    for (let seed = 1; seed <= 6; seed += 1) {
      const truth = injected(signalToNoise, 1003.137 + 1.21 * seed);
      const [event, ...others] = await findEvents(makeSeries(seed, month, [truth]), { threshold: 6 });
      expect(others).toEqual([]);
      expect(Math.abs(event!.timeDays - truth.timeDays)).toBeLessThan(3 * event!.timeErrorDays);
      expect(event!.timeErrorDays).toBeLessThan(0.1 * truth.durationDays);
      expect(Math.abs(event!.depth - truth.depth)).toBeLessThan(3.5 * event!.depthError);
      expect(Math.abs(event!.durationDays / truth.durationDays - 1)).toBeLessThan(tolerance);
      expect(event!.signalToNoise / signalToNoise).toBeGreaterThan(0.65);
      expect(event!.signalToNoise / signalToNoise).toBeLessThan(1.2);
      expect(event!.isAtEdge).toBe(false);
      expect(event!.coverage).toBeGreaterThan(0.95);
    }
  });

  it('shows a sloped ingress when it is strong', async () => {
    const dip = { timeDays: 1008, durationDays: 0.4, ingressDays: 0.1, depth: 0.01 };
    const [event] = await findEvents(makeSeries(3, month, [dip]));
    expect(event!.shape).toBe('trapezoid');
    expect(event!.durationDays).toBeCloseTo(0.4, 1);
    const [box] = await findEvents(makeSeries(3, month, [boxDip(1008, 0.4, 0.01)]));
    expect(box!.shape).toBe('box');
    expect(box!.durationDays).toBeCloseTo(0.4, 2);
  });

  it('has errors of time and depth that are not far from the scatter of both', async () => {
    let time = 0;
    let depth = 0;
    const seeds = 24;
    for (let seed = 1; seed <= seeds; seed += 1) {
      const truth = injected(16, 1004.2 + 0.31 * seed);
      const [event] = await findEvents(makeSeries(100 + seed, month, [truth]));
      time += ((event!.timeDays - truth.timeDays) / event!.timeErrorDays) ** 2 / seeds;
      depth += ((event!.depth - truth.depth) / event!.depthError) ** 2 / seeds;
    }
    // The error of the time has a term for sharp edges beside that of a sloped ingress, and is to spare.
    expect(Math.sqrt(time)).toBeGreaterThan(0.35);
    expect(Math.sqrt(time)).toBeLessThan(1.3);
    expect(Math.sqrt(depth)).toBeGreaterThan(0.6);
    expect(Math.sqrt(depth)).toBeLessThan(1.5);
  });

  it('is found in red noise, with the S/N that such noise leaves', async () => {
    const red = { amplitude: 0.001, points: 36 };
    const dip = boxDip(1008, 0.3, 0.012);
    const [quiet] = await findEvents(makeSeries(5, month, [dip]));
    const [event, ...others] = await findEvents(makeSeries(5, month, [dip], { red }));
    expect(others).toEqual([]);
    expect(Math.abs(event!.timeDays - 1008)).toBeLessThan(3 * event!.timeErrorDays);
    expect(event!.signalToNoise).toBeLessThan(0.6 * quiet!.signalToNoise);
  });

  it('next to a gap takes no level from beyond it', async () => {
    const added = (time: number) => (time > 1013.5 ? 0.02 : 0);
    const [event, ...others] = await findEvents(makeSeries(6, month, [boxDip(1012.8, 0.3, 0.008)], { added }));
    expect(others).toEqual([]);
    expect(event!.isAtEdge).toBe(true);
    expect(Math.abs(event!.depth - 0.008)).toBeLessThan(3.5 * event!.depthError);
  });

  it('that is half observed says so', async () => {
    const time = month.filter((at) => at < 1008 || at > 1008.18);
    const [event] = await findEvents(makeSeries(7, time, [boxDip(1008.05, 0.4, 0.008)]));
    expect(event!.coverage).toBeGreaterThan(0.4);
    expect(event!.coverage).toBeLessThan(0.75);
    expect(event!.isAtEdge).toBe(true);
  });

  it('of three points, the middle one deepest, keeps them all', async () => {
    const middle = month[1100]!;
    const dip = { timeDays: middle, durationDays: 4 * CADENCE_DAYS, ingressDays: 2 * CADENCE_DAYS, depth: 0.03 };
    const [event, ...others] = await findEvents(makeSeries(16, month, [dip]));
    expect(others).toEqual([]);
    expect(event!.timeDays).toBeCloseTo(middle, 2);
    expect(event!.pointsInside).toBeGreaterThanOrEqual(3);
    expect(Math.abs(event!.depth - 0.03)).toBeLessThan(0.006);
  });

  it('close to a deep one is found once that is taken out', async () => {
    const events = await findEvents(makeSeries(8, month, [boxDip(1008, 0.3, 0.3), boxDip(1008.5, 0.2, 0.01)]));
    expect(events.map(({ timeDays }) => Math.round(timeDays * 100) / 100)).toEqual([1008, 1008.5]);
    expect(events[1]!.depth).toBeCloseTo(0.01, 3);
  });

  it('is the same when every point is there twice with its share of the weight', async () => {
    const once = makeSeries(9, month, [boxDip(1008, 0.3, 0.006)]);
    const twice = {
      seriesId: 'twice',
      time: Float64Array.from([...once.time].flatMap((value) => [value, value])),
      flux: Float64Array.from([...once.flux].flatMap((value) => [value, value])),
      error: new Float64Array(2 * once.time.length).fill(SIGMA * Math.SQRT2),
    };
    const [single] = await findEvents(once);
    const [double] = await findEvents(twice);
    expect(double!.pointsInside).toBe(2 * single!.pointsInside);
    for (const name of ['timeDays', 'durationDays', 'depth'] as const)
      expect(double![name]).toBeCloseTo(single![name], 6);
    // Pairs fill the sides of a few more places along the gap, which count for the noise.
    expect(double!.signalToNoise).toBeCloseTo(single!.signalToNoise, 1);
  });
});

describe('noise alone', () => {
  it.each([
    ['white', { amplitude: 0, points: 1 }],
    ['red over an hour', { amplitude: 0.001, points: 6 }],
    ['red over six hours', { amplitude: 0.001, points: 36 }],
    ['red over a day', { amplitude: 0.002, points: 144 }],
    ['red over three days', { amplitude: 0.005, points: 432 }],
  ])('that is %s passes S/N 5 not once in 20 series', async (_, red) => {
    for (let seed = 1; seed <= 20; seed += 1)
      expect(await findEvents(makeSeries(seed, month, [], { red }), { threshold: 5 })).toEqual([]);
  });

  it('is found when errors are given too small, and then only by its shape', async () => {
    const series = makeSeries(1, month);
    const brave = { ...series, error: series.error.map((error) => error / 10) };
    expect(await findEvents(brave)).toEqual([]);
    const [event] = await findEvents({ ...makeSeries(1, month, [boxDip(1008, 0.3, 0.006)]), error: brave.error });
    // Ten times the significance over ten times the noise.
    expect(event!.signalToNoise).toBeLessThan(40);
  });
});

describe('what is no transit', () => {
  const short = month.map((time) => (time > 1013.5 ? time - 1 : time));

  it.each([
    ['down', -0.01],
    ['up', 0.01],
  ])('is flagged at the edge where the level jumps %s in a gap', async (_, step) => {
    const events = await findEvents(makeSeries(11, short, [], { added: (time) => (time > 1013.1 ? step : 0) }));
    expect(events.length).toBeGreaterThan(0);
    expect(events.every(({ isAtEdge }) => isAtEdge)).toBe(true);
  });

  it('is left out where the level jumps without a gap', async () => {
    expect(await findEvents(makeSeries(12, month, [], { added: (time) => (time > 1007 ? -0.01 : 0) }))).toEqual([]);
  });

  it('is flagged at the edge where the flux settles after a start', async () => {
    const added = (time: number) => -0.02 * Math.exp(-(time - 1000) / 0.3);
    const events = await findEvents(makeSeries(13, month, [], { added }));
    expect(events.length).toBeGreaterThan(0);
    expect(events.every(({ isAtEdge }) => isAtEdge)).toBe(true);
  });

  it.each([
    ['a steady slope', (time: number) => 0.05 * (time - 1000)],
    ['a lone low point', (_: number, i: number) => (i === 900 ? -0.05 : 0)],
    ['a lone high point', (_: number, i: number) => (i === 900 ? 5 : 0)],
    ['a flare', (time: number) => (time > 1007 ? 0.05 * Math.exp(-(time - 1007) / 0.1) : 0)],
    ['rotation', (time: number) => 0.02 * Math.sin(time * Math.PI)],
  ])('is left out: %s', async (_, added) => {
    expect(await findEvents(makeSeries(14, month, [], { added }))).toEqual([]);
  });

  it('does not hide the event beside it: a lone low point', async () => {
    const series = makeSeries(15, month, [boxDip(1008, 0.3, 0.006)], { added: (_, i) => (i === 1170 ? -0.2 : 0) });
    const [event, ...others] = await findEvents(series);
    expect(others).toEqual([]);
    expect(Math.abs(event!.timeDays - 1008)).toBeLessThan(3 * event!.timeErrorDays);
  });
});

describe('the list of events', () => {
  it('is the strongest twenty, none overlapping', async () => {
    const time = sampleSpans([[0, 200]]);
    const dips = Array.from({ length: 25 }, (_, i) => boxDip(7.6 * (i + 1), 0.2, 0.01 + 0.001 * i));
    const events = await findEvents(makeSeries(21, time, dips));
    expect(events).toHaveLength(20);
    events.forEach(({ timeDays, signalToNoise, durationDays }, i) => {
      if (i === 0) return;
      expect(signalToNoise).toBeLessThanOrEqual(events[i - 1]!.signalToNoise);
      for (const other of events.slice(0, i))
        expect(Math.abs(other.timeDays - timeDays)).toBeGreaterThan((other.durationDays + durationDays) / 2);
    });
    expect(events.every(({ timeDays }) => timeDays > 7.6 * 5.5)).toBe(true);
  });

  it('leaves masked signals out', async () => {
    const series = makeSeries(22, month, [boxDip(1005, 0.3, 0.01), boxDip(1009, 0.3, 0.008)]);
    const masked = [{ periodDays: 100, epochDays: 1005, durationDays: 0.3 }];
    expect((await findEvents(series)).map(({ timeDays }) => Math.round(timeDays))).toEqual([1005, 1009]);
    expect((await findEvents(series, { masked })).map(({ timeDays }) => Math.round(timeDays))).toEqual([1009]);
  });

  it('uses the durations that are given, and lists those that were searched', async () => {
    const outcome = await tryEvents(makeSeries(23, month), { durationsDays: [0.5, 0.1, 20, 0.1] });
    expect(outcome).toMatchObject({ kind: 'done', value: { durationsDays: [0.1, 0.5], key: 'k' } });
  });
});

describe('a series that cannot be searched', () => {
  const points = (time: readonly number[]) => ({
    seriesId: 's',
    time: Float64Array.from(time),
    flux: new Float64Array(time.length).fill(1),
    error: new Float64Array(time.length).fill(SIGMA),
  });

  it.each([
    ['none', [], 'at least 10 points'],
    ['three', [1, 2, 3], 'this series has 3'],
    ['one time', new Array(12).fill(5), 'the same time'],
    ['few', Array.from({ length: 20 }, (_, i) => i * 0.02), 'too few'],
  ])('fails with a sentence: %s', async (_, time, sentence) => {
    const outcome = await tryEvents(points(time));
    expect(outcome).toMatchObject({ kind: 'failed', error: { sentence: expect.stringContaining(sentence) } });
  });

  it.each([
    ['threshold', { threshold: Number.NaN }],
    ['density', { densityCgs: -1 }],
    ['durations', { durationsDays: [0.1, 0] }],
    ['no durations', { durationsDays: [] }],
    ['too long durations', { durationsDays: [9] }],
  ])('fails with a sentence on a wrong %s', async (_, settings) => {
    expect((await tryEvents(makeSeries(1, month), settings)).kind).toBe('failed');
  });

  it('takes no notice of values that are not numbers, absurd errors and absurd fluxes', async () => {
    const series = makeSeries(24, month, [boxDip(1008, 0.3, 0.008)]);
    series.flux[40] = Number.NaN;
    series.error[60] = 0;
    series.error[80] = 1e-30;
    series.error[90] = Number.POSITIVE_INFINITY;
    series.flux[500] = 1e12;
    series.flux[700] = -1e12;
    const [event, ...others] = await findEvents(series);
    expect(others).toEqual([]);
    expect(event!.timeDays).toBeCloseTo(1008, 1);
    expect(Math.abs(event!.depth - 0.008)).toBeLessThan(3.5 * event!.depthError);
  });

  it('finds nothing in a flux that never changes', async () => {
    expect(await findEvents({ ...makeSeries(1, month), flux: new Float64Array(month.length).fill(1) })).toEqual([]);
  });

  it('hears a cancel', async () => {
    const settings = { ...DEFAULT_SINGLE_EVENTS };
    const eager = { ...createCheckpoint(() => true), isDue: () => true };
    expect(await findSingleEvents(makeSeries(1, month), { key: 'k', settings }, eager)).toEqual({ kind: 'cancelled' });
  });
});
