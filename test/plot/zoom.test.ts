import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Span } from '../../src/plot/span.ts';
import { clampSpan, expSpan, logSpan, panSpan, zoomSpan } from '../../src/plot/zoom.ts';

const wholes = fc.tuple(
  fc.double({ min: -1e6, max: 3e6, noNaN: true }),
  fc.double({ min: 0.01, max: 1e5, noNaN: true }),
);
const anything = fc.double({ min: -1e9, max: 1e9, noNaN: true });

function expectInside(span: Span, whole: Span): void {
  const slack = 1e-9 * Math.max(1, Math.abs(whole[0]), Math.abs(whole[1]));
  expect(span[1]).toBeGreaterThan(span[0]);
  expect(span[0]).toBeGreaterThanOrEqual(whole[0] - slack);
  expect(span[1]).toBeLessThanOrEqual(whole[1] + slack);
}

describe('zoom arithmetic', () => {
  it('stays inside the data and never degenerates under any run of zooms and pans', () => {
    const acts = fc.array(fc.tuple(fc.boolean(), anything, fc.double({ min: -60, max: 60, noNaN: true })), {
      maxLength: 40,
    });
    fc.assert(
      fc.property(wholes, acts, ([first, width], steps) => {
        const whole: Span = [first, first + width];
        let span = whole;
        for (const [pans, at, power] of steps) {
          span = pans ? panSpan(span, whole, at) : zoomSpan(span, whole, at, 2 ** power);
          expectInside(span, whole);
        }
      }),
    );
  });
  it('keeps the value under the pointer where it is', () => {
    const span = zoomSpan([0, 100], [0, 100], 30, 4);
    expect(span[1] - span[0]).toBeCloseTo(25, 12);
    expect((30 - span[0]) / 25).toBeCloseTo(0.3, 12);
  });
  it('undoes itself away from the ends', () => {
    const back = zoomSpan(zoomSpan([40, 60], [0, 100], 47, 3), [0, 100], 47, 1 / 3);
    expect(back[0]).toBeCloseTo(40, 10);
    expect(back[1]).toBeCloseTo(60, 10);
  });
  it('pans no further than the ends, with the width kept', () => {
    expect(panSpan([10, 20], [0, 100], -50)).toEqual([0, 10]);
    expect(panSpan([10, 20], [0, 100], 500)).toEqual([90, 100]);
    expect(clampSpan([-10, 300], [0, 100])).toEqual([0, 100]);
  });
  it('zooms periods by their logarithms', () => {
    const whole = logSpan([0.5, 50]);
    const [first, last] = expSpan(zoomSpan(whole, whole, Math.log(5), 2));
    expect(first).toBeCloseTo(5 / Math.sqrt(10), 10);
    expect(last).toBeCloseTo(5 * Math.sqrt(10), 10);
  });
});
