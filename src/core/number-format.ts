/** Numbers as they are printed: grouped in threes, a true minus sign, a value and its error to the same decimal. */

const SPACE = '\u00a0';
const MINUS = '\u2212';
export const NOT_COMPUTED = '\u2014';
export const NO_ERROR = '\u00b1 not known';

/**
 * U+2212 for minus, U+00A0 between groups of three: before the point from four digits on, after it from five.
 * @param decimals digits after the point, 0 to 15
 */
export function formatNumber(value: number | undefined, decimals = 0): string {
  if (value === undefined || !Number.isFinite(value)) return NOT_COMPUTED;
  const fixed = Math.abs(value).toFixed(Math.min(15, Math.max(0, decimals)));
  const [whole = '0', fraction] = fixed.split('.');
  const sign = value < 0 && Number(fixed) !== 0 ? MINUS : '';
  return sign + groupWhole(whole) + (fraction ? `.${groupFraction(fraction)}` : '');
}

/**
 * Decimals to which a value with this error is printed: two significant figures of the error when its first digit is
 * 1 to 5, else one. Undefined for an error of zero or none.
 */
export function decimalsFor(error: number): number | undefined {
  if (!(error > 0) || !Number.isFinite(error)) return undefined;
  // toExponential rounds first, so that 0.0996 is seen as 0.10.
  const [digits = '1', exponent = '0'] = error.toExponential(1).split('e');
  const figures = Number(digits) < 6 ? 2 : 1;
  return Math.max(0, figures - 1 - Number(exponent));
}

/** A value and its error for the columns of a sheet; without an error the value has `decimals`, and the error says so. */
export function formatValueWithError(
  value: number | undefined,
  error: number | undefined,
  decimals = 4,
): { readonly value: string; readonly error: string } {
  const shown = error === undefined ? undefined : decimalsFor(error);
  if (value === undefined || !Number.isFinite(value)) return { value: NOT_COMPUTED, error: '' };
  if (shown === undefined) return { value: formatNumber(value, decimals), error: NO_ERROR };
  return { value: formatNumber(value, shown), error: `\u00b1 ${formatNumber(error, shown)}` };
}

/** "7.318 42(11)": the error in units of the value's last digits. */
export function formatConcise(value: number, error: number | undefined, decimals = 6): string {
  const shown = error === undefined ? undefined : decimalsFor(error);
  if (error === undefined || shown === undefined) return formatNumber(value, decimals);
  const digits = shown === 0 ? formatNumber(error) : String(Math.round(error * 10 ** shown));
  return `${formatNumber(value, shown)}(${digits})`;
}

function groupWhole(digits: string): string {
  return digits.replace(/\B(?=(\d{3})+$)/g, SPACE);
}

function groupFraction(digits: string): string {
  return digits.length > 4 ? digits.replace(/(\d{3})(?=\d)/g, `$1${SPACE}`) : digits;
}
