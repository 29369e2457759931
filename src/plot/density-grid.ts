import type { PixelBlock } from './draw-context.ts';
import type { Scale } from './scale.ts';

/** Counts of points per CSS pixel of a plot area, kept between frames so that a drag allocates nothing. */
export interface DensityGrid {
  width: number;
  height: number;
  counts: Uint32Array;
  /** Row of the lowest and of the highest value of each column, from 0 at the top; -1 where a column is empty. */
  lowestRow: Int32Array;
  highestRow: Int32Array;
  rgba: Uint8ClampedArray<ArrayBuffer>;
}

export function makeDensityGrid(): DensityGrid {
  return {
    width: 0,
    height: 0,
    counts: new Uint32Array(0),
    lowestRow: new Int32Array(0),
    highestRow: new Int32Array(0),
    rgba: new Uint8ClampedArray(0),
  };
}

/** Empties the grid and gives it a size in pixels. */
export function resetDensityGrid(grid: DensityGrid, width: number, height: number): void {
  if (grid.width !== width || grid.height !== height) {
    Object.assign(grid, makeDensityGrid(), { width, height });
    grid.counts = new Uint32Array(width * height);
    grid.lowestRow = new Int32Array(width);
    grid.highestRow = new Int32Array(width);
    grid.rgba = new Uint8ClampedArray(width * height * 4);
  }
  grid.counts.fill(0);
  grid.lowestRow.fill(-1);
  grid.highestRow.fill(-1);
}

/**
 * Adds points to the grid. Points left or right of it and NaN are passed over; points above or below count in its first
 * or last row, or are passed over too. Order does not matter, so a fold can be counted as it is.
 *
 * @param x, y length n, looked at from index `from` (included) to `to` (not)
 * @param xScale, yScale linear; the grid's corner is the start of xScale's range and the end of yScale's
 */
export function countPoints(
  grid: DensityGrid,
  x: Float64Array,
  y: Float64Array,
  from: number,
  to: number,
  xScale: Scale,
  yScale: Scale,
  outside: 'edge' | 'hide',
): void {
  const { width, height, counts, lowestRow, highestRow } = grid;
  const x0 = xScale.domain[0];
  const xSlope = xScale.slope;
  const yTop = yScale.domain[1];
  const ySlope = yScale.slope;
  const lastRow = height - 1;
  const hide = outside === 'hide';
  for (let i = from; i < to; i += 1) {
    const along = (x[i]! - x0) * xSlope;
    const depth = (y[i]! - yTop) * ySlope;
    if (!(along >= 0 && along < width) || Number.isNaN(depth)) continue;
    if (hide && (depth < 0 || depth > height)) continue;
    // Both are positive here, where cutting the fraction off is the floor and keeps the loop in integers.
    const column = along | 0;
    const row = depth <= 0 ? 0 : depth >= lastRow ? lastRow : depth | 0;
    counts[row * width + column]! += 1;
    if (row > lowestRow[column]!) lowestRow[column] = row;
    if (highestRow[column]! < 0 || row < highestRow[column]!) highestRow[column] = row;
  }
}

/** Colours the grid: logarithm of the count along the ramp, lowest and highest of each column in `extreme`. */
export function paintDensity(grid: DensityGrid, ramp: Uint32Array, extreme: number): PixelBlock {
  const { width, height, counts, lowestRow, highestRow, rgba } = grid;
  const pixels = new Uint32Array(rgba.buffer);
  const colours = coloursByCount(counts, ramp);
  for (let cell = 0; cell < counts.length; cell += 1) pixels[cell] = colours[counts[cell]!]!;
  for (let column = 0; column < width; column += 1) {
    if (lowestRow[column]! < 0) continue;
    pixels[lowestRow[column]! * width + column] = extreme;
    pixels[highestRow[column]! * width + column] = extreme;
  }
  return { width, height, rgba };
}

function coloursByCount(counts: Uint32Array, ramp: Uint32Array): Uint32Array {
  let most = 1;
  for (let cell = 0; cell < counts.length; cell += 1) if (counts[cell]! > most) most = counts[cell]!;
  const colours = new Uint32Array(most + 1);
  // Under eight points to the fullest pixel the ramp is not stretched: a lone point must not look like a crowd.
  const full = Math.log(Math.max(most, 8));
  for (let count = 1; count <= most; count += 1) {
    colours[count] = ramp[Math.round((Math.log(count) / full) * (ramp.length - 1))]!;
  }
  return colours;
}
