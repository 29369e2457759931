import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { fitPeriodToTimes } from '../../src/core/period-from-times.ts';
import { shortestUnseenPeriod } from '../../src/core/shortest-unseen-period.ts';

describe('period from marked dips', () => {
  it('finds the longest period of which all times are whole cycles', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 20, noNaN: true }),
        fc.uniqueArray(fc.integer({ min: 0, max: 12 }), { minLength: 2, maxLength: 6 }),
        (period, cycles) => {
          const fit = fitPeriodToTimes(
            cycles.map((cycle) => 100 + cycle * period),
            0.1,
          )!;
          const steps = cycles.map((cycle) => (cycle - cycles[0]!) * period);
          for (const step of steps) {
            const turns = step / fit.periodDays;
            expect(Math.abs(turns - Math.round(turns)) * fit.periodDays).toBeLessThan(0.051);
          }
          expect(fit.periodDays).toBeGreaterThan(period * 0.999);
        },
      ),
    );
  });

  it('has none for one time, for the same time twice, or for dips closer than a transit can repeat', () => {
    expect(fitPeriodToTimes([3], 0.1)).toBeUndefined();
    expect(fitPeriodToTimes([3, 3], 0.1)).toBeUndefined();
    expect(fitPeriodToTimes([0, 0.3, 0.65], 0.1)).toBeUndefined();
  });
});

describe('shortest period of a single event', () => {
  const covered = Float64Array.from({ length: 1000 }, (_, i) => i / 20);

  it('reaches the end of unbroken data', () => {
    expect(shortestUnseenPeriod(covered, 10, 0.4)).toBeGreaterThan(39.5);
    expect(shortestUnseenPeriod(covered, 10, 0.4)).toBeLessThan(41);
  });

  it('is a period at which no other event would be seen, nor at any longer one', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 5, max: 45, noNaN: true }),
        fc.double({ min: 0, max: 40, noNaN: true }),
        (event, gap) => {
          const time = covered.filter((t) => t < gap || t > gap + 8);
          const period = shortestUnseenPeriod(time, event, 0.4);
          for (let longer = period; longer < 60; longer += 0.2)
            for (const other of [event - longer, event + longer])
              expect(time.filter((t) => Math.abs(t - other) <= 0.1).length).toBeLessThan(3);
        },
      ),
      { numRuns: 50 },
    );
  });
});
