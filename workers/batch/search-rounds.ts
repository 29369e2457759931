import { done, type Outcome } from '../../src/contract/outcome.ts';
import type { BoxPeak, BoxSearchResult, SearchSeries } from '../../src/contract/search-contract.ts';
import { type BoxSearchSettings, type MaskedSignal, rankedSignalToNoise } from '../../src/core/box-search-settings.ts';
import type { CaseNumbers } from '../../src/session/document.ts';
import type { Checkpoint } from '../checkpoint.ts';
import { maskSignals } from '../search/mask-signals.ts';
import { searchBoxPart } from '../search/search-part.ts';
import { summariseBoxSearch } from '../search/summarise.ts';
import type { SweepSettings, SweptSignal, TargetResult } from './target-result.ts';

type Rounds = Pick<TargetResult, 'signals' | 'roundsSearched' | 'ending'>;

/**
 * Searches round after round, the strongest signal of each masked for the next, until one stays under the S/N asked
 * for, looks like two stars, or the rounds are used up. A strong signal of too few events is masked but not kept.
 *
 * @param key of the first round, under which the numbers of every round are given: the later ones follow from it
 */
export async function searchRounds(
  series: SearchSeries,
  { key, settings, options }: { key: string; settings: BoxSearchSettings; options: SweepSettings },
  checkpoint: Checkpoint,
): Promise<Outcome<Rounds>> {
  const signals: SweptSignal[] = [];
  const masked: MaskedSignal[] = [];
  for (let round = 1; ; round += 1) {
    const searched = await searchOnce(series, { key, settings: { ...settings, masked: [...masked] } }, checkpoint);
    if (searched.kind === 'failed' && round > 1)
      return done({ signals, ...endedBy(round - 1, searched.error.sentence) });
    if (searched.kind !== 'done') return searched;
    const { peaks, holdBack } = searched.value;
    const [strongest] = peaks;
    if (strongest === undefined || !(rankedSignalToNoise(strongest, settings.objective) >= options.leastSignalToNoise))
      return done({ signals, ...endedBy(round, weakWords(round, strongest, { settings, options })) });
    if (strongest.eventCount >= options.leastEvents) signals.push(signalOf(round, strongest, key));
    if (holdBack !== undefined) return done({ signals, ...endedBy(round, holdBack) });
    if (round >= options.rounds) return done({ signals, ...endedBy(round, 'More rounds were not asked for.') });
    masked.push(maskOf(strongest));
  }
}

async function searchOnce(
  whole: SearchSeries,
  { key, settings }: { key: string; settings: BoxSearchSettings },
  checkpoint: Checkpoint,
): Promise<Outcome<BoxSearchResult>> {
  const series = maskSignals(whole, settings.masked);
  const part = await searchBoxPart(series, { key, settings, part: 0, partCount: 1 }, checkpoint);
  if (part.kind !== 'done') return part;
  const maskedPoints = whole.time.length - series.time.length;
  return summariseBoxSearch(series, { key, settings, parts: [part.value], maskedPoints }, checkpoint);
}

const endedBy = (roundsSearched: number, ending: string) => ({ roundsSearched, ending });

function weakWords(
  round: number,
  peak: BoxPeak | undefined,
  { settings, options }: { readonly settings: BoxSearchSettings; readonly options: SweepSettings },
): string {
  if (peak === undefined) return `Round ${round} has no dip at any period.`;
  const strength = rankedSignalToNoise(peak, settings.objective).toFixed(2);
  return `The strongest signal of round ${round}, ${Number(peak.periodDays.toPrecision(5))} d, has ${settings.objective} ${strength}, under ${options.leastSignalToNoise}.`;
}

function signalOf(round: number, peak: BoxPeak, key: string): SweptSignal {
  const { periodDays, periodErrorDays, epochDays, epochErrorDays, durationDays } = peak;
  return {
    round,
    timing: {
      kind: 'linear',
      periodDays,
      periodErrorDays: finite(periodErrorDays),
      epochDays,
      epochErrorDays: finite(epochErrorDays),
      durationDays,
    },
    numbers: numbersOf(peak, key),
  };
}

function numbersOf(peak: BoxPeak, key: string): CaseNumbers {
  return {
    key,
    boxDepth: peak.boxDepth,
    boxDepthError: finite(peak.boxDepthError),
    signalToNoise: finite(peak.signalToNoise),
    correlatedSignalToNoise: finite(peak.correlatedSignalToNoise),
    sde: finite(peak.sde),
    falseAlarmProbability: undefined,
    eventCount: peak.eventCount,
  };
}

/** A session holds no NaN: what a strange series leaves without a value is not known. */
const finite = (value: number | undefined): number | undefined =>
  value !== undefined && Number.isFinite(value) ? value : undefined;

function maskOf({ periodDays, epochDays, durationDays, boxDepth, signalToNoise, sde }: BoxPeak): MaskedSignal {
  return { periodDays, epochDays, durationDays, boxDepth, signalToNoise, sde };
}
