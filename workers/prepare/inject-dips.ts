import { type Ephemeris, phaseOf } from '../../src/core/ephemeris.ts';
import type { FluxColumn, FluxUnit, LightCurve } from '../../src/core/light-curve.ts';

/**
 * A light curve with box dips put into one of its flux columns, in that column's unit.
 *
 * @param depth relative; in sigma where the column is
 */
export function injectDips(
  lightCurve: LightCurve,
  column: FluxColumn,
  { periodDays, epochDays, durationDays }: Ephemeris,
  depth: number,
): LightCurve {
  const { time } = lightCurve;
  const flux = column.flux.map((value, i) =>
    Math.abs(phaseOf(time[i]!, periodDays, epochDays)) * periodDays > durationDays / 2
      ? value
      : dimmed(value, column.unit, depth),
  );
  const fluxColumns = lightCurve.fluxColumns.map((other) => (other === column ? { ...column, flux } : other));
  return { ...lightCurve, fluxColumns };
}

/** A dip of a magnitude goes up: Pogson (1856), MNRAS 17, 12. */
function dimmed(value: number, unit: FluxUnit, depth: number): number {
  if (unit === 'magnitude') return value - 2.5 * Math.log10(1 - depth);
  if (unit === 'ppm') return (1 + value * 1e-6) * (1 - depth) * 1e6 - 1e6;
  return unit === 'sigma' ? value - depth : value * (1 - depth);
}
