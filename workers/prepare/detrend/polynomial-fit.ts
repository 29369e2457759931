/** A pivot under this part of its diagonal has lost its digits: the degree ends before it. */
const LEAST_PIVOT = 1e-9;

/** Polynomials of least squares through runs of the same points. */
export interface PolynomialFit {
  /** Takes members first to end - 1; later runs lie among them. @param scaleDays what one unit of the powers is */
  gather(
    time: Float64Array,
    flux: Float64Array,
    members: { readonly first: number; readonly end: number },
    middleDays: number,
    scaleDays: number,
  ): void;
  /** Value at a time of the polynomial through members from to to - 1; of lower degree where they carry no more. */
  valueAt(from: number, to: number, time: number): number;
}

/**
 * Running sums of t^k and of t^k y; a run's sums are differences, moved to the wanted time by the binomial theorem, and
 * the polynomial's value there is its constant term. Normal equations by Cholesky's factors.
 */
export function createPolynomialFit(degree: number): PolynomialFit {
  const powers = 2 * degree + 1;
  const width = powers + degree + 1;
  const binomials = binomialsTo(2 * degree);
  const moved = new Float64Array(width);
  const solver = createConstantTerm(degree);
  let sums = new Float64Array(0);
  let [offset, level, middle, scale] = [0, 0, 0, 1];

  /** Entry `k` of a block of powers about the middle, taken about `shift` instead. */
  const moveBlock = (start: number, length: number, from: number, to: number, shift: number): void => {
    const low = (from - offset) * width + start;
    const high = (to - offset) * width + start;
    for (let k = 0; k < length; k += 1) {
      let value = 0;
      for (let j = 0; j <= k; j += 1)
        value = value * -shift + binomials[k * powers + j]! * (sums[high + j]! - sums[low + j]!);
      moved[start + k] = value;
    }
  };

  return {
    gather: (time, flux, { first, end }, middleDays, scaleDays) => {
      [offset, level, middle, scale] = [first, flux[first] ?? 0, middleDays, scaleDays];
      if (sums.length < (end - first + 1) * width) sums = new Float64Array((end - first + 1) * width);
      sums.fill(0, 0, width);
      for (let i = first; i < end; i += 1)
        addPowers(sums, (i - first) * width, width, powers, (time[i]! - middle) / scale, flux[i]! - level);
    },
    valueAt: (from, to, time) => {
      const shift = (time - middle) / scale;
      moveBlock(0, powers, from, to, shift);
      moveBlock(powers, degree + 1, from, to, shift);
      return level + solver(moved, powers, Math.min(degree, to - from - 2));
    },
  };
}

/** The sums of one more member, after those at `at`. */
function addPowers(sums: Float64Array, at: number, width: number, powers: number, x: number, y: number): void {
  let power = 1;
  for (let k = 0; k < powers; k += 1) {
    sums[at + width + k] = sums[at + k]! + power;
    if (powers + k < width) sums[at + width + powers + k] = sums[at + powers + k]! + power * y;
    power *= x;
  }
}

/** Row k holds the binomial coefficients of (a + b)^k, `most` + 1 to a row. */
function binomialsTo(most: number): Float64Array {
  const width = most + 1;
  const table = new Float64Array(width * width);
  for (let k = 0; k <= most; k += 1)
    for (let j = 0; j <= k; j += 1)
      table[k * width + j] = j === 0 ? 1 : table[(k - 1) * width + j - 1]! + (table[(k - 1) * width + j] ?? 0);
  return table;
}

/** The constant term of the polynomial with these sums: powers from 0, then right sides from `powers`. */
function createConstantTerm(mostDegree: number): (sums: Float64Array, powers: number, degree: number) => number {
  const size = mostDegree + 1;
  const factor = new Float64Array(size * size);
  const solution = new Float64Array(size);
  return (sums, powers, degree) => {
    const rows = factorise(factor, size, sums, degree);
    for (let row = 0; row < rows; row += 1) {
      let value = sums[powers + row]!;
      for (let k = 0; k < row; k += 1) value -= factor[row * size + k]! * solution[k]!;
      solution[row] = value / factor[row * size + row]!;
    }
    for (let row = rows - 1; row >= 0; row -= 1) {
      let value = solution[row]!;
      for (let k = row + 1; k < rows; k += 1) value -= factor[k * size + row]! * solution[k]!;
      solution[row] = value / factor[row * size + row]!;
    }
    return solution[0]!;
  };
}

/** Cholesky's factor of the matrix of power sums, as far as its pivots have digits. @returns how many rows */
function factorise(factor: Float64Array, size: number, sums: Float64Array, degree: number): number {
  for (let row = 0; row <= degree; row += 1) {
    for (let column = 0; column <= row; column += 1) {
      let value = sums[row + column]!;
      for (let k = 0; k < column; k += 1) value -= factor[row * size + k]! * factor[column * size + k]!;
      if (column < row) factor[row * size + column] = value / factor[column * size + column]!;
      else if (value > LEAST_PIVOT * sums[2 * row]!) factor[row * size + row] = Math.sqrt(value);
      else return row;
    }
  }
  return degree + 1;
}
