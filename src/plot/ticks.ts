import type { Span } from './span.ts';

export interface Ticks {
  readonly major: readonly number[];
  readonly minor: readonly number[];
  /** Between what neighbours the margin scale changes from filled to open: majors and one beyond each end. */
  readonly segments: readonly { readonly from: number; readonly to: number; readonly filled: boolean }[];
  /** Digits after the point that tell majors apart. */
  readonly decimals: number;
}

/** Ticks at 1, 2 or 5 times a power of ten, at most `greatestCount` of them where the span allows. */
export function linearTicks(domain: Span, greatestCount: number): Ticks {
  const step = stepFor(domain, greatestCount);
  return steppedTicks(domain, step, minorParts(step));
}

/** Ticks at the multiples of a step, each interval in so many parts. */
export function steppedTicks(domain: Span, step: number, parts: number): Ticks {
  const first = Math.ceil(domain[0] / step - 1e-9);
  const last = Math.floor(domain[1] / step + 1e-9);
  const major: number[] = [];
  for (let i = first; i <= last; i += 1) major.push(multiple(i, step));
  const minor: number[] = [];
  for (let i = (first - 1) * parts; i <= (last + 1) * parts; i += 1) {
    const value = multiple(i, step / parts);
    if (i % parts !== 0 && value >= domain[0] && value <= domain[1]) minor.push(value);
  }
  const segments = [];
  for (let i = first - 1; i <= last; i += 1) {
    segments.push({ from: multiple(i, step), to: multiple(i + 1, step), filled: Math.abs(i) % 2 === 0 });
  }
  return { major, minor, segments, decimals: decimalsOf(step) };
}

/** Ticks of a logarithmic axis at 1, 2 and 5, minor ones at every digit; linear ones where under two would show. */
export function logTicks(domain: Span, greatestCount: number): Ticks {
  const inside = (value: number) => value >= domain[0] * (1 - 1e-9) && value <= domain[1] * (1 + 1e-9);
  const decades = decadesOf(domain);
  const all = decades.flatMap((decade) => [1, 2, 5].map((digit) => digit * decade));
  const major = all.filter(inside);
  if (major.length < 3) return linearTicks(domain, Math.max(2, greatestCount));
  const minor = decades.flatMap((decade) => [3, 4, 6, 7, 8, 9].map((digit) => digit * decade)).filter(inside);
  const segments = all.slice(1).map((to, i) => ({ from: all[i]!, to, filled: i % 2 === 0 }));
  return { major, minor, segments, decimals: 0 };
}

/** As short as a value at 1, 2 or 5 can be said: 0.5, 20. */
export function shortestDecimals(value: number): number {
  return Math.max(0, Math.ceil(-Math.log10(Math.abs(value)) - 1e-9));
}

function decadesOf(domain: Span): number[] {
  const decades: number[] = [];
  const last = Math.ceil(Math.log10(domain[1]));
  for (let power = Math.floor(Math.log10(domain[0])); power <= last; power += 1) {
    decades.push(power < 0 ? 1 / 10 ** -power : 10 ** power);
  }
  return decades;
}

function stepFor(domain: Span, greatestCount: number): number {
  const rough = (domain[1] - domain[0]) / Math.max(1, greatestCount);
  const power = Math.floor(Math.log10(rough));
  for (const digit of [1, 2, 5, 10]) {
    const step = power < 0 ? digit / 10 ** -power : digit * 10 ** power;
    if (step >= rough * (1 - 1e-12)) return step;
  }
  return 10 ** (power + 1);
}

/** Fifteen digits: 3 * 0.1 is 0.3, and times of seven digits keep steps of 1e-8. */
function multiple(i: number, step: number): number {
  return Number((i * step).toPrecision(15));
}

function minorParts(step: number): number {
  const digit = Math.round(step / 10 ** Math.floor(Math.log10(step) + 1e-9));
  return digit === 2 ? 4 : 5;
}

/** Fewest decimals that print a step exactly: 2 for 0.25. */
function decimalsOf(step: number): number {
  const least = Math.max(0, Math.ceil(-Math.log10(step) - 1e-9));
  return Number(step.toFixed(least)) === Number(step.toPrecision(6)) ? least : least + 1;
}
