import type { PeakRelation } from '../../src/contract/search-contract.ts';
import type { Ephemeris } from '../../src/core/ephemeris.ts';
import { isSameSignal } from '../../src/core/same-signal.ts';

/** Whole-number ratios up to this are told from chance. */
const MOST_RATIO = 7;
const MOST_DAILY = 3;
/** Aliases are looked for within this many resolution elements 1/span. */
const ALIAS_ELEMENTS = 1.5;

export interface Sampling {
  readonly spanDays: number;
  /** Per day, of the spectral window. */
  readonly windowFrequencies: readonly number[];
}

/** How a weaker peak may follow from a stronger one by its period alone, with the reason; undefined: not at all. */
export function relatePeriods(
  main: Ephemeris,
  other: Ephemeris,
  sampling: Sampling,
): { relation: PeakRelation; reason: string } | undefined {
  return relateByRatio(main, other, sampling.spanDays) ?? relateByAlias(main, other, sampling);
}

function relateByRatio(main: Ephemeris, other: Ephemeris, spanDays: number) {
  for (let below = 1; below <= MOST_RATIO; below += 1)
    for (let above = 1; above <= MOST_RATIO; above += 1) {
      if (above === below || divide(above, below)) continue;
      const periodDays = (main.periodDays * above) / below;
      if (!isSameSignal({ ...other, periodDays }, other, spanDays)) continue;
      return { relation: nameOf(above, below), reason: `Its period is ${above}/${below} of ${days(main.periodDays)}.` };
    }
  return undefined;
}

function nameOf(above: number, below: number): PeakRelation {
  if (below === 1) return `${above}P`;
  return above === 1 ? `P/${below}` : `${above}P/${below}`;
}

/** Whether both share a divisor. */
const divide = (a: number, b: number): boolean => [2, 3, 5, 7].some((prime) => a % prime === 0 && b % prime === 0);

function relateByAlias(main: Ephemeris, other: Ephemeris, { spanDays, windowFrequencies }: Sampling) {
  const difference = Math.abs(1 / other.periodDays - 1 / main.periodDays);
  const sum = 1 / other.periodDays + 1 / main.periodDays;
  const width = ALIAS_ELEMENTS / spanDays;
  for (const window of windowFrequencies)
    for (let order = 1; order <= MOST_DAILY; order += 1) {
      const shift = order * window;
      if (Math.abs(difference - shift) > width && Math.abs(sum - shift) > width) continue;
      const isDaily = Math.abs(shift - Math.round(shift)) < 0.01 && Math.round(shift) > 0;
      const relation: PeakRelation = isDaily ? 'daily alias' : 'window alias';
      return {
        relation,
        reason: `Its frequency lies ${shift.toFixed(3)} per day from that of ${days(main.periodDays)}, where the sampling repeats itself.`,
      };
    }
  return undefined;
}

const days = (value: number): string => `${Number(value.toPrecision(6))} d`;
