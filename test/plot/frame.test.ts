import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { makeFrame } from '../../src/plot/frame.ts';
import { linearScale, logScale, toPx, toValue } from '../../src/plot/scale.ts';
import { wideSpan } from '../../src/plot/span.ts';

const finite = (least: number, most: number) => fc.double({ min: least, max: most, noNaN: true });

describe('scales', () => {
  it('gives back the value that a linear pixel came from', () => {
    fc.assert(
      fc.property(finite(-3e6, 3e6), finite(1e-3, 1e5), finite(0, 1), (first, width, place) => {
        const scale = linearScale([first, first + width], [58, 756]);
        const value = first + place * width;
        expect(Math.abs(toValue(scale, toPx(scale, value)) - value)).toBeLessThanOrEqual(
          1e-9 * Math.max(1, Math.abs(value)),
        );
      }),
    );
  });
  it('gives back the period that a logarithmic pixel came from', () => {
    fc.assert(
      fc.property(finite(1e-3, 10), finite(1.01, 1e5), finite(0, 1), (first, ratio, place) => {
        const scale = logScale([first, first * ratio], [58, 756]);
        const value = first * ratio ** place;
        expect(toValue(scale, toPx(scale, value)) / value).toBeCloseTo(1, 10);
      }),
    );
  });
  it('keeps order and stays inside the range', () => {
    const scale = linearScale([2, 4], [100, 0]);
    expect([2, 3, 4].map((value) => toPx(scale, value))).toEqual([100, 50, 0]);
    expect(toPx(logScale([1, 100], [0, 10]), 10)).toBeCloseTo(5, 12);
  });
  it('never degenerates, whatever the data', () => {
    fc.assert(
      fc.property(fc.double(), fc.double(), (a, b) => {
        const [first, last] = wideSpan(a, b);
        expect(last).toBeGreaterThan(first);
        const scale = linearScale([a, b], [0, 700]);
        expect(Number.isFinite(scale.slope)).toBe(true);
        expect(Number.isFinite(logScale([a, b], [0, 700]).slope)).toBe(true);
      }),
    );
  });
});

describe('makeFrame', () => {
  const margins = { left: 58, right: 12, top: 8, bottom: 22 };
  it('puts the ends of its domains on the edges of the plot area, y upwards', () => {
    const frame = makeFrame({ widthPx: 768, heightPx: 182, margins, xDomain: [10, 20], yDomain: [-1, 1] });
    expect([toPx(frame.x, 10), toPx(frame.x, 20)]).toEqual([58, 756]);
    expect([toPx(frame.y, -1), toPx(frame.y, 1)]).toEqual([160, 8]);
  });
  it('keeps a plot area in a pane too small for its margins', () => {
    const frame = makeFrame({ widthPx: 20, heightPx: 5, margins, xDomain: [0, 1], yDomain: [0, 1] });
    expect(frame.right).toBeGreaterThan(frame.left);
    expect(frame.bottom).toBeGreaterThan(frame.top);
  });
});
