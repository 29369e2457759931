import FFT from 'fft.js';

/** Grid points on each side of a point that its Gaussian reaches: nine keep nine digits. */
const REACH = 9;
/** The fine grid has at least so many points a mode, counted on both sides of zero. */
const OVERSAMPLING = 2;

/** Real and imaginary parts of sum c_j exp(2 pi i k x_j) for k = 0..count. */
export interface FrequencySums {
  readonly real: Float64Array;
  readonly imaginary: Float64Array;
}

/**
 * Sums of weighted phasors at evenly spaced frequencies by a non-uniform FFT with Gaussian gridding, to about 1e-9 of
 * the sum of |c|. Source: Greengard & Lee (2004), SIAM Rev. 46, 443, eqs. 3-9 and section 3.1.
 *
 * @param cycles x_j, any real, length n; only their fractions count
 * @param values c_j, length n
 * @param count highest k
 */
export function sumAtFrequencies(cycles: Float64Array, values: Float64Array, count: number): FrequencySums {
  const modes = 2 * count + 1;
  const size = 2 ** Math.ceil(Math.log2(Math.max(64, OVERSAMPLING * modes)));
  const ratio = size / modes;
  const tau = (Math.PI * REACH) / (modes * modes * ratio * (ratio - 0.5));
  const grid = spread(cycles, values, size, tau);
  const fft = new FFT(size);
  const spectrum = fft.createComplexArray() as number[];
  fft.realTransform(spectrum, grid);
  return deconvolve(spectrum, count, size, tau);
}

function spread(cycles: Float64Array, values: Float64Array, size: number, tau: number): Float64Array {
  const grid = new Float64Array(size);
  const step = (2 * Math.PI) / size;
  const mask = size - 1;
  // exp(-(x - l h)^2 / 4 tau) = exp(-x^2 / 4 tau) exp(x h / 2 tau)^l exp(-(l h)^2 / 4 tau): three factors.
  const steady = Float64Array.from({ length: REACH + 1 }, (_, l) => Math.exp(-((l * step) ** 2) / (4 * tau)));
  for (let j = 0; j < cycles.length; j += 1) {
    const place = (cycles[j]! - Math.floor(cycles[j]!)) * size;
    const nearest = Math.round(place);
    const offset = (place - nearest) * step;
    const centre = values[j]! * Math.exp(-(offset * offset) / (4 * tau));
    const turn = Math.exp((offset * step) / (2 * tau));
    let up = centre;
    let down = centre;
    grid[nearest & mask] = grid[nearest & mask]! + centre;
    for (let l = 1; l <= REACH; l += 1) {
      up *= turn;
      down /= turn;
      const right = (nearest + l) & mask;
      const left = (nearest - l + size) & mask;
      grid[right] = grid[right]! + up * steady[l]!;
      grid[left] = grid[left]! + down * steady[l]!;
    }
  }
  return grid;
}

/** The transform has exp(-i k x): the sign of the imaginary part is turned. */
function deconvolve(spectrum: readonly number[], count: number, size: number, tau: number): FrequencySums {
  const real = new Float64Array(count + 1);
  const imaginary = new Float64Array(count + 1);
  const factor = Math.sqrt(Math.PI / tau) / size;
  for (let k = 0; k <= count; k += 1) {
    const scale = factor * Math.exp(k * k * tau);
    real[k] = scale * spectrum[2 * k]!;
    imaginary[k] = -scale * spectrum[2 * k + 1]!;
  }
  return { real, imaginary };
}
