import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { makeFrame } from '../../src/plot/frame.ts';
import { columnExtremes, highestNear } from '../../src/plot/periodogram-layer.ts';
import { ascendingPeriods } from '../../src/plot/periodogram-scene.ts';
import { toPx } from '../../src/plot/scale.ts';

const frame = makeFrame({
  widthPx: 110,
  heightPx: 100,
  margins: { left: 58, right: 12, top: 8, bottom: 22 },
  xDomain: [0.5, 40],
  yDomain: [0, 20],
  xKind: 'log',
});

describe('columnExtremes', () => {
  it('keeps lowest and highest of each pixel column, as the slow way does', () => {
    const sample = fc.tuple(
      fc.double({ min: 0.4, max: 50, noNaN: true }),
      fc.oneof(fc.double({ min: -3, max: 30, noNaN: true }), fc.constant(Number.NaN)),
    );
    fc.assert(
      fc.property(fc.array(sample, { maxLength: 400 }), (samples) => {
        // Adding 0 makes -0 into 0: which of the two a minimum is makes no picture different.
        const sorted = samples.map(([period, value]) => [period, value + 0] as const).toSorted((a, b) => a[0] - b[0]);
        const [periods, values] = [Float64Array.from(sorted, (s) => s[0]), Float64Array.from(sorted, (s) => s[1])];
        const { lowest, highest } = columnExtremes(periods, values, frame);
        for (let column = 0; column < lowest.length; column += 1) {
          const inside = sorted.filter(([period, value]) => {
            const place = Math.min(lowest.length - 1, Math.floor(toPx(frame.x, period) - frame.left));
            return period >= 0.5 && period <= 40 && place === column && !Number.isNaN(value);
          });
          const all = inside.map(([, value]) => value);
          expect(lowest[column]).toBe(all.length > 0 ? Math.min(...all) : Number.NaN);
          expect(highest[column]).toBe(all.length > 0 ? Math.max(...all) : Number.NaN);
        }
      }),
      { numRuns: 40 },
    );
  });
});

describe('highestNear', () => {
  const periods = Float64Array.from({ length: 4000 }, (_, i) => 0.5 * 80 ** (i / 3999));
  const values = periods.map(() => 2);
  values[2000] = 18;

  it('snaps to a peak within reach and to nothing further', () => {
    const at = toPx(frame.x, periods[2000]!);
    expect(highestNear(frame, periods, values, at + 2.5, 3)).toBe(2000);
    expect(highestNear(frame, periods, values, at - 2.5, 3)).toBe(2000);
    expect(highestNear(frame, periods, values, at + 4, 3)).not.toBe(2000);
    expect(highestNear(frame, new Float64Array(0), new Float64Array(0), at, 3)).toBeUndefined();
  });
});

describe('ascendingPeriods', () => {
  it('turns a search that went from long to short, values with periods', () => {
    const turned = ascendingPeriods(Float64Array.of(9, 3, 1), Float64Array.of(90, 30, 10));
    expect([[...turned.periods], [...turned.values]]).toEqual([
      [1, 3, 9],
      [10, 30, 90],
    ]);
  });
});
