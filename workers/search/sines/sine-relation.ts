import { windowFrequencies } from '../window-frequencies.ts';
import type { WeightedSeries } from './weighted-series.ts';

/** Frequencies within this many resolution elements 1 / span are one. */
const ELEMENTS = 1.5;
const MOST_DAILY = 3;
/** Below this part of the window's power at zero an alias is lost in noise. */
const LEAST_WINDOW_POWER = 0.15;

export interface SineSampling {
  readonly spanDays: number;
  /** Per day, at which the sampling repeats itself. */
  readonly windowFrequencies: readonly number[];
}

/** The strongest frequencies of the spectral window, and those of the day and its parts that are in it. */
export function sampleWindow(series: WeightedSeries): SineSampling {
  const { spanDays } = series;
  const daily = Array.from({ length: MOST_DAILY }, (_, k) => k + 1).filter(
    (perDay) => spanDays > 2 * ELEMENTS && windowPower(series, perDay) > LEAST_WINDOW_POWER,
  );
  const others = windowFrequencies(series.time).filter((other) => !daily.some((own) => isNear(own, other, spanDays)));
  return { spanDays, windowFrequencies: [...daily, ...others] };
}

const isNear = (a: number, b: number, spanDays: number): boolean => Math.abs(a - b) < ELEMENTS / spanDays;

/** |sum w exp(2 pi i f t)|^2: 1 where all times lie at one phase. */
function windowPower({ time, weight }: WeightedSeries, frequencyPerDay: number): number {
  let real = 0;
  let imaginary = 0;
  for (let i = 0; i < time.length; i += 1) {
    const turns = frequencyPerDay * time[i]!;
    const angle = 2 * Math.PI * (turns - Math.round(turns));
    real += weight[i]! * Math.cos(angle);
    imaginary += weight[i]! * Math.sin(angle);
  }
  return real * real + imaginary * imaginary;
}

/**
 * How a frequency follows from earlier ones ("2 f1", "f1 + f2", "f1 + 1 / d, an alias"); undefined: it does not. What
 * lies within a resolution element of zero is no frequency that anything could follow from.
 */
export function relateSine(
  frequency: number,
  earlier: readonly number[],
  { spanDays, windowFrequencies }: SineSampling,
): string | undefined {
  const isAt = (other: number): boolean =>
    Math.abs(other) > ELEMENTS / spanDays && isNear(frequency, Math.abs(other), spanDays);
  const isBeside = (base: number): boolean => isNear(frequency, base, spanDays);
  const [beside] = named(earlier).filter(({ base }) => isBeside(base));
  if (beside !== undefined) return `beside ${beside.name}`;
  return (
    named(earlier)
      .map((own) => nameMultiple(own, isAt))
      .find(isWord) ??
    pairs(earlier)
      .map((pair) => nameCombination(pair, isAt))
      .find(isWord) ??
    named(earlier)
      .map((own) => nameAlias(own, windowFrequencies, isAt))
      .find(isWord)
  );
}

interface Named {
  readonly name: string;
  readonly base: number;
}

const isWord = (word: string | undefined): word is string => word !== undefined;
const named = (earlier: readonly number[]): Named[] => earlier.map((base, index) => ({ name: `f${index + 1}`, base }));
const pairs = (earlier: readonly number[]): (readonly [Named, Named])[] =>
  named(earlier).flatMap((second, index, all) => all.slice(0, index).map((first) => [first, second] as const));

type IsAt = (frequency: number) => boolean;

function nameMultiple({ name, base }: Named, isAt: IsAt): string | undefined {
  if (isAt(2 * base)) return `2 ${name}`;
  if (isAt(3 * base)) return `3 ${name}`;
  return isAt(base / 2) ? `${name} / 2` : undefined;
}

function nameCombination([first, second]: readonly [Named, Named], isAt: IsAt): string | undefined {
  if (isAt(first.base + second.base)) return `${first.name} + ${second.name}`;
  const [high, low] = first.base > second.base ? [first, second] : [second, first];
  return isAt(high.base - low.base) ? `${high.name} − ${low.name}` : undefined;
}

function nameAlias({ name, base }: Named, windows: readonly number[], isAt: IsAt): string | undefined {
  for (const window of windows) {
    const words = Number.isInteger(window) ? `${window} / d` : `${Number(window.toPrecision(3))} / d`;
    if (isAt(base + window)) return `${name} + ${words}, an alias`;
    if (isAt(base - window)) return base > window ? `${name} − ${words}, an alias` : `${words} − ${name}, an alias`;
  }
  return undefined;
}
