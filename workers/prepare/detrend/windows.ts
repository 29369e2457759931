/** Members first[i] to end[i] - 1 lie in the window around the i-th centre. */
export interface Windows {
  readonly first: Int32Array;
  readonly end: Int32Array;
}

/** Windows of full width `windowDays`, both ends included. @param members and @param centres ascending, days */
export function windowsAround(members: Float64Array, centres: Float64Array, windowDays: number): Windows {
  const windows = { first: new Int32Array(centres.length), end: new Int32Array(centres.length) };
  let first = 0;
  let end = 0;
  for (let i = 0; i < centres.length; i += 1) {
    const start = centres[i]! - windowDays / 2;
    const stop = centres[i]! + windowDays / 2;
    while (first < members.length && members[first]! < start) first += 1;
    end = Math.max(end, first);
    while (end < members.length && members[end]! <= stop) end += 1;
    windows.first[i] = first;
    windows.end[i] = end;
  }
  return windows;
}
