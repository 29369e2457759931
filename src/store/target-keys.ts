import { DEFAULT_LOMB_SCARGLE } from '../contract/lomb-scargle-contract.ts';
import type { PrepareJob } from '../contract/prepare-contract.ts';
import { DEFAULT_SINGLE_EVENTS, type SingleEventsSettings } from '../contract/single-events-contract.ts';
import { type BoxSearchSettings, DEFAULT_BOX_SEARCH } from '../core/box-search-settings.ts';
import type { Ephemeris } from '../core/ephemeris.ts';
import type { Interval } from '../core/interval.ts';
import { stableKey } from '../core/stable-key.ts';
import type { Target } from '../session/document.ts';

/**
 * Keys of everything computed for a target, each a hash of all its inputs. KERNELS goes into every key and is raised
 * when a kernel's numbers change, so that an old session's frozen numbers can be told from new ones.
 */
const KERNELS = 2;

/** Of the estimate of false alarms: how many surrogates, and what their random numbers start from. */
export const SURROGATES = { surrogateCount: 200, seed: 1 } as const;

export const lightCurveKey = keyOf((target) => {
  const file = target.files[0]!;
  return { KERNELS, sha256: file.sha256, mapping: file.mapping };
});

/** What preparation needs of a target besides its light curve and what the session keeps for all targets. */
export function preparationOf(
  target: Target,
): Pick<PrepareJob, 'recipe' | 'excluded' | 'protectedEvents' | 'protectedIntervals'> {
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

export const preparedKey = keyOf((target) => ({
  lightCurve: lightCurveKey(target),
  ...preparationOf(target),
  instrumentTable: target.instrumentTable,
  modeSet: target.recipe.commonModes > 0 ? target.modeSet : undefined,
}));

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

/** Keys of this round of the search and of those before it: a case keeps the numbers of its own round. */
export function roundKeys(target: Target): readonly string[] {
  const masked = target.search.masked ?? [];
  const earlier = masked.map((_, round) => ({
    ...target,
    search: { ...target.search, masked: masked.slice(0, round) },
  }));
  return [searchKey(target), ...earlier.map(searchKey)];
}

/** Keys of what is computed on request, each of its own inputs. */
export const sinesKey = keyOf((target) => ({ sines: preparedKey(target), settings: DEFAULT_LOMB_SCARGLE }));
export const singlesKey = keyOf((target) => ({ singles: preparedKey(target), settings: singleSettingsOf(target) }));
export const falseAlarmKey = keyOf((target) => ({ falseAlarm: searchKey(target), SURROGATES }));

/** Of the common modes that a target's recipe takes out. */
export const modesKey = ({ modeSet, recipe }: Target): string => `modes ${modeSet} ${recipe.commonModes}`;

/** Single events are looked for beside the signals that the search has masked. */
export function singleSettingsOf(target: Target): SingleEventsSettings {
  return { ...DEFAULT_SINGLE_EVENTS, densityCgs: densityOf(target), masked: target.search.masked ?? [] };
}

/** Mean density in g cm^-3: as given, or from mass and radius (1.409780 g cm^-3 is the Sun's, IAU 2015 B3 with CODATA G). */
export function densityOf(target: Target): number | undefined {
  const { densityCgs, massSolar, radiusSolar } = target.star;
  if (densityCgs !== undefined) return densityCgs;
  if (massSolar === undefined || radiusSolar === undefined) return undefined;
  return (1.40978 * massSolar) / radiusSolar ** 3;
}
