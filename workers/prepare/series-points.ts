/** The points of a series that are worked on, all arrays of one length, ascending in time. */
export interface SeriesPoints {
  readonly time: Float64Array;
  /** Relative flux. */
  readonly raw: Float64Array;
  readonly error: Float64Array | undefined;
  /** Index of each in the light curve. */
  readonly sourceIndex: Int32Array;
  /** 1 where a point carries no weight in a trend and is never left out for its flux. */
  readonly isProtected: Uint8Array;
}

export function pickPoints(points: SeriesPoints, indices: Int32Array): SeriesPoints {
  return {
    time: pick(points.time, indices),
    raw: pick(points.raw, indices),
    error: points.error && pick(points.error, indices),
    sourceIndex: indices.map((i) => points.sourceIndex[i]!),
    isProtected: Uint8Array.from(indices, (i) => points.isProtected[i]!),
  };
}

export function pick(values: Float64Array, indices: Int32Array): Float64Array {
  const picked = new Float64Array(indices.length);
  for (let i = 0; i < picked.length; i += 1) picked[i] = values[indices[i]!]!;
  return picked;
}

/** Indices at which a mark is set or not. */
export function indicesWhere(marks: Uint8Array, value: 0 | 1): Int32Array {
  return Int32Array.from(marks.keys()).filter((i) => marks[i] === value);
}

/** Where the segments of the file begin among the points, without the first. */
export function segmentsAmong(segmentStarts: Int32Array, sourceIndex: Int32Array): number[] {
  const starts: number[] = [];
  let i = 0;
  for (const start of segmentStarts) {
    while (i < sourceIndex.length && sourceIndex[i]! < start) i += 1;
    if (i > 0 && i < sourceIndex.length && starts.at(-1) !== i) starts.push(i);
  }
  return starts;
}

/** 1 where a point has weight in a fit. */
export const weightsOf = (isProtected: Uint8Array): Uint8Array => isProtected.map((own) => 1 - own);
