import type { Steps } from './steps.ts';

/** Room and factors for transforms of real series of one length. */
export interface RealTransform {
  /** A power of two, at least 8. */
  readonly size: number;
  /** exp(-2 pi i j / size) for j = 0..size / 4, real and imaginary parts in turn. */
  readonly turns: Float64Array;
  readonly spare: Float64Array;
}

export function planRealTransform(size: number): RealTransform {
  return { size, turns: makeTurns(size), spare: new Float64Array(size) };
}

/** A quarter of the circle from an eighth of it. */
function makeTurns(size: number): Float64Array {
  const quarter = size / 4;
  const turns = new Float64Array(2 * quarter + 2);
  for (let j = 0; 2 * j <= quarter; j += 1) {
    const cosine = Math.cos((2 * Math.PI * j) / size);
    const sine = Math.sin((2 * Math.PI * j) / size);
    turns[2 * j] = cosine;
    turns[2 * j + 1] = -sine;
    turns[2 * (quarter - j)] = sine;
    turns[2 * (quarter - j) + 1] = -cosine;
  }
  return turns;
}

/**
 * Transform of real values as half as many complex ones, even places real and odd ones imaginary: `readMode` takes
 * the two apart. Stockham's self-sorting form with radix 4.
 * Source: Cooley & Tukey (1965), Math. Comp. 19, 297; Van Loan (1992), Computational Frameworks for the Fast Fourier
 * Transform, section 1.7 (from memory).
 *
 * @param values length `size`, written over
 * @returns `values` or the plan's spare room, whichever holds the result
 */
export function* transformReal({ size, turns, spare }: RealTransform, values: Float64Array): Steps<Float64Array> {
  let [from, into] = [values, spare];
  for (let length = size / 2, stride = 1; length > 1; length /= 4, stride *= 4) {
    if (length === 2) passOfTwo(from, into);
    else passOfFour(from, into, length, stride, turns);
    [from, into] = [into, from];
    yield size;
  }
  return from;
}

/** What one transform of this size yields in all. */
export const unitsOfTransform = (size: number): number => size * Math.ceil(Math.log2(size / 2) / 2);

/**
 * Butterflies of x[q + s (p + k n / 4)], k = 0..3, into y[q + s (4 p + k)] for a stride s and a length n; places count
 * complex numbers, and q runs over the stride. One function with plain names: it is where the time goes.
 */
function passOfFour(x: Float64Array, y: Float64Array, length: number, stride: number, turns: Float64Array): void {
  const quarter = (stride * length) >> 1;
  const width = stride << 1;
  const step = (4 * ((turns.length - 2) / length)) | 0;
  const end = length >> 2;
  for (let p = 0; p < end; p += 1) {
    const c = turns[step * p]!;
    const s = turns[step * p + 1]!;
    const c2 = c * c - s * s;
    const s2 = 2 * c * s;
    const c3 = c2 * c - s2 * s;
    const s3 = c2 * s + s2 * c;
    let a = width * p;
    let o = 4 * a;
    for (const last = a + width; a < last; a += 2, o += 2) {
      const ar = x[a]!;
      const ai = x[a + 1]!;
      const br = x[a + quarter]!;
      const bi = x[a + quarter + 1]!;
      const dr = x[a + 2 * quarter]!;
      const di = x[a + 2 * quarter + 1]!;
      const er = x[a + 3 * quarter]!;
      const ei = x[a + 3 * quarter + 1]!;
      const evenReal = ar + dr;
      const evenImaginary = ai + di;
      const oddReal = br + er;
      const oddImaginary = bi + ei;
      y[o] = evenReal + oddReal;
      y[o + 1] = evenImaginary + oddImaginary;
      const r1 = ar - dr + (bi - ei);
      const i1 = ai - di - (br - er);
      y[o + width] = r1 * c - i1 * s;
      y[o + width + 1] = r1 * s + i1 * c;
      const r2 = evenReal - oddReal;
      const i2 = evenImaginary - oddImaginary;
      y[o + 2 * width] = r2 * c2 - i2 * s2;
      y[o + 2 * width + 1] = r2 * s2 + i2 * c2;
      const r3 = ar - dr - (bi - ei);
      const i3 = ai - di + (br - er);
      y[o + 3 * width] = r3 * c3 - i3 * s3;
      y[o + 3 * width + 1] = r3 * s3 + i3 * c3;
    }
  }
}

/** The last pass where the length is an odd power of two: nothing is left to turn. */
function passOfTwo(x: Float64Array, y: Float64Array): void {
  const half = x.length / 2;
  for (let q = 0; q < half; q += 1) {
    y[q] = x[q]! + x[q + half]!;
    y[q + half] = x[q]! - x[q + half]!;
  }
}

/**
 * Takes the modes of the real series, sum x_l exp(+2 pi i k l / size), out of the transform of its pairs.
 *
 * @param scale what each mode k = 0..count is multiplied by; count < size / 2
 */
export function readModes(
  { size, turns }: RealTransform,
  pairs: Float64Array,
  scale: Float64Array,
  real: Float64Array,
  imaginary: Float64Array,
): void {
  const half = size / 2;
  for (let k = 0; k < scale.length; k += 1) {
    const a = 2 * k;
    const b = k === 0 ? 0 : size - a;
    const isPastQuarter = 2 * k > half;
    const j = isPastQuarter ? 2 * (half - k) : a;
    const c = isPastQuarter ? -turns[j]! : turns[j]!;
    const s = turns[j + 1]!;
    const evenReal = pairs[a]! + pairs[b]!;
    const evenImaginary = pairs[a + 1]! - pairs[b + 1]!;
    const oddReal = pairs[a + 1]! + pairs[b + 1]!;
    const oddImaginary = pairs[b]! - pairs[a]!;
    const share = 0.5 * scale[k]!;
    real[k] = share * (evenReal + c * oddReal - s * oddImaginary);
    imaginary[k] = -share * (evenImaginary + c * oddImaginary + s * oddReal);
  }
}
