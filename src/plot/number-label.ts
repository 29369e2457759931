const THIN = '\u00a0';
const MINUS = '\u2212';

/**
 * A number as it is printed on a plot: U+2212 for minus, U+00A0 between groups of three, before the point from four
 * digits on, after it from five. @param decimals digits after the point, 0 to 15
 */
export function numberLabel(value: number, decimals = 0): string {
  if (!Number.isFinite(value)) return '—';
  const fixed = Math.abs(value).toFixed(decimals);
  const [whole = '0', fraction] = fixed.split('.');
  const sign = value < 0 && Number(fixed) !== 0 ? MINUS : '';
  return sign + groupWhole(whole) + (fraction ? `.${groupFraction(fraction)}` : '');
}

function groupWhole(digits: string): string {
  return digits.replace(/\B(?=(\d{3})+$)/g, THIN);
}

function groupFraction(digits: string): string {
  return digits.length > 4 ? digits.replace(/(\d{3})(?=\d)/g, `$1${THIN}`) : digits;
}
