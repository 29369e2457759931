import { formatNumber } from '../core/number-format.ts';

/** A number as it is printed on a plot. @param decimals digits after the point, 0 to 15 */
export function numberLabel(value: number, decimals = 0): string {
  return formatNumber(value, decimals);
}
