/** The median of values first to end - 1 as both limits move on. */
export interface SlidingMedian {
  /** Limits never move back. */
  moveTo(first: number, end: number): void;
  /** The mean of the middle two for an even count; NaN when empty. */
  median(): number;
}

/**
 * Counts of the window's members by their rank among all values, in a binary indexed tree (Fenwick 1994, Softw. Pract.
 * Exper. 24, 327): each step costs the logarithm of the length, whatever the width.
 *
 * @param values without NaN; left as they are
 */
export function createSlidingMedian(values: Float64Array): SlidingMedian {
  const n = values.length;
  const order = Uint32Array.from(values.keys()).sort((a, b) => values[a]! - values[b]! || a - b);
  const rank = new Uint32Array(n);
  for (let i = 0; i < n; i += 1) rank[order[i]!] = i;
  const tree = new Int32Array(n + 1);
  const highest = 2 ** Math.floor(Math.log2(Math.max(1, n)));
  let [first, end] = [0, 0];
  const change = (index: number, by: number): void => {
    for (let node = rank[index]! + 1; node <= n; node += node & -node) tree[node] = tree[node]! + by;
  };
  /** The k-th smallest of the window, from 0. */
  const select = (k: number): number => {
    let node = 0;
    let left = k;
    for (let step = highest; step > 0; step >>= 1) {
      if (node + step > n || tree[node + step]! > left) continue;
      node += step;
      left -= tree[node]!;
    }
    return values[order[node]!]!;
  };
  return {
    moveTo: (nextFirst, nextEnd) => {
      for (; end < nextEnd; end += 1) change(end, 1);
      for (; first < nextFirst; first += 1) change(first, -1);
    },
    median: () => {
      const count = end - first;
      if (count === 0) return Number.NaN;
      const upper = select(count >> 1);
      return count % 2 === 1 ? upper : (select((count >> 1) - 1) + upper) / 2;
    },
  };
}
