import type { StarRow } from '../../src/contract/read-contract.ts';
import type { StarParameters } from '../../src/core/light-curve.ts';
import type { RawColumn, RawTable } from './raw-table.ts';

const LABEL = /^(target|star|name|object|id|label)$/i;

/** Columns of a stars table by what they hold; the unit is in the name where there could be two. */
const PARAMETERS: readonly { readonly field: keyof StarParameters; readonly name: RegExp }[] = [
  { field: 'raDeg', name: /^ra(_?deg)?$/i },
  { field: 'decDeg', name: /^dec(_?deg)?$/i },
  { field: 'magnitude', name: /^(mag|magnitude)$/i },
  { field: 'teffK', name: /^t_?eff(_?k)?$/i },
  { field: 'teffErrorK', name: /^(e_)?t_?eff(_?err(or)?)(_?k)?$|^e_teff$/i },
  { field: 'radiusSolar', name: /^(radius|r_?star|rad)(_?r?sun|_?rsun|_solar)?$/i },
  { field: 'radiusErrorSolar', name: /^(radius|r_?star|rad)_?err(or)?(_?rsun|_solar)?$|^e_rad(ius)?$/i },
  { field: 'massSolar', name: /^(mass|m_?star)(_?msun|_solar)?$/i },
  { field: 'massErrorSolar', name: /^(mass|m_?star)_?err(or)?(_?msun|_solar)?$|^e_mass$/i },
  { field: 'loggCgs', name: /^log_?g$/i },
  { field: 'loggErrorCgs', name: /^log_?g_?err(or)?$|^e_logg$/i },
  { field: 'densityCgs', name: /^(density|rho)(_?gcc|_?cgs)?$/i },
  { field: 'densityErrorCgs', name: /^(density|rho)_?err(or)?(_?gcc|_?cgs)?$|^e_(density|rho)$/i },
];

/**
 * Rows of a table of stars: a column of labels and at least two of parameters (degrees, K, solar radii and masses,
 * log g and density in cgs), no column of time or flux. Undefined where the table is none.
 */
export function readStars(table: RawTable): readonly StarRow[] | undefined {
  const labels = table.columns.find(({ name, texts }) => LABEL.test(name) && texts !== undefined)?.texts;
  const known = table.columns.flatMap((column) => {
    const parameter = PARAMETERS.find(({ name }) => name.test(column.name));
    return parameter === undefined ? [] : [{ field: parameter.field, column }];
  });
  if (labels === undefined || known.length < 2) return undefined;
  const band = table.columns.find(({ name }) => /^(band|filter|passband)$/i.test(name))?.texts;
  return labels.map((label, row) => ({ label, star: starAt(row, known, band) }));
}

function starAt(
  row: number,
  known: readonly { readonly field: keyof StarParameters; readonly column: RawColumn }[],
  band: readonly string[] | undefined,
): StarParameters {
  const numbers = known.map(({ field, column }) => [field, column.values[row]!] as const);
  const star = Object.fromEntries(numbers.filter(([, value]) => Number.isFinite(value)));
  return band?.[row] ? { ...star, magnitudeBand: band[row] } : star;
}
