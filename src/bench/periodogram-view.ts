import { rankedSignalToNoise } from '../core/box-search-settings.ts';
import { strengthAt } from '../core/extreme-value.ts';
import { isSameSignal } from '../core/same-signal.ts';
import { numberLabel } from '../plot/number-label.ts';
import type { PeriodogramAlias, PeriodogramPeak } from '../plot/periodogram-scene.ts';
import type { BenchSelection } from '../store/bench-selection.ts';
import type { PeriodogramValue } from '../store/view-store.ts';

/** What the periodogram pane draws, whichever search it came from. */
export interface PeriodogramView {
  readonly periods: Float64Array;
  readonly values: Float64Array;
  readonly yTitle: string;
  readonly peaks: readonly PeriodogramPeak[];
  readonly aliases: readonly PeriodogramAlias[];
  readonly threshold: { readonly value: number; readonly label: string } | undefined;
  readonly sentence: string;
}

const NONE = new Float64Array();
/** False-alarm probability of the line that is drawn. */
const LEVEL = 0.01;

const TITLES: Readonly<Record<PeriodogramValue, string>> = { SDE: 'SDE', levelled: 'levelled SDE', 'S/N': 'S/N' };

export function boxView(bench: BenchSelection, quantity: PeriodogramValue): PeriodogramView {
  const { search, falseAlarm } = bench;
  const values = search && { SDE: search.sde, levelled: search.levelledEfficiency, 'S/N': search.objective }[quantity];
  const level = falseAlarm === undefined ? undefined : strengthAt(falseAlarm, LEVEL);
  return {
    periods: search?.periods ?? NONE,
    values: values ?? NONE,
    yTitle: TITLES[quantity],
    peaks: boxPeaks(bench, quantity),
    aliases: boxAliases(bench),
    threshold:
      level === undefined || quantity !== 'S/N'
        ? undefined
        : { value: level, label: `1 % false alarm, ${numberLabel(level, 1)}` },
    sentence: boxSentence(bench),
  };
}

/** A peak wears its case's shape where a case has the same signal. */
function boxPeaks({ search, target, prepared }: BenchSelection, quantity: PeriodogramValue): PeriodogramPeak[] {
  return (search?.peaks ?? []).map((peak) => ({
    periodDays: peak.periodDays,
    value: {
      SDE: peak.sde,
      levelled: peak.levelledEfficiency,
      'S/N': rankedSignalToNoise(peak, search!.settings.objective),
    }[quantity],
    label: `${numberLabel(peak.periodDays, 5)} d`,
    caseNumber: target?.cases.find(
      ({ timing }) => timing.kind === 'linear' && isSameSignal(timing, peak, prepared?.spanDays ?? 0),
    )?.number,
  }));
}

/** The periods of a selected alias set, else those that the selected signal makes besides its own. */
function boxAliases({ search, ephemeris, prepared, case: chosen }: BenchSelection): PeriodogramAlias[] {
  if (chosen?.timing.kind === 'alias set')
    return chosen.timing.periods.map(({ periodDays, weight }) => ({
      periodDays,
      label: `${numberLabel(weight * 100)} %`,
      caseNumber: chosen.number,
    }));
  if (ephemeris === undefined) return [];
  const signal = search?.peaks.find((peak) => isSameSignal(ephemeris, peak, prepared?.spanDays ?? 0));
  return (signal?.relatives ?? []).map(({ periodDays, relation }) => ({
    periodDays,
    // Aliases have names too long to stand side by side; the sheet has them.
    label: relation.includes('P') ? relation : '',
    caseNumber: chosen?.number,
  }));
}

function boxSentence({ search }: BenchSelection): string {
  const best = search?.peaks[0];
  if (search !== undefined && best === undefined) return 'Periodogram: no dip found.';
  if (best === undefined) return 'Periodogram: nothing searched yet.';
  return (
    `Periodogram: strongest peak at ${numberLabel(best.periodDays, 5)} days, ` +
    `SDE ${numberLabel(best.sde, 1)}, S/N ${numberLabel(best.signalToNoise, 1)}.`
  );
}

export function sinesView({ sines }: BenchSelection): PeriodogramView {
  const peaks = sines?.peaks ?? [];
  const level = sines?.levels.find(({ probability }) => probability === LEVEL);
  const best = peaks[0];
  return {
    periods: sines?.frequencies.map((frequency) => 1 / frequency).reverse() ?? NONE,
    values: sines?.power.toReversed() ?? NONE,
    yTitle: 'power',
    peaks: peaks.map((peak) => ({
      periodDays: peak.periodDays,
      value: peak.power,
      label: `${numberLabel(peak.periodDays, 4)} d${peak.relation === undefined ? '' : `, ${peak.relation}`}`,
    })),
    aliases: [],
    threshold: level && { value: level.power, label: '1 % false alarm, white noise assumed' },
    sentence:
      best === undefined
        ? 'Lomb-Scargle periodogram: no sine stands out.'
        : `Lomb-Scargle periodogram: strongest sine at ${numberLabel(best.periodDays, 4)} days, ` +
          `semi-amplitude ${numberLabel(best.amplitude * 1e6)} ppm.`,
  };
}
