import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { linearTicks, logTicks, steppedTicks } from '../../src/plot/ticks.ts';

describe('linearTicks', () => {
  it('steps by 1, 2 or 5 times a power of ten, inside the domain, no more than asked', () => {
    const spans = fc.tuple(
      fc.double({ min: -3e6, max: 3e6, noNaN: true }),
      fc.double({ min: 1e-3, max: 1e6, noNaN: true }),
    );
    fc.assert(
      fc.property(spans, fc.integer({ min: 2, max: 20 }), ([first, width], count) => {
        const { major } = linearTicks([first, first + width], count);
        expect(major.length).toBeLessThanOrEqual(count + 1);
        for (const value of major) {
          expect(value).toBeGreaterThanOrEqual(first - 1e-9 * width - 1e-9);
          expect(value).toBeLessThanOrEqual(first + width + 1e-9 * width + 1e-9);
        }
        if (major.length < 2) return;
        const step = major[1]! - major[0]!;
        const digit = step / 10 ** Math.floor(Math.log10(step) + 1e-6);
        expect([1, 2, 5].some((wanted) => Math.abs(digit - wanted) < 1e-4)).toBe(true);
      }),
    );
  });
  it('prints as many decimals as the step has', () => {
    expect(linearTicks([1239.5, 1243], 8)).toMatchObject({
      major: [1239.5, 1240, 1240.5, 1241, 1241.5, 1242, 1242.5, 1243],
      decimals: 1,
    });
    expect(linearTicks([-8, 8], 8)).toMatchObject({ major: [-8, -6, -4, -2, 0, 2, 4, 6, 8], decimals: 0 });
    expect(linearTicks([0, 0.3], 3).major).toEqual([0, 0.1, 0.2, 0.3]);
    expect(steppedTicks([-0.25, 0.75], 0.25, 5)).toMatchObject({ major: [-0.25, 0, 0.25, 0.5, 0.75], decimals: 2 });
  });
  it('turns segments from filled to open at each major, over the whole domain, alike after a pan', () => {
    const { segments } = linearTicks([1203, 1247], 10);
    expect(segments[0]!.from).toBeLessThanOrEqual(1203);
    expect(segments.at(-1)!.to).toBeGreaterThanOrEqual(1247);
    segments.slice(1).forEach((segment, i) => {
      expect(segment.filled).not.toBe(segments[i]!.filled);
    });
    const later = linearTicks([1208, 1252], 10).segments.find((segment) => segment.from === 1210)!;
    expect(later.filled).toBe(segments.find((segment) => segment.from === 1210)!.filled);
  });
});

describe('logTicks', () => {
  it('stands at 1, 2 and 5', () => {
    expect(logTicks([0.5, 40], 10).major).toEqual([0.5, 1, 2, 5, 10, 20]);
    expect(logTicks([0.5, 40], 10).minor).toEqual(
      [0.6, 0.7, 0.8, 0.9, 3, 4, 6, 7, 8, 9, 30, 40].map((v) => expect.closeTo(v, 9)),
    );
  });
  it('falls back to even steps where 1, 2 and 5 would leave the axis bare', () => {
    const { major } = logTicks([7.2, 7.4], 6);
    expect(major.length).toBeGreaterThanOrEqual(2);
    expect(major.every((value) => value >= 7.2 && value <= 7.4)).toBe(true);
  });
});
