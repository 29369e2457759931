const POWERS = Array.from({ length: 23 }, (_, exponent) => 10 ** exponent);
const MISSING = /^(|nan|-nan|null|none|--|-|n\/a|na|\.{3})$/i;

/**
 * The number that a cell holds, correctly rounded; NaN for the usual words of a missing value; undefined for
 * anything else. Fortran's D is an exponent.
 *
 * Up to 15 digits and powers of ten to 22 both factors are exact doubles and one operation rounds once (Clinger
 * 1990, PLDI 25, 92); the rest is left to the platform's own correctly rounded reading.
 */
export function readNumber(cell: string): number | undefined {
  const fast = readShort(cell);
  if (fast !== undefined) return fast;
  const text = cell.trim();
  if (MISSING.test(text)) return Number.NaN;
  if (/^[+-]?inf(inity)?$/i.test(text))
    return text.startsWith('-') ? Number.NEGATIVE_INFINITY : Number.POSITIVE_INFINITY;
  if (!/^[+-]?(\d+\.?\d*|\.\d+)([eEdD][+-]?\d+)?$/.test(text)) return undefined;
  return Number(text.replace(/[dD]/, 'e'));
}

/** Plain decimals of few digits, the bulk of every table. */
function readShort(text: string): number | undefined {
  let at = 0;
  const first = text.charCodeAt(0);
  const negative = first === 45;
  if (negative || first === 43) at = 1;
  let mantissa = 0;
  let digits = 0;
  let decimals = -1;
  for (; at < text.length; at += 1) {
    const code = text.charCodeAt(at);
    if (code === 46 && decimals < 0) decimals = 0;
    else if (code >= 48 && code <= 57) {
      mantissa = mantissa * 10 + (code - 48);
      digits += 1;
      if (decimals >= 0) decimals += 1;
    } else return undefined;
  }
  if (digits === 0 || digits > 15) return undefined;
  const value = decimals > 0 ? mantissa / POWERS[decimals]! : mantissa;
  return negative ? -value : value;
}
