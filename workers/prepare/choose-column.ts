import { failed, type Outcome } from '../../src/contract/outcome.ts';
import type { FluxColumn, FluxMeaning, LightCurve } from '../../src/core/light-curve.ts';

/** Most processed first. */
const ORDER: readonly FluxMeaning[] = ['corrected', 'aperture', 'unknown', 'raw'];

/** The named flux column, or the first of the most processed ones. */
export function chooseColumn({ fluxColumns }: LightCurve, name: string | undefined): Outcome<FluxColumn> {
  const chosen =
    name === undefined
      ? ORDER.map((meaning) => fluxColumns.find((column) => column.meaning === meaning)).find((column) => column)
      : fluxColumns.find((column) => column.name === name);
  if (chosen !== undefined) return { kind: 'done', value: chosen };
  const names = fluxColumns.map((column) => `"${column.name}"`).join(', ');
  return failed(
    name === undefined
      ? 'This light curve has no flux column.'
      : `The recipe asks for flux column "${name}", which this light curve does not have; it has ${names}.`,
  );
}
