import { cancelled, done, type Outcome } from '../../src/contract/outcome.ts';
import type {
  BoxSearchPart,
  BoxSearchResult,
  CorrelatedNoise,
  SearchSeries,
  SummariseJob,
} from '../../src/contract/search-contract.ts';
import type { SearchObjective } from '../../src/core/box-search-settings.ts';
import { correlatedSigmaAt, correlatedSignalToNoise } from '../../src/core/correlated-noise.ts';
import type { Checkpoint } from '../checkpoint.ts';
import { type BoxWork, makeBoxWork } from './box-search.ts';
import { measureCorrelatedNoise } from './correlated-noise.ts';
import { detectionEfficiency } from './detection-efficiency.ts';
import { maskWork } from './event-sums.ts';
import { findHoldBack } from './hold-back.ts';
import { joinParts } from './join-parts.ts';
import { levelEfficiency } from './levelled-efficiency.ts';
import { MASK_HALF_WIDTH } from './mask-signals.ts';
import { findSignals } from './peaks.ts';
import { planBoxSearch } from './plan-box-search.ts';

/** Joins the parts of a search, in any order, finds its signals and says what they stand out from. */
export async function summariseBoxSearch(
  series: SearchSeries,
  { key, settings, parts, maskedPoints = 0 }: Omit<SummariseJob, 'jobId' | 'seriesId'> & { maskedPoints?: number },
  checkpoint: Checkpoint,
): Promise<Outcome<BoxSearchResult>> {
  const planned = planBoxSearch(series, settings);
  if (planned.kind !== 'done') return planned;
  const { periods, resolved } = planned.value;
  const join = (column: (part: BoxSearchPart) => Float64Array): Float64Array =>
    joinParts(parts, column, periods.length);
  const scan = {
    periods,
    signalToNoise: join((part) => part.power),
    durationDays: join((part) => part.durationDays),
    epochDays: join((part) => part.epochDays),
    depth: join((part) => part.depth),
  };
  const work = makeBoxWork(series);
  const noise = measureCorrelatedNoise(withoutStrongest(work, scan), thinOut(resolved.durationsDays));
  const objective = rankTrials(scan, noise, settings.objective, series.time.at(-1)! - series.time[0]!);
  const columns = {
    ...scan,
    objective,
    sde: detectionEfficiency(scan.signalToNoise),
    levelledEfficiency: levelEfficiency(scan.signalToNoise),
  };
  const peaks = await findSignals(series, work, columns, noise, checkpoint);
  if (peaks === undefined) return cancelled;
  const holdBack = findHoldBack(work, peaks, noise);
  return done({ key, ...columns, correlatedNoise: noise, peaks, holdBack, settings: { ...resolved, maskedPoints } });
}

type Scan = Pick<BoxSearchResult, 'periods' | 'signalToNoise' | 'durationDays' | 'epochDays' | 'depth'>;

/** Correlated noise changes slowly with duration: six of the durations tell it. */
function thinOut(durations: readonly number[]): readonly number[] {
  const step = Math.max(1, Math.ceil(durations.length / 6));
  return durations.filter((_, i) => i % step === 0);
}

/** What is left for noise when the strongest trial's events are taken out. */
function withoutStrongest(work: BoxWork, scan: Scan): BoxWork {
  let best = 0;
  for (let i = 1; i < scan.periods.length; i += 1) if (scan.signalToNoise[i]! > scan.signalToNoise[best]!) best = i;
  if (!(scan.durationDays[best]! > 0)) return work;
  const { periods, epochDays, durationDays } = scan;
  const strongest = { periodDays: periods[best]!, epochDays: epochDays[best]!, durationDays: durationDays[best]! };
  const rest = maskWork(work, [strongest], MASK_HALF_WIDTH);
  return rest.totalWeight > 0 ? rest : work;
}

/** The S/N that trials are ranked by; of the box kept at each, the number of events is that of cycles in the span. */
function rankTrials(
  { periods, signalToNoise, durationDays, depth }: Scan,
  noise: CorrelatedNoise,
  objective: SearchObjective,
  spanDays: number,
): Float64Array {
  if (objective === 'white noise S/N') return signalToNoise;
  return signalToNoise.map((white, i) => {
    if (!(white > 0)) return 0;
    const sigma = correlatedSigmaAt(noise, durationDays[i]!);
    return correlatedSignalToNoise(depth[i]!, depth[i]! / white, sigma, spanDays / periods[i]!);
  });
}
