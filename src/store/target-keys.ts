import type { PrepareJob } from '../contract/prepare-contract.ts';
import { type BoxSearchSettings, DEFAULT_BOX_SEARCH } from '../core/box-search-settings.ts';
import type { Ephemeris } from '../core/ephemeris.ts';
import type { Interval } from '../core/interval.ts';
import { stableKey } from '../core/stable-key.ts';
import type { Target } from '../session/document.ts';

/**
 * Keys of everything computed for a target, each a hash of all its inputs. KERNELS goes into every key and is raised
 * when a kernel's numbers change, so that an old session's frozen numbers can be told from new ones.
 */
const KERNELS = 1;

export const lightCurveKey = keyOf((target) => {
  const file = target.files[0]!;
  return { KERNELS, sha256: file.sha256, mapping: file.mapping };
});

/** What preparation needs of a target besides its light curve. */
export function preparationOf(target: Target): Omit<PrepareJob, 'jobId' | 'key' | 'lightCurve'> {
  const excluded = target.marks.filter((mark) => mark.kind === 'exclude').map((mark) => mark.interval);
  const protectedEvents: Ephemeris[] = [];
  const protectedIntervals: Interval[] = [];
  for (const { timing } of target.recipe.protectCases ? target.cases : []) {
    const half = timing.durationDays / 2;
    if (timing.kind === 'linear') protectedEvents.push(timing);
    if (timing.kind === 'single')
      protectedIntervals.push({ start: timing.timeDays - half, end: timing.timeDays + half });
  }
  return { recipe: target.recipe, excluded, protectedEvents, protectedIntervals };
}

export const preparedKey = keyOf((target) => ({ lightCurve: lightCurveKey(target), ...preparationOf(target) }));

/** The settings of a target's search: its own where the analyst set them, the star's density where it is known. */
export function searchSettingsOf(target: Target): BoxSearchSettings {
  return { ...DEFAULT_BOX_SEARCH, densityCgs: densityOf(target), ...target.search };
}

export const searchKey = keyOf((target) => ({ prepared: preparedKey(target), settings: searchSettingsOf(target) }));

/** Targets are never mutated, and the screen asks for their keys many times a second: each is hashed once. */
function keyOf(inputsOf: (target: Target) => unknown): (target: Target) => string {
  const known = new WeakMap<Target, string>();
  return (target) => {
    const before = known.get(target);
    if (before !== undefined) return before;
    const key = stableKey(inputsOf(target));
    known.set(target, key);
    return key;
  };
}

/** Mean density in g cm^-3: as given, or from mass and radius (1.409780 g cm^-3 is the Sun's, IAU 2015 B3 with CODATA G). */
function densityOf(target: Target): number | undefined {
  const { densityCgs, massSolar, radiusSolar } = target.star;
  if (densityCgs !== undefined) return densityCgs;
  if (massSolar === undefined || radiusSolar === undefined) return undefined;
  return (1.40978 * massSolar) / radiusSolar ** 3;
}
