/** Cells of one grid step in which the kernel is a cubic: its error is then below 1e-10 of the kernel's height. */
const CELLS = 64;
const NODES = [1, 3, 5, 7].map((k) => Math.cos((k * Math.PI) / 8));

/** A window of compact support that carries a value at any place onto an even grid. */
export interface SpreadingKernel {
  /** Grid points that a value reaches. */
  readonly width: number;
  readonly cells: number;
  /**
   * Cubic of cell c and grid point l at [4 (c width + l)], lowest power first, in v = -1..1 across the cell. Cell c
   * is for grid points that start c / cells to (c + 1) / cells of a step inside the kernel.
   */
  readonly cubics: Float64Array;
  /** Its Fourier transform at a frequency in cycles a grid step. */
  transformAt(frequency: number): number;
}

/**
 * Kaiser-Bessel window for a non-uniform FFT, as narrow as the accuracy allows.
 * Source: Fessler & Sutton (2003), IEEE Trans. Signal Process. 51, 560, section IV; shape and the width for an
 * accuracy after Barnett, Magland & af Klinteberg (2019), SIAM J. Sci. Comput. 41, C479, section 3 (from memory).
 *
 * @param oversampling grid points over twice the highest frequency, above 1
 * @param accuracy of the sums, as a part of the sum of absolute values
 */
export function makeKaiserBessel(oversampling: number, accuracy: number): SpreadingKernel {
  const width = Math.ceil(-Math.log(accuracy) / (Math.PI * Math.sqrt(1 - 1 / oversampling))) + 1;
  const shape = Math.PI * width * (1 - 1 / (2 * oversampling));
  const scale = 1 / besselI0(shape);
  const heightAt = (u: number): number => scale * besselI0(shape * Math.sqrt(Math.max(0, 1 - ((2 * u) / width) ** 2)));
  return {
    width,
    cells: CELLS,
    cubics: fitCubics(heightAt, width),
    transformAt: (frequency) => {
      const root = Math.sqrt(shape * shape - (Math.PI * width * frequency) ** 2);
      const growth = Math.exp(root);
      return (scale * width * 0.5 * (growth - 1 / growth)) / root;
    },
  };
}

/** Interpolated at Chebyshev's nodes, as sums of T_0 to T_3. */
function fitCubics(heightAt: (u: number) => number, width: number): Float64Array {
  const cubics = new Float64Array(4 * CELLS * width);
  for (let cell = 0; cell < CELLS; cell += 1)
    for (let l = 0; l < width; l += 1) {
      const heights = NODES.map((v) => heightAt((cell + (v + 1) / 2) / CELLS - width / 2 + l));
      const [t0, t1, t2, t3] = chebyshevTerms(heights);
      cubics.set([t0 - t2, t1 - 3 * t3, 2 * t2, 4 * t3], 4 * (cell * width + l));
    }
  return cubics;
}

function chebyshevTerms(heights: readonly number[]): [number, number, number, number] {
  let [t0, t1, t2, t3] = [0, 0, 0, 0];
  for (let i = 0; i < NODES.length; i += 1) {
    const v = NODES[i]!;
    const height = heights[i]! / 2;
    t0 += height / 2;
    t1 += height * v;
    t2 += height * (2 * v * v - 1);
    t3 += height * (4 * v * v - 3) * v;
  }
  return [t0, t1, t2, t3];
}

/** Modified Bessel function of order zero by its power series, all of whose terms are positive; |x| below 100. */
function besselI0(x: number): number {
  const quarter = (x * x) / 4;
  let term = 1;
  let sum = 1;
  for (let k = 1; term > 1e-17 * sum; k += 1) {
    term *= quarter / (k * k);
    sum += term;
  }
  return sum;
}
