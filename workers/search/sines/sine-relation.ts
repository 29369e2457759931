/** Frequencies within this many resolution elements 1/span are one. */
const ELEMENTS = 1.5;

/** How a frequency follows from earlier ones ("2 f1", "f1 + f2", "f1 + 1/d"); undefined: it does not. */
export function relateSine(
  frequency: number,
  earlier: readonly number[],
  { spanDays, windowFrequencies }: { readonly spanDays: number; readonly windowFrequencies: readonly number[] },
): string | undefined {
  const isNear = (other: number): boolean => Math.abs(frequency - other) < ELEMENTS / spanDays;
  for (const [index, base] of earlier.entries()) {
    const name = `f${index + 1}`;
    if (isNear(base)) return `beside ${name}`;
    for (const factor of [2, 3, 4]) if (isNear(factor * base)) return `${factor} ${name}`;
    for (const factor of [2, 3]) if (isNear(base / factor)) return `${name} / ${factor}`;
    for (const [other, second] of earlier.slice(0, index).entries()) {
      if (isNear(base + second)) return `f${other + 1} + ${name}`;
      if (isNear(Math.abs(base - second))) return `f${other + 1} − ${name}`;
    }
    for (const window of windowFrequencies) {
      const words = `${Number(window.toFixed(2))} per day`;
      if (isNear(base + window)) return `${name} + ${words}, an alias`;
      if (isNear(Math.abs(base - window))) return `${name} − ${words}, an alias`;
    }
  }
  return undefined;
}
