import type { BoxSearchSettings } from '../../src/core/box-search-settings.ts';
import type { StarParameters } from '../../src/core/light-curve.ts';
import type { Recipe } from '../../src/core/recipe.ts';
import { stableKey } from '../../src/core/stable-key.ts';
import type { FileRecord } from '../../src/session/document.ts';

/**
 * The number of the kernels and the keys below are those of src/store/target-keys.ts, which this room may not import:
 * the app then takes a case's numbers for what they are, those of its own first search. A test holds them together.
 */
export const KERNELS = 2;

export interface KeyedInputs {
  readonly file: Pick<FileRecord, 'sha256' | 'mapping'>;
  readonly recipe: Recipe;
  readonly instrumentTable: string | undefined;
  readonly settings: BoxSearchSettings;
}

/** Of the prepared series of a target without marks and protected cases, and of the search of it. */
export function resultKeys({ file, recipe, instrumentTable, settings }: KeyedInputs) {
  const lightCurve = stableKey({ KERNELS, sha256: file.sha256, mapping: file.mapping });
  const none = { excluded: [], protectedEvents: [], protectedIntervals: [] };
  const prepared = stableKey({ lightCurve, recipe, ...none, instrumentTable });
  return { prepared, search: stableKey({ prepared, settings }) };
}

/** Mean density in g cm^-3: as given, or from mass and radius (1.409780 g cm^-3 is the Sun's, IAU 2015 B3 with CODATA G). */
export function densityOf({ densityCgs, massSolar, radiusSolar }: StarParameters): number | undefined {
  if (densityCgs !== undefined) return densityCgs;
  if (massSolar === undefined || radiusSolar === undefined) return undefined;
  return (1.40978 * massSolar) / radiusSolar ** 3;
}
