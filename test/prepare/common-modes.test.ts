import { describe, expect, it } from 'vitest';
import type { ModeStar } from '../../src/contract/prepare-contract.ts';
import { modeAt } from '../../workers/prepare/common-modes.ts';
import { latticeOf, rowOf } from '../../workers/prepare/mode-lattice.ts';
import { createPrepareService } from '../../workers/prepare/prepare-service.ts';
import { expectDone } from '../search/search-box.ts';
import { awayFrom, noisy, times } from './noisy-series.ts';

const time = times(12, 1 / 48);
const first = (t: number): number => 0.003 * Math.sin(t);
const second = (t: number): number => (t > 6 ? 0.004 * Math.exp(-(t - 6)) : 0);
const star = (number: number, own: (t: number) => number = () => 0, at = time): ModeStar => ({
  time: at,
  flux: noisy(
    at,
    `star ${number}`,
    (t) => (0.5 + 0.1 * (number % 7)) * first(t) + (number % 4) * 0.8 * second(t) + own(t),
  ),
  masked: [],
});
const stars = Array.from({ length: 12 }, (_, i) => star(i));
const find = (given: readonly ModeStar[], modeCount = 2) =>
  createPrepareService().findCommonModes({ jobId: 'm', key: 'm', stars: given, modeCount });

function correlate(a: ArrayLike<number>, b: ArrayLike<number>): number {
  const centre = (x: ArrayLike<number>) => {
    const values = Float64Array.from(x);
    const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
    return values.map((value) => value - mean);
  };
  const dot = (x: Float64Array, y: Float64Array) => x.reduce((sum, value, i) => sum + value * y[i]!, 0);
  const [p, q] = [centre(a), centre(b)];
  return dot(p, q) / Math.sqrt(dot(p, p) * dot(q, q));
}

/** Share of a shape's variance that two orthogonal modes carry. */
const sharedBy = (modes: readonly Float64Array[], shape: ArrayLike<number>): number =>
  modes.reduce((sum, mode) => sum + correlate(mode, shape) ** 2, 0);

describe('common modes', () => {
  it('span the shapes that the stars were given, of zero mean and unit scatter, strongest first', async () => {
    const modes = expectDone(await find(stars));
    expect(modes).toMatchObject({ key: 'm', starsUsed: 12 });
    expect(sharedBy(modes.modes, time.map(first))).toBeGreaterThan(0.98);
    expect(sharedBy(modes.modes, time.map(second))).toBeGreaterThan(0.95);
    expect(modes.explained[0]!).toBeGreaterThan(modes.explained[1]!);
    for (const mode of modes.modes) {
      expect(mode.reduce((sum, value) => sum + value, 0) / mode.length).toBeCloseTo(0, 10);
      expect(mode.reduce((sum, value) => sum + value * value, 0) / mode.length).toBeCloseTo(1, 10);
    }
  });

  it('leave out stars that are loud or vary by themselves', async () => {
    const loud = star(20, (t) => 0.1 * Math.sin(9 * t));
    const own = star(24, (t) => 0.006 * Math.sin((2 * Math.PI * t) / 0.7));
    const modes = expectDone(await find([...stars, loud, own]));
    expect(modes.starsUsed).toBe(12);
    const pulse = time.map((t) => Math.sin((2 * Math.PI * t) / 0.7));
    expect(sharedBy(modes.modes, pulse)).toBeLessThan(0.01);
  });

  it('do not know the masked events, though every star had them at once', async () => {
    const dip = (t: number): number => (awayFrom(t, 2, 1) < 0.1 ? -0.01 : 0);
    const eclipsed = stars.map((_, i) => star(i, dip));
    const masked = [{ periodDays: 2, epochDays: 1, durationDays: 0.2 }];
    const open = expectDone(await find(eclipsed, 3));
    const closed = expectDone(
      await find(
        eclipsed.map((one) => ({ ...one, masked })),
        3,
      ),
    );
    const shape = time.map((t) => (awayFrom(t, 2, 1) < 0.1 ? 1 : 0));
    expect(sharedBy(open.modes, shape)).toBeGreaterThan(0.3);
    expect(sharedBy(closed.modes, shape)).toBeLessThan(0.05);
  });

  it('are found on one lattice for stars of other cadences, with gaps and missing points', async () => {
    const fine = times(12, 1 / 480);
    const holed = time.filter((t) => t < 4 || t > 4.6);
    const mixed = stars.map((one, i) =>
      i % 3 === 0 ? star(i, undefined, fine) : i % 3 === 1 ? star(i, undefined, holed) : one,
    );
    mixed[2]!.flux[100] = Number.NaN;
    const modes = expectDone(await find(mixed));
    expect(modes.starsUsed).toBe(12);
    expect(modes.time[1]! - modes.time[0]!).toBeCloseTo(1 / 48, 9);
    expect(sharedBy(modes.modes, modes.time.map(first))).toBeGreaterThan(0.97);
    expect(modes.modes.every((mode) => mode.every(Number.isFinite))).toBe(true);
  });

  it('keep no times that most stars do not have', () => {
    const late = stars.map((one, i) => ({ ...one, time: one.time.map((t) => (i < 10 ? t : t + 400)) }));
    const lattice = latticeOf(late);
    expect(lattice.time).toHaveLength(time.length);
    expect(rowOf(late[11]!, lattice)).toBeUndefined();
    expect(rowOf(late[0]!, lattice)!.coverage).toBe(1);
  });

  it.each([
    ['too few stars', stars.slice(0, 7)],
    ['no stars', []],
    ['stars without common times', stars.map((one, i) => ({ ...one, time: one.time.map((t) => t + 100 * i) }))],
    ['constant stars', stars.map((one) => ({ ...one, flux: one.flux.map(() => 1) }))],
    [
      'stars of one point',
      stars.map((one) => ({ ...one, time: one.time.subarray(0, 1), flux: one.flux.subarray(0, 1) })),
    ],
  ])('are refused with a sentence for %s', async (_, given) => {
    const outcome = await find(given);
    expect(outcome).toMatchObject({ kind: 'failed', error: { sentence: expect.stringContaining('8 quiet stars') } });
  });

  it('hear a cancel', async () => {
    const service = createPrepareService();
    const many = Array.from({ length: 100 }, (_, i) => star(i, undefined, times(12, 1 / 240)));
    const running = service.findCommonModes({ jobId: 'm', key: 'm', stars: many, modeCount: 2 });
    await service.cancel('m');
    expect(await running).toEqual({ kind: 'cancelled' });
  });
});

describe('a mode at other times', () => {
  const grid = Float64Array.of(0, 1, 2, 3, 9, 10, 11);
  const mode = Float64Array.of(0, 10, 20, 30, 90, 100, 110);

  it('is linear between the lattice’s, and unknown away from them', () => {
    const at = Float64Array.of(-5, -0.5, 0, 0.25, 2.5, 3.5, 6, 8.5, 11, 11.5, 14);
    const values = modeAt({ time: grid }, mode, at);
    expect([...values]).toEqual([Number.NaN, 0, 0, 2.5, 25, 30, Number.NaN, 90, 110, 110, Number.NaN]);
    expect([...modeAt({ time: new Float64Array(0) }, new Float64Array(0), Float64Array.of(1))]).toEqual([Number.NaN]);
  });
});
